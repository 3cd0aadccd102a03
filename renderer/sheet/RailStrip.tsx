import { useRef, type CSSProperties, type KeyboardEvent, type PointerEvent, type ReactNode } from 'react'
import { levelAfterKey } from './level-rail-keys.ts'
import { nearestLevel } from './nearest-level.ts'
import type { RailBar } from './rail-bars.ts'

/** A place at which the handle stops. */
export interface RailStop {
  readonly key: string
  /** Along the track, 0 to 1. */
  readonly share: number
  readonly bar: RailBar | undefined
}

export interface RailMark {
  readonly share: number
  readonly text: string
}

export interface RailStripProps {
  /** What the strip is called. */
  readonly name: string
  /** Of the number at its left. */
  readonly label: string
  readonly number: string
  /** What the bars mean, line by line. */
  readonly caption: readonly string[]
  readonly slider: {
    readonly name: string
    readonly least: number
    readonly greatest: number
    readonly now: number
    /** What stands at this stop, in words, for people who hear the screen. */
    readonly spoken: string
  }
  /** In their order along the track. */
  readonly stops: readonly RailStop[]
  readonly index: number
  readonly marks: readonly RailMark[]
  /** As many bars have room beside each other as there are stops, or these. */
  readonly fewestBars?: number
  readonly onMove: (index: number) => void
  /** Numbers at the current stop. */
  readonly children: ReactNode
}

const percent = (share: number): string => `${(share * 100).toFixed(3)}%`

/** The strip along the foot of the sheet: one handle that goes from stop to stop by keys or by hand, a bar at each stop, numbers at both ends. */
export function RailStrip({ name, label, number, caption, slider, stops, index, marks, fewestBars = 0, onMove, children }: RailStripProps) {
  const trackRef = useRef<HTMLDivElement>(null)

  const onKeyDown = (event: KeyboardEvent): void => {
    if (event.ctrlKey || event.metaKey || event.altKey) return
    const target = levelAfterKey(event.key, index, stops.length)
    if (target === null) return
    event.preventDefault()
    onMove(target)
  }

  const moveTo = (event: PointerEvent): void => {
    const { current: track } = trackRef
    if (track === null) return
    const { left, width } = track.getBoundingClientRect()
    const shares = stops.map(({ share }) => share)
    const nearest = nearestLevel(shares, (event.clientX - left) / width)
    // Of several stops at one place the current one stays.
    if (shares[nearest] !== shares[index]) onMove(nearest)
  }

  return (
    <footer className="rail" aria-label={name}>
      <div className="rail-level">
        <span className="rail-label">{label}</span>
        <output className="rail-number">{number}</output>
      </div>
      <p className="rail-caption">
        {caption.map((line) => (
          <span key={line}>{line} </span>
        ))}
      </p>
      <div
        className="rail-grip"
        // oxlint-disable-next-line jsx-a11y/prefer-tag-over-role -- a range input has no uneven stops and no bars
        role="slider"
        tabIndex={0}
        aria-label={slider.name}
        aria-orientation="horizontal"
        aria-valuemin={slider.least}
        aria-valuemax={slider.greatest}
        aria-valuenow={slider.now}
        aria-valuetext={slider.spoken}
        onKeyDown={onKeyDown}
        onPointerDown={(event) => {
          if (event.button !== 0) return
          event.currentTarget.setPointerCapture(event.pointerId)
          moveTo(event)
        }}
        onPointerMove={(event) => {
          if (event.currentTarget.hasPointerCapture(event.pointerId)) moveTo(event)
        }}
      >
        <div className="rail-track" ref={trackRef} style={{ '--levels': Math.max(fewestBars, stops.length) } as CSSProperties}>
          {marks.map((mark) => (
            <span key={mark.text} className="rail-mark" style={{ left: percent(mark.share) }}>
              <span>{mark.text}</span>
            </span>
          ))}
          {stops.map((stop, i) => (
            <Bar key={stop.key} stop={stop} isCurrent={i === index} />
          ))}
          <span className="rail-handle" style={{ left: percent(stops[index]?.share ?? 0) }} />
        </div>
      </div>
      <div className="rail-readout">{children}</div>
    </footer>
  )
}

function Bar({ stop: { share, bar }, isCurrent }: { readonly stop: RailStop; readonly isCurrent: boolean }) {
  const height = bar?.height ?? null
  const state = `${isCurrent ? ' is-current' : ''}${bar?.cut === true ? ' is-cut' : ''}${height === null ? ' is-empty' : ''}`
  return (
    <span className={`rail-bar${state}`} style={{ left: percent(share), height: height === null ? undefined : `${4 + height * 22}px` }} />
  )
}

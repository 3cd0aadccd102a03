import { useRef, type CSSProperties, type KeyboardEvent, type PointerEvent, type ReactNode } from 'react'
import { formatLevel } from './format.ts'
import { levelAfterKey } from './level-rail-keys.ts'
import { nearestLevel } from './nearest-level.ts'
import type { RailBar } from './rail-bars.ts'

export interface LevelRailProps {
  readonly levels: readonly number[]
  readonly index: number
  readonly bars: readonly RailBar[]
  /** What the bars mean, line by line. */
  readonly caption?: readonly string[]
  /** What stands at this level, in words, for people who hear the screen. */
  readonly spoken: string
  readonly onMove: (index: number) => void
  /** Numbers at the current level. */
  readonly children: ReactNode
}

const marks = Array.from({ length: 11 }, (_, i) => i / 10)
const percent = (value: number): string => `${(value * 100).toFixed(3)}%`

/** The strip along the foot of the sheet: one handle, alpha from 0 to 1, shared by every chart and table. */
export function LevelRail({ levels, index, bars, caption = [], spoken, onMove, children }: LevelRailProps) {
  const trackRef = useRef<HTMLDivElement>(null)
  const level = levels[index] ?? 0

  const onKeyDown = (event: KeyboardEvent): void => {
    if (event.ctrlKey || event.metaKey || event.altKey) return
    const target = levelAfterKey(event.key, index, levels.length)
    if (target === null) return
    event.preventDefault()
    onMove(target)
  }

  const moveTo = (event: PointerEvent): void => {
    const { current: track } = trackRef
    if (track === null) return
    const { left, width } = track.getBoundingClientRect()
    const nearest = nearestLevel(levels, (event.clientX - left) / width)
    if (nearest !== index) onMove(nearest)
  }

  return (
    <footer className="rail" aria-label="Level rail">
      <div className="rail-level">
        <span className="rail-label">Conversion α</span>
        <output className="rail-number">{formatLevel(level)}</output>
      </div>
      <p className="rail-caption">
        {caption.map((line) => (
          <span key={line}>{line} </span>
        ))}
      </p>
      <div
        className="rail-grip"
        // oxlint-disable-next-line jsx-a11y/prefer-tag-over-role -- a range input has no uneven levels and no bars
        role="slider"
        tabIndex={0}
        aria-label="Conversion level"
        aria-orientation="horizontal"
        aria-valuemin={levels[0] ?? 0}
        aria-valuemax={levels.at(-1) ?? 1}
        aria-valuenow={level}
        aria-valuetext={spoken}
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
        <div className="rail-track" ref={trackRef} style={{ '--levels': levels.length } as CSSProperties}>
          {marks.map((mark) => (
            <span key={mark} className="rail-mark" style={{ left: percent(mark) }}>
              <span>{mark.toFixed(1)}</span>
            </span>
          ))}
          {levels.map((one, i) => (
            <RailBarView key={one} bar={bars[i]} left={one} current={i === index} />
          ))}
          <span className="rail-handle" style={{ left: percent(level) }} />
        </div>
      </div>
      <div className="rail-readout">{children}</div>
    </footer>
  )
}

function RailBarView({ bar, left, current }: { readonly bar: RailBar | undefined; readonly left: number; readonly current: boolean }) {
  const height = bar?.height ?? null
  const state = `${current ? ' is-current' : ''}${bar?.cut === true ? ' is-cut' : ''}${height === null ? ' is-empty' : ''}`
  return (
    <span className={`rail-bar${state}`} style={{ left: percent(left), height: height === null ? undefined : `${4 + height * 22}px` }} />
  )
}

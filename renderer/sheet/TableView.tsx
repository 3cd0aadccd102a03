import { useEffect, useLayoutEffect, useRef, type ClipboardEvent, type KeyboardEvent, type ReactNode } from 'react'
import { firstRowToShow, rowAt, wholeRowsFrom } from './whole-rows.ts'

/**
 * The frame of a table: it scrolls inside, takes the focus, copies itself as tab-separated text when nothing in it is selected, and keeps the
 * current row in sight.
 */
export function TableView({
  label,
  copied,
  currentRow,
  onKeyDown,
  children,
}: {
  readonly label: string
  /** null while what is on show must not leave the sheet. */
  readonly copied: () => string | null
  /** Changes when another row becomes the current one. */
  readonly currentRow: number | null
  readonly onKeyDown?: (event: KeyboardEvent) => void
  readonly children: ReactNode
}) {
  const spaceRef = useRef<HTMLDivElement>(null)
  const frameRef = useRef<HTMLElement>(null)

  const settledRef = useRef<Measured | null>(null)

  useLayoutEffect(() => {
    const [space, frame] = [spaceRef.current, frameRef.current]
    const table = frame?.querySelector('table')
    if (space === null || frame === null || table === null || table === undefined) return
    const settle = (): void => {
      const scrolled = frame.scrollTop
      settledRef.current = measured(space, frame)
      fitWithCurrent(frame, settledRef.current, scrolled)
    }
    const fitWhereScrolled = (): void => {
      const { current } = settledRef
      if (current !== null) fitFrom(frame, current, rowAt(current.heights, frame.scrollTop))
    }
    const observer = new ResizeObserver(settle)
    observer.observe(space)
    observer.observe(table)
    frame.addEventListener('scrollend', fitWhereScrolled)
    settle()
    return () => {
      observer.disconnect()
      frame.removeEventListener('scrollend', fitWhereScrolled)
    }
  }, [])

  useEffect(() => {
    const [frame, settled] = [frameRef.current, settledRef.current]
    if (frame !== null && settled !== null && currentRow !== null) fitWithCurrent(frame, settled, frame.scrollTop)
  }, [currentRow])

  const onCopy = (event: ClipboardEvent): void => {
    const inField = event.target instanceof HTMLInputElement || event.target instanceof HTMLTextAreaElement
    if (inField || window.getSelection()?.isCollapsed === false) return
    event.preventDefault()
    const text = copied()
    if (text !== null) event.clipboardData.setData('text/plain', text)
  }

  return (
    <div className="table-space" ref={spaceRef}>
      {/* oxlint-disable-next-line jsx-a11y/no-noninteractive-tabindex, jsx-a11y/no-noninteractive-element-interactions -- it scrolls, so it must be reached by keyboard (WCAG 2.1.1) */}
      <section className="table-view" aria-label={label} tabIndex={0} ref={frameRef} onCopy={onCopy} onKeyDown={onKeyDown}>
        {children}
      </section>
    </div>
  )
}

/** Heights of a frame and of what stands in it. */
interface Measured {
  readonly heights: readonly number[]
  readonly head: number
  /** The lower border and, where the table is too wide, the scroll bar. */
  readonly edge: number
  /** For rows. */
  readonly room: number
}

/** Lets the frame grow as far as there is room, and takes its measure. */
function measured(space: HTMLElement, frame: HTMLElement): Measured {
  frame.style.maxHeight = 'none'
  delete frame.dataset.cut
  const head = frame.querySelector('thead')?.getBoundingClientRect().height ?? 0
  frame.style.setProperty('--table-head', `${head}px`)
  const edge = frame.offsetHeight - frame.clientHeight
  const heights = Array.from(frame.querySelectorAll('tbody tr'), (row) => row.getBoundingClientRect().height)
  return { heights, head, edge, room: space.clientHeight - head - edge }
}

/** As `fitFrom`, scrolled so far that the current row is in sight. */
function fitWithCurrent(frame: HTMLElement, settled: Measured, scrolled: number): void {
  const { heights, room } = settled
  const present = rowAt(heights, scrolled)
  const current = Array.from(frame.querySelectorAll('tbody tr')).findIndex((row) => row.getAttribute('aria-current') === 'true')
  fitFrom(frame, settled, current < 0 ? present : firstRowToShow(heights, room, present, current))
}

/**
 * Makes the frame as tall as whole rows fill it, so that none is cut by its lower edge; the scroll snap keeps them whole at the head. Rows may differ in height, so that the
 * frame is fitted anew wherever it was scrolled to.
 */
function fitFrom(frame: HTMLElement, { heights, head, edge, room }: Measured, row: number): void {
  const { first, shown, height } = wholeRowsFrom(heights, room, row)
  if (shown === heights.length) return
  frame.style.maxHeight = `${head + height + edge}px`
  frame.scrollTop = heights.slice(0, first).reduce((sum, one) => sum + one, 0)
  frame.dataset.cut = ''
}

import { useEffect, useLayoutEffect, useRef, type ClipboardEvent, type KeyboardEvent, type ReactNode } from 'react'

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

  useLayoutEffect(() => {
    const [space, frame] = [spaceRef.current, frameRef.current]
    const table = frame?.querySelector('table')
    if (space === null || frame === null || table === null || table === undefined) return
    const settle = (): void => {
      showWholeRows(space, frame)
      showCurrentRow(frame)
    }
    const observer = new ResizeObserver(settle)
    observer.observe(space)
    observer.observe(table)
    settle()
    return () => observer.disconnect()
  }, [])

  useEffect(() => {
    if (frameRef.current !== null && currentRow !== null) showCurrentRow(frameRef.current)
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

function showCurrentRow(frame: HTMLElement): void {
  const row = frame.querySelector<HTMLElement>('tr[aria-current="true"]')
  if (row === null) return
  const head = frame.querySelector('thead')?.offsetHeight ?? 0
  const [top, bottom] = [row.offsetTop - head, row.offsetTop + row.offsetHeight]
  if (top < frame.scrollTop) frame.scrollTop = top - row.offsetHeight
  else if (bottom > frame.scrollTop + frame.clientHeight) frame.scrollTop = Math.min(top, bottom - frame.clientHeight + row.offsetHeight)
}

/** Makes the frame as tall as whole rows fill it, so that none is cut by its lower edge; the scroll snap keeps them whole at the head. */
function showWholeRows(space: HTMLElement, frame: HTMLElement): void {
  const scrolled = frame.scrollTop
  frame.style.maxHeight = 'none'
  delete frame.dataset.cut
  const head = frame.querySelector('thead')?.getBoundingClientRect().height ?? 0
  frame.style.setProperty('--table-head', `${head}px`)
  // The lower border and, where the table is too wide, the scroll bar.
  const edge = frame.offsetHeight - frame.clientHeight
  const room = space.clientHeight - head - edge
  const rows = Array.from(frame.querySelectorAll('tbody tr'), (row) => row.getBoundingClientRect().height)
  let shown = 0
  for (const [i, height] of rows.entries()) {
    if (i > 0 && shown + height > room + 0.5) {
      frame.style.maxHeight = `${head + shown + edge}px`
      frame.scrollTop = scrolled
      frame.dataset.cut = ''
      break
    }
    shown += height
  }
}

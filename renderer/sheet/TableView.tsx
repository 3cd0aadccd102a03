import { useEffect, useRef, type ClipboardEvent, type KeyboardEvent, type ReactNode } from 'react'

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
  readonly copied: () => string
  /** Changes when another row becomes the current one. */
  readonly currentRow: number | null
  readonly onKeyDown?: (event: KeyboardEvent) => void
  readonly children: ReactNode
}) {
  const frameRef = useRef<HTMLElement>(null)

  useEffect(() => {
    const { current: frame } = frameRef
    const row = frame?.querySelector<HTMLElement>('tr[aria-current="true"]')
    if (frame === null || row === null || row === undefined || currentRow === null) return
    const head = frame.querySelector('thead')?.offsetHeight ?? 0
    const [top, bottom] = [row.offsetTop - head, row.offsetTop + row.offsetHeight]
    if (top < frame.scrollTop) frame.scrollTop = top - row.offsetHeight
    else if (bottom > frame.scrollTop + frame.clientHeight) frame.scrollTop = bottom - frame.clientHeight + row.offsetHeight
  }, [currentRow])

  const onCopy = (event: ClipboardEvent): void => {
    const inField = event.target instanceof HTMLInputElement
    if (inField || window.getSelection()?.isCollapsed === false) return
    event.clipboardData.setData('text/plain', copied())
    event.preventDefault()
  }

  return (
    // oxlint-disable-next-line jsx-a11y/no-noninteractive-tabindex, jsx-a11y/no-noninteractive-element-interactions -- it scrolls, so it must be reached by keyboard (WCAG 2.1.1)
    <section className="table-view" aria-label={label} tabIndex={0} ref={frameRef} onCopy={onCopy} onKeyDown={onKeyDown}>
      {children}
    </section>
  )
}

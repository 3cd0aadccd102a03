import { useId, type ReactNode } from 'react'

/** One half of the sheet: evidence at the left, result at the right. */
export function Half({
  side,
  title,
  note,
  aside,
  children,
}: {
  readonly side: 'evidence' | 'result'
  readonly title: string
  readonly note: ReactNode
  /** A control that belongs to the whole half, at the right of its title. */
  readonly aside?: ReactNode
  readonly children: ReactNode
}) {
  const id = useId()
  return (
    <section className={`half half-${side}`} aria-labelledby={id}>
      <header className="half-head">
        <h2 id={id}>{title}</h2>
        <p className="half-note">{note}</p>
        {aside}
      </header>
      {children}
    </section>
  )
}

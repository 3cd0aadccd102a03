import { useId, type ReactNode } from 'react'

/** One half of the sheet: evidence at the left, result at the right. */
export function Half({
  side,
  title,
  note,
  children,
}: {
  readonly side: 'evidence' | 'result'
  readonly title: string
  readonly note: ReactNode
  readonly children: ReactNode
}) {
  const id = useId()
  return (
    <section className={`half half-${side}`} aria-labelledby={id}>
      <header className="half-head">
        <h2 id={id}>{title}</h2>
        <p className="half-note">{note}</p>
      </header>
      {children}
    </section>
  )
}

import type { ReactNode } from 'react'
import type { DataColumn } from './data-table.ts'
import { Remarked } from './Remarked.tsx'

/** The head of a table: quantity and, beneath it, unit. `end` names a last column of buttons to those who hear the screen. */
export function TableHead<Row>({ columns, end }: { readonly columns: readonly DataColumn<Row>[]; readonly end?: string }) {
  return (
    <thead>
      <tr>
        {columns.map((column) => (
          <th key={column.id} scope="col" className={column.numeric ? 'is-number' : undefined}>
            <span>{column.heading}</span>
            <span className="unit">{column.unit}</span>
          </th>
        ))}
        {end !== undefined && (
          <th scope="col">
            <span className="visually-hidden">{end}</span>
          </th>
        )}
      </tr>
    </thead>
  )
}

/** A cell of numbers, or of the words that stand where a number is not to be had. A remark on it shows when it is pointed at, and is heard. */
export function NumberCell({
  text,
  remark = null,
  children,
}: {
  readonly text: string
  readonly remark?: string | null
  readonly children?: ReactNode
}) {
  const isWord = text !== '' && !/\d/.test(text)
  return (
    <td className={isWord ? 'is-number is-word' : 'is-number'} {...(remark === null ? {} : { title: remark })}>
      <Remarked remark={remark}>{text}</Remarked>
      {children}
    </td>
  )
}

/** The heading of a column of numbers: quantity and, beneath it, unit. */
export const NumberHeading = ({ text, unit = '' }: { readonly text: string; readonly unit?: string }) => (
  <th scope="col" className="is-number">
    <span>{text}</span>
    <span className="unit">{unit}</span>
  </th>
)

/** Whether a row counts. */
export function UseBox({
  row,
  isUsed,
  onUse,
}: {
  /** Counted from 0. */
  readonly row: number
  readonly isUsed: boolean
  readonly onUse: (use: boolean) => void
}) {
  return (
    <input
      type="checkbox"
      className="use-box"
      aria-label={`Use row ${row + 1}`}
      checked={isUsed}
      onChange={(event) => onUse(event.target.checked)}
    />
  )
}

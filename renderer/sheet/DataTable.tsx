import type { ReactNode } from 'react'
import type { DataColumn } from './data-table.ts'

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

/** A cell of numbers, or of the words that stand where a number is not to be had. */
export function NumberCell({ text, children }: { readonly text: string; readonly children?: ReactNode }) {
  const isWord = text !== '' && !/\d/.test(text)
  return (
    <td className={isWord ? 'is-number is-word' : 'is-number'}>
      {text}
      {children}
    </td>
  )
}

import type { Dialect } from './decide-dialect.ts'
import type { Layout } from './find-layout.ts'
import type { ImportContext } from './import-context.ts'
import { quoted, type Refuse } from './import-refusal.ts'
import { parseNumber } from './parse-number.ts'
import type { PlannedColumn } from './plan-columns.ts'
import { delimiterCharacter, splitCells } from './split-cells.ts'
import { isBlankCode, isBlankLine, lineEnd, lineStart, lineText, type TextLines } from './text-lines.ts'

/** The numbers of the planned columns as the file writes them; NaN where a cell is empty. */
export interface RawTable {
  /** Rows between the first and the last row of numbers, blank lines left out. */
  readonly rows: number
  /** Line of each row, counted from 1. */
  readonly lineOfRow: Uint32Array
  /** By index of the column; undefined for a column that is set aside. */
  readonly columns: readonly (Float64Array | undefined)[]
  /** Number of cells that are not empty, by index of the column. */
  readonly filled: Uint32Array
}

const rowsBetweenChecks = 8192
const quote = 34

/**
 * Reads the rows of numbers straight from the text into columns.
 * @throws ImportRefusal naming line and cell for anything in a planned column that is no number, and for cells beyond the last heading
 */
export function readColumns(
  lines: TextLines,
  layout: Layout,
  dialect: Dialect,
  plan: readonly PlannedColumn[],
  context: ImportContext,
  refuse: Refuse,
): RawTable {
  let rows = 0
  for (let i = layout.firstData; i <= layout.lastData; i++) if (!isBlankLine(lines, i)) rows++
  const lineOfRow = new Uint32Array(rows)
  const filled = new Uint32Array(plan.length)
  const columns = plan.map((column) => (column.quantity === null ? undefined : new Float64Array(rows).fill(Number.NaN)))
  const { text } = lines

  let row = 0
  const take = (column: number, source: string, cellStart: number, cellEnd: number): void => {
    let from = cellStart
    let to = cellEnd
    while (from < to && isBlankCode(source.charCodeAt(from))) from++
    while (to > from && isBlankCode(source.charCodeAt(to - 1))) to--
    if (from === to) return
    const line = lineOfRow[row] ?? 0
    if (column >= plan.length) {
      const remedy =
        'Remove what is too much in this line, or state the “delimiter” and the “decimal sign” (on the command line: --delimiter, --decimal-sign).'
      throw refuse(
        line,
        `The row has more cells than there are columns: ${quoted(source.slice(from, to))} stands in cell ${column + 1}.`,
        remedy,
      )
    }
    filled[column] = (filled[column] ?? 0) + 1
    const target = columns[column]
    if (target === undefined) return
    const value = parseNumber(source, from, to, dialect.decimal)
    if (Number.isNaN(value)) throw notANumber(source.slice(from, to), line, plan[column]?.label ?? '', plan, refuse)
    target[row] = value
  }

  for (let index = layout.firstData; index <= layout.lastData; index++) {
    if (isBlankLine(lines, index)) continue
    lineOfRow[row] = index + 1
    const start = lineStart(lines, index)
    const end = lineEnd(lines, index)
    if (dialect.delimiter === 'blanks' || holds(text, start, end, quote)) {
      splitCells(lineText(lines, index), dialect.delimiter).forEach((cell, column) => take(column, cell, 0, cell.length))
    } else {
      const delimiter = delimiterCharacter[dialect.delimiter].charCodeAt(0)
      let column = 0
      let cellStart = start
      for (let at = start; at <= end; at++) {
        if (at < end && text.charCodeAt(at) !== delimiter) continue
        take(column, text, cellStart, at)
        column++
        cellStart = at + 1
      }
    }
    row++
    if (row % rowsBetweenChecks === 0) {
      context.checkCancelled()
      context.progress(end, text.length)
    }
  }
  context.progress(text.length, text.length)
  return { rows, lineOfRow, columns, filled }
}

function holds(text: string, start: number, end: number, code: number): boolean {
  for (let at = start; at < end; at++) if (text.charCodeAt(at) === code) return true
  return false
}

function notANumber(cell: string, line: number, label: string, plan: readonly PlannedColumn[], refuse: Refuse) {
  if (plan.some((column) => column.heading.text !== '' && column.heading.text === cell)) {
    const remedy = 'Put each table in a file of its own.'
    return refuse(line, `The headings are repeated here (${quoted(cell)}): a second table follows the first.`, remedy)
  }
  const remedy = 'Mend or remove this line; or, if its column is not needed, set that aside (on the command line: --column).'
  return refuse(line, `${quoted(cell)} in column ${quoted(label)} is not a number, and more rows of numbers follow.`, remedy)
}

import type { DecimalSignWord } from '../../shared-kinetics/contract/import-options.ts'
import type { Dialect } from './decide-dialect.ts'
import type { Layout } from './find-layout.ts'
import type { ImportContext } from './import-context.ts'
import { quoted, type Refuse } from './import-refusal.ts'
import { byteKinds, cellText, findCells, type LineCells, newLineCells } from './line-cells.ts'
import { numberInBytes } from './number-in-bytes.ts'
import type { PlannedColumn } from './plan-columns.ts'
import { type ColumnsInProgress, readPlainRows } from './read-plain-rows.ts'
import { lineEnd, type TextLines } from './text-lines.ts'

/** The numbers of the planned columns as the file writes them; NaN where a cell is empty. */
export interface RawTable {
  /** Rows between the first and the last row of numbers, blank lines left out. */
  readonly rows: number
  /** Line of each row, counted from 1. */
  readonly lineOfRow: Uint32Array
  /** By index of the column; undefined for a column that is set aside. */
  readonly columns: readonly (Float64Array | undefined)[]
  /** Number of cells that are not empty, by index of the column; of one that is set aside only whether there are any (0 or 1). */
  readonly filled: Uint32Array
}

const linesBetweenChecks = 1024

/**
 * Reads the rows of numbers straight from the bytes into columns: plain lines all in one go, any other line cell by cell with more care.
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
  const { delimiter, decimal } = dialect
  const columns = emptyColumns(plan, layout.lastData - layout.firstData + 1)
  const kinds = byteKinds(delimiter)
  const cells = newLineCells(lines)
  let index = layout.firstData
  while (index <= layout.lastData) {
    const last = Math.min(index + linesBetweenChecks - 1, layout.lastData)
    while (index <= last) {
      index = readPlainRows(lines, index, last, delimiter, decimal, columns)
      if (index > last) break
      findCells(lines, index, delimiter, kinds, cells)
      if (cells.count > 0) readRow(cells, index + 1, decimal, plan, columns, refuse)
      index++
    }
    context.checkCancelled()
    context.progress(lineEnd(lines, last), lines.bytes.length)
  }
  context.progress(lines.bytes.length, lines.bytes.length)
  return tableOf(plan, columns)
}

function emptyColumns(plan: readonly PlannedColumn[], capacity: number): ColumnsInProgress {
  let used = 0
  const offsets = Int32Array.from(plan, (column) => (column.quantity === null ? -1 : capacity * used++))
  return {
    values: new Float64Array(capacity * used).fill(Number.NaN),
    capacity,
    offsets,
    filled: new Uint32Array(plan.length),
    lineOfRow: new Uint32Array(capacity),
    rows: 0,
  }
}

function readRow(
  cells: LineCells,
  line: number,
  decimal: DecimalSignWord,
  plan: readonly PlannedColumn[],
  columns: ColumnsInProgress,
  refuse: Refuse,
): void {
  const { values, offsets, filled, lineOfRow, rows } = columns
  for (let column = 0; column < cells.count; column++) {
    const from = cells.from[column] ?? 0
    const to = cells.to[column] ?? 0
    if (from === to) continue
    if (column >= plan.length) throw tooManyCells(cellText(cells, column), column, line, refuse)
    const offset = offsets[column] ?? -1
    if (offset < 0) {
      filled[column] = 1
      continue
    }
    const value = numberInBytes(cells.bytes, from, to, decimal)
    if (Number.isNaN(value)) throw notANumber(cellText(cells, column), line, plan[column]?.label ?? '', plan, refuse)
    values[offset + rows] = value
    filled[column] = (filled[column] ?? 0) + 1
  }
  lineOfRow[rows] = line
  columns.rows++
}

function tableOf(plan: readonly PlannedColumn[], { values, offsets, filled, lineOfRow, rows }: ColumnsInProgress): RawTable {
  const columns = plan.map((_, i) => {
    const offset = offsets[i] ?? -1
    return offset < 0 ? undefined : values.subarray(offset, offset + rows)
  })
  return { rows, lineOfRow: lineOfRow.subarray(0, rows), columns, filled }
}

function tooManyCells(cell: string, column: number, line: number, refuse: Refuse) {
  const remedy =
    'Remove what is too much in this line, or state the “delimiter” and the “decimal sign” (on the command line: --delimiter, --decimal-sign).'
  return refuse(line, `The row has more cells than there are columns: ${quoted(cell)} stands in cell ${column + 1}.`, remedy)
}

function notANumber(cell: string, line: number, label: string, plan: readonly PlannedColumn[], refuse: Refuse) {
  if (plan.some((column) => column.heading.text !== '' && column.heading.text === cell)) {
    const remedy = 'Put each table in a file of its own.'
    return refuse(line, `The headings are repeated here (${quoted(cell)}): a second table follows the first.`, remedy)
  }
  const remedy = 'Mend or remove this line; or, if its column is not needed, set that aside (on the command line: --column).'
  return refuse(line, `${quoted(cell)} in column ${quoted(label)} is not a number, and more rows of numbers follow.`, remedy)
}

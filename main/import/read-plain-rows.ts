import type { DecimalSignWord, DelimiterWord } from '../../shared-kinetics/contract/import-options.ts'
import { numberInBytes } from './number-in-bytes.ts'
import { powersOfTen } from './parse-number.ts'
import { delimiterCharacter } from './split-cells.ts'
import type { TextLines } from './text-lines.ts'

/** Columns on their way in: NaN where no number was read. */
export interface ColumnsInProgress {
  /** Column after column, each `capacity` long. */
  readonly values: Float64Array
  readonly capacity: number
  /** Where each column of the file begins in `values`; -1 for one that is set aside. */
  readonly offsets: Int32Array
  /** Cells that are not empty; of a set-aside column 1 once there is any. */
  readonly filled: Uint32Array
  readonly lineOfRow: Uint32Array
  /** Rows read so far. */
  rows: number
}

const space = 32
const quote = 34
const minus = 45
const mostDigits = 15

/**
 * Reads lines for as long as they are plain rows: cells of ASCII characters without quotation marks, at most as many as there are
 * columns, every one in a column that is used a number or empty, and at least one filled. Lines, cells and digits are walked in one loop,
 * since this is where the time of an import goes.
 *
 * Digits are gathered as a whole number of at most 15 digits, which one division by an exact power of ten rounds rightly (W. D. Clinger,
 * Proc. PLDI (1990) 92); every other way to write a number is left to `numberInBytes`.
 *
 * @param first, last - the lines to read, from 0
 * @returns the first line that is not plain, or `last + 1`
 */
export function readPlainRows(
  { bytes, starts, ends }: TextLines,
  first: number,
  last: number,
  delimiter: DelimiterWord,
  decimal: DecimalSignWord,
  columns: ColumnsInProgress,
): number {
  const { values, offsets, filled, lineOfRow } = columns
  const width = offsets.length
  const runsOfBlanks = delimiter === 'blanks'
  const separator = runsOfBlanks ? space : delimiterCharacter[delimiter].charCodeAt(0)
  const point = decimal === 'point' ? 46 : 44
  let row = columns.rows
  let line = first
  lines: for (; line <= last; line++) {
    const end = ends[line] ?? 0
    let at = starts[line] ?? 0
    let nothing = true
    for (let column = 0; ; column++) {
      while (at < end && bytes[at] === space) at++
      if (at === end && (runsOfBlanks || column === 0 || column >= width)) break
      if (column >= width) break lines
      const offset = offsets[column] ?? -1
      if (offset < 0) {
        const from = at
        for (; at < end && bytes[at] !== separator; at++) {
          const byte = bytes[at] ?? 0
          if (byte < space || byte === quote || byte >= 0x80) break lines
        }
        if (at > from) {
          filled[column] = 1
          nothing = false
        }
      } else {
        const from = at
        const negative = bytes[at] === minus
        if (negative) at++
        const firstDigit = at
        let mantissa = 0
        let digit = 0
        for (; at < end; at++) {
          digit = (bytes[at] ?? 0) - 48
          if (digit < 0 || digit > 9) break
          mantissa = mantissa * 10 + digit
        }
        let digits = at - firstDigit
        let scale = 0
        if (at < end && bytes[at] === point) {
          const behind = ++at
          for (; at < end; at++) {
            digit = (bytes[at] ?? 0) - 48
            if (digit < 0 || digit > 9) break
            mantissa = mantissa * 10 + digit
          }
          scale = at - behind
          digits += scale
        }
        const plain =
          (at === end || bytes[at] === separator) && digits > 0 && digits <= mostDigits && (scale > 0 || at === firstDigit + digits)
        if (plain) {
          const value = mantissa / (powersOfTen[scale] ?? 1)
          values[offset + row] = negative ? -value : value
          filled[column] = (filled[column] ?? 0) + 1
          nothing = false
        } else if (from < end && bytes[from] !== separator) {
          at = endOfCell(bytes, from, end, separator)
          const value = numberInBytes(bytes, from, withoutBlanks(bytes, from, at), decimal)
          if (Number.isNaN(value)) break lines
          values[offset + row] = value
          filled[column] = (filled[column] ?? 0) + 1
          nothing = false
        }
      }
      if (at === end) break
      at++
    }
    if (nothing) break
    lineOfRow[row] = line + 1
    row++
  }
  columns.rows = row
  if (line <= last) forgetRow(columns, row)
  return line
}

/** A line that is not plain may have left numbers behind. */
function forgetRow({ values, offsets, filled }: ColumnsInProgress, row: number): void {
  offsets.forEach((offset, column) => {
    if (offset < 0 || Number.isNaN(values[offset + row])) return
    values[offset + row] = Number.NaN
    filled[column] = (filled[column] ?? 0) - 1
  })
}

function endOfCell(bytes: Buffer, from: number, end: number, separator: number): number {
  let at = from
  while (at < end && bytes[at] !== separator) at++
  return at
}

function withoutBlanks(bytes: Buffer, from: number, to: number): number {
  let end = to
  while (end > from && bytes[end - 1] === space) end--
  return end
}

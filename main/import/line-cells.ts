import type { DelimiterWord } from '../../shared-kinetics/contract/import-options.ts'
import { delimiterCharacter, splitCells } from './split-cells.ts'
import { isBlankCode, isBlankLine, lineEnd, lineStart, lineText, type TextLines, trimmed } from './text-lines.ts'

/**
 * The cells of one line as places in bytes, blanks around each left out; an empty cell is from 0 to 0. One such object serves line
 * after line: rows of numbers are read without a string for each cell.
 */
export interface LineCells {
  /** What the places refer to: the text itself, or one line of it with its quotation marks resolved, in UTF-8. */
  bytes: Buffer
  /** 0 for a line of nothing but blanks. */
  count: number
  from: Int32Array
  to: Int32Array
  /** Quotation marks stand in the line. */
  quoted: boolean
}

export const newLineCells = (lines: TextLines): LineCells => ({
  bytes: lines.bytes,
  count: 0,
  from: new Int32Array(16),
  to: new Int32Array(16),
  quoted: false,
})

export const cellText = (cells: LineCells, index: number): string => cells.bytes.toString('utf8', cells.from[index], cells.to[index])

const inCell = 0
const blank = 1
const delimits = 2
const needsCare = 3

/** What each byte means between cells: bytes of a character beyond ASCII and quotation marks need more than a look at one byte. */
export function byteKinds(delimiter: DelimiterWord): Uint8Array {
  return Uint8Array.from({ length: 256 }, (_, byte) => {
    if (byte >= 0x80 || byte === 34) return needsCare
    // The old end-of-file mark parts no words.
    if (delimiter === 'blanks') return byte === 26 ? blank : isBlankCode(byte) ? delimits : inCell
    if (byte === delimiterCharacter[delimiter].charCodeAt(0)) return delimits
    return isBlankCode(byte) ? blank : inCell
  })
}

/**
 * Finds the cells of a line in its bytes. Lines that hold quotation marks or characters beyond ASCII are split as strings, by `splitCells`.
 * @param kinds - `byteKinds(delimiter)`
 */
export function findCells(lines: TextLines, index: number, delimiter: DelimiterWord, kinds: Uint8Array, cells: LineCells): void {
  const { bytes } = lines
  const end = lineEnd(lines, index)
  cells.bytes = bytes
  cells.count = 0
  cells.quoted = false
  let nothing = true
  let from = -1
  let to = -1
  for (let at = lineStart(lines, index); at < end; at++) {
    const kind = kinds[bytes[at] ?? 0]
    if (kind === inCell) {
      // Blanks inside a cell belong to it, those around it do not.
      if (from < 0) from = at
      to = at + 1
    } else if (kind === delimits) {
      if (from >= 0) {
        addCell(cells, from, to)
        nothing = false
      } else if (delimiter !== 'blanks') addCell(cells, 0, 0)
      from = -1
    } else if (kind === needsCare) {
      findCellsWithCare(lines, index, delimiter, cells)
      return
    }
  }
  if (from >= 0) addCell(cells, from, to)
  else if (nothing && (cells.count === 0 || delimiter === 'tab')) cells.count = 0
  else if (delimiter !== 'blanks') addCell(cells, 0, 0)
}

function addCell(cells: LineCells, from: number, to: number): void {
  if (cells.count === cells.from.length) {
    cells.from = twiceAsLong(cells.from)
    cells.to = twiceAsLong(cells.to)
  }
  cells.from[cells.count] = from
  cells.to[cells.count] = to
  cells.count++
}

function twiceAsLong(array: Int32Array): Int32Array {
  const longer = new Int32Array(array.length * 2)
  longer.set(array)
  return longer
}

function findCellsWithCare(lines: TextLines, index: number, delimiter: DelimiterWord, cells: LineCells): void {
  const line = lineText(lines, index)
  const texts = splitCells(line, delimiter).map(trimmed)
  cells.count = 0
  cells.quoted = line.includes('"')
  if (isBlankLine(lines, index)) return
  cells.bytes = Buffer.from(texts.join(''), 'utf8')
  let at = 0
  for (const text of texts) {
    const length = Buffer.byteLength(text, 'utf8')
    if (length === 0) addCell(cells, 0, 0)
    else addCell(cells, at, at + length)
    at += length
  }
}

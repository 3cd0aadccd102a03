import type { ImportContext } from './import-context.ts'
import type { Refuse } from './import-refusal.ts'
import { binaryRemedy } from './refuse-binary.ts'
import { type TextBytes, textOf } from './text-bytes.ts'

/** A text and where its lines begin and end; CRLF, LF and CR may be mixed. Line i (from 0) is line i + 1 to a person. */
export interface TextLines extends TextBytes {
  readonly count: number
  readonly starts: Uint32Array
  /** Past the last byte of the line, its line end not included. */
  readonly ends: Uint32Array
}

const largestLineCount = 20_000_000
const lineFeed = 10
const carriageReturn = 13

/**
 * Finds the lines.
 * @throws ImportRefusal for a text that is full of control characters, and for too many lines; Cancelled
 */
export function textLines({ bytes, encoding }: TextBytes, context: ImportContext, refuse: Refuse): TextLines {
  const { length } = bytes
  // Lines of numbers are seldom shorter.
  let starts = new Uint32Array(16 + (length >>> 4))
  let ends = new Uint32Array(starts.length)
  let count = 0
  let start = 0
  let controls = 0
  for (let at = 0; at < length; at++) {
    const byte = bytes[at] ?? 0
    if (byte >= 32) continue
    if (byte !== lineFeed && byte !== carriageReturn) {
      if (isControl(byte) && at < controlsSample) controls++
      continue
    }
    if (count >= largestLineCount) throw refuse(null, 'The file has more than 20 million lines.', 'Export it with a coarser time step.')
    // One place is left for a last line without a line end.
    if (count + 1 >= starts.length) {
      starts = grown(starts)
      ends = grown(ends)
      context.checkCancelled()
    }
    starts[count] = start
    ends[count] = at
    count++
    if (byte === carriageReturn && bytes[at + 1] === lineFeed) at++
    start = at + 1
  }
  if (start < length) {
    starts[count] = start
    ends[count] = length
    count++
  }
  if (controls > 0 && controls > charactersIn(bytes.subarray(0, controlsSample)) / 200) {
    throw refuse(null, 'The file is not text: it is full of control characters.', binaryRemedy)
  }
  return { bytes, encoding, count, starts, ends }
}

const controlsSample = 65_536

/** Control characters that exports do not write: all but tab, line ends, form feed and the old end-of-file mark. */
const isControl = (byte: number): boolean => byte < 9 || (byte > 13 && byte !== 26)

/** Bytes that continue a character of UTF-8 count for none. */
function charactersIn(bytes: Uint8Array): number {
  let count = 0
  for (const byte of bytes) if ((byte & 0xc0) !== 0x80) count++
  return count
}

function grown(array: Uint32Array<ArrayBuffer>): Uint32Array<ArrayBuffer> {
  const longer = new Uint32Array(array.length * 2)
  longer.set(array)
  return longer
}

export const lineStart = (lines: TextLines, index: number): number => lines.starts[index] ?? lines.bytes.length
export const lineEnd = (lines: TextLines, index: number): number => lines.ends[index] ?? lines.bytes.length

export const lineText = (lines: TextLines, index: number): string => textOf(lines, lineStart(lines, index), lineEnd(lines, index))

/** Nothing but blanks in the line. */
export function isBlankLine(lines: TextLines, index: number): boolean {
  const end = lineEnd(lines, index)
  for (let at = lineStart(lines, index); at < end; at++) {
    const byte = lines.bytes[at] ?? 0
    if (byte >= 0x80) return trimmed(lineText(lines, index)) === ''
    if (!isBlankCode(byte)) return false
  }
  return true
}

/** Blank, tab, no-break blank, vertical tab, form feed, the old end-of-file mark. */
export const isBlankCode = (code: number): boolean =>
  code === 32 || code === 9 || code === 0xa0 || code === 11 || code === 12 || code === 26 || code === 0xfeff

/** Without the blanks around it. */
export function trimmed(text: string): string {
  let from = 0
  let to = text.length
  while (from < to && isBlankCode(text.charCodeAt(from))) from++
  while (to > from && isBlankCode(text.charCodeAt(to - 1))) to--
  return text.slice(from, to)
}

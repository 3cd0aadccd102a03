import type { ImportContext } from './import-context.ts'
import type { Refuse } from './import-refusal.ts'

/** A text and where its lines begin and end; CRLF, LF and CR may be mixed. Line i (from 0) is line i + 1 to a person. */
export interface TextLines {
  readonly text: string
  readonly count: number
  readonly starts: Uint32Array
  /** Past the last character of the line, its line end not included. */
  readonly ends: Uint32Array
}

const largestLineCount = 20_000_000
const lineFeed = 10
const carriageReturn = 13

export function textLines(text: string, context: ImportContext, refuse: Refuse): TextLines {
  let starts = new Uint32Array(1024)
  let ends = new Uint32Array(1024)
  let count = 0
  let start = 0
  const close = (end: number): void => {
    if (count === starts.length) {
      if (count >= largestLineCount) throw refuse(null, 'The file has more than 20 million lines.', 'Export it with a coarser time step.')
      starts = grown(starts)
      ends = grown(ends)
      context.checkCancelled()
    }
    starts[count] = start
    ends[count] = end
    count++
  }
  for (let at = 0; at < text.length; at++) {
    const code = text.charCodeAt(at)
    if (code !== lineFeed && code !== carriageReturn) continue
    close(at)
    if (code === carriageReturn && text.charCodeAt(at + 1) === lineFeed) at++
    start = at + 1
  }
  if (start < text.length) close(text.length)
  return { text, count, starts, ends }
}

function grown(array: Uint32Array<ArrayBuffer>): Uint32Array<ArrayBuffer> {
  const longer = new Uint32Array(array.length * 2)
  longer.set(array)
  return longer
}

export const lineStart = (lines: TextLines, index: number): number => lines.starts[index] ?? lines.text.length
export const lineEnd = (lines: TextLines, index: number): number => lines.ends[index] ?? lines.text.length

export const lineText = (lines: TextLines, index: number): string => lines.text.slice(lineStart(lines, index), lineEnd(lines, index))

/** Nothing but blanks in the line. */
export function isBlankLine(lines: TextLines, index: number): boolean {
  const end = lineEnd(lines, index)
  for (let at = lineStart(lines, index); at < end; at++) if (!isBlankCode(lines.text.charCodeAt(at))) return false
  return true
}

/** Blank, tab, no-break blank, vertical tab, form feed, the old end-of-file mark. */
export const isBlankCode = (code: number): boolean =>
  code === 32 || code === 9 || code === 0xa0 || code === 11 || code === 12 || code === 26 || code === 0xfeff

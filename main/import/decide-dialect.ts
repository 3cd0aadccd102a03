import type { DecimalSignWord, DelimiterWord, ImportOptions } from '../../shared-kinetics/contract/import-options.ts'
import type { ImportContext } from './import-context.ts'
import type { Refuse } from './import-refusal.ts'
import { byteKinds, cellText, findCells, type LineCells, newLineCells } from './line-cells.ts'
import { isDigit, numberInBytes } from './number-in-bytes.ts'
import { isMissingMark } from './parse-number.ts'
import { delimiterCharacter } from './split-cells.ts'
import { lineEnd, lineStart, type TextLines } from './text-lines.ts'

/** How the cells of a file are written, and what its rows of numbers look like. */
export interface Dialect {
  readonly delimiter: DelimiterWord
  readonly decimal: DecimalSignWord
  readonly delimiterReason: string
  readonly decimalReason: string
  /** For each column whether its cells are numbers (or empty) in nearly every row of the longest stretch of such rows. */
  readonly numericColumns: readonly boolean[]
}

/** The longest stretch of rows that look like rows of numbers under one reading. */
interface Stretch {
  readonly delimiter: DelimiterWord
  readonly decimal: DecimalSignWord
  readonly rows: number
  readonly score: number
  readonly columns: number
  readonly numeric: readonly number[]
  /** Some cell holds a point or a comma, so that the decimal sign matters. */
  readonly signs: boolean
}

const sampleLines = 200
const longestLine = 100_000
const fewestRows = 3
// Where two delimiters read the same numbers (a tab is a blank as well), the first of these is meant.
const preference: readonly DelimiterWord[] = ['tab', 'semicolon', 'comma', 'pipe', 'blanks']

/**
 * Delimiter and decimal sign by evidence: each pair is tried on the rows, and the one under which the longest stretch of rows
 * of one width is all numbers wins. Two readings are returned where both decimal signs make every cell a number and yet
 * different ones (`1,234`): what the numbers mean must then decide.
 * @throws ImportRefusal where no reading gives three rows of two numbers
 */
export function decideDialect(lines: TextLines, options: ImportOptions, context: ImportContext, refuse: Refuse): readonly Dialect[] {
  let stretches = readEachWay(lines, options, sampleLines)
  // A tie on the first rows may be settled by a later one.
  if (readingsOf(stretches).length > 1) {
    context.checkCancelled()
    stretches = readEachWay(lines, options, Number.POSITIVE_INFINITY)
  }
  const readings = readingsOf(stretches)
  if ((readings[0]?.rows ?? 0) < fewestRows) throw refuse(null, ...noTable(lines, options))
  return readings.map((stretch) => ({
    delimiter: stretch.delimiter,
    decimal: stretch.decimal,
    delimiterReason: options.delimiter === undefined ? `splits ${stretch.rows} rows into ${stretch.columns} cells each` : 'stated',
    decimalReason: decimalReason(stretch, options),
    numericColumns: stretch.numeric.map((count) => count >= 0.9 * stretch.rows),
  }))
}

/** The best reading, and with it the one that differs only in the decimal sign where nothing tells them apart. */
function readingsOf(stretches: readonly Stretch[]): readonly Stretch[] {
  const best = stretches[0]
  if (best === undefined) return []
  const rival = stretches.find((s) => s.delimiter === best.delimiter && s.decimal !== best.decimal && s.score === best.score)
  if (rival === undefined) return [best]
  if (best.signs || rival.signs) return [best, rival]
  return [best.decimal === 'point' ? best : rival]
}

function decimalReason(stretch: Stretch, options: ImportOptions): string {
  if (options.decimalSign !== undefined) return 'stated'
  if (!stretch.signs) return 'all numbers are whole'
  return `makes every cell of ${stretch.rows} rows a number`
}

function noTable(lines: TextLines, options: ImportOptions): readonly [string, string] {
  const stated = [options.delimiter, options.decimalSign].filter((word) => word !== undefined)
  const under = stated.length === 0 ? '' : ` with what was stated (${stated.join(', ')})`
  const long = Array.from({ length: Math.min(lines.count, sampleLines) }, (_, i) => lineEnd(lines, i) - lineStart(lines, i))
  if (long.some((length) => length > longestLine)) {
    return [
      `It holds lines of more than ${longestLine} characters and no table of numbers${under}.`,
      'Export it with one row of numbers a line.',
    ]
  }
  return [
    `No table of numbers was found${under}: at least ${fewestRows} rows of two or more numbers are needed.`,
    'Export time, temperature and the signal as columns of numbers; or state “delimiter” and “decimal sign”.',
  ]
}

/**
 * Reads the lines under each delimiter and decimal sign until `enough` look like rows of numbers under one of them: so all are judged by
 * the same lines.
 */
function readEachWay(lines: TextLines, options: ImportOptions, enough: number): readonly Stretch[] {
  const signs: readonly DecimalSignWord[] = options.decimalSign === undefined ? ['point', 'comma'] : [options.decimalSign]
  const delimiters = options.delimiter === undefined ? preference.filter((delimiter) => occurs(delimiter, lines)) : [options.delimiter]
  const ways = delimiters.map((delimiter) => ({
    delimiter,
    kinds: byteKinds(delimiter),
    readers: signs.map((decimal) => stretchReader(delimiter, decimal)),
    read: 0,
  }))
  const cells = newLineCells(lines)
  for (let i = 0; i < lines.count && ways.every((way) => way.read < enough); i++) {
    if (lineEnd(lines, i) - lineStart(lines, i) > longestLine) continue
    for (const way of ways) {
      findCells(lines, i, way.delimiter, way.kinds, cells)
      if (cells.count === 0) continue
      let likeData = false
      for (const reader of way.readers) likeData = reader.read(cells) || likeData
      if (likeData) way.read++
    }
  }
  const stretches = ways.flatMap((way) => way.readers.map((reader) => reader.longest()))
  return stretches.filter((s) => s.score > 0).sort((a, b) => b.score - a.score)
}

const occurs = (delimiter: DelimiterWord, { bytes }: TextLines): boolean =>
  delimiter === 'blanks' || bytes.includes(delimiterCharacter[delimiter].charCodeAt(0))

/** Follows the rows under one reading and keeps the stretch with the most numbers in it. */
function stretchReader(delimiter: DelimiterWord, decimal: DecimalSignWord) {
  const empty: Stretch = { delimiter, decimal, rows: 0, score: 0, columns: 0, numeric: [], signs: false }
  let best = empty
  let rows = 0
  let score = 0
  let columns = 0
  let numeric: number[] = []
  let signs = false
  const isNumeric: boolean[] = []
  const close = (): void => {
    if (score > best.score) best = { delimiter, decimal, rows, score, columns, numeric, signs }
    rows = 0
    score = 0
    numeric = []
    signs = false
  }
  return {
    /** Takes the next line that is not blank. @returns whether it looks like a row of numbers */
    read(cells: LineCells): boolean {
      // Spreadsheets leave empty cells behind at the end.
      let width = cells.count
      while (width > 0 && cells.from[width - 1] === cells.to[width - 1]) width--
      let numbers = 0
      let others = 0
      if (width < 2) {
        close()
        return false
      }
      for (let i = 0; i < width; i++) {
        const from = cells.from[i] ?? 0
        const to = cells.to[i] ?? 0
        const isEmpty = from === to
        const is = isEmpty || (!commaTwice(cells) && !Number.isNaN(numberInBytes(cells.bytes, from, to, decimal)))
        isNumeric[i] = is
        if (isEmpty) continue
        if (is) numbers++
        else if (isDigit(cells.bytes[from] ?? 0) || !isMissingMark(cellText(cells, i))) others++
      }
      const likeData = numbers >= 2 && numbers >= others
      if (!likeData || width !== columns) close()
      if (!likeData) return false
      columns = width
      rows++
      score += numbers - 0.9 * others
      for (let i = 0; i < width; i++) {
        numeric[i] = (numeric[i] ?? 0) + (isNumeric[i] === true ? 1 : 0)
        signs ||= isNumeric[i] === true && holdsSign(cells, i)
      }
      return true
    },
    longest(): Stretch {
      close()
      return best
    },
  }

  /** Unquoted, a comma cannot be both. */
  function commaTwice(cells: LineCells): boolean {
    return delimiter === 'comma' && decimal === 'comma' && !cells.quoted
  }
}

/** A point or a comma stands in the cell. */
function holdsSign(cells: LineCells, index: number): boolean {
  const to = cells.to[index] ?? 0
  for (let at = cells.from[index] ?? 0; at < to; at++) if (cells.bytes[at] === 46 || cells.bytes[at] === 44) return true
  return false
}

import type { ImportOptions } from '../../shared-kinetics/contract/import-options.ts'
import type { Dialect } from './decide-dialect.ts'
import { unitOf } from './file-unit.ts'
import { quoted, type Refuse } from './import-refusal.ts'
import { isMissingMark, isNumber } from './parse-number.ts'
import { splitCells, withoutEmptyEnd } from './split-cells.ts'
import { isBlankLine, lineEnd, lineStart, lineText, type TextLines } from './text-lines.ts'

/** Where things stand in a file. Lines are counted from 0 here. */
export interface Layout {
  /** Lines of the preamble: neither headings nor units nor data. */
  readonly preamble: readonly number[]
  readonly headingLine: number | null
  /** Names of the columns; empty where the file has none. */
  readonly headings: readonly string[]
  /** Cells of a line above the headings that names groups of columns: at least two of them, with empty cells between. */
  readonly titles: readonly string[]
  readonly unitLine: number | null
  readonly units: readonly string[]
  readonly firstData: number
  readonly lastData: number
  /** Lines behind the data that are not blank: remarks, or rows that are not whole. */
  readonly trailing: readonly number[]
}

const longestHeadingLine = 20_000
const mostTrailing = 50

/**
 * Finds preamble, headings, unit row, first and last row of numbers. A row of numbers has numbers (or nothing) in every column
 * that is numeric in the stretch the dialect was told from, and at least two of them. Lines between the first and the last such
 * row are all taken for data, so that a broken one among them is refused later by name and not skipped.
 */
export function findLayout(lines: TextLines, dialect: Dialect, options: ImportOptions, refuse: Refuse): Layout {
  const cellsOf = (index: number): string[] => withoutEmptyEnd(splitCells(lineText(lines, index), dialect.delimiter))
  const isRow = (index: number): boolean => isRowOfNumbers(cellsOf(index), dialect)
  const firstData = options.firstDataLine === undefined ? findFirstData(lines, cellsOf, dialect, refuse) : options.firstDataLine - 1
  if (firstData >= lines.count || isBlankLine(lines, firstData)) {
    throw refuse(firstData + 1, 'The first data line that was stated holds nothing.', 'State another “first data line”.')
  }
  let lastData = lines.count - 1
  while (lastData > firstData && (isBlankLine(lines, lastData) || !isRow(lastData))) lastData--
  const trailing = range(lastData + 1, lines.count).filter((i) => !isBlankLine(lines, i))
  if (trailing.length > mostTrailing) {
    const [line = 0] = trailing
    const reason = `From this line on, ${trailing.length} lines are no rows of numbers like those before: ${quoted(lineText(lines, line))}.`
    throw refuse(line + 1, reason, 'Keep one table in the file, or mend these lines.')
  }
  const above = headingsAbove(lines, firstData, cellsOf, dialect, options, refuse)
  refuseSurplusNames(lines, above, firstData, dialect, refuse)
  const titles = titlesAbove(lines, above.headingLine, dialect)
  const preamble = range(0, firstData).filter((i) => i !== above.headingLine && i !== above.unitLine && !isBlankLine(lines, i))
  return { preamble, ...above, titles, firstData, lastData, trailing }
}

const range = (from: number, to: number): number[] => Array.from({ length: Math.max(0, to - from) }, (_, i) => from + i)

function isRowOfNumbers(cells: readonly string[], dialect: Dialect): boolean {
  let numbers = 0
  for (let i = 0; i < cells.length; i++) {
    const cell = cells[i] ?? ''
    if (cell === '' || dialect.numericColumns[i] === false || isMissingMark(cell)) continue
    if (!isNumber(cell, dialect.decimal)) return false
    numbers++
  }
  return numbers >= 2
}

function findFirstData(lines: TextLines, cellsOf: (index: number) => string[], dialect: Dialect, refuse: Refuse): number {
  const width = dialect.numericColumns.length
  let earliest: number | null = null
  let run = 0
  let runStart = 0
  for (let i = 0; i < lines.count; i++) {
    if (isBlankLine(lines, i)) continue
    const cells = lineEnd(lines, i) - lineStart(lines, i) > longestHeadingLine * 5 ? [] : cellsOf(i)
    if (isRowOfNumbers(cells, dialect)) {
      if (run === 0) runStart = i
      run++
      if (earliest === null && cells.length >= width) earliest = i
      if (run >= 3) break
    } else {
      // A row of names behind a lone row of numbers: that row belonged to the preamble.
      if (earliest !== null && isRowOfNames(cells, dialect) && cells.length >= Math.min(width, 2)) earliest = null
      run = 0
    }
  }
  if (run < 3) throw refuse(null, 'No three rows of numbers follow each other.', 'Export the table as unbroken rows of numbers.')
  return earliest === null ? runStart : Math.min(earliest, runStart)
}

const isRowOfNames = (cells: readonly string[], dialect: Dialect): boolean =>
  cells.filter((cell) => cell !== '').length >= 2 && !cells.some((cell) => isNumber(cell, dialect.decimal))

/** As wide as the table, with numbers in some of its columns of numbers. */
const isBrokenRow = (cells: readonly string[], dialect: Dialect): boolean =>
  cells.length === dialect.numericColumns.length &&
  cells.some((cell, i) => dialect.numericColumns[i] === true && isNumber(cell, dialect.decimal))

type Headings = Pick<Layout, 'headingLine' | 'headings' | 'unitLine' | 'units'>

function headingsAbove(
  lines: TextLines,
  firstData: number,
  cellsOf: (index: number) => string[],
  dialect: Dialect,
  options: ImportOptions,
  refuse: Refuse,
): Headings {
  const above = range(0, firstData)
    .filter((i) => !isBlankLine(lines, i) && lineEnd(lines, i) - lineStart(lines, i) <= longestHeadingLine)
    .reverse()
  const namesOf = (index: number): string[] => headingCells(lineText(lines, index), cellsOf(index), dialect)
  if (options.headingLine !== undefined && options.headingLine !== 'none') {
    const headingLine = options.headingLine - 1
    if (headingLine >= firstData) {
      throw refuse(headingLine + 1, 'The heading line that was stated does not stand above the data.', 'State another “heading line”.')
    }
    const unitLine = above.find((i) => i > headingLine && isUnitRow(namesOf(i))) ?? null
    return { headingLine, headings: namesOf(headingLine), unitLine, units: unitLine === null ? [] : namesOf(unitLine) }
  }
  const [nearest, next] = above
  const nearestIsUnits = nearest !== undefined && isUnitRow(namesOf(nearest))
  const unitLine = nearestIsUnits ? nearest : null
  const units = nearestIsUnits ? namesOf(nearest) : []
  const candidate = nearestIsUnits ? next : nearest
  if (options.headingLine === 'none' || candidate === undefined) return { headingLine: null, headings: [], unitLine, units }
  const headings = namesOf(candidate)
  if (!nearestIsUnits && options.columns === undefined && isBrokenRow(headings, dialect)) {
    const line = quoted(lineText(lines, candidate))
    const reason = `${line} stands above the first row of numbers and is neither headings nor a row of numbers.`
    throw refuse(
      candidate + 1,
      reason,
      'Mend or remove this line; or state the “heading line” and the “first data line” (on the command line: --heading-line, --first-data-line).',
    )
  }
  // A `key: value` or `key;value` line of the preamble above a unit row is no heading: it has a colon, or fewer cells than the units.
  const isEntry = /:(?:\s|$)/.test(headings[0] ?? '') || headings.length < units.length
  if (!isRowOfNames(headings, dialect) || (nearestIsUnits && isEntry)) {
    return { headingLine: null, headings: [], unitLine, units }
  }
  return { headingLine: candidate, headings, unitLine, units }
}

/**
 * A delimiter inside a name moves every name behind it onto its neighbour's numbers. Rows that end in empty cells prove that the
 * last names belong to empty columns; rows that are shorter than the names do not.
 */
function refuseSurplusNames(
  lines: TextLines,
  { headings, headingLine }: Headings,
  firstData: number,
  dialect: Dialect,
  refuse: Refuse,
): void {
  if (headingLine === null) return
  const firstRows = range(firstData, Math.min(firstData + 5, lines.count)).map(
    (i) => splitCells(lineText(lines, i), dialect.delimiter).length,
  )
  const cells = Math.max(...firstRows)
  if (headings.length <= cells && (dialect.delimiter !== 'blanks' || headings.length === dialect.numericColumns.length)) return
  throw refuse(
    headingLine + 1,
    `This line names ${headings.length} columns but the rows have ${cells} cells, so that names and numbers cannot be matched.`,
    'Put names that hold the delimiter in quotation marks, or rename them without it.',
  )
}

/** `5 K/min;;;10 K/min;;` above the headings of runs side by side. */
function titlesAbove(lines: TextLines, headingLine: number | null, dialect: Dialect): readonly string[] {
  if (headingLine === null || dialect.delimiter === 'blanks') return []
  const line = range(0, headingLine).findLast((i) => !isBlankLine(lines, i))
  if (line === undefined || lineEnd(lines, line) - lineStart(lines, line) > longestHeadingLine) return []
  const cells = withoutEmptyEnd(splitCells(lineText(lines, line), dialect.delimiter))
  const filled = cells.flatMap((cell, i) => (cell === '' ? [] : [i]))
  const apart = filled.every((at, i) => i === 0 || at - (filled[i - 1] ?? 0) >= 2)
  return filled.length >= 2 && apart ? cells : []
}

function isUnitRow(cells: readonly string[]): boolean {
  const filled = cells.filter((cell) => cell !== '')
  return filled.length >= 2 && filled.every((cell) => unitOf(cell) !== null)
}

/** Cells of a heading line: a `#` in front is dropped; where blanks delimit, a name may hold single blanks and a bracketed unit. */
function headingCells(line: string, cells: string[], dialect: Dialect): string[] {
  const comment = /^\s*#+\s*(?=[^\s\d])/.exec(line)?.[0] ?? ''
  const rest = line.slice(comment.length)
  const plain = comment === '' ? cells : withoutEmptyEnd(splitCells(rest, dialect.delimiter))
  const width = dialect.numericColumns.length
  if (dialect.delimiter !== 'blanks' || plain.length === width) return plain
  const wide = rest.trim().split(/\s{2,}|\t/)
  if (wide.length === width) return wide
  const joined: string[] = []
  for (const cell of plain) {
    if (/^[([{]/.test(cell) && joined.length > 0) joined.push(`${joined.pop() ?? ''} ${cell}`)
    else joined.push(cell)
  }
  return joined.length === width ? joined : plain
}

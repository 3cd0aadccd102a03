import type { DecimalSignWord, DelimiterWord } from '../../shared-kinetics/contract/import-options.ts'
import { cellWithPlainPowers, lineWithLoweredPowers, withPlainPowers } from '../../shared-kinetics/units/plain-powers.ts'
import { parseRateUnit } from '../../shared-kinetics/units/rate-unit.ts'
import { unitOf } from './file-unit.ts'
import type { Refuse } from './import-refusal.ts'
import { isMissingMark, parseNumber } from './parse-number.ts'
import { linesWithinLimits, rateConstantTextLimits } from './rate-constant-limits.ts'
import { writtenWithUncertainty, type WrittenWithUncertainty } from './value-with-uncertainty.ts'
import { delimiterCharacter, splitCells, withoutEmptyEnd } from './split-cells.ts'

/** A cell of a small table: a number, with a unit behind it where somebody typed one. */
export interface NumberCell {
  readonly value: number
  /** Empty where there is none. */
  readonly unitText: string
  /** Written into the same cell: of the value, or as a fraction of it. */
  readonly uncertainty?: { readonly value: number; readonly isRelative: boolean; readonly form: WrittenWithUncertainty['form'] }
}

/** A line that is not blank; `number` counts from 1. */
export interface NumberedLine {
  readonly number: number
  readonly text: string
}

export interface CellReading {
  readonly delimiter: DelimiterWord
  readonly decimal: DecimalSignWord
  readonly rows: readonly { readonly line: number; readonly cells: readonly string[]; readonly isData: boolean }[]
  readonly score: number
  /** Some number has a point or a comma, so that the decimal sign matters. */
  readonly hasSigns: boolean
}

const preference: readonly DelimiterWord[] = ['tab', 'semicolon', 'comma', 'pipe', 'blanks']

/**
 * The lines of a text that are not blank, within the limits of a table; powers of ten as papers print them (`2.1×10⁻⁵`, `2.1 x 10^-5`) become `2.1e-5`.
 * @throws ImportRefusal where the text is larger than a table can be
 */
export const linesOf = (text: string, refuse: Refuse): readonly NumberedLine[] =>
  linesWithinLimits(text.replace(/^\ufeff/, ''), refuse).map((line) => ({ number: line.number, text: withPlainPowers(line.text) }))

/**
 * Every way of reading the lines that gives rows of two numbers, the best first; two of the same score are both possible. Blanks part cells only where no
 * other sign parts as many rows: in a label such as “batch 1” they do not.
 */
export function cellReadings(
  lines: readonly NumberedLine[],
  stated: { readonly delimiter?: DelimiterWord | undefined; readonly decimalSign?: DecimalSignWord | undefined },
): readonly CellReading[] {
  const delimiters = stated.delimiter === undefined ? preference : [stated.delimiter]
  const signs: readonly DecimalSignWord[] = stated.decimalSign === undefined ? ['point', 'comma'] : [stated.decimalSign]
  const readings = delimiters
    .flatMap((delimiter) => signs.map((decimal) => readingOf(lines, delimiter, decimal)))
    .filter((reading) => reading.score > 0)
    .toSorted((a, b) => b.score - a.score)
  const rowsParted = (besides: DelimiterWord | null): number =>
    readings.reduce(
      (most, { delimiter, rows }) => (delimiter === 'blanks' || delimiter === besides ? most : Math.max(most, dataRows({ rows }))),
      0,
    )
  // The commas of “298,0 3,46e-5” part it as well, though into what is no number.
  return readings.filter(
    (reading) => reading.delimiter !== 'blanks' || dataRows(reading) > rowsParted(isAllDecimalCommas(reading) ? 'comma' : null),
  )
}

const isAllDecimalCommas = ({ decimal, rows }: CellReading): boolean =>
  decimal === 'comma' &&
  rows.every(({ cells, isData }) => !isData || cells.every((cell) => numberCell(cell, decimal) !== null && cell.includes(',')))

const dataRows = ({ rows }: Pick<CellReading, 'rows'>): number => rows.filter((row) => row.isData).length

function readingOf(lines: readonly NumberedLine[], delimiter: DelimiterWord, decimal: DecimalSignWord): CellReading {
  let score = 0
  let hasSigns = false
  const isUnquotedComma = delimiter === 'comma' && decimal === 'comma'
  const named = delimiter === 'blanks' ? wordsOfHeading(lines, decimal) : 0
  const rows = lines.map(({ number, text }) => {
    const cells = cellsOf(text, delimiter, decimal, named)
    // Words of a remark, which no sign but blanks parts into so many.
    if (cells.length > rateConstantTextLimits.cells) return { line: number, cells, isData: false }
    const filled = cells.filter((cell) => cell !== '' && !isMissingMark(cell))
    const numbers = filled.filter((cell) => numberCell(cell, decimal) !== null)
    const others = filled.length - numbers.length
    const isLikeData = numbers.length >= 2 && numbers.length >= others && !(isUnquotedComma && !text.includes('"'))
    if (isLikeData) {
      // Commas of decimals part “7,87 ± 0,3” into what looks like more numbers than there are.
      const split = delimiter === 'comma' ? numbers.filter((cell) => numberCell(cell, decimal)?.uncertainty !== undefined).length : 0
      score += numbers.length - split - 0.9 * others
      hasSigns ||= numbers.some((cell) => /[.,]/.test(cell))
    }
    return { line: number, cells, isData: isLikeData }
  })
  return { delimiter, decimal, rows, score, hasSigns }
}

/** How many cells blanks part in the line above the first with two numbers; 0 where there is none. */
function wordsOfHeading(lines: readonly NumberedLine[], decimal: DecimalSignWord): number {
  let above = 0
  for (const { text } of lines) {
    const cells = joinedWords(text.replaceAll(/\s{2,}/g, ' '), decimal)
    if (cells.length <= rateConstantTextLimits.cells && cells.filter((cell) => numberCell(cell, decimal) !== null).length >= 2) return above
    above = cells.length
  }
  return 0
}

/** @param named - where blanks part the cells, so many stand in the heading */
function cellsOf(line: string, delimiter: DelimiterWord, decimal: DecimalSignWord, named: number): readonly string[] {
  // A run of blanks means no more than one of them, and patterns would try each way of sharing it out.
  const text = delimiter === 'tab' ? line.replaceAll(/[^\S\t]{2,}/g, ' ') : line.replaceAll(/\s{2,}/g, ' ')
  if (delimiter !== 'blanks')
    return text.includes(delimiterCharacter[delimiter]) ? withoutEmptyEnd(splitCells(text, delimiter)) : [text.trim()]
  const lowered = joinedUncertainties(lineWithLoweredPowers(text))
  const words = lowered === text ? [] : joinedWords(text, decimal)
  // A row of as many words as there are headings is parted by its blanks, whatever sign stands between them.
  return words.length > 0 && words.length === named ? words : joinedWords(lowered, decimal)
}

/** An uncertainty belongs to the number before it. */
const joinedUncertainties = (text: string): string =>
  text
    .replaceAll(/(?<=[\d)]) ?(±|\+\/-) ?(?=\d)/g, '$1')
    .replaceAll(/(?<=\d\)) ?([×·x*]) ?(?=10)/g, '$1')
    .replaceAll(/(?<=\d) (?=%)/g, '')

/** The cells of a line that blanks part: a unit belongs to the number before it, and a bracket to the name before it. */
function joinedWords(text: string, decimal: DecimalSignWord): readonly string[] {
  const joined: string[][] = []
  let isBracketOpen = false
  for (const cell of splitCells(text, 'blanks')) {
    const last = joined.at(-1)
    const [only = ''] = last ?? []
    const isUnit = last?.length === 1 && isBareNumber(only, decimal) && !isBareNumber(cell, decimal) && isUnitText(cell)
    if (last !== undefined && (isUnit || /^[([{/]/.test(cell) || (isBracketOpen && !isBareNumber(cell, decimal)))) last.push(cell)
    else {
      joined.push([cell])
      isBracketOpen = false
    }
    const opened = lastOf(cell, '(', '[', '{')
    const closed = lastOf(cell, ')', ']', '}')
    if (opened !== closed) isBracketOpen = opened > closed
  }
  return joined.map((parts) => parts.join(' '))
}

const lastOf = (text: string, ...signs: readonly string[]): number => Math.max(...signs.map((sign) => text.lastIndexOf(sign)))

/** A unit is short: a longer text is not looked through for one. */
export const isUnitText = (text: string): boolean =>
  text.length <= 60 && (unitOf(text)?.dimension === 'temperature' || parseRateUnit(text).ok)

const isBareNumber = (cell: string, decimal: DecimalSignWord): boolean => numberCell(cell, decimal)?.unitText === ''

/** `298.15`, `25 °C`, `25°C`, `3.5e-5 1/s`, `3.5 × 10−5 1/s`, `2.94(8)e-6`, `2.9e-6 ± 1e-7`; null for what is no number with or without a unit. */
export function numberCell(cell: string, decimal: DecimalSignWord): NumberCell | null {
  const plain = plainNumberCell(cell, decimal)
  if (plain !== null || !/±|\+\/-|\d ?\(\d/.test(cell)) return plain
  const written = writtenWithUncertainty(cell.trim(), decimal)
  if (written === null) return null
  const [number, uncertainty] = [plainNumberCell(written.number, decimal), plainNumberCell(written.uncertainty, decimal)]
  if (number === null || uncertainty === null) return null
  // A unit behind both stands behind the second.
  const unitText = number.unitText === '' ? uncertainty.unitText : number.unitText
  if (uncertainty.unitText !== '' && uncertainty.unitText !== unitText) return null
  const { form, isPercent } = written
  return {
    value: number.value,
    unitText,
    uncertainty: { value: isPercent ? uncertainty.value / 100 : uncertainty.value, isRelative: isPercent, form },
  }
}

function plainNumberCell(cell: string, decimal: DecimalSignWord): NumberCell | null {
  const trimmed = cellWithPlainPowers(cell.trim())
  if (trimmed === '') return null
  const whole = parseNumber(trimmed, 0, trimmed.length, decimal)
  if (!Number.isNaN(whole)) return { value: whole, unitText: '' }
  const match = /^(\S+)\s+(.+)$/.exec(trimmed) ?? /^([-+−]?[\d.,]+(?:e[-+−]?\d+)?)([°ºa-z%].*)$/i.exec(trimmed)
  if (match === null) return null
  const [, number = '', unitText = ''] = match
  if (!isUnitText(unitText)) return null
  const value = parseNumber(number, 0, number.length, decimal)
  return number === '' || Number.isNaN(value) ? null : { value, unitText }
}

import type { DecimalSignWord, DelimiterWord } from '../../shared-kinetics/contract/import-options.ts'
import { plainSuperscripts } from '../../shared-kinetics/units/plain-superscripts.ts'
import { parseRateUnit } from '../../shared-kinetics/units/rate-unit.ts'
import { unitOf } from './file-unit.ts'
import { isMissingMark, isNumber, parseNumber } from './parse-number.ts'
import { delimiterCharacter, splitCells, withoutEmptyEnd } from './split-cells.ts'

/** A cell of a small table: a number, with a unit behind it where somebody typed one. */
export interface NumberCell {
  readonly value: number
  /** Empty where there is none. */
  readonly unitText: string
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

/** The lines of a text that are not blank; powers of ten as papers print them (`2.1×10⁻⁵`, `2.1 x 10^-5`) become `2.1e-5`. */
export function linesOf(text: string): readonly NumberedLine[] {
  return text
    .replace(/^\ufeff/, '')
    .split(/\r\n|\n|\r/)
    .map((line, i) => ({ number: i + 1, text: withPlainPowers(line) }))
    .filter((line) => line.text.trim() !== '')
}

const withPlainPowers = (line: string): string =>
  line.replaceAll(
    /(\d)\s*[×x·⋅*]\s*10\s*(?:\^\s*\(?\s*([-+−]?\d{1,3})\s*\)?|([⁻⁺]?[⁰¹²³⁴⁵⁶⁷⁸⁹]{1,3}))/gi,
    (_, digit: string, plain?: string, raised?: string) => {
      const exponent = plain ?? plainSuperscripts(raised ?? '').slice(1)
      return `${digit}e${exponent.replace('−', '-')}`
    },
  )

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
  const rowsParted = Math.max(...readings.filter(({ delimiter }) => delimiter !== 'blanks').map(dataRows))
  return readings.filter((reading) => reading.delimiter !== 'blanks' || dataRows(reading) > rowsParted)
}

const dataRows = ({ rows }: CellReading): number => rows.filter((row) => row.isData).length

function readingOf(lines: readonly NumberedLine[], delimiter: DelimiterWord, decimal: DecimalSignWord): CellReading {
  let score = 0
  let hasSigns = false
  const isUnquotedComma = delimiter === 'comma' && decimal === 'comma'
  const rows = lines.map(({ number, text }) => {
    const cells = cellsOf(text, delimiter, decimal)
    const filled = cells.filter((cell) => cell !== '' && !isMissingMark(cell))
    const numbers = filled.filter((cell) => numberCell(cell, decimal) !== null)
    const others = filled.length - numbers.length
    const isLikeData = numbers.length >= 2 && numbers.length >= others && !(isUnquotedComma && !text.includes('"'))
    if (isLikeData) {
      score += numbers.length - 0.9 * others
      hasSigns ||= numbers.some((cell) => /[.,]/.test(cell))
    }
    return { line: number, cells, isData: isLikeData }
  })
  return { delimiter, decimal, rows, score, hasSigns }
}

function cellsOf(text: string, delimiter: DelimiterWord, decimal: DecimalSignWord): readonly string[] {
  if (delimiter !== 'blanks')
    return text.includes(delimiterCharacter[delimiter]) ? withoutEmptyEnd(splitCells(text, delimiter)) : [text.trim()]
  // Where blanks part the cells, a unit belongs to the number before it, and a bracket to the name before it.
  const joined: string[] = []
  for (const cell of splitCells(text, 'blanks')) {
    const last = joined.at(-1)
    const isUnit = last !== undefined && isNumber(last, decimal) && !isNumber(cell, decimal) && isUnitText(cell)
    if (last !== undefined && (isUnit || /^[([{/]/.test(cell) || (/[([{][^)\]}]*$/.test(last) && !isNumber(cell, decimal)))) {
      joined[joined.length - 1] = `${last} ${cell}`
    } else joined.push(cell)
  }
  return joined
}

export const isUnitText = (text: string): boolean => unitOf(text)?.dimension === 'temperature' || parseRateUnit(text).ok

/** `298.15`, `25 °C`, `25°C`, `3.5e-5 1/s`; null for what is no number with or without a unit. */
export function numberCell(cell: string, decimal: DecimalSignWord): NumberCell | null {
  const trimmed = cell.trim()
  if (trimmed === '') return null
  const whole = parseNumber(trimmed, 0, trimmed.length, decimal)
  if (!Number.isNaN(whole)) return { value: whole, unitText: '' }
  const match = /^(\S+)\s+(.+)$/.exec(trimmed) ?? /^([-+−]?[\d.,]+(?:e[-+−]?\d+)?)([°ºa-z%].*)$/i.exec(trimmed)
  const [number, unitText] = [match?.[1] ?? '', match?.[2] ?? '']
  if (!isUnitText(unitText)) return null
  const value = parseNumber(number, 0, number.length, decimal)
  return number === '' || Number.isNaN(value) ? null : { value, unitText }
}

import { createHash } from 'node:crypto'
import { rateConstantLimits, type RateConstantReadOptions } from '../../shared-kinetics/contract/rate-constant-schema.ts'
import type { RateConstantNote, RateConstantSource, RateConstantTable } from '../../shared-kinetics/rate-constants/rate-constant-table.ts'
import { hasPowerWithoutSign, powerWithoutSign } from '../../shared-kinetics/units/plain-powers.ts'
import { parseRateUnit } from '../../shared-kinetics/units/rate-unit.ts'
import { decodeText } from './decode-text.ts'
import { ImportRefusal, quoted, type Refuse } from './import-refusal.ts'
import { refuseMixedSigns } from './mixed-decimal-signs.ts'
import { refuseBinary } from './refuse-binary.ts'
import { cellReadings, linesOf, type CellReading, type NumberedLine } from './rate-constant-cells.ts'
import { planRateConstantColumns } from './rate-constant-columns.ts'
import { RateConstantQuestion, unitRemedy, type Ask } from './rate-constant-question.ts'
import { readRateConstantRows } from './rate-constant-rows.ts'
import { isPowerUnclear, powerUnclear } from './value-with-uncertainty.ts'
import { textOf } from './text-bytes.ts'

export interface RateConstantText {
  readonly text: string
  /** For messages and as the source of the table. */
  readonly name: string
  readonly source: RateConstantSource
  readonly sha256: string | null
}

/**
 * Reads a file of rate constants: delimited text with a column of temperature (or 1/T) and one of k (or ln k, log10 k).
 * @throws ImportRefusal with line, reason and remedy; RateConstantQuestion where a statement is all that is missing
 */
export function readRateConstantFile(name: string, bytes: Uint8Array, options: RateConstantReadOptions): RateConstantTable {
  const refuse: Refuse = (line, reason, remedy) => new ImportRefusal(name, line, reason, remedy)
  refuseBinary(bytes, refuse)
  if (bytes.byteLength > rateConstantLimits.bytes) {
    throw refuse(null, 'The file is larger than a table of rate constants can be.', 'Keep one row for each temperature.')
  }
  const { text } = decodeText(bytes, options.encoding, refuse)
  const sha256 = createHash('sha256').update(bytes).digest('hex')
  return readRateConstantText({ text: textOf(text), name, source: 'file', sha256 }, options)
}

/**
 * Reads a table of rate constants from text: with headings (names and units in the usual spellings, a row of units allowed), or as two bare columns,
 * temperature and k, with units behind the numbers or stated. No unit of temperature is guessed.
 *
 * @throws ImportRefusal with line, reason and remedy; RateConstantQuestion where a statement is all that is missing
 */
export function readRateConstantText(input: RateConstantText, options: RateConstantReadOptions): RateConstantTable {
  const refuse: Refuse = (line, reason, remedy) => new ImportRefusal(input.name, line, reason, remedy)
  const ask: Ask = (line, reason, remedy, what) => new RateConstantQuestion(input.name, line, reason, remedy, what)
  if (options.rateUnit !== undefined) {
    const stated = parseRateUnit(options.rateUnit)
    if (!stated.ok) throw refuse(null, `The unit stated for the rate constants is not known: ${stated.reason}.`, unitRemedy)
  }
  const lines = linesOf(input.text, refuse)
  try {
    return readLines(lines, input, options, refuse, ask)
  } catch (error) {
    if (!(error instanceof ImportRefusal) || error instanceof RateConstantQuestion) throw error
    // What a power without its sign, or one behind an uncertainty only, makes of the cells is no help to anybody.
    for (const { number, text } of lines) {
      const cell = text.split(/[\t;|]/).find(isPowerUnclear)
      if (cell !== undefined) throw refuse(number, `In ${quoted(cell.trim())} ${powerUnclear.reason}`, powerUnclear.remedy)
    }
    const lost = lines.find(({ text }) => hasPowerWithoutSign(text))
    if (lost === undefined) throw error
    throw refuse(lost.number, `${quoted(lost.text)} ${powerWithoutSign.reason}`, powerWithoutSign.remedy)
  }
}

function readLines(
  lines: readonly NumberedLine[],
  input: RateConstantText,
  options: RateConstantReadOptions,
  refuse: Refuse,
  ask: Ask,
): RateConstantTable {
  const readings = cellReadings(lines, options)
  const [best] = readings
  if (best === undefined) {
    throw refuse(
      null,
      'There is no table of rate constants: no line holds two numbers.',
      'Give one row for each temperature: the temperature, then the rate constant, with a heading such as “T (°C); k (1/s)”.',
    )
  }
  const rival = readings.find((other) => other.delimiter === best.delimiter && other.decimal !== best.decimal && other.score === best.score)
  const read = (reading: CellReading): RateConstantTable => tableFrom(reading, input, options, refuse, ask)
  if (rival === undefined) return read(best)
  if (!best.hasSigns && !rival.hasSigns) return read(best.decimal === 'point' ? best : rival)
  // Both signs make every cell a number: the one stands that gives possible rate constants.
  const outcomes = [best, rival].map((reading) => attempt(() => read(reading)))
  const [first, second] = outcomes
  if (first === undefined || second === undefined) throw new RangeError('two readings')
  if (first instanceof ImportRefusal && second instanceof ImportRefusal) throw first
  if (first instanceof ImportRefusal) return second as RateConstantTable
  if (second instanceof ImportRefusal || JSON.stringify(first.rows) === JSON.stringify(second.rows)) return first
  throw ask(
    null,
    'Its numbers can be read in two ways: the sign in “1,234” may be a decimal sign or divide thousands.',
    'State the decimal sign, point or comma (on the command line: --decimal-sign).',
    'decimal-sign',
  )
}

function attempt(read: () => RateConstantTable): RateConstantTable | ImportRefusal {
  try {
    return read()
  } catch (error) {
    if (error instanceof ImportRefusal) return error
    throw error
  }
}

function tableFrom(
  reading: CellReading,
  input: RateConstantText,
  options: RateConstantReadOptions,
  refuse: Refuse,
  ask: Ask,
): RateConstantTable {
  const notes: RateConstantNote[] = []
  refuseMixedSigns(reading, refuse)
  const columns = planRateConstantColumns(reading, options, refuse, notes)
  const read = readRateConstantRows(reading, columns, options, { refuse, ask, notes })
  return {
    rows: read.rows,
    rateUnit: read.rateUnit,
    temperatureUnitShown: read.temperatureUnit,
    predictAt_K: [],
    source: {
      kind: input.source,
      name: input.source === 'file' ? input.name.slice(0, rateConstantLimits.text) : null,
      sha256: input.sha256,
    },
    notes,
  }
}

import { rateConstantLimits, type RateConstantReadOptions } from '../../shared-kinetics/contract/rate-constant-schema.ts'
import type { RateConstantNote, RateConstantRow, TemperatureUnit } from '../../shared-kinetics/rate-constants/rate-constant-table.ts'
import { celsiusToKelvin, fahrenheitToKelvin } from '../../shared-kinetics/units/convert.ts'
import { parseRateUnit } from '../../shared-kinetics/units/rate-unit.ts'
import { unitOf } from './file-unit.ts'
import { quoted, type Refuse } from './import-refusal.ts'
import { isMissingMark } from './parse-number.ts'
import { numberCell, type CellReading, type NumberCell } from './rate-constant-cells.ts'
import { oneSignRemedy, otherSignReason } from './mixed-decimal-signs.ts'
import type { Placed, RateConstantColumns } from './rate-constant-columns.ts'
import { type Ask, unitRemedy } from './rate-constant-question.ts'

export interface RateConstantRows {
  readonly rows: readonly RateConstantRow[]
  readonly rateUnit: string
  readonly temperatureUnit: TemperatureUnit
}

interface Reporting {
  readonly refuse: Refuse
  readonly ask: Ask
  readonly notes: RateConstantNote[]
}

/** Temperatures between which a rate constant can have been measured; beyond lies another unit. */
const possible_K = [20, 5000] as const

/**
 * The rows under the columns: temperatures to kelvin by the unit of heading, cell or statement; k as its heading says. Lines that hold a temperature and
 * no rate constant are set aside with a note, anything else between the rows is refused by its line.
 */
export function readRateConstantRows(
  reading: CellReading,
  columns: RateConstantColumns,
  options: RateConstantReadOptions,
  report: Reporting,
): RateConstantRows {
  const first = reading.rows.findIndex((row) => row.isData)
  const last = reading.rows.findLastIndex((row) => row.isData)
  const [temperature] = columns.temperatures
  const [rateConstant] = columns.rateConstants
  if (temperature === undefined || rateConstant === undefined) throw new RangeError('columns are planned before rows are read')
  const units = { temperature: new Set<TemperatureUnit>(), rate: new Set<string>() }
  const rows: RateConstantRow[] = []
  const emptyLines: number[] = []
  const forms = new Set<UncertaintyForm>()
  for (const { line, cells, isData } of reading.rows.slice(first, last + 1)) {
    if (cells.length > columns.width && columns.headingLine !== null)
      throw report.refuse(line, `The row has ${cells.length} cells, the headings name ${columns.width}.`, 'Mend this row.')
    const cell = (index: number): string => cells[index] ?? ''
    if (isMissing(cell(rateConstant.index)) && numberCell(cell(temperature.index), reading.decimal) !== null) {
      emptyLines.push(line)
      continue
    }
    if (!isData)
      throw report.refuse(line, `${quoted(cells.join(' '))} is no row of a temperature and a rate constant.`, 'Mend or remove this line.')
    const read: Reader = { line, cell, reading, options, report, units, forms }
    const temperature_K = temperatureOf(temperature, read)
    const { k, uncertainty: beside } = rateConstantOf(rateConstant, read)
    for (const other of columns.temperatures.slice(1)) mustAgree(temperature_K, temperatureOf(other, read), 0.7, temperature, other, read)
    for (const other of columns.rateConstants.slice(1)) {
      if (other.column.unit !== null && other.column.unit !== rateConstant.column.unit) continue
      mustAgree(Math.log(k), Math.log(rateConstantOf(other, read).k), 0.05, rateConstant, other, read)
    }
    const label = columns.label === null ? '' : cell(columns.label.index).slice(0, rateConstantLimits.text)
    rows.push({
      temperature_K,
      rateConstant: k,
      standardUncertainty: (columns.uncertainty === null ? null : uncertaintyOf(columns.uncertainty, rateConstant, k, read)) ?? beside,
      label: label === '' ? null : label,
      use: true,
    })
  }
  if (rows.length > rateConstantLimits.rows)
    throw report.refuse(
      null,
      `There are ${rows.length} rows; a table holds at most ${rateConstantLimits.rows}.`,
      'Keep one row for each temperature.',
    )
  const behind: number[] = []
  for (const { line, cells } of reading.rows.slice(last + 1)) {
    const [T = '', k = ''] = [cells[temperature.index], cells[rateConstant.index]]
    if (numberCell(T, reading.decimal) === null) behind.push(line)
    else if (isMissing(k)) emptyLines.push(line)
    // What begins like a number is a slip in a row; words behind a number are a remark.
    else if (/^[-+−]?[.,]?\d/.test(k))
      throw report.refuse(line, `${quoted(k)} in column ${quoted(rateConstant.label)} is no number.`, 'Mend or remove this row.')
    else behind.push(line)
  }
  noteRows(emptyLines, 'without a rate constant', report.notes)
  noteRows(behind, 'behind the table', report.notes)
  noteUncertainties(forms, report.notes)
  noteHeadings(columns, options, report.notes)
  return { rows, ...settledUnits(temperature, rateConstant, units, options, report) }
}

interface Reader {
  readonly line: number
  readonly cell: (index: number) => string
  readonly reading: CellReading
  readonly options: RateConstantReadOptions
  readonly report: Reporting
  readonly units: { readonly temperature: Set<TemperatureUnit>; readonly rate: Set<string> }
  readonly forms: Set<UncertaintyForm>
}

/** Uncertainties that stood in cells of other columns. */
type UncertaintyForm = NonNullable<NumberCell['uncertainty']>['form'] | 'of-temperature'

const isMissing = (cell: string): boolean => cell === '' || isMissingMark(cell)

function numberIn(placed: { readonly index: number; readonly label: string }, read: Reader): NumberCell {
  const cell = read.cell(placed.index)
  const number = numberCell(cell, read.reading.decimal)
  if (number === null) {
    const mixed = otherSignReason(cell, read.reading.decimal)
    if (mixed !== null) throw read.report.refuse(read.line, `${mixed}.`, oneSignRemedy)
    throw read.report.refuse(read.line, `${quoted(cell)} in column ${quoted(placed.label)} is no number.`, 'Mend or remove this row.')
  }
  return number
}

function temperatureOf(placed: RateConstantColumns['temperatures'][number], read: Reader): number {
  const { value, unitText, uncertainty } = numberIn(placed, read)
  if (uncertainty !== undefined) read.forms.add('of-temperature')
  const { refuse, ask } = read.report
  const heading = placed.column.role === 'temperature' ? placed.column.unit : null
  if (placed.column.role === 'inverse-temperature') {
    const kelvin = placed.column.factor / value
    if (kelvin >= possible_K[0] && kelvin <= possible_K[1]) return kelvin
    throw refuse(
      read.line,
      `${value} under ${quoted(placed.label)} would be ${Number(kelvin.toPrecision(4))} K.`,
      'Write “1/T (1/K)” over numbers such as 0.003, “1000/T (1/K)” over numbers such as 3.',
    )
  }
  const inCell = unitText === '' ? null : temperatureUnitOf(unitText)
  if (unitText !== '' && inCell === null)
    throw refuse(read.line, `${quoted(unitText)} is no unit of temperature.`, 'Units of temperature are K, °C and °F.')
  if (inCell !== null && heading !== null && inCell !== heading)
    throw refuse(
      read.line,
      `The unit behind the temperature, ${quoted(unitText)}, is not that of the heading ${quoted(placed.label)}.`,
      'Mend one of them.',
    )
  const unit = inCell ?? read.options.temperatureUnit ?? heading
  if (unit === null) {
    throw ask(
      read.line,
      `Nothing says in which unit ${quoted(placed.label)} holds temperature; ${value} may be K, °C or °F.`,
      'Write the unit into the heading, “T (°C)” or “T (K)”, or state it (on the command line: --temperature-unit).',
      'temperature-unit',
    )
  }
  read.units.temperature.add(unit)
  const kelvin = unit === 'K' ? value : unit === 'C' ? celsiusToKelvin(value) : fahrenheitToKelvin(value)
  if (kelvin >= possible_K[0] && kelvin <= possible_K[1]) return kelvin
  throw refuse(
    read.line,
    `A temperature of ${value} ${unit === 'K' ? 'K' : `°${unit}`} is not possible here.`,
    'Look at the unit of temperature and at the decimal sign.',
  )
}

function temperatureUnitOf(text: string): TemperatureUnit | null {
  const unit = unitOf(text)
  if (unit?.dimension !== 'temperature') return null
  return unit.word === '°C' ? 'C' : unit.word === '°F' ? 'F' : 'K'
}

/** k, and the standard uncertainty that stands in its cell. */
function rateConstantOf(placed: Placed<'rate-constant'>, read: Reader): { readonly k: number; readonly uncertainty: number | null } {
  const { value, unitText, uncertainty } = numberIn(placed, read)
  const { form, scale } = placed.column
  if (unitText !== '') {
    const unit = parseRateUnit(unitText)
    if (!unit.ok || form !== 'k') throw read.report.refuse(read.line, `${quoted(unitText)} is no unit of a rate constant here.`, unitRemedy)
    read.units.rate.add(unit.value.text)
  }
  const k = (form === 'ln' ? Math.exp(value) : form === 'log10' ? 10 ** value : value) * scale
  if (k > 0 && Number.isFinite(k)) {
    if (uncertainty === undefined) return { k, uncertainty: null }
    read.forms.add(uncertainty.form)
    const absolute = uncertainty.isRelative ? uncertainty.value * Math.abs(value) : uncertainty.value
    // Of a logarithm it is relative.
    const u = form === 'k' ? absolute * scale : k * absolute * (form === 'log10' ? Math.LN10 : 1)
    return { k, uncertainty: positive(u, read.cell(placed.index), read) }
  }
  const why = form === 'k' ? 'is not above 0, and has no logarithm' : 'leaves the range of numbers'
  throw read.report.refuse(read.line, `The rate constant ${quoted(read.cell(placed.index))} ${why}.`, 'Mend or remove this row.')
}

function uncertaintyOf(placed: Placed<'uncertainty'>, of: Placed<'rate-constant'>, k: number, read: Reader): number | null {
  if (isMissing(read.cell(placed.index))) return null
  const percent = /^([\d.,]+)\s*%$/.exec(read.cell(placed.index))?.[1]
  if (percent !== undefined) {
    const share = numberCell(percent, read.reading.decimal)
    if (share !== null) return k * (positive(share.value, read.cell(placed.index), read) / 100)
  }
  const { value } = numberIn(placed, read)
  const { relative, unit } = placed.column
  if (unit !== null && of.column.unit !== null && unit !== of.column.unit)
    throw read.report.refuse(null, `The uncertainty is in ${unit} and k in ${of.column.unit}.`, 'Give both in one unit.')
  positive(value, String(value), read)
  if (relative !== 'no') return k * (relative === 'percent' ? value / 100 : value)
  // That of a logarithm is relative; that of k in powers of ten has them too.
  if (of.column.form === 'k') return value * of.column.scale
  return k * value * (of.column.form === 'log10' ? Math.LN10 : 1)
}

function positive(uncertainty: number, written: string, { line, report }: Reader): number {
  if (uncertainty > 0) return uncertainty
  throw report.refuse(line, `The uncertainty in ${quoted(written)} is not above 0.`, 'Leave it out where there is none.')
}

function mustAgree(
  one: number,
  other: number,
  within: number,
  first: { readonly label: string },
  second: { readonly label: string },
  { line, report }: Reader,
): void {
  if (Math.abs(one - other) <= within) return
  throw report.refuse(
    line,
    `The columns ${quoted(first.label)} and ${quoted(second.label)} do not agree in this row.`,
    'Mend the row, or remove one of the columns.',
  )
}

function noteRows(lines: readonly number[], which: string, notes: RateConstantNote[]): void {
  if (lines.length === 0) return
  notes.push({
    code: 'rows-set-aside',
    severity: 'caution',
    message: `${lines.length === 1 ? 'A line' : `${lines.length} lines`} ${which} ${lines.length === 1 ? 'was' : 'were'} set aside (line ${lines.slice(0, 5).join(', ')}${lines.length > 5 ? ', …' : ''}).`,
    evidence: { lines: lines.length, firstLine: lines[0] ?? null },
  })
}

function noteUncertainties(forms: ReadonlySet<UncertaintyForm>, notes: RateConstantNote[]): void {
  const say = (message: string, severity: RateConstantNote['severity']): void => {
    notes.push({ code: 'uncertainty-read-as', severity, message, evidence: {} })
  }
  if (forms.has('plus-minus'))
    say(
      'What stands behind ± was read as one standard uncertainty of k. Where it is an expanded one (two standard uncertainties, or half a 95 % interval), state the standard uncertainty in a column “u(k)”.',
      'caution',
    )
  if (forms.has('brackets')) say('Digits in brackets, as in 2.94(8), were read as the standard uncertainty of the last digits.', 'note')
  if (forms.has('of-temperature')) say('Uncertainties of temperature enter nothing and were set aside.', 'note')
}

function noteHeadings(
  { rateConstants, temperatures }: RateConstantColumns,
  options: RateConstantReadOptions,
  notes: RateConstantNote[],
): void {
  const say = (message: string, severity: RateConstantNote['severity']): void => {
    notes.push({ code: 'heading-read-as', severity, message, evidence: {} })
  }
  const [k] = rateConstants
  const [temperature] = temperatures
  if (k !== undefined && k.column.remark !== null)
    say(`Heading ${quoted(k.label)}: ${k.column.remark}.`, k.column.scale === 1 ? 'note' : 'caution')
  if (temperature?.column.role === 'inverse-temperature')
    say(`Heading ${quoted(temperature.label)} was read as ${temperature.column.factor}/T with T in kelvin.`, 'note')
  const stated = options.temperatureUnit
  if (
    temperature?.column.role === 'temperature' &&
    temperature.column.unit !== null &&
    stated !== undefined &&
    stated !== temperature.column.unit
  )
    say(
      `Heading ${quoted(temperature.label)} names another unit of temperature than was stated (${stated}); the statement was followed.`,
      'caution',
    )
}

function settledUnits(
  temperature: RateConstantColumns['temperatures'][number],
  rateConstant: Placed<'rate-constant'>,
  units: Reader['units'],
  options: RateConstantReadOptions,
  { refuse, notes }: Reporting,
): Pick<RateConstantRows, 'rateUnit' | 'temperatureUnit'> {
  const stated = options.rateUnit === undefined ? null : parseRateUnit(options.rateUnit)
  const inCells = [...units.rate]
  if (inCells.length > 1) throw refuse(null, `The rate constants have several units: ${inCells.join(', ')}.`, 'Give all in one unit.')
  const written = rateConstant.column.unit ?? inCells[0] ?? null
  const rateUnit = stated?.ok === true ? stated.value.text : (written ?? '')
  if (written !== null && rateUnit !== written) {
    notes.push({
      code: 'heading-read-as',
      severity: 'caution',
      message: `The table gives k in ${written}; it was taken to be in ${rateUnit}, as stated.`,
      evidence: { table: written, stated: rateUnit },
    })
  }
  const [only] = units.temperature
  return { rateUnit, temperatureUnit: temperature.column.role === 'inverse-temperature' ? 'K' : (only ?? 'K') }
}

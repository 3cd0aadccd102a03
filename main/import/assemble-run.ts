import { studyLimits } from '../../shared-kinetics/contract/study-document.ts'
import type { ImportNote, RunColumns, SignalInfo } from '../../shared-kinetics/series/run.ts'
import type { SignalUnit } from '../../shared-kinetics/series/signal-quantity.ts'
import { type ConvertedColumn, convertColumn } from './convert-column.ts'
import type { RunOfColumns } from './divide-into-runs.ts'
import { type FileUnit, signalUnitOf } from './file-unit.ts'
import { quoted, type Refuse } from './import-refusal.ts'
import type { LinearScale } from './linear-scale.ts'
import { type PlannedColumn, words } from './plan-columns.ts'
import type { RawTable } from './read-columns.ts'
import { settleUnit, unitUnknown } from './settle-unit.ts'

/** A run's columns in SI units, and what was noticed on the way. */
export interface AssembledRun {
  readonly columns: RunColumns
  readonly rows: number
  readonly signals: readonly SignalInfo[]
  /** First plausible reading of an absolute mass column. */
  readonly firstMass_kg: number | null
  readonly notes: readonly ImportNote[]
  /** Unit of each column as settled, by index of the column. */
  readonly units: ReadonlyMap<number, FileUnit>
}

const highestTemperature_K = 4000

/**
 * Cuts a run's columns to its own rows, settles their units, converts them to SI on shared memory and checks what no run can be.
 * @throws ImportRefusal for empty cells amid the rows, units that nothing tells, temperatures below absolute zero, time going backwards
 */
export function assembleRun(
  run: RunOfColumns,
  table: RawTable,
  stated: { readonly nominal_K_per_s: number | null; readonly initialMass_kg: number | null },
  refuse: Refuse,
): AssembledRun {
  const used = [...(run.time === null ? [] : [run.time]), run.temperature, ...run.signals]
  const { rows, incomplete } = wholeRows(used, table, refuse)
  const raw = (column: PlannedColumn): Float64Array => table.columns[column.index]?.subarray(0, rows) ?? new Float64Array(rows)
  const lineOf = (row: number): number => table.lineOfRow[row] ?? 0
  const notes: ImportNote[] = incomplete.length === 0 ? [] : [rowsNote(incomplete)]
  const units = new Map<number, FileUnit>()
  const settle = (column: PlannedColumn, evidence: Parameters<typeof settleUnit>[2]): FileUnit | null => {
    const settled = settleUnit(column, raw(column), evidence)
    if (settled === null) return null
    if (settled.note !== null) notes.push(settled.note)
    units.set(column.index, settled.unit)
    return settled.unit
  }

  const temperatureUnit = settle(run.temperature, null)
  if (temperatureUnit === null) throw unitUnknown(run.temperature, lineOf(0), refuse)
  const temperature = convertColumn(raw(run.temperature), 'K', temperatureUnit.scale)
  checkTemperature(temperature, run.temperature, lineOf, refuse)
  const temperature_K = temperature.values

  const span = (temperature_K.at(-1) ?? Number.NaN) - (temperature_K[0] ?? Number.NaN)
  const timeUnit = run.time === null ? null : settle(run.time, { temperatureSpan_K: span, nominal_K_per_s: stated.nominal_K_per_s })
  if (run.time !== null && timeUnit === null) throw unitUnknown(run.time, lineOf(0), refuse)
  const time = run.time === null || timeUnit === null ? null : convertColumn(raw(run.time), 's', timeUnit.scale)
  if (time === null) notes.push(timeMissing)
  else if (run.time !== null) checkTime(time, run.time, raw(run.time), lineOf, refuse)

  const signals: { info: SignalInfo; column: ConvertedColumn<SignalUnit>; planned: PlannedColumn }[] = []
  const aside: { column: PlannedColumn; why: string }[] = []
  for (const planned of run.signals) {
    const unit = settle(planned, null)
    const scale = unit === null ? null : scaleOf(planned, unit, raw(planned), stated.initialMass_kg)
    if (unit === null || scale === null) {
      aside.push({ column: planned, why: unit === null ? 'nothing tells its unit' : 'the mass at the start is not known' })
      continue
    }
    const siUnit = signalUnitOf[unit.dimension as keyof typeof signalUnitOf] satisfies SignalUnit
    const fileUnit = planned.unitText === '' ? unit.word : planned.unitText.replace(/^[([{]\s*|\s*[)\]}]$/g, '')
    const quantity = planned.quantity as SignalInfo['quantity']
    signals.push({
      planned,
      info: { quantity, unit: siUnit, label: planned.label, fileUnit },
      column: convertColumn(raw(planned), siUnit, scale),
    })
  }
  const [firstAside] = aside
  if (signals.length === 0 && firstAside !== undefined) {
    if (firstAside.column.unit === null) throw unitUnknown(firstAside.column, lineOf(0), refuse)
    const remedy = 'Give the sample mass in a line above the table (“Sample mass: 5.1 mg”).'
    throw refuse(lineOf(0), `Column ${quoted(firstAside.column.label)} cannot be used: ${firstAside.why}.`, remedy)
  }
  if (signals.length > studyLimits.signals) {
    throw refuse(lineOf(0), `A run has ${signals.length} signals.`, `Set columns aside: at most ${studyLimits.signals} are kept.`)
  }
  if (aside.length > 0) notes.push(asideNote(aside))
  notes.push(...severalNotes(signals.map(({ planned }) => planned)))
  const columns: RunColumns = { time_s: time?.values ?? null, temperature_K, signals: signals.map(({ column }) => column.values) }
  const mass = signals.find(({ info, planned }) => info.unit === 'kg' && planned.as === 'value')
  return {
    columns,
    rows,
    signals: signals.map(({ info }) => info),
    firstMass_kg: mass === undefined ? null : firstPlausible(mass.column),
    notes,
    units,
  }
}

/** The rows up to the last whole one. Behind it a few that are cut short are set aside; before it an empty cell is refused. */
function wholeRows(used: readonly PlannedColumn[], table: RawTable, refuse: Refuse): { rows: number; incomplete: readonly number[] } {
  const complete = used.every((column) => table.filled[column.index] === table.rows)
  const { rows, incomplete } = complete ? { rows: table.rows, incomplete: [] } : rowsAmongEmptyCells(used, table, refuse)
  if (rows < 3) throw refuse(table.lineOfRow[0] ?? 0, `A run has only ${rows} whole rows.`, 'Export the whole run.')
  return { rows, incomplete }
}

function rowsAmongEmptyCells(used: readonly PlannedColumn[], table: RawTable, refuse: Refuse): ReturnType<typeof wholeRows> {
  const isEmpty = (column: PlannedColumn, row: number): boolean => Number.isNaN(table.columns[column.index]?.[row] ?? Number.NaN)
  let last = table.rows - 1
  const incomplete: number[] = []
  while (last >= 0 && used.some((column) => isEmpty(column, last))) {
    if (!used.every((column) => isEmpty(column, last))) incomplete.push(table.lineOfRow[last] ?? 0)
    last--
  }
  const rows = last + 1
  const few = Math.max(3, rows / 100)
  for (let row = 0; row < (incomplete.length > few ? table.rows : rows); row++) {
    const missing = used.find((column) => isEmpty(column, row))
    if (missing === undefined || used.every((column) => isEmpty(column, row))) continue
    const reason = `The cell of column ${quoted(missing.label)} is empty here, while the rest of the run’s row is not.`
    throw refuse(table.lineOfRow[row] ?? 0, reason, `Complete the row or remove it, or set “column ${missing.index + 1}” aside.`)
  }
  for (let row = 0; row < rows; row++) {
    if (!isEmpty(used[0] as PlannedColumn, row)) continue
    throw refuse(table.lineOfRow[row] ?? 0, 'The run’s cells are empty here, and more of its rows follow.', 'Remove this line.')
  }
  return { rows, incomplete: incomplete.toReversed() }
}

/** Change and loss become what is left: of 1, or of the mass at the start. */
function scaleOf(column: PlannedColumn, unit: FileUnit, values: Float64Array, initialMass_kg: number | null): LinearScale | null {
  if (column.quantity !== 'mass' || column.as === 'value') return unit.scale
  const start = unit.dimension === 'fraction' ? 1 : initialMass_kg
  if (start === null) return null
  const change = { ...unit.scale, offset: start }
  if (column.as === 'change') return change
  // Some write a loss as a negative number: then it is the change.
  let sum = 0
  for (const value of values) sum += value
  return sum >= 0 ? { ...change, factor: -change.factor } : change
}

function checkTemperature(
  { values, least, greatest }: ConvertedColumn<'K'>,
  column: PlannedColumn,
  lineOf: (row: number) => number,
  refuse: Refuse,
): void {
  if (least > 0 && greatest <= highestTemperature_K) return
  const impossible = values.findIndex((value) => !(value > 0 && value <= highestTemperature_K))
  const value = values[impossible] ?? Number.NaN
  const where = value <= 0 ? 'at or below absolute zero' : 'above any that a sample reaches'
  const reason = `The temperature in column ${quoted(column.label)} would be ${Number(value.toPrecision(6))} K, ${where}.`
  throw refuse(lineOf(impossible), reason, `Check this row and the unit of “column ${column.index + 1}”.`)
}

function checkTime(
  { firstFall }: ConvertedColumn<'s'>,
  column: PlannedColumn,
  raw: Float64Array,
  lineOf: (row: number) => number,
  refuse: Refuse,
): void {
  if (firstFall === null) return
  const reason = `Time goes backwards: ${raw[firstFall]} follows ${raw[firstFall - 1]} in column ${quoted(column.label)}.`
  throw refuse(lineOf(firstFall), reason, 'Export one segment a file, or put the rows in order of time.')
}

/** A first row may hold a placeholder: the first reading of at least half the greatest one counts. */
function firstPlausible({ values, greatest }: ConvertedColumn<SignalUnit>): number | null {
  return values.find((value) => value > 0 && value >= greatest / 2) ?? null
}

const timeMissing: ImportNote = {
  code: 'time-missing',
  severity: 'note',
  message: 'The export holds no time; it is rebuilt from the heating rate that is stated.',
  evidence: {},
}

export function rowsNote(lineNumbers: readonly number[]): ImportNote {
  const shown = lineNumbers.slice(0, 10).join(', ')
  const several = lineNumbers.length > 1
  const message = `${several ? 'Lines' : 'Line'} ${shown}${lineNumbers.length > 10 ? ', …' : ''} behind the data ${several ? 'are' : 'is'} no whole row of numbers and ${several ? 'were' : 'was'} set aside.`
  return { code: 'rows-set-aside', severity: 'caution', message, evidence: { lines: shown, count: lineNumbers.length } }
}

function asideNote(aside: readonly { column: PlannedColumn; why: string }[]): ImportNote {
  const message = `Set aside: ${aside.map(({ column, why }) => `${quoted(column.label)} (${why})`).join('; ')}.`
  return { code: 'columns-set-aside', severity: 'caution', message, evidence: { columns: aside.length } }
}

function severalNotes(signals: readonly PlannedColumn[]): readonly ImportNote[] {
  const quantities = [...new Set(signals.map((signal) => signal.quantity))]
  return quantities.flatMap((quantity): ImportNote[] => {
    const same = signals.filter((signal) => signal.quantity === quantity)
    const [first] = same
    if (quantity === null || first === undefined || same.length < 2) return []
    const labels = same.map((signal) => signal.label)
    const message = `The run holds ${same.length} columns of ${words(quantity)}: ${labels.map(quoted).join(', ')}. The first of these, ${quoted(first.label)}, is taken unless another is chosen.`
    return [
      {
        code: 'several-columns-of-one-quantity',
        severity: 'note',
        message,
        evidence: { quantity, columns: labels.join('; ').slice(0, 1000), taken: first.label },
      },
    ]
  })
}

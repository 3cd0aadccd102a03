import { KineticsError } from '../errors.ts'
import { perSecondToPerMinute } from '../units/convert.ts'
import { column, type Column } from '../units/quantity.ts'
import { mainHeating } from './main-heating.ts'
import type { NominalHeatingRate, RunColumns } from './run.ts'

/** The rows of one run that can be used with one signal: time ascends strictly from 0 at the first of them, every number is finite. */
export interface UsableRows {
  readonly time_s: Column<'s'>
  readonly temperature_K: Column<'K'>
  readonly signal: Float64Array
  /** The heating rate that time was rebuilt from, or null where time was measured. */
  readonly rebuiltFrom: NominalHeatingRate | null
}

const fewestRows = 20
/** More rows than this share that go back in time are not a repeated row here and there but two recordings in one. */
const mostBackward = 0.05

/**
 * Rows with finite time, temperature and signal, in order of time. A row whose time does not go on is left out. Without a time column, time is (T - T first) / β
 * over the rows of the main heating part in which the temperature still rises, with the heating rate β that somebody stated.
 *
 * @param label - of the run, for messages
 * @throws KineticsError `no-heating-rate` without time and stated rate; `time-not-ascending`; `empty-window` with fewer than 20 rows; `no-signal` without the column
 */
export function usableRows(columns: RunColumns, signalIndex: number, nominal: NominalHeatingRate | null, label: string): UsableRows {
  const signal = columns.signals[signalIndex]
  if (signal === undefined)
    throw new KineticsError('no-signal', `${label} has no column for the chosen signal. Choose another signal or leave the run out.`, {
      run: label,
    })
  return columns.time_s === null
    ? rowsWithRebuiltTime(columns.temperature_K, signal, nominal, label)
    : rowsWithMeasuredTime(columns.time_s, columns.temperature_K, signal, label)
}

function rowsWithMeasuredTime(time: Float64Array, temperature: Float64Array, signal: Float64Array, label: string): UsableRows {
  const kept: number[] = []
  let latest = -Infinity
  let finite = 0
  let backward = 0
  let firstBackward = -1
  for (let i = 0; i < time.length; i++) {
    const t = time[i] ?? Number.NaN
    if (!Number.isFinite(t) || !Number.isFinite(temperature[i]) || !Number.isFinite(signal[i])) continue
    finite++
    if (t > latest) {
      latest = t
      kept.push(i)
    } else if (t < latest) {
      backward++
      if (firstBackward < 0) firstBackward = i
    }
  }
  if (backward > mostBackward * finite) {
    throw new KineticsError(
      'time-not-ascending',
      `${label}: time goes back at data row ${firstBackward + 1}, and ${backward} of ${finite} rows lie behind an earlier one. ` +
        'Export the run in one piece with time counted from its start, or split the file at that row.',
      { run: label, row: firstBackward + 1, backward },
    )
  }
  enough(kept.length, label)
  const start = time[kept[0] ?? 0] ?? 0
  return {
    time_s: column(
      Float64Array.from(kept, (i) => (time[i] ?? Number.NaN) - start),
      's',
    ),
    temperature_K: pick(temperature, kept),
    signal: Float64Array.from(kept, (i) => signal[i] ?? Number.NaN),
    rebuiltFrom: null,
  }
}

function rowsWithRebuiltTime(
  temperature: Float64Array,
  signal: Float64Array,
  nominal: NominalHeatingRate | null,
  label: string,
): UsableRows {
  if (nominal === null) {
    throw new KineticsError(
      'no-heating-rate',
      `${label} has no time column, and no heating rate is stated for it. Give its heating rate (K/min), or export the run with time.`,
      { run: label },
    )
  }
  const finite: number[] = []
  for (let i = 0; i < temperature.length; i++) if (Number.isFinite(temperature[i]) && Number.isFinite(signal[i])) finite.push(i)
  enough(finite.length, label)
  const main = mainHeating(Float64Array.from(finite, (i) => temperature[i] ?? Number.NaN))
  const kept: number[] = []
  let highest = -Infinity
  for (const i of finite.slice(main.first, main.last + 1)) {
    const value = temperature[i] ?? Number.NaN
    if (value <= highest) continue
    highest = value
    kept.push(i)
  }
  enough(kept.length, label)
  const start = temperature[kept[0] ?? 0] ?? Number.NaN
  return {
    time_s: column(
      Float64Array.from(kept, (i) => ((temperature[i] ?? Number.NaN) - start) / nominal.heatingRate_K_per_s),
      's',
    ),
    temperature_K: pick(temperature, kept),
    signal: Float64Array.from(kept, (i) => signal[i] ?? Number.NaN),
    rebuiltFrom: nominal,
  }
}

const pick = (temperature: Float64Array, rows: readonly number[]): Column<'K'> =>
  column(
    Float64Array.from(rows, (i) => temperature[i] ?? Number.NaN),
    'K',
  )

function enough(rows: number, label: string): void {
  if (rows < fewestRows) {
    throw new KineticsError(
      'empty-window',
      `${label} has ${rows} usable rows; ${fewestRows} are needed. Check that time, temperature and signal were read from the right columns.`,
      { run: label, rows },
    )
  }
}

/** A heating rate in words: `10 K/min`. */
export const heatingRateInWords = (heatingRate_K_per_s: number): string =>
  `${Number(perSecondToPerMinute(heatingRate_K_per_s).toPrecision(4))} K/min`

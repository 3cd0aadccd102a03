import { KineticsError } from '../errors.ts'
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
  readonly setAside: RowsSetAside
}

/** Rows of the export that are no usable rows of their own. */
export interface RowsSetAside {
  /** Without time, temperature or signal. */
  readonly withoutNumber: number
  /** With the time of the row before, into whose mean they went; where time was rebuilt, rows in which the temperature does not rise. */
  readonly sameTime: number
  /** Blocks of rows whose time lies behind that of an earlier row: how many, and the usable row after which they stood. */
  readonly behind: readonly { readonly after: number; readonly rows: number }[]
}

const fewestRows = 20
/** More rows than this share that go back in time are not a repeated row here and there but two recordings in one. */
export const mostBackward = 0.05

/**
 * Rows with finite time, temperature and signal, in order of time. Rows of one time count as
 * one, their mean, which is unbiased where time was rounded; rows that lie behind in time are set aside. Without a time column, time is (T - T first) / β
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
  if (allUsable(time, temperature, signal)) {
    enough(time.length, label)
    return {
      time_s: column(fromZero(time), 's'),
      temperature_K: column(temperature, 'K'),
      signal,
      rebuiltFrom: null,
      setAside: { withoutNumber: 0, sameTime: 0, behind: [] },
    }
  }
  const keptTime = new Float64Array(time.length)
  const keptTemperature = new Float64Array(time.length)
  const keptSignal = new Float64Array(time.length)
  const behind: { after: number; rows: number }[] = []
  let kept = 0
  let inMean = 0
  let withoutNumber = 0
  let sameTime = 0
  let backward = 0
  let firstBackward = -1
  for (let i = 0; i < time.length; i++) {
    const t = time[i] as number
    const T = temperature[i] as number
    const y = signal[i] as number
    if (!Number.isFinite(t) || !Number.isFinite(T) || !Number.isFinite(y)) {
      withoutNumber++
      continue
    }
    const latest = kept === 0 ? -Infinity : (keptTime[kept - 1] ?? Number.NaN)
    if (t > latest) {
      keptTime[kept] = t
      keptTemperature[kept] = T
      keptSignal[kept] = y
      kept++
      inMean = 1
    } else if (t === latest) {
      sameTime++
      inMean++
      keptTemperature[kept - 1] = (keptTemperature[kept - 1] ?? Number.NaN) + (T - (keptTemperature[kept - 1] ?? Number.NaN)) / inMean
      keptSignal[kept - 1] = (keptSignal[kept - 1] ?? Number.NaN) + (y - (keptSignal[kept - 1] ?? Number.NaN)) / inMean
    } else {
      const block = behind.at(-1)
      if (block?.after === kept - 1) block.rows++
      else behind.push({ after: kept - 1, rows: 1 })
      backward++
      if (firstBackward < 0) firstBackward = i
    }
  }
  const finite = time.length - withoutNumber
  if (backward > mostBackward * finite) {
    throw new KineticsError(
      'time-not-ascending',
      `${label}: time goes back at data row ${firstBackward + 1}, and ${backward} of ${finite} rows lie behind an earlier one. ` +
        'Export the run in one piece with time counted from its start, or split the file at that row.',
      { run: label, row: firstBackward + 1, backward },
    )
  }
  enough(kept, label)
  return {
    time_s: column(fromZero(keptTime.subarray(0, kept)), 's'),
    temperature_K: column(keptTemperature.subarray(0, kept), 'K'),
    signal: keptSignal.subarray(0, kept),
    rebuiltFrom: null,
    setAside: { withoutNumber, sameTime, behind },
  }
}

/** Every number is finite and time ascends: nothing is set aside, and the columns serve as they are. */
function allUsable(time: Float64Array, temperature: Float64Array, signal: Float64Array): boolean {
  let latest = -Infinity
  for (let i = 0; i < time.length; i++) {
    const t = time[i] as number
    const T = temperature[i] as number
    const y = signal[i] as number
    if (!(t > latest && t < Infinity && T > -Infinity && T < Infinity && y > -Infinity && y < Infinity)) return false
    latest = t
  }
  return true
}

/** The same times counted from the first; they themselves where that is 0. */
function fromZero(time: Float64Array): Float64Array {
  const start = time[0] ?? 0
  if (start === 0) return time
  const counted = new Float64Array(time.length)
  for (let i = 0; i < time.length; i++) counted[i] = (time[i] as number) - start
  return counted
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
  const finite = Int32Array.from(temperature.keys()).filter((i) => Number.isFinite(temperature[i]) && Number.isFinite(signal[i]))
  enough(finite.length, label)
  const main = mainHeating(Float64Array.from(finite, (i) => temperature[i] ?? Number.NaN))
  let highest = -Infinity
  const kept = finite.subarray(main.first, main.last + 1).filter((i) => {
    const value = temperature[i] ?? Number.NaN
    if (value <= highest) return false
    highest = value
    return true
  })
  enough(kept.length, label)
  const start = temperature[kept[0] ?? 0] ?? Number.NaN
  const pick = (values: Float64Array): Float64Array => Float64Array.from(kept, (i) => values[i] ?? Number.NaN)
  return {
    time_s: column(
      pick(temperature).map((T) => (T - start) / nominal.heatingRate_K_per_s),
      's',
    ),
    temperature_K: column(pick(temperature), 'K'),
    signal: pick(signal),
    rebuiltFrom: nominal,
    setAside: { withoutNumber: temperature.length - finite.length, sameTime: main.last - main.first + 1 - kept.length, behind: [] },
  }
}

function enough(rows: number, label: string): void {
  if (rows < fewestRows) {
    throw new KineticsError(
      'empty-window',
      `${label} has ${rows} usable rows; ${fewestRows} are needed. Check that time, temperature and signal were read from the right columns.`,
      { run: label, rows },
    )
  }
}

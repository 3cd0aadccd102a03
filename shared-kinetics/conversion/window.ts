import { KineticsError } from '../errors.ts'
import { isHold } from '../series/hold.ts'
import { mainHeating, type RowRange } from '../series/main-heating.ts'
import type { Window } from '../series/run.ts'
import { longestHold } from './longest-hold.ts'
import { cellMeans } from '../signal/cell-means.ts'
import { lowerBound } from '../signal/lower-bound.ts'
import { median } from '../signal/median.ts'
import { noiseOf } from '../signal/noise.ts'
import { findQuietEnds, lowestPeak } from '../signal/quiet-ends.ts'
import { kelvinToCelsius } from '../units/convert.ts'

const fewestRows = 20

/**
 * Rows inside a window that somebody set. In temperature it is applied to the main heating part of the run: from the first row there that reaches its start to
 * the last that has not passed its end. In time it counts from the run's first row.
 *
 * @param time_s - ascending from 0
 * @throws KineticsError `empty-window` where fewer than 20 rows lie inside
 */
export function rowsInWindow(time_s: Float64Array, temperature_K: Float64Array, window: Window, label: string): RowRange {
  const range = window.kind === 'time' ? rowsInTime(time_s, window.start_s, window.end_s) : rowsInTemperature(temperature_K, window)
  const rows = range.last - range.first + 1
  if (rows < fewestRows) {
    throw new KineticsError(
      'empty-window',
      `${label}: ${Math.max(0, rows)} rows lie inside the window ${windowInWords(window)}; ${fewestRows} are needed. ` +
        `The run spans ${rangeInWords(time_s, temperature_K, window)}. Set a window inside that.`,
      { run: label, rows: Math.max(0, rows) },
    )
  }
  return range
}

function rowsInTime(time: Float64Array, start: number, end: number): RowRange {
  let past = lowerBound(time, end)
  if (time[past] === end) past++
  return { first: lowerBound(time, start), last: past - 1 }
}

function rowsInTemperature(temperature: Float64Array, window: { readonly start_K: number; readonly end_K: number }): RowRange {
  const main = mainHeating(temperature)
  let { first, last } = main
  while (first <= last && !((temperature[first] ?? Number.NaN) >= window.start_K)) first++
  while (last >= first && !((temperature[last] ?? Number.NaN) <= window.end_K)) last--
  return { first, last }
}

/**
 * The window where none is set. For mass, conversion and heat release, whose own ends tell start and finish: all of the main heating part. For heat flow, whose
 * signal goes on before and after the reaction: from the straight stretch before the main peak to that after it (with their outer ends for tangents, with their
 * inner ends for a straight baseline), the start-up of the heating left out; where the run reacts in a hold, all of the hold, the heating before it left out.
 */
export function findWindow(
  time_s: Float64Array,
  temperature_K: Float64Array,
  signal: Float64Array,
  kind: 'whole' | 'peak-with-tangents' | 'peak-alone',
): RowRange {
  const main = mainHeating(temperature_K)
  if (kind === 'whole') return main
  const hold = holdWithReaction(time_s, temperature_K, signal, main)
  if (hold !== null) return hold
  const steady = afterStartUp(time_s, temperature_K, main)
  const { before, after } = findQuietEnds(time_s, signal, steady.first, steady.last)
  const end = kind === 'peak-alone' ? 'inner' : 'outer'
  const range = {
    first: before === null ? steady.first : lowerBound(time_s, before[end]),
    last: after === null ? steady.last : Math.max(0, lowerBound(time_s, after[end]) - 1),
  }
  return range.last - range.first + 1 >= fewestRows ? range : steady
}

/** A run holds where one temperature takes most of its time and no whole peak lies in the heating before. */
const mostOfTime = 0.5

/** Rows of the hold in which a run with a heat flow reacts; null where it reacts while it is heated. */
function holdWithReaction(time: Float64Array, temperature: Float64Array, signal: Float64Array, main: RowRange): RowRange | null {
  if (isHold(temperature, main)) return main
  const hold = longestHold(time, temperature, main)
  const between = (a: number, b: number): number => (time[b] ?? 0) - (time[a] ?? 0)
  if (hold.last - hold.first + 1 < fewestRows || between(hold.first, hold.last) < mostOfTime * between(main.first, main.last)) return null
  const heating = { first: main.first, last: hold.first - 1 }
  if (heating.last - heating.first + 1 < fewestRows) return hold
  const steady = afterStartUp(time, temperature, heating)
  const { height, reachesFoot } = findQuietEnds(time, signal, steady.first, steady.last)
  const hasPeak =
    Math.abs(height) > lowestPeak * noiseOf(time, signal, steady.first, steady.last) && reachesFoot.before && reachesFoot.after
  return hasPeak ? null : hold
}

const startUpCells = 200
/** Heating has started up when its rate has come to this share of the usual one. */
const steadyShare = 0.9
/** A start-up longer than this share of the part is none: the programme itself changes. */
const longestStartUp = 0.2

/** The heating part without its start-up, in which furnace and sensors have not yet come to a steady heating rate and the heat flow still swings in. */
function afterStartUp(time: Float64Array, temperature: Float64Array, main: RowRange): RowRange {
  const mean = cellMeans(time, temperature, main.first, main.last, Math.min(startUpCells, Math.floor((main.last - main.first) / 4)))
  const rates: number[] = []
  for (let i = 1; i < mean.x.length; i++) rates.push(((mean.y[i] ?? 0) - (mean.y[i - 1] ?? 0)) / ((mean.x[i] ?? 0) - (mean.x[i - 1] ?? 0)))
  const usual = median(rates)
  const steady = rates.findIndex((rate) => rate >= steadyShare * usual)
  if (!(usual > 0) || steady <= 0 || steady > longestStartUp * rates.length) return main
  return { first: lowerBound(time, mean.x[steady] ?? 0), last: main.last }
}

const number = (value: number): string => String(Number(value.toPrecision(5)))
const celsius = (kelvin: number): string => `${number(kelvin)} K (${number(kelvinToCelsius(kelvin))} °C)`
const minutes = (seconds: number): string => `${number(seconds / 60)} min`

function windowInWords(window: Window): string {
  return window.kind === 'time'
    ? `${minutes(window.start_s)} to ${minutes(window.end_s)}`
    : `${celsius(window.start_K)} to ${celsius(window.end_K)}`
}

function rangeInWords(time: Float64Array, temperature: Float64Array, window: Window): string {
  if (window.kind === 'time') return `0 to ${minutes(time.at(-1) ?? 0)}`
  const { first, last } = mainHeating(temperature)
  return `${celsius(temperature[first] ?? Number.NaN)} to ${celsius(temperature[last] ?? Number.NaN)}`
}

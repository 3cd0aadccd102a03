import { lineFit } from '../numerics/line-fit.ts'
import { orderStatistic } from '../numerics/order-statistic.ts'
import { zeroCelsius_K } from '../units/constants.ts'
import type { RowRange } from './main-heating.ts'
import type { Programme } from './programme.ts'

/** How straight T(t) is while the sample reacts, beside what the digits of the file let one see. */
export interface Steadiness {
  /** Largest distance of T from a straight line in time (ramp), or half its range without the outermost 1 % of the rows on either side (hold); NaN where there is nothing to tell. */
  readonly deviation_K: number
  /** What one unit in the last digit of temperature and of time, as they were printed, is worth together; NaN for holds, where one number shows no last digit. */
  readonly lastDigit_K: number
}

const fewestRows = 10
/** Beyond this no digits are looked for: such a T(t) was measured. */
export const straightest_K = 0.02
const mostDecimals = 6
/** Numbers turned from one unit into another are off a printed one by so much of its last digit at most. */
const roundingOfUnits = 1e-3

const temperatureUnits = [
  { size_K: 1, printed: (T: number) => T },
  { size_K: 1, printed: (T: number) => T - zeroCelsius_K },
  { size_K: 1 / 1.8, printed: (T: number) => (T - zeroCelsius_K) * 1.8 + 32 },
]
const timeUnits = [1, 60, 3600].map((size_s) => ({ size_s, printed: (t: number) => t / size_s }))

export const unknownSteadiness: Steadiness = { deviation_K: Number.NaN, lastDigit_K: Number.NaN }

/**
 * Tells how far a measured T(t) keeps from the line of its programme between two rows, and the last digits of its numbers: the coarsest decimal step, in any unit of
 * temperature (K, °C, °F) and time (s, min, h), that all of them are multiples of. Nothing for a programme that is neither a ramp nor a hold, nor for fewer than ten rows.
 *
 * @param time_s - as measured: where it was rebuilt from T, T is straight in it by making
 */
export function steadinessOf(
  time_s: Float64Array,
  temperature_K: Float64Array,
  { first, last }: RowRange,
  { kind }: Programme,
): Steadiness {
  if (kind === 'general' || last - first + 1 < fewestRows) return unknownSteadiness
  const T = temperature_K.subarray(first, last + 1)
  if (kind === 'isothermal') return { deviation_K: halfRange(T), lastDigit_K: Number.NaN }
  const t = time_s.subarray(first, last + 1)
  const line = lineFit(t, T)
  let deviation_K = 0
  for (let i = 0; i < T.length; i++)
    deviation_K = Math.max(deviation_K, Math.abs((T[i] as number) - line.valueAtMean - line.slope * ((t[i] as number) - line.xMean)))
  if (!(deviation_K <= straightest_K)) return { deviation_K, lastDigit_K: Number.NaN }
  const ofTemperature = Math.max(...temperatureUnits.map(({ size_K, printed }) => size_K * decimalStep(T, printed)))
  const ofTime = Math.max(...timeUnits.map(({ size_s, printed }) => size_s * decimalStep(t, printed)))
  return { deviation_K, lastDigit_K: ofTemperature + line.slope * ofTime }
}

function halfRange(values: Float64Array): number {
  const ordered = values.slice()
  const outermost = Math.floor(0.01 * ordered.length)
  return 0.5 * (orderStatistic(ordered, ordered.length - 1 - outermost) - orderStatistic(ordered, outermost))
}

/** Largest power of ten from 1 down to 1e-6 that the numbers, as printed, are multiples of; 1e-6 where there is none. */
function decimalStep(values: Float64Array, printed: (value: number) => number): number {
  for (let decimals = 0; decimals < mostDecimals; decimals++) {
    const scale = 10 ** decimals
    if (areWhole(values, (value) => scale * printed(value))) return 1 / scale
  }
  return 10 ** -mostDecimals
}

function areWhole(values: Float64Array, scaled: (value: number) => number): boolean {
  // Every row: of evenly spaced ones, some picked out evenly may have rounder times than the rest.
  for (let i = 0; i < values.length; i++) if (!isWhole(scaled(values[i] as number))) return false
  return true
}

const isWhole = (value: number): boolean => Math.abs(value - Math.round(value)) < roundingOfUnits

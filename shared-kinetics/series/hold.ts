import { orderStatistic } from '../numerics/order-statistic.ts'
import type { RowRange } from './main-heating.ts'

/** A hold keeps the temperature within a band of this width. */
export const holdBand_K = 3

/** Whether the temperature keeps within 3 K from `first` to `last`, apart from the outermost 1 % of the samples on either side. */
export function isHold(temperature_K: Float64Array, { first, last }: RowRange): boolean {
  const values = temperature_K.slice(first, last + 1)
  const outermost = Math.floor(0.01 * values.length)
  return !(orderStatistic(values, values.length - 1 - outermost) - orderStatistic(values, outermost) > holdBand_K)
}

/** First row from which on the temperature stays within the band around that of the hold (apart from 1 % of the samples); `last` + 1 where it never does. */
export function startOfHold(temperature_K: Float64Array, { first, last }: RowRange, hold_K: number): number {
  let outside = 0
  let start = last + 1
  for (let i = last; i >= first; i--) {
    if (Math.abs((temperature_K[i] ?? Number.NaN) - hold_K) > 0.5 * holdBand_K) outside++
    else if (outside <= 0.01 * (last - i + 1)) start = i
    if (outside > 0.01 * (last - first + 1)) break
  }
  return start
}

/**
 * Time at which the temperature enters the band around that of the hold to stay in it, between rows by the straight line; that of the first row where it is inside
 * from the start, NaN where it never stays.
 */
export function timeOfHold(time_s: Float64Array, temperature_K: Float64Array, hold_K: number): number {
  const row = startOfHold(temperature_K, { first: 0, last: time_s.length - 1 }, hold_K)
  const at = time_s[row] ?? Number.NaN
  if (row === 0) return at
  const before = temperature_K[row - 1] ?? Number.NaN
  const edge = hold_K + 0.5 * holdBand_K * Math.sign(before - hold_K)
  const share = (edge - before) / ((temperature_K[row] ?? Number.NaN) - before)
  return at - (1 - Math.min(1, Math.max(0, share))) * (at - (time_s[row - 1] ?? Number.NaN))
}

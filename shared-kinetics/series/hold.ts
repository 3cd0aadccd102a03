import { cellMeans } from '../signal/cell-means.ts'
import { lowerBound } from '../signal/lower-bound.ts'
import { median } from '../signal/median.ts'
import type { RowRange } from './main-heating.ts'

/** A hold keeps the temperature within a band of this width. */
export const holdBand_K = 3

/** Whether the temperature keeps within 3 K from `first` to `last`, apart from the outermost 1 % of the samples on either side. */
export function isHold(temperature_K: Float64Array, { first, last }: RowRange): boolean {
  const sorted = temperature_K.slice(first, last + 1).sort()
  const outermost = Math.floor(0.01 * sorted.length)
  return (sorted[sorted.length - 1 - outermost] ?? 0) - (sorted[outermost] ?? 0) <= holdBand_K
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

const cells = 500

/** The longest part, in time, in which the temperature keeps within the band. */
export function longestHold(time_s: Float64Array, temperature_K: Float64Array, { first, last }: RowRange): RowRange {
  const mean = cellMeans(time_s, temperature_K, first, last, Math.max(1, Math.min(cells, last - first)))
  let best = { from: 0, to: 0 }
  for (let from = 0; from < mean.y.length - (best.to - best.from); from++) {
    let lowest = Infinity
    let highest = -Infinity
    for (let to = from; to < mean.y.length; to++) {
      lowest = Math.min(lowest, mean.y[to] ?? Number.NaN)
      highest = Math.max(highest, mean.y[to] ?? Number.NaN)
      if (highest - lowest > holdBand_K) break
      if (to - from > best.to - best.from) best = { from, to }
    }
  }
  const half = 0.5 * mean.step
  const from = Math.max(first, lowerBound(time_s, (mean.x[best.from] ?? 0) - half))
  const end = Math.min(last, lowerBound(time_s, (mean.x[best.to] ?? 0) + half))
  return {
    first: Math.min(end, startOfHold(temperature_K, { first: from, last: end }, median(mean.y.subarray(best.from, best.to + 1)))),
    last: end,
  }
}

import { holdBand_K, startOfHold } from '../series/hold.ts'
import type { RowRange } from '../series/main-heating.ts'
import { cellMeans } from '../signal/cell-means.ts'
import { lowerBound } from '../signal/lower-bound.ts'
import { median } from '../signal/median.ts'

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

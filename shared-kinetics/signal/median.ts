import { orderStatistic } from '../numerics/order-statistic.ts'

/** Median of the finite values; NaN where there is none. */
export function median(values: ArrayLike<number>): number {
  const finite = new Float64Array(values.length)
  let n = 0
  for (let i = 0; i < values.length; i++) {
    const value = values[i] as number
    if (value > -Infinity && value < Infinity) finite[n++] = value
  }
  if (n === 0) return Number.NaN
  const half = n >> 1
  const upper = orderStatistic(finite.subarray(0, n), half)
  if (n % 2 === 1) return upper
  // The selection leaves the lower half before it.
  let lower = -Infinity
  for (let i = 0; i < half; i++) if ((finite[i] as number) > lower) lower = finite[i] as number
  return 0.5 * (upper + lower)
}

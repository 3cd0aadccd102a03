/** Median of the finite values; NaN where there is none. */
export function median(values: ArrayLike<number>): number {
  const sorted = (values instanceof Float64Array ? values : Float64Array.from(values)).filter(Number.isFinite).sort()
  const n = sorted.length
  if (n === 0) return Number.NaN
  const upper = sorted[n >> 1] ?? Number.NaN
  return n % 2 === 1 ? upper : 0.5 * (upper + (sorted[(n >> 1) - 1] ?? Number.NaN))
}

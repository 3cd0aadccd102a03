/**
 * Rows to draw of curves that share one row numbering: the first and the last, and from each of equal buckets of rows the one where a curve is lowest and the one
 * where it is highest. Every local extreme that a bucket holds is kept, so that a peak or a spike never vanishes from a picture.
 *
 * @param curves - columns of one length; NaN is passed over
 * @param mostPoints - at most so many rows come back (default 1,000)
 * @returns row numbers, ascending, without repeats; all of them where there are no more than `mostPoints`
 */
export function decimate(curves: readonly Float64Array[], mostPoints = 1000): Uint32Array {
  const n = curves[0]?.length ?? 0
  if (n <= mostPoints) return Uint32Array.from({ length: n }, (_, i) => i)
  const buckets = Math.max(1, Math.floor((mostPoints - 2) / (2 * curves.length)))
  const kept = new Set([0, n - 1])
  const found = new Int32Array(2)
  for (let bucket = 0; bucket < buckets; bucket++) {
    const from = Math.floor((bucket * n) / buckets)
    const to = Math.floor(((bucket + 1) * n) / buckets)
    for (const curve of curves) {
      extremes(curve, from, to, found)
      const [lowest, highest] = [found[0] as number, found[1] as number]
      if (lowest >= 0) kept.add(lowest).add(highest)
    }
  }
  return Uint32Array.from([...kept].sort((a, b) => a - b))
}

/** Rows of the lowest and of the highest value from `from` to before `to`, the first of equals; -1 where there is no number. */
function extremes(curve: Float64Array, from: number, to: number, found: Int32Array): void {
  let lowest = -1
  let highest = -1
  let low = Infinity
  let high = -Infinity
  for (let i = from; i < to; i++) {
    const value = curve[i] as number
    if (value < low || (lowest < 0 && value === low)) {
      low = value
      lowest = i
    }
    if (value > high || (highest < 0 && value === high)) {
      high = value
      highest = i
    }
  }
  found[0] = lowest
  found[1] = highest
}

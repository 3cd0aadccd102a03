/**
 * Number of maxima of a reaction rate that stand out: the curve rises to each by more than `share` of its highest value, and falls by more than that between two.
 * Values that are not numbers are passed over.
 */
export function countRateMaxima(rate: ArrayLike<number>, share: number): number {
  const values = Array.from(rate).filter(Number.isFinite)
  const least = share * values.reduce((most, value) => Math.max(most, value), 0)
  if (!(least > 0)) return 0
  let count = 0
  let rising = true
  /** The lowest value since the last maximum, or the highest of the present one. */
  let extreme = values[0] ?? 0
  for (const value of values) {
    extreme = rising ? Math.min(extreme, value) : Math.max(extreme, value)
    if (rising && value - extreme > least) {
      count++
      rising = false
      extreme = value
    } else if (!rising && extreme - value > least) {
      rising = true
      extreme = value
    }
  }
  return count
}

/**
 * Joins successive samples of a curve to straight segments wherever these pass within `tolerance` (in y) of every sample they span: indices of the samples kept,
 * first and last included. One pass; x ascending. A ramp of 20,000 rows becomes one segment; a noisy curve keeps its samples.
 */
export function linearSegments(x: ArrayLike<number>, y: ArrayLike<number>, tolerance: number): number[] {
  const n = x.length
  if (n < 3) return Array.from({ length: n }, (_, i) => i)
  const kept = [0]
  let start = 0
  // Slopes from the start that pass within the tolerance of every sample since.
  let lowest = Number.NEGATIVE_INFINITY
  let highest = Number.POSITIVE_INFINITY
  for (let i = 1; i < n; i++) {
    const dx = at(x, i) - at(x, start)
    const dy = at(y, i) - at(y, start)
    const slope = dx > 0 ? dy / dx : Number.NaN
    if (i - 1 > start && !(slope >= lowest && slope <= highest)) {
      start = i - 1
      kept.push(start)
      lowest = Number.NEGATIVE_INFINITY
      highest = Number.POSITIVE_INFINITY
    }
    const width = at(x, i) - at(x, start)
    const rise = at(y, i) - at(y, start)
    lowest = Math.max(lowest, (rise - tolerance) / width)
    highest = Math.min(highest, (rise + tolerance) / width)
  }
  kept.push(n - 1)
  return kept
}

const at = (values: ArrayLike<number>, i: number): number => values[i] ?? Number.NaN

import { lineFit } from '../numerics/line-fit.ts'
import { localPolynomialAt } from '../signal/local-polynomial.ts'

/** So many rows are compared at a time. Few, because a hold may begin with the reaction running at its fastest. */
const block = 9

/**
 * Value of a signal at one end of its window, from as much of the plateau there as there is.
 *
 * Starts with the outermost nine rows. Where a line through them is level within its standard error their mean is taken, and the next nine join as long as their
 * mean agrees within twice its own noise. Where the line slopes there is no plateau, and the value is that of a local parabola at the outermost row.
 *
 * @param noise - standard deviation of y
 */
export function valueAtEnd(time: Float64Array, y: Float64Array, end: 'start' | 'end', noise: number): number {
  const n = y.length
  const rows = (from: number): readonly [number, number] => (end === 'start' ? [from, from + block] : [n - from - block, n - from])
  const [a, b] = rows(0)
  const line = lineFit(time.subarray(a, b), y.subarray(a, b))
  const drift = Math.abs(line.slope) * ((time[b - 1] ?? 0) - (time[a] ?? 0))
  if (drift > noise && Math.abs(line.slope) > 3 * line.slopeStandardError) {
    const outermost = time[end === 'start' ? 0 : n - 1] ?? Number.NaN
    return localPolynomialAt(time, y, outermost, { halfWidth: 0, degree: 2, minimumPoints: block }).value
  }
  let mean = line.valueAtMean
  let count = block
  for (let from = block; from + block <= n; from += block) {
    const [c, d] = rows(from)
    const next = y.subarray(c, d).reduce((sum, value) => sum + value, 0) / block
    if (Math.abs(next - mean) > 2 * noise * Math.sqrt(1 / block + 1 / count)) break
    mean = (mean * count + next * block) / (count + block)
    count += block
  }
  return mean
}

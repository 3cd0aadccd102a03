import { lineFit } from '../numerics/line-fit.ts'

/** The outermost rows that are looked at first: 1 % of the window, at least so many. */
const fewestRows = 9

/**
 * Value of a signal at one end of its window, from as much of the plateau there as there is.
 *
 * Starts with the outermost 1 % of the rows. Where a line through them is level within its standard error their mean is taken, and the rows next to them join as
 * long as their mean agrees within twice its own noise; where the line slopes there is no plateau, and the value is that of the line at the outermost row.
 *
 * @param noise - standard deviation of y
 */
export function valueAtEnd(time: Float64Array, y: Float64Array, end: 'start' | 'end', noise: number): number {
  const n = y.length
  const block = Math.min(n, Math.max(fewestRows, Math.ceil(0.01 * n)))
  const rows = (from: number): readonly [number, number] => (end === 'start' ? [from, from + block] : [n - from - block, n - from])
  const [a, b] = rows(0)
  const line = lineFit(time.subarray(a, b), y.subarray(a, b))
  const outermost = time[end === 'start' ? 0 : n - 1] ?? Number.NaN
  const drift = Math.abs(line.slope) * ((time[b - 1] ?? 0) - (time[a] ?? 0))
  if (drift > noise && Math.abs(line.slope) > 3 * line.slopeStandardError) return line.valueAtMean + line.slope * (outermost - line.xMean)
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

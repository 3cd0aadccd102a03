import { lineFit } from '../numerics/line-fit.ts'
import { cellMeans } from '../signal/cell-means.ts'
import { localPolynomialAt } from '../signal/local-polynomial.ts'
import { lowerBound } from '../signal/lower-bound.ts'
import { correlatedNoiseOf, noiseOf } from '../signal/noise.ts'

/** So large a part of the window is compared at a time. Small, because a hold may begin with the reaction running at its fastest. */
const blocksInWindow = 100
const fewestRowsInBlock = 9

/**
 * Value of a signal at one end of its window, from as much of the plateau there as there is.
 *
 * Starts with the outermost hundredth of the window (nine rows at the least). Where a line through it is level within its standard error its mean is taken, and the
 * next block joins unless its mean and that of the block after it both lie beyond twice the noise of such means, on one side. Where the line slopes there is no plateau, and the value is that of a parabola
 * through the outermost block at the outermost row.
 */
export function valueAtEnd(time: Float64Array, y: Float64Array, end: 'start' | 'end'): number {
  const n = time.length
  const blocks = Math.max(1, Math.min(blocksInWindow, Math.floor(n / fewestRowsInBlock)))
  const mean = cellMeans(time, y, 0, n - 1, blocks)
  const noise = noiseOfMeans(time, y, mean.y, mean.samplesPerCell)
  const width = mean.step
  const outermost = time[end === 'start' ? 0 : n - 1] ?? Number.NaN
  const [a, b] =
    end === 'start'
      ? [0, Math.max(fewestRowsInBlock, lowerBound(time, outermost + width))]
      : [Math.min(n - fewestRowsInBlock, lowerBound(time, outermost - width)), n]
  const line = lineFit(time.subarray(a, b), y.subarray(a, b))
  const drift = Math.abs(line.slope) * ((time[b - 1] ?? 0) - (time[a] ?? 0))
  // The drift of a line across a block has √12 times the standard error of the block's mean.
  if (drift > 3 * Math.sqrt(12) * noise) {
    return localPolynomialAt(time, y, outermost, { halfWidth: width, degree: 2, minimumPoints: fewestRowsInBlock }).value
  }
  const away = (block: number, value: number): number => (mean.y[end === 'start' ? block : blocks - 1 - block] ?? Number.NaN) - value
  let value = line.valueAtMean
  for (let count = 1; count + 1 < blocks; count++) {
    const limit = 2 * noise * Math.sqrt(1 + 1 / count)
    const [next, overnext] = [away(count, value), away(count + 1, value)]
    // Noise strays and comes back; the reaction goes on.
    if (Math.min(Math.abs(next), Math.abs(overnext)) > limit && next * overnext > 0) break
    value += next / (count + 1)
  }
  return value
}

/**
 * Standard deviation of the means of blocks. From the means themselves where there are a hundred, most of which lie outside the reaction or follow it smoothly: noise
 * that a filter has spread over many rows then counts in full. From the rows, as if their noise were independent, where there are few.
 */
function noiseOfMeans(time: Float64Array, y: Float64Array, means: Float64Array, rowsInBlock: number): number {
  const ofRows = noiseOf(time, y, 0, y.length - 1) / Math.sqrt(rowsInBlock)
  if (means.length < blocksInWindow) return ofRows
  const places = means.map((_, i) => i)
  return Math.max(ofRows, correlatedNoiseOf(places, means, 0, means.length - 1, 2))
}

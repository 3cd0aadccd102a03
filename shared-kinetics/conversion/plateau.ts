import { lineFit } from '../numerics/line-fit.ts'
import { cellMeans, type CellMeans } from '../signal/cell-means.ts'
import { localPolynomialAt } from '../signal/local-polynomial.ts'
import { correlatedNoiseOf } from '../signal/noise.ts'

/** A plateau is followed in blocks of so large a part of the window, and of nine rows at the least. */
const blocksInWindow = 100
const fewestRowsInBlock = 9
/** The drift of a line across a block has √12 times the standard error of the block's mean; beyond three of those it is no noise. */
const certainDrift = 3 * Math.sqrt(12)

/** The value of a signal at one end of its window, and what noise leaves in it. */
export interface EndValue {
  readonly value: number
  readonly standardError: number
  /** The outermost rows that it was read from. */
  readonly rows: number
  /** Its variance for independent noise of 1, times these rows: 1 of a mean, 9 of a parabola's outermost value. */
  readonly varianceOfMean: number
}

/** The value of `plateauAtEnd` alone. */
export const valueAtEnd = (time: Float64Array, y: Float64Array, end: 'start' | 'end', noiseOfRows: number): number =>
  plateauAtEnd(time, y, end, noiseOfRows).value

/**
 * Value of a signal at one end of its window, from as much of the plateau there as there is.
 *
 * Looks for a drift first, in the outermost nine rows and in twice as many up to a hundredth of the window (a hold may begin with the reaction running at its
 * fastest): where there is one there is no plateau, and the value is that of a parabola through these rows at the outermost one. Else the blocks of a hundredth of
 * the window are averaged from the end inwards, up to where the mean of a block and that of the block after it both lie beyond twice the noise of such means, on one
 * side. The standard error is that of the mean of so many blocks; of a parabola's outermost value it is 3σ/√rows.
 *
 * @param noiseOfRows - standard deviation of the noise of `y` from row to row
 */
export function plateauAtEnd(time: Float64Array, y: Float64Array, end: 'start' | 'end', noiseOfRows: number): EndValue {
  const n = time.length
  const rowsInBlock = Math.max(fewestRowsInBlock, Math.ceil(n / blocksInWindow))
  for (let rows = fewestRowsInBlock; ; rows = Math.min(2 * rows, rowsInBlock)) {
    const [from, to] = end === 'start' ? [0, rows] : [n - rows, n]
    const { slope } = lineFit(time.subarray(from, to), y.subarray(from, to))
    const length = (time[to - 1] ?? 0) - (time[from] ?? 0)
    const drift = Math.abs(slope) * length
    // The means of all blocks are asked only where noise that is independent from row to row does not explain the drift.
    if (
      drift > certainDrift * (noiseOfRows / Math.sqrt(rowsInBlocks(n, rows))) &&
      drift > certainDrift * noiseOfMeans(blocksOf(time, y, rows), noiseOfRows)
    ) {
      const outermost = time[end === 'start' ? 0 : n - 1] ?? Number.NaN
      const { value } = localPolynomialAt(time, y, outermost, { halfWidth: 0, degree: 2, minimumPoints: rows })
      return { value, standardError: (3 * noiseOfRows) / Math.sqrt(rows), rows, varianceOfMean: 9 }
    }
    if (rows === rowsInBlock) break
  }
  const blocks = blocksOf(time, y, rowsInBlock)
  const noise = noiseOfMeans(blocks, noiseOfRows)
  const means = end === 'start' ? blocks.y : blocks.y.toReversed()
  let value = means[0] ?? Number.NaN
  let count = 1
  for (; count + 1 < means.length; count++) {
    const limit = 2 * noise * Math.sqrt(1 + 1 / count)
    const next = (means[count] ?? Number.NaN) - value
    const overnext = (means[count + 1] ?? Number.NaN) - value
    // Noise strays and comes back; the reaction goes on.
    if (Math.min(Math.abs(next), Math.abs(overnext)) > limit && next * overnext > 0) break
    value += next / (count + 1)
  }
  const rows = Math.min(n, Math.round(count * rowsInBlocks(n, rowsInBlock)))
  return { value, standardError: noise / Math.sqrt(count), rows, varianceOfMean: 1 }
}

const numberOfBlocks = (n: number, rows: number): number => Math.max(1, Math.floor(n / rows))
const rowsInBlocks = (n: number, rows: number): number => n / numberOfBlocks(n, rows)

const blocksOf = (time: Float64Array, y: Float64Array, rows: number): CellMeans =>
  cellMeans(time, y, 0, time.length - 1, numberOfBlocks(time.length, rows))

/** A hundred blocks know their own noise to some 15 %, of the largest of two looks at it: below this the rows are independent. */
const mostByChance = 1.7

/** Noise of a signal where many rows are averaged, and of one row as far as that tells it. */
export interface SpreadNoise {
  /** Variance of the mean of n rows, times n. */
  readonly perRow: number
  /** Variance of a single row, at the least. */
  readonly ofOneRow: number
}

/**
 * Noise that a filter has spread over neighbouring rows counts for more than that of independent ones where many are averaged. Told from the means of blocks of a hundredth
 * of the window; that of independent rows where there are too few rows for so many blocks.
 */
export function spreadNoise(time: Float64Array, y: Float64Array, noiseOfRows: number): SpreadNoise {
  const variance = noiseOfRows ** 2
  if (!(variance > 0)) return { perRow: variance, ofOneRow: variance }
  const rows = Math.max(fewestRowsInBlock, Math.ceil(time.length / blocksInWindow))
  const blocks = blocksOf(time, y, rows)
  const halves = blocksOf(time, y, rows / 2)
  const ofHalves = noiseOfMeans(halves, noiseOfRows) ** 2 * halves.samplesPerCell
  // Blocks half as long have at least half of it, where it is noise; of a curve's own bends they have next to nothing.
  const perRow = Math.min(noiseOfMeans(blocks, noiseOfRows) ** 2 * blocks.samplesPerCell, 2.5 * ofHalves)
  const ofMeans = perRow / blocks.samplesPerCell
  return perRow > mostByChance * variance ? { perRow, ofOneRow: Math.max(variance, ofMeans) } : { perRow: variance, ofOneRow: variance }
}

/**
 * Standard deviation of the means of blocks. From the means themselves where there are about a hundred, most of which lie outside the reaction or follow it smoothly:
 * noise that a filter has spread over many rows then counts in full. From the rows, as if their noise were independent, where there are few.
 */
function noiseOfMeans({ x, y, samplesPerCell }: CellMeans, ofRows: number): number {
  const independent = ofRows / Math.sqrt(samplesPerCell)
  return y.length < 0.9 * blocksInWindow ? independent : Math.max(independent, correlatedNoiseOf(x, y, 0, y.length - 1, 2))
}

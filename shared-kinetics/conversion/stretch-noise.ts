import { randomStream } from '../numerics/random.ts'
import { valueAt } from '../series/value-at.ts'
import { cellMeans } from '../signal/cell-means.ts'
import { cumulativeIntegral } from '../signal/cumulative-integral.ts'
import { median } from '../signal/median.ts'
import { findQuietEnds } from '../signal/quiet-ends.ts'
import { column } from '../units/quantity.ts'
import { tangents } from './from-heat-flow.ts'
import type { BaselineLine, ConversionCurve } from './smooth-curve.ts'

/** Repetitions with other noise: they know a spread to some 15 %. */
const repetitions = 40
const mostCells = 1000
/** Standard deviation of a normal variable over the median of its magnitude: 1/Φ⁻¹(3/4). */
const madToStandardDeviation = 1.482602218505602

/**
 * By how much more noise moves the conversion at each time than with the stretches of the tangents held: noise also decides which stretches they are laid through, and that
 * is not to be had in closed form. Repeats the search on the smoothed signal with fresh noise of the same size, from a fixed seed, and compares the spread of the conversion
 * with what it is where only the lines through the same stretches move. 1 where no tangents were drawn.
 *
 * @param perRow - variance of the noise of a row, as means of many rows have it
 * @returns one factor a time, not below 1
 * @throws Cancelled, by `checkCancelled`
 */
export function stretchNoise(
  curve: ConversionCurve,
  times_s: ArrayLike<number>,
  perRow: number,
  checkCancelled: () => void = () => undefined,
): Float64Array {
  const { drawn } = curve
  const factors = new Float64Array(times_s.length).fill(1)
  const [before, after] = drawn?.lines ?? []
  if (drawn?.passes !== 'with-conversion' || before === undefined || after === undefined || !(perRow > 0)) return factors
  const n = curve.time_s.length
  const cells = Math.min(mostCells, n)
  const onCells = (values: Float64Array): Float64Array => cellMeans(curve.time_s, values, 0, n - 1, cells).y
  const { x: time, samplesPerCell } = cellMeans(curve.time_s, curve.conversion, 0, n - 1, cells)
  const alpha = onCells(curve.conversion)
  const drawnThere = (lines: readonly BaselineLine[]): Float64Array => baselineThrough(lines, time, alpha)
  const clean = onCells(curve.reactionRate_per_s)
  const under = drawnThere(drawn.lines)
  for (let k = 0; k < cells; k++) clean[k] = (clean[k] as number) + (under[k] as number)
  const noise = Math.sqrt(perRow / samplesPerCell)

  /** δα to first order, h taken as 1, of noise and of other lines under it, at each time. */
  const conversionShifts = (error: Float64Array, lines: readonly BaselineLine[], than: Float64Array): number[] => {
    const now = drawnThere(lines)
    const sum = cumulativeIntegral(
      column(time, 's'),
      error.map((value, k) => value - (now[k] as number) + (than[k] as number)),
    )
    const whole = sum[cells - 1] ?? Number.NaN
    return Array.from(times_s, (t) => {
      const at = Math.min(time[cells - 1] ?? Number.NaN, Math.max(time[0] ?? Number.NaN, t))
      return valueAt(time, sum, at) - valueAt(time, alpha, at) * whole
    })
  }
  const cleanEnds = { before: stretchOf(before), after: stretchOf(after) }
  const cleanLines = drawnThere(tangents(time, clean, cleanEnds))
  const free: number[][] = []
  const held: number[][] = []
  for (let k = 0; k < repetitions; k++) {
    checkCancelled()
    const random = randomStream(1, k)
    const error = clean.map(() => noise * random.normal())
    const noisy = clean.map((value, i) => value + (error[i] as number))
    free.push(conversionShifts(error, tangents(time, noisy, findQuietEnds(time, noisy, 0, cells - 1)), cleanLines))
    held.push(conversionShifts(error, tangents(time, noisy, cleanEnds), cleanLines))
  }
  for (let i = 0; i < factors.length; i++) {
    checkCancelled()
    const ratio = spread(free, i) / spread(held, i)
    factors[i] = ratio > 1 ? ratio : 1
  }
  return factors
}

/** The stretch of a line; null for an end that had none and got a level. */
const stretchOf = ({ end, from_s, to_s, hasSlope }: BaselineLine) =>
  hasSlope ? { inner: end === 'start' ? to_s : from_s, outer: end === 'start' ? from_s : to_s } : null

function baselineThrough(lines: readonly BaselineLine[], time: Float64Array, alpha: Float64Array): Float64Array {
  return time.map((t, k) => {
    let value = 0
    for (const line of lines)
      value += (line.end === 'start' ? 1 - (alpha[k] as number) : (alpha[k] as number)) * (line.value + line.slope * (t - line.x))
    return value
  })
}

/** By the median distance from the median, which wild repetitions do not touch. */
function spread(rows: readonly (readonly number[])[], i: number): number {
  const values = Float64Array.from(rows, (row) => row[i] ?? Number.NaN)
  const middle = median(values)
  return madToStandardDeviation * median(values.map((value) => Math.abs(value - middle)))
}

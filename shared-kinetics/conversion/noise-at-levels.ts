import { areaNoise } from './area-noise.ts'
import { spreadNoise } from './plateau.ts'
import { slopeVariance, valueVariance } from '../signal/smoothing-width.ts'
import { smoothedCorrelation } from '../signal/smoothing-kernel.ts'
import { valueAt } from '../series/value-at.ts'
import { column, type Column } from '../units/quantity.ts'
import type { LevelsRead } from './levels.ts'
import { stretchNoise } from './stretch-noise.ts'
import { fewestPoints, type ConversionCurve } from './smooth-curve.ts'

/** What the noise of the signal leaves in the values read at the levels: standard errors, NaN where a level is not reached. */
export interface NoiseAtLevels {
  /** Of the time at which the level is passed. */
  readonly time_s: Column<'s'>
  /** Of ln(dα/dt) at a given time. */
  readonly lnReactionRate: Float64Array
  /** d ln(dα/dt)/dt: an error of the time carries the reaction rate along with it. */
  readonly lnReactionRateSlope_per_s: Float64Array
  /** Correlation of the error of the conversion with that at the level before; 0 at the first. */
  readonly correlationWithBefore: Float64Array
}

/**
 * Standard errors that noise of the signal causes at each level, after smoothing. With noise σ, ρ rows per second there and half-width h:
 *
 * - a signal of extent (mass): var α = 1.425 σ²/(ρ h), var dα/dt = 17.16 σ²/(ρ h³), those of a local cubic with tricube weights; to var α the values that were taken for
 *   conversion 0 and 1 add (1 - α)² u₀² + α² u₁²;
 * - a signal of rate (heat flow): var dα/dt = 1.425 σ²/(ρ h) and what baseline and whole area add, var α that of the partial area with its baseline (`areaNoise`).
 *
 * The error of the time is that of α over dα/dt. The noise is the one found in the data (`ConversionCurve.noise`). Where a filter has spread it over neighbouring rows, σ² is
 * that which means of many rows have, times their number (`spreadNoise`); a smoothed value is no worse than a single row.
 *
 * @param stretches - `sought`: holds that noise decides which stretches tangents are laid through, too (`stretchNoise`), which takes some 20 ms
 * @throws Cancelled, by `checkCancelled`
 * @source cleveland-1979
 */
export function noiseAtLevels(
  curve: ConversionCurve,
  levels: ArrayLike<number>,
  read: LevelsRead,
  stretches: 'held' | 'sought' = 'held',
  checkCancelled: () => void = () => undefined,
): NoiseAtLevels {
  const { time_s, smoothing, noise, measured } = curve
  const n = levels.length
  const isExtent = measured.kind === 'extent'
  const [start, end] = [time_s[0] ?? Number.NaN, time_s.at(-1) ?? Number.NaN]
  const rowsPerSecond = rowsPerSecondIn(curve)
  const halfWidth = Math.max(smoothing.halfWidth, (0.5 * fewestPoints) / rowsPerSecond)
  const time = new Float64Array(n).fill(Number.NaN)
  const slope = new Float64Array(n).fill(Number.NaN)
  const lnReactionRate = new Float64Array(n).fill(Number.NaN)
  const correlationWithBefore = new Float64Array(n)
  const { perRow, ofOneRow } = spreadNoise(time_s, measured.values, noise)
  const ofArea = perRow / rowsPerSecond
  const smoothedVariance = Math.min(ofOneRow, (valueVariance * ofArea) / halfWidth)
  const slopesVariance = (slopeVariance * ofArea) / halfWidth ** 3
  /** What the values taken for conversion 0 and 1 have in common at two levels. */
  const endsCovariance = (alpha: number, other: number): number =>
    (1 - alpha) * (1 - other) * curve.ends.start ** 2 + alpha * other * curve.ends.end ** 2
  const area = isExtent ? null : areaNoise(curve)
  /** Covariance of the conversion at one level and at one before it. */
  const covariance = (before: number, level: number): number => {
    const [from, to] = [read.time_s[before] ?? Number.NaN, read.time_s[level] ?? Number.NaN]
    return area === null
      ? smoothedVariance * smoothedCorrelation((to - from) / halfWidth) +
          endsCovariance(levels[before] ?? Number.NaN, levels[level] ?? Number.NaN)
      : ofArea * area.covariance(from, to)
  }
  const rateAt = (time: number): number => valueAt(time_s, curve.reactionRate_per_s, Math.min(end, Math.max(start, time)))
  const factors = stretches === 'sought' && !isExtent ? stretchNoise(curve, read.time_s, perRow, checkCancelled) : null
  for (let i = 0; i < n; i++) {
    checkCancelled()
    const factor = factors?.[i] ?? 1
    const at = read.time_s[i] ?? Number.NaN
    const rate = read.reactionRate_per_s[i] ?? Number.NaN
    if (Number.isNaN(at) || !(rate > 0)) continue
    const variance = covariance(i, i)
    time[i] = (factor * Math.sqrt(Math.max(0, variance))) / rate
    slope[i] = (rateAt(at + halfWidth) - rateAt(at - halfWidth)) / (2 * halfWidth * rate)
    lnReactionRate[i] = Math.sqrt(area === null ? slopesVariance : smoothedVariance + factor ** 2 * ofArea * area.rateVariance(at)) / rate
    if (Number.isNaN(read.time_s[i - 1] ?? Number.NaN)) continue
    correlationWithBefore[i] = correlationOf(covariance(i - 1, i), variance, covariance(i - 1, i - 1))
  }
  return { time_s: column(time, 's'), lnReactionRate, lnReactionRateSlope_per_s: slope, correlationWithBefore }
}

/** Errors that are none do not go together; rounding makes none of more than 1. */
const correlationOf = (covariance: number, variance: number, otherVariance: number): number =>
  variance > 0 && otherVariance > 0 ? Math.max(-1, Math.min(1, covariance / Math.sqrt(variance * otherVariance))) : 0

function rowsPerSecondIn({ time_s, reaction }: ConversionCurve): number {
  return (reaction.last - reaction.first) / ((time_s[reaction.last] ?? Number.NaN) - (time_s[reaction.first] ?? Number.NaN))
}

import { slopeVariance, valueVariance } from '../signal/smoothing-width.ts'
import { smoothedCorrelation } from '../signal/smoothing-kernel.ts'
import { valueAt } from '../series/value-at.ts'
import { column, type Column } from '../units/quantity.ts'
import type { LevelsRead } from './levels.ts'
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
 * Standard errors that independent noise of the signal causes at each level, after smoothing. With noise σ, ρ rows per second there and half-width h:
 *
 * - a signal of extent (mass): var α = 1.425 σ²/(ρ h), var dα/dt = 17.16 σ²/(ρ h³), those of a local cubic with tricube weights; to var α the values that were taken for
 *   conversion 0 and 1 add (1 - α)² u₀² + α² u₁²;
 * - a signal of rate (heat flow): var dα/dt = 1.425 σ²/(ρ h), and α, an integral over the window of length D that is scaled to 1, var α = (σ²/ρ)(t (1 - 2α) + α² D), t from
 *   the start of the window.
 *
 * The error of the time is that of α over dα/dt. The noise is the one found in the data (`ConversionCurve.noise`).
 *
 * @source cleveland-1979
 */
export function noiseAtLevels(curve: ConversionCurve, levels: ArrayLike<number>, read: LevelsRead): NoiseAtLevels {
  const { time_s, smoothing, noise, measured } = curve
  const n = levels.length
  const start = time_s[0] ?? Number.NaN
  const whole = (time_s.at(-1) ?? Number.NaN) - start
  const rowsPerSecond = rowsPerSecondIn(curve)
  const halfWidth = Math.max(smoothing.halfWidth, (0.5 * fewestPoints) / rowsPerSecond)
  const time = new Float64Array(n).fill(Number.NaN)
  const slope = new Float64Array(n).fill(Number.NaN)
  const lnReactionRate = new Float64Array(n).fill(Number.NaN)
  const correlationWithBefore = new Float64Array(n)
  const smoothedVariance = (valueVariance * noise ** 2) / (rowsPerSecond * halfWidth)
  const slopesVariance = (slopeVariance * noise ** 2) / (rowsPerSecond * halfWidth ** 3)
  /** Covariance of the partial area up to two times, the earlier first, over the whole area. */
  const areaCovariance = (earlier: number, alphaEarlier: number, later: number, alphaLater: number): number =>
    (noise ** 2 / rowsPerSecond) * (earlier - alphaLater * earlier - alphaEarlier * later + alphaEarlier * alphaLater * whole)
  /** What the values taken for conversion 0 and 1 have in common at two levels. */
  const endsCovariance = (alpha: number, other: number): number =>
    (1 - alpha) * (1 - other) * curve.ends.start ** 2 + alpha * other * curve.ends.end ** 2
  const rateAt = (time: number): number =>
    valueAt(time_s, curve.reactionRate_per_s, Math.min(time_s.at(-1) ?? Number.NaN, Math.max(start, time)))
  for (let i = 0; i < n; i++) {
    const t = (read.time_s[i] ?? Number.NaN) - start
    const rate = read.reactionRate_per_s[i] ?? Number.NaN
    const alpha = levels[i] ?? Number.NaN
    if (Number.isNaN(t) || !(rate > 0)) continue
    const before = (read.time_s[i - 1] ?? Number.NaN) - start
    const alphaBefore = levels[i - 1] ?? Number.NaN
    const isExtent = measured.kind === 'extent'
    const variance = isExtent ? smoothedVariance + endsCovariance(alpha, alpha) : areaCovariance(t, alpha, t, alpha)
    time[i] = Math.sqrt(variance) / rate
    slope[i] = (rateAt(t + start + halfWidth) - rateAt(t + start - halfWidth)) / (2 * halfWidth * rate)
    lnReactionRate[i] = Math.sqrt(isExtent ? slopesVariance : smoothedVariance) / rate
    if (Number.isNaN(before)) continue
    correlationWithBefore[i] = isExtent
      ? correlationOf(
          smoothedVariance * smoothedCorrelation((t - before) / halfWidth) + endsCovariance(alphaBefore, alpha),
          variance,
          smoothedVariance + endsCovariance(alphaBefore, alphaBefore),
        )
      : correlationOf(areaCovariance(before, alphaBefore, t, alpha), variance, areaCovariance(before, alphaBefore, before, alphaBefore))
  }
  return { time_s: column(time, 's'), lnReactionRate, lnReactionRateSlope_per_s: slope, correlationWithBefore }
}

/** Errors that are none do not go together. */
const correlationOf = (covariance: number, variance: number, otherVariance: number): number =>
  variance > 0 && otherVariance > 0 ? covariance / Math.sqrt(variance * otherVariance) : 0

function rowsPerSecondIn({ time_s, reaction }: ConversionCurve): number {
  return (reaction.last - reaction.first) / ((time_s[reaction.last] ?? Number.NaN) - (time_s[reaction.first] ?? Number.NaN))
}

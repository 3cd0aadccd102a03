import { bracketedRoot } from '../numerics/root.ts'
import { localPolynomial, localPolynomialAt } from '../signal/local-polynomial.ts'
import { temperatureReader } from './levels.ts'
import type { ConversionCurve } from './smooth-curve.ts'

/** Half-width of the fit around the maximum, as a share of the reaction's duration; a bell-shaped peak is then a cubic within 1e-4. */
const aroundMaximum = 0.1

/**
 * Temperature at which dα/dt is largest, between samples: the root of the slope of local cubics through the reaction rate, nearest to where they are highest and
 * within the half-width of the fit. (Of noisy data value and slope are two estimates, whose maximum and root are rows apart.) NaN where the rate has no maximum
 * inside the window (it only falls, as in many holds, or only rises), and where the fit around it would reach across a gap of the rows.
 */
export function peakTemperature(curve: ConversionCurve): number {
  const { first, last } = curve.reaction
  const time = curve.time_s.subarray(first, last + 1)
  const rate = curve.reactionRate_per_s.subarray(first, last + 1)
  const options = { halfWidth: Math.max(aroundMaximum * curve.duration_s, curve.smoothing.halfWidth), degree: 3 } as const
  const { value, slope } = localPolynomial(time, rate, options)
  const top = value.reduce((highest, height, i) => (height > (value[highest] ?? 0) ? i : highest), 0)
  const before = turnNearest(time, slope, top, options.halfWidth)
  if (before === null) return Number.NaN
  const reaches = (from: number, to: number): boolean =>
    (curve.time_s[from] ?? 0) < (time[before + 1] ?? 0) + options.halfWidth &&
    (curve.time_s[to] ?? 0) > (time[before] ?? 0) - options.halfWidth
  if (curve.gaps.some((gap) => reaches(gap.first, gap.last))) return Number.NaN
  const slopeAt = (at: number): number => localPolynomialAt(time, rate, at, options).slope
  // The slopes that told the turn close the bracket: over means of cells they differ from those at one place in the sixth digit.
  const maximum = bracketedRoot(slopeAt, time[before] ?? Number.NaN, time[before + 1] ?? Number.NaN, {
    relativeTolerance: 1e-12,
    fLower: slope[before] ?? Number.NaN,
    fUpper: slope[before + 1] ?? Number.NaN,
  })
  return temperatureReader(curve)(maximum.x)
}

/** The row nearest to `top`, within `reach` of it, after which the slope turns from rising to falling. */
function turnNearest(time: Float64Array, slope: Float64Array, top: number, reach: number): number | null {
  const turnsAfter = (i: number): boolean => (slope[i] ?? Number.NaN) > 0 && (slope[i + 1] ?? Number.NaN) <= 0
  const near = (i: number): boolean => Math.abs((time[i] ?? Number.NaN) - (time[top] ?? Number.NaN)) <= reach
  for (let away = 0; near(top - away) || near(top + away); away++) {
    if (near(top - away) && turnsAfter(top - away)) return top - away
    if (near(top + away) && turnsAfter(top + away)) return top + away
  }
  return null
}

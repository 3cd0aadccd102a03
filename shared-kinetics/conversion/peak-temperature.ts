import { bracketedRoot } from '../numerics/root.ts'
import { localPolynomial, localPolynomialAt } from '../signal/local-polynomial.ts'
import { temperatureReader } from './levels.ts'
import type { ConversionCurve } from './smooth-curve.ts'

/** Half-width of the fit around the maximum, as a share of the reaction's duration; a bell-shaped peak is then a cubic within 1e-4. */
const aroundMaximum = 0.1

/**
 * Temperature at which dα/dt is largest, between samples: the root of the slope of local cubics through the reaction rate, next to where they are highest. NaN where
 * the rate has no maximum inside the window (it only falls, as in many holds, or only rises).
 */
export function peakTemperature(curve: ConversionCurve): number {
  const { first, last } = curve.reaction
  const time = curve.time_s.subarray(first, last + 1)
  const rate = curve.reactionRate_per_s.subarray(first, last + 1)
  const options = { halfWidth: Math.max(aroundMaximum * curve.duration_s, curve.smoothing.halfWidth), degree: 3 } as const
  const { value, slope } = localPolynomial(time, rate, options)
  const top = value.reduce((highest, height, i) => (height > (value[highest] ?? 0) ? i : highest), 0)
  const turnsAfter = (i: number): boolean => (slope[i] ?? 0) > 0 && (slope[i + 1] ?? 0) <= 0
  const before = [top, top - 1, top + 1, top - 2, top + 2].find(turnsAfter)
  if (before === undefined) return Number.NaN
  const slopeAt = (at: number): number => localPolynomialAt(time, rate, at, options).slope
  const maximum = bracketedRoot(slopeAt, time[before] ?? Number.NaN, time[before + 1] ?? Number.NaN, { relativeTolerance: 1e-12 })
  return temperatureReader(curve)(maximum.x)
}

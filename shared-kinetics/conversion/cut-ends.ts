import { lineFit } from '../numerics/line-fit.ts'
import { lowerBound } from '../signal/lower-bound.ts'
import type { ConversionCurve } from './smooth-curve.ts'

/** The reaction rate at the ends of the window, as a share of its maximum. */
export interface RateAtEnds {
  readonly start: number
  readonly end: number
}

/** The rate at an end is the slope over the outermost fifth of the reaction's duration: a share of its maximum of 3 % is then 0.6 % of conversion. */
const outermostShare = 0.2
const fewestRows = 9

/** How fast the reaction still (or already) runs where the window cuts it off. Near 0 where a plateau lies inside the window. */
export function rateAtEnds({ time_s, conversion, duration_s }: ConversionCurve): RateAtEnds {
  const n = time_s.length
  const reach = outermostShare * duration_s
  const startRows = Math.max(fewestRows, lowerBound(time_s, (time_s[0] ?? 0) + reach))
  const endRows = Math.max(fewestRows, n - lowerBound(time_s, (time_s[n - 1] ?? 0) - reach))
  const share = (from: number, to: number): number =>
    Math.abs(lineFit(time_s.subarray(from, to), conversion.subarray(from, to)).slope) * duration_s
  return { start: share(0, Math.min(n, startRows)), end: share(Math.max(0, n - endRows), n) }
}

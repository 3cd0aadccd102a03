import type { ConversionCurve } from '../conversion/smooth-curve.ts'
import { quantity, type Quantity } from '../units/quantity.ts'

/** Temperatures on either side of a rate peak at which the reaction rate is half of its height there; NaN where the window ends before. */
export interface HalfHeights {
  readonly lower: Quantity<'K'>
  readonly upper: Quantity<'K'>
}

/** Half heights of the rate peak of a run heated at a constant rate, between rows by straight lines. NaN for a peak that is NaN. */
export function halfHeights({ temperature_K, reactionRate_per_s, reaction }: ConversionCurve, peak_K: number): HalfHeights {
  const T = (i: number): number => temperature_K[i] ?? Number.NaN
  const rate = (i: number): number => reactionRate_per_s[i] ?? Number.NaN
  let top = reaction.first
  for (let i = reaction.first; i <= reaction.last; i++) if (Math.abs(T(i) - peak_K) < Math.abs(T(top) - peak_K)) top = i
  const half = 0.5 * rate(top)
  const crossing = (step: 1 | -1): number => {
    for (let i = top; i >= 0 && i < temperature_K.length; i += step) {
      const next = i + step
      if (rate(next) <= half) return T(i) + ((rate(i) - half) / (rate(i) - rate(next))) * (T(next) - T(i))
    }
    return Number.NaN
  }
  const found = (value: number): Quantity<'K'> => quantity(Number.isNaN(peak_K) ? Number.NaN : value, 'K')
  return { lower: found(crossing(-1)), upper: found(crossing(1)) }
}

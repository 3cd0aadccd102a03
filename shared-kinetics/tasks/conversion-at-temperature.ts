import type { ConversionCurve } from '../conversion/smooth-curve.ts'

/** Conversion of a run heated at a constant rate where it passes a temperature, read at the nearest row of the reaction; NaN for NaN. */
export function conversionAtTemperature({ temperature_K, conversion, reaction }: ConversionCurve, at_K: number): number {
  let nearest = Number.NaN
  let closest = Number.POSITIVE_INFINITY
  for (let i = reaction.first; i <= reaction.last; i++) {
    const away = Math.abs((temperature_K[i] ?? Number.NaN) - at_K)
    if (!(away < closest)) continue
    closest = away
    nearest = conversion[i] ?? Number.NaN
  }
  return nearest
}

import type { FullRatePeak } from '../tasks/peak-run.ts'
import { perMinuteToPerSecond } from '../units/convert.ts'
import { quantity } from '../units/quantity.ts'

/** Peaks from plain numbers, one programme each; half heights 10 K on either side and a start at 300 K unless `change` says otherwise. */
export const peaksOf = (
  heatingRate_K_per_min: readonly number[],
  temperature_K: readonly (number | string)[],
  change: (i: number) => Partial<FullRatePeak> = () => ({}),
): FullRatePeak[] =>
  heatingRate_K_per_min.map((beta, i) => {
    const T = Number(temperature_K[i])
    return {
      heatingRate: perMinuteToPerSecond(beta),
      temperature: quantity(T, 'K'),
      programmeGroup: i,
      conversion: 0.6,
      lowerHalf: quantity(T - 10, 'K'),
      upperHalf: quantity(T + 10, 'K'),
      start: quantity(300, 'K'),
      ...change(i),
    }
  })

/** The standard error that first-order propagation gives a number read from peaks: each ln beta moved by itself, the rest of the line kept. */
export function propagatedError(
  peaks: readonly FullRatePeak[],
  residualStandardDeviation: number,
  read: (peaks: readonly FullRatePeak[]) => number,
): number {
  const d = 1e-5
  const slopes = peaks.map((_, i) => {
    const moved = (sign: number): number =>
      read(peaks.map((peak, j) => (j === i ? { ...peak, heatingRate: quantity(peak.heatingRate * Math.exp(sign * d), 'K/s') } : peak)))
    return (moved(1) - moved(-1)) / (2 * d)
  })
  return residualStandardDeviation * Math.sqrt(slopes.reduce((sum, slope) => sum + slope * slope, 0))
}

import { KineticsError } from '../errors.ts'
import { kissingerOrdinate, readKissingerLine } from './kissinger.ts'
import { peakEstimate, type PeakEstimate, type RatePeak } from './peak-line.ts'

/** A peak with the conversion reached there. */
export interface RatePeakAtConversion extends RatePeak {
  /** Inside (0, 1). */
  readonly conversion: number
}

/** Kissinger's line for a given reaction model, and whether his own line would have done. */
export interface KissingerForModel extends PeakEstimate {
  /** f'(alpha_p) of each peak, in the order given. */
  readonly derivativeAtPeak: Float64Array
  /** Farjas and Roura's condition: largest less smallest ln(-f'(alpha_p)). Kissinger's own Ea holds where it is 0; his ln A besides where f'(alpha_p) = -1. */
  readonly derivativeSpread: number
}

/**
 * Kissinger's method for any reaction model f(alpha), by Farjas and Roura's condition for the peak,
 *
 *   f'(alpha_p) A exp(-Ea/(R Tp)) + beta Ea/(R Tp²) = 0,
 *
 * which is d²alpha/dt² = 0 written out and so is exact for one step under a constant heating rate. The line
 *
 *   ln(beta/Tp²) - ln(-f'(alpha_p)) = ln(A R/Ea) - Ea/(R Tp)
 *
 * gives Ea (slope -Ea/R) and A of that model, A = -beta Ea/(R Tp² f'(alpha_p)) exp(Ea/(R Tp)). Where f'(alpha_p) is the same at all heating rates the slope is
 * Kissinger's: his Ea is right without the model, his A off by the factor -f'(alpha_p). For nth-order and Avrami models f'(alpha_p) is near -1 and tends to it as
 * Ea/(R Tp) grows, since then f'(alpha_p) g(alpha_p) = -1.
 *
 * Assumes that f(alpha) is right and alpha_p well measured; a wrong model shifts A without a sign of it, and hardly Ea. Not to be used where f has no falling part
 * at the peak (f' >= 0: such a model has no peak there), for holds, or where peaks overlap.
 *
 * Statuses as of `kissinger`.
 *
 * @param dfdalpha - f'(alpha)
 * @throws KineticsError as `kissinger`, and `bad-option` where f' is not below 0 at a peak or its conversion not inside (0, 1)
 * @source farjas-roura-2014
 */
export function kissingerForModel(peaks: readonly RatePeakAtConversion[], dfdalpha: (conversion: number) => number): KissingerForModel {
  const derivativeAtPeak = Float64Array.from(peaks, ({ conversion }, i) => {
    if (!(conversion > 0 && conversion < 1)) {
      throw new KineticsError('bad-option', `The conversion at peak ${i + 1} is ${conversion}; it must lie between 0 and 1.`, { peak: i })
    }
    const derivative = dfdalpha(conversion)
    if (!(derivative < 0)) {
      throw new KineticsError(
        'bad-option',
        `This reaction model has no rate peak at conversion ${conversion} (peak ${i + 1}): its f' is ${derivative} there and would have to be below 0. Choose another model.`,
        { peak: i, conversion },
      )
    }
    return derivative
  })
  const logs = derivativeAtPeak.map((derivative) => Math.log(-derivative))
  const indexed = peaks.map((peak, i) => ({ ...peak, logDerivative: logs[i] ?? Number.NaN }))
  return {
    ...peakEstimate('Kissinger', indexed, (peak) => kissingerOrdinate(peak) - peak.logDerivative, readKissingerLine),
    derivativeAtPeak,
    derivativeSpread: logs.length === 0 ? Number.NaN : Math.max(...logs) - Math.min(...logs),
  }
}

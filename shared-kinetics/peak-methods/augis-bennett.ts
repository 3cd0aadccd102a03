import { KineticsError } from '../errors.ts'
import type { LineFit } from '../numerics/line-fit.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { Quantity } from '../units/quantity.ts'
import { peakEstimate, type PeakEstimate, type RatePeak, type ReadFromLine } from './peak-line.ts'
import type { PeakMethodInfo } from './peak-method-info.ts'

export const augisBennettInfo: PeakMethodInfo = {
  id: 'augis-bennett',
  label: 'Augis–Bennett',
  ordinate: 'ln(β/(Tp − T0))',
  sources: ['augis-bennett-1978'],
}

export const augisBennettWithoutStartInfo: PeakMethodInfo = {
  id: 'augis-bennett-without-start',
  label: 'Augis–Bennett, without T0',
  ordinate: 'ln(β/Tp)',
  sources: ['augis-bennett-1978'],
}

/** A peak with the temperature at which the heating began. */
export interface RatePeakFromStart extends RatePeak {
  /** T0, below the peak. */
  readonly start: Quantity<'K'>
}

/**
 * Augis and Bennett's method for crystallisation (nucleation and growth) on heating: Ea and the frequency factor K0 from the line
 *
 *   ln(beta/(Tp - T0)) = ln K0 - Ea/(R Tp)
 *
 * through the runs, T0 the temperature at which the heating began. Slope -Ea/R, ln K0 = intercept, in 1/s. It holds for any Avrami exponent, which `avramiExponent`
 * gives from the width of the peak. Its error for a one-step reaction is T (2 - T/(T - T0)) R/Ea of Ea, nothing where T0 = Tp/2.
 *
 * Not for reactions other than crystallisation from an undercooled state (a change of mass is none), nor for overlapping peaks.
 *
 * Statuses: `too-few-programmes`, `line-not-determined`, `energy-not-positive`.
 *
 * @throws KineticsError `no-heating-rate`, `not-finite`; `bad-option` where a start does not lie below its peak
 * @source augis-bennett-1978 (from memory)
 */
export function augisBennett(peaks: readonly RatePeakFromStart[]): PeakEstimate {
  peaks.forEach(({ start, temperature }, i) => {
    if (!(start >= 0 && start < temperature)) {
      throw new KineticsError(
        'bad-option',
        `Augis–Bennett needs a start of heating below the peak; peak ${i + 1} has ${start} K and ${temperature} K.`,
        {
          peak: i,
        },
      )
    }
  })
  return peakEstimate(
    'Augis–Bennett',
    peaks,
    ({ heatingRate, temperature, start }) => Math.log(heatingRate / (temperature - start)),
    readArrheniusLine,
  )
}

/**
 * The same with Tp in place of Tp - T0, for where no start of heating is known: ln(beta/Tp) = ln K0 - Ea/(R Tp). For a one-step reaction Ea comes out high by R Tp
 * (4 % at Ea/(R Tp) = 25).
 *
 * Statuses and errors as of `kissinger`.
 *
 * @source augis-bennett-1978 (from memory)
 */
export function augisBennettWithoutStart(peaks: readonly RatePeak[]): PeakEstimate {
  return peakEstimate('Augis–Bennett', peaks, ({ heatingRate, temperature }) => Math.log(heatingRate / temperature), readArrheniusLine)
}

function readArrheniusLine(fit: LineFit): ReadFromLine {
  const R = gasConstant_J_per_mol_K
  return {
    Ea: -R * fit.slope,
    EaBySlope: -R,
    lnA: fit.intercept,
    lnAVariance: fit.interceptStandardError ** 2,
    covarianceEaLnA: -R * fit.covariance,
  }
}

/**
 * Avrami exponent from the full width of the rate peak at half its height, n = 2.5 R Tp²/(width Ea). (The width of an Avrami peak for large Ea/(R Tp) is
 * 2.446 R Tp²/(n Ea); 2.5 is the method's own round number.)
 *
 * @source augis-bennett-1978 (from memory)
 */
export const avramiExponent = (Ea: Quantity<'J/mol'>, peak: Quantity<'K'>, width: Quantity<'K'>): number =>
  (2.5 * gasConstant_J_per_mol_K * peak * peak) / (width * Ea)

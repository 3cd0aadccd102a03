import type { LineFit } from '../numerics/line-fit.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { peakEstimate, type PeakEstimate, type RatePeak, type ReadFromLine } from './peak-line.ts'
import type { PeakMethodInfo } from './peak-method-info.ts'

export const kissingerInfo: PeakMethodInfo = {
  id: 'kissinger',
  label: 'Kissinger',
  ordinate: 'ln(β/Tp²)',
  sources: ['kissinger-1957', 'ictac-2011'],
}

/**
 * Kissinger's method: Ea of the reaction whose rate peaks at Tp, from the line
 *
 *   ln(beta/Tp²) = ln(A R/Ea) - Ea/(R Tp)
 *
 * through the runs, beta the heating rate in K/s and Tp in K. Slope -Ea/R; ln A = intercept + ln(Ea/R), A in 1/s. The standard error of ln A takes in that of
 * Ea and their correlation.
 *
 * For a first-order reaction the condition behind it, beta Ea/(R Tp²) = A exp(-Ea/(R Tp)), is exact; for others Ea holds as far as the conversion at the peak does
 * not change with the heating rate, and A is that of first order (`kissingerForModel` mends both where f(alpha) is known). One number for a whole reaction: it
 * does not show that Ea varies with conversion. Not to be used for holds or cooling, or where peaks overlap.
 *
 * Statuses: `too-few-programmes`, `line-not-determined`, `energy-not-positive`.
 *
 * @throws KineticsError `no-heating-rate` or `not-finite` where a heating rate or a peak temperature is not a positive number
 * @source kissinger-1957
 */
export function kissinger(peaks: readonly RatePeak[]): PeakEstimate {
  return peakEstimate('Kissinger', peaks, kissingerOrdinate, readKissingerLine)
}

export const kissingerOrdinate = ({ heatingRate, temperature }: RatePeak): number => Math.log(heatingRate) - 2 * Math.log(temperature)

/** Ea and ln A from a line with slope -Ea/R and intercept ln(A R/Ea). */
export function readKissingerLine(fit: LineFit): ReadFromLine {
  const R = gasConstant_J_per_mol_K
  const Ea = -R * fit.slope
  // ln A = intercept + ln(-slope): d ln A = d intercept + d slope/slope.
  const slopeVariance = fit.slopeStandardError ** 2
  return {
    Ea,
    EaBySlope: -R,
    lnA: fit.intercept + Math.log(Ea / R),
    lnAVariance: fit.interceptStandardError ** 2 + slopeVariance / fit.slope ** 2 + (2 * fit.covariance) / fit.slope,
    covarianceEaLnA: -R * (fit.covariance + slopeVariance / fit.slope),
  }
}

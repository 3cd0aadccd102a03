import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { energyFromSlope } from './energy-from-slope.ts'
import { peakEstimate, type PeakEstimate, type RatePeak } from './peak-line.ts'
import type { PeakMethodInfo } from './peak-method-info.ts'

export const ozawaPeakInfo: PeakMethodInfo = {
  id: 'ozawa-peak',
  label: 'Ozawa, peaks',
  ordinate: 'ln β',
  sources: ['ozawa-1965', 'doyle-1962', 'ictac-2011'],
}

export const ozawaPeakCorrectedInfo: PeakMethodInfo = { ...ozawaPeakInfo, id: 'ozawa-peak-corrected', label: 'Ozawa, peaks, corrected' }

/** Ozawa's 1.052 from Doyle's line ln p(x) = -5.331 - 1.052 x. */
const doyleSlope = 1.052

/**
 * Ozawa's method on rate peaks: Ea from the line
 *
 *   ln beta = const - 1.052 Ea/(R Tp)
 *
 * through the runs, Doyle's straight line standing for ln p(x). Assumes the same conversion at every peak. Gives no A. Ea is off by the temperature integral:
 * +13 % at Ea/(R Tp) = 10, +4.2 % at 20, +1.2 % at 30, -1.8 % at 60, which the corrected form does without; of use for comparison with older work. Not for holds or
 * overlapping peaks.
 *
 * Statuses: `too-few-programmes`, `line-not-determined`, `energy-not-positive`.
 *
 * @throws KineticsError `no-heating-rate`, `not-finite`
 * @source ozawa-1965; doyle-1962
 */
export function ozawaPeak(peaks: readonly RatePeak[]): PeakEstimate {
  return peakEstimate(ozawaPeakInfo.label, peaks, lnHeatingRate, (fit) => ({
    Ea: (-gasConstant_J_per_mol_K * fit.slope) / doyleSlope,
    EaBySlope: -gasConstant_J_per_mol_K / doyleSlope,
    ...withoutA,
  }))
}

/**
 * Ozawa's method on rate peaks with the exact slope of ln p(x) in place of 1.052: Ea h(Ea/(R T)) = -R d ln beta/d(1/Tp), h = -d ln p/dx, T the reciprocal of the mean
 * of 1/Tp; where correcting again and again ends. Exact, for heating rates close to each other, where the conversion at the peak does not change with the heating
 * rate; a first-order reaction, in which it changes a little, comes out about 2/x² high (0.3 % at x = Ea/(R Tp) = 25). Gives no A.
 *
 * Statuses and errors as of `ozawaPeak`.
 *
 * @source ozawa-1965; ictac-2011
 */
export function ozawaPeakCorrected(peaks: readonly RatePeak[]): PeakEstimate {
  return peakEstimate(ozawaPeakCorrectedInfo.label, peaks, lnHeatingRate, (fit) => {
    const energy = energyFromSlope(-fit.slope, 1 / fit.xMean)
    return energy === null ? null : { Ea: energy.Ea, EaBySlope: -energy.EaBySteepness, ...withoutA }
  })
}

const lnHeatingRate = ({ heatingRate }: RatePeak): number => Math.log(heatingRate)
const withoutA = { lnA: Number.NaN, lnAVariance: Number.NaN, covarianceEaLnA: Number.NaN }

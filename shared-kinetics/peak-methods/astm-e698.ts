import type { LineFit } from '../numerics/line-fit.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity, type Quantity } from '../units/quantity.ts'
import { energyFromSlope } from './energy-from-slope.ts'
import { halfLifeTemperature } from './half-life-temperature.ts'
import { middleProgramme } from './middle-programme.ts'
import { peakEstimate, type PeakEstimate, type RatePeak, type ReadFromLine } from './peak-line.ts'
import type { PeakMethodInfo } from './peak-method-info.ts'

export const astmE698Info: PeakMethodInfo = {
  id: 'astm-e698',
  label: 'ASTM E698',
  ordinate: 'log β',
  sources: ['astm-e698', 'doyle-1962'],
}

/** The half-life at whose temperature the standard has a sample aged. */
export const confirmationHalfLife_s = 3600

export interface AstmE698Estimate extends PeakEstimate {
  /** Ea before it is refined: 2.19 R times the slope of log beta. */
  readonly firstEstimate: Quantity<'J/mol'>
  /** -d ln p/dx at the refined Ea/(RT): what 2.303/2.19 stands for in the first estimate. */
  readonly D: number
  /** Peak temperature at the heating rate nearest the middle, where D and Z are taken. */
  readonly middlePeak: Quantity<'K'>
  /** Where the half-life of the reaction is 60 min; and its standard error, which takes in the correlation of Ea and ln Z. */
  readonly confirmationTemperature: Quantity<'K'>
  readonly confirmationTemperatureStandardError: Quantity<'K'>
}

/**
 * ASTM E698: Ea and Z of an exothermic reaction from the peaks of three or more DSC runs, by the line of log beta against 1/Tp.
 *
 *   Ea = -2.19 R d log beta/d(1/Tp) at first, then refined: Ea = -(2.303/D) R d log beta/d(1/Tp),   D = -d ln p/dx at x = Ea/(R T),
 *   Z = beta Ea exp(Ea/(R T))/(R T²),   k = Z exp(-Ea/(R T)),
 *   temperature of half-life t½: T½ = Ea/(R ln(Z t½/ln 2)).
 *
 * beta and T are those of the heating rate nearest the (geometric) middle. D is taken exactly, not from a table, and the refinement carried to its end. The line
 * gives log beta with beta in K/s. Standard errors are those of the unweighted regression, propagated to first order; that of ln Z takes in its correlation with Ea.
 *
 * Assumes Arrhenius' law and the same conversion at every peak; Z and half-life are those of first order. For a first-order reaction the refined Ea is high by about
 * 2/x² (0.3 % at x = 25), since the conversion at its peak moves a little. Not for reactions that are partly inhibited, simultaneous or consecutive, nor with a phase
 * change in their range; made for exothermic reactions in DSC. A line that is not straight, or a sample that fails the confirmation, shows that it does not apply.
 * Confirmation: a sample aged 60 min at the temperature whose half-life is 60 min must then show half the peak of one that was not aged.
 *
 * Statuses: `too-few-programmes`, `line-not-determined`, `energy-not-positive`.
 *
 * @throws KineticsError `no-heating-rate`, `not-finite`
 * @source astm-e698 (scope read; equations from memory, Z checked against the exact first-order peak)
 */
export function astmE698(peaks: readonly RatePeak[]): AstmE698Estimate {
  const R = gasConstant_J_per_mol_K
  const middle = middleProgramme(peaks)
  const read = (fit: LineFit): ReadFromLine | null => {
    const energy = energyFromSlope(-fit.slope, 1 / middle.inverseTemperature)
    if (energy === null) return null
    const { Ea, EaBySteepness } = energy
    // ln Z from the middle peaks: its derivative by ln beta of each of them is 1/count, and by the slope what Ea brings.
    const lnZByEa = 1 / Ea + middle.inverseTemperature / R
    const bySteepness = lnZByEa * EaBySteepness
    const slopeVariance = fit.slopeStandardError ** 2
    const withMiddle = -(middle.inverseTemperature - fit.xMean) * slopeVariance
    return {
      Ea,
      EaBySlope: -EaBySteepness,
      lnA: middle.lnHeatingRate + Math.log(Ea / R) + 2 * Math.log(middle.inverseTemperature) + (Ea / R) * middle.inverseTemperature,
      lnAVariance: fit.residualStandardDeviation ** 2 / middle.count + 2 * bySteepness * withMiddle + bySteepness ** 2 * slopeVariance,
      covarianceEaLnA: EaBySteepness * (withMiddle + bySteepness * slopeVariance),
    }
  }
  const estimate = peakEstimate('ASTM E698', peaks, ({ heatingRate }) => Math.log(heatingRate), read)
  const { line } = estimate
  const ok = estimate.status === 'ok'
  const T = halfLifeTemperature(estimate.Ea, estimate.lnA, confirmationHalfLife_s)
  return {
    ...estimate,
    line: {
      ...line,
      y: line.y.map((value) => value / Math.LN10),
      slope_K: line.slope_K / Math.LN10,
      intercept: line.intercept / Math.LN10,
    },
    firstEstimate: quantity(ok ? (-2.19 * R * line.slope_K) / Math.LN10 : Number.NaN, 'J/mol'),
    D: ok ? (-R * line.slope_K) / estimate.Ea : Number.NaN,
    middlePeak: quantity(ok ? 1 / middle.inverseTemperature : Number.NaN, 'K'),
    confirmationTemperature: T,
    confirmationTemperatureStandardError: temperatureError(estimate, T),
  }
}

/** T = Ea/(R L), L = ln Z + const: dT = T (dEa/Ea - d ln Z/L). */
function temperatureError({ Ea, standardError, lnAStandardError, covarianceEaLnA }: PeakEstimate, T: number): Quantity<'K'> {
  const L = Ea / (gasConstant_J_per_mol_K * T)
  return quantity(T * Math.sqrt((standardError / Ea) ** 2 + (lnAStandardError / L) ** 2 - (2 * covarianceEaLnA) / (Ea * L)), 'K')
}

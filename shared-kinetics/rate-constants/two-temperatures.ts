import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { Quantity } from '../units/quantity.ts'
import { energyFromLnRatio, type EnergyFromRatio } from './energy-from-ratio.ts'
import { checkRateConstants, type RateConstantPoint } from './rate-constant-point.ts'

export interface TwoTemperatures {
  readonly status: EnergyFromRatio['status']
  readonly Ea: Quantity<'J/mol'>
  /** ln of A in the unit of k. */
  readonly lnA: number
}

/**
 * Ea and ln A from rate constants at two temperatures: Ea = R ln(k₂/k₁)/(1/T₁ - 1/T₂), ln A = ln k₁ + Ea/(R T₁).
 * Two points leave nothing to judge them by: there is no interval, and an error of one k or T goes into Ea whole.
 *
 * @throws KineticsError `not-finite`, naming the row, where k or T is not above 0
 * @source arrhenius-1889
 */
export function twoTemperatures(one: RateConstantPoint, other: RateConstantPoint): TwoTemperatures {
  checkRateConstants([one, other])
  const lnK = Math.log(one.rateConstant)
  const { status, Ea } = energyFromLnRatio(Math.log(other.rateConstant) - lnK, one.temperature, other.temperature)
  return { status, Ea, lnA: lnK + Ea / (gasConstant_J_per_mol_K * one.temperature) }
}

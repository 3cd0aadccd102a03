import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity, type Quantity } from '../units/quantity.ts'

/**
 * Temperature at which half of a first-order reaction is over in a given time:
 *
 *   T½ = Ea/(R ln(Z t½/ln 2)),   from k = Z exp(-Ea/(R T)) = ln 2/t½.
 *
 * A calculated value far outside the temperatures measured is no more than an estimate. NaN where there is none (Z t½ <= ln 2, or a number that is not to be had).
 *
 * @param lnZ - ln of Z in 1/s
 * @source astm-e698 (equation from memory)
 */
export function halfLifeTemperature(Ea: Quantity<'J/mol'>, lnZ: number, halfLife_s: number): Quantity<'K'> {
  const L = lnZ + Math.log(halfLife_s / Math.LN2)
  return quantity(L > 0 ? Ea / (gasConstant_J_per_mol_K * L) : Number.NaN, 'K')
}

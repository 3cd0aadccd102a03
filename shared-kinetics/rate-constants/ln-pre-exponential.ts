import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { Quantity } from '../units/quantity.ts'

/**
 * ln A from one rate constant and a known Ea: ln A = ln k + Ea/(R T), A in the unit of k. A logarithm, since A itself can leave double precision.
 * @source arrhenius-1889
 */
export const lnPreExponential = (rateConstant: number, temperature: Quantity<'K'>, Ea: Quantity<'J/mol'>): number =>
  Math.log(rateConstant) + Ea / (gasConstant_J_per_mol_K * temperature)

import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { Quantity } from '../units/quantity.ts'
import { expOrNone } from './exp-or-none.ts'

/**
 * The exponential factor exp(-Ea/(R T)), a pure number: the share of encounters with at least the energy Ea in collision theory, k/A in any case. NaN where it leaves
 * double precision.
 * @source arrhenius-1889
 */
export const exponentialFactor = (Ea: Quantity<'J/mol'>, temperature: Quantity<'K'>): number =>
  expOrNone(Ea / (-gasConstant_J_per_mol_K * temperature))

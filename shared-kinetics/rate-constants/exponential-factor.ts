import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { Quantity } from '../units/quantity.ts'

/**
 * The exponential factor exp(-Ea/(R T)), a pure number: the share of encounters with at least the energy Ea in collision theory, k/A in any case.
 * @source arrhenius-1889
 */
export const exponentialFactor = (Ea: Quantity<'J/mol'>, temperature: Quantity<'K'>): number =>
  1 / Math.exp(Ea / (gasConstant_J_per_mol_K * temperature))

import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { Quantity } from '../units/quantity.ts'

/**
 * How many times faster a reaction is at `to` than at `from`: k(T₂)/k(T₁) = exp((Ea/R)(1/T₁ - 1/T₂)).
 * k at another temperature is k₁ times this.
 * @source arrhenius-1889
 */
export const rateRatio = (Ea: Quantity<'J/mol'>, from: Quantity<'K'>, to: Quantity<'K'>): number =>
  Math.exp((Ea / gasConstant_J_per_mol_K) * ((to - from) / (from * to)))

import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { Quantity } from '../units/quantity.ts'
import { expOrNone } from './exp-or-none.ts'

/**
 * How many times faster a reaction is at `to` than at `from`: k(T₂)/k(T₁) = exp((Ea/R)(1/T₁ - 1/T₂)).
 * k at another temperature is k₁ times this. NaN where it leaves double precision.
 * @source arrhenius-1889
 */
export const rateRatio = (Ea: Quantity<'J/mol'>, from: Quantity<'K'>, to: Quantity<'K'>): number =>
  expOrNone((Ea / gasConstant_J_per_mol_K) * ((to - from) / (from * to)))

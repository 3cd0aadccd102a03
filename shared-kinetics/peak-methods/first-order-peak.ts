import { KineticsError } from '../errors.ts'
import { lambertWOfExp } from '../numerics/lambert-w.ts'
import { scaledPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity, type Quantity } from '../units/quantity.ts'

/**
 * Temperature at which the rate of a first-order reaction peaks under a constant heating rate, in closed form:
 *
 *   Ea/(R Tp) = 2 W₀(½ √(A Ea/(R beta))),
 *
 * the root of beta Ea/(R Tp²) = A exp(-Ea/(R Tp)), W₀ Lambert's function. Taken by logarithms: any A that has one will do.
 *
 * @param lnA - ln of A in 1/s
 * @throws KineticsError `bad-option` where Ea or the heating rate is not above 0
 * @source farjas-roura-2014
 */
export function firstOrderPeakTemperature(Ea: Quantity<'J/mol'>, lnA: number, heatingRate: Quantity<'K/s'>): Quantity<'K'> {
  if (!(Ea > 0) || !(heatingRate > 0)) {
    throw new KineticsError('bad-option', `A rate peak needs Ea and heating rate above 0, not ${Ea} J/mol and ${heatingRate} K/s.`, {
      Ea,
      heatingRate,
    })
  }
  const R = gasConstant_J_per_mol_K
  const x = 2 * lambertWOfExp(0.5 * (lnA + Math.log(Ea / R) - Math.log(heatingRate)) - Math.LN2)
  return quantity(Ea / (R * x), 'K')
}

/**
 * Conversion at the rate peak of a first-order reaction under a constant heating rate, alpha_p = 1 - exp(-π(x)) with x = Ea/(R Tp): between 0.57 at x = 10 and
 * 1 - 1/e for large x.
 *
 * @throws KineticsError `bad-option` where x is not a positive finite number
 * @source farjas-roura-2014
 */
export const firstOrderPeakConversion = (x: number): number => -Math.expm1(-scaledPOfX(x))

import { KineticsError } from '../errors.ts'
import type { ReactionModel } from '../reaction-models/model.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity, type Quantity } from '../units/quantity.ts'

/** The kinetic triplet of a single step. */
export interface KineticTriplet {
  readonly Ea: Quantity<'J/mol'>
  /** ln of A in 1/s. */
  readonly lnA: number
  readonly model: ReactionModel
}

/**
 * Time at a constant temperature to a conversion, for a known kinetic triplet: t = g(alpha)/(A exp(-Ea/(R T))), from alpha = 0 at t = 0.
 *
 * A calculated value is an estimate for planning: it holds for one step as far as its triplet does, inside the temperatures it was found at and their near
 * surroundings, and for a sample that keeps its temperature. It does not replace tests on the real amount, package and plant; local codes and the judgement of licensed or
 * otherwise competent people come first.
 *
 * @param temperature - positive
 * @param alpha - 0 to 1
 * @returns seconds; Infinity for a conversion the model reaches only in the end; NaN for a model whose rate starts from nothing (`gZeroAt` not 0)
 * @throws KineticsError `bad-option` where T is not a positive number, alpha is outside 0 to 1 or the triplet is not finite
 * @source ictac-2011
 */
export function isothermalTime({ Ea, lnA, model }: KineticTriplet, temperature: Quantity<'K'>, alpha: number): Quantity<'s'> {
  if (!(temperature > 0) || !Number.isFinite(temperature)) {
    throw new KineticsError('bad-option', `A prediction needs a temperature above 0 K, not ${temperature}.`, { temperature })
  }
  if (!(alpha >= 0 && alpha <= 1)) throw new KineticsError('bad-option', `A conversion lies between 0 and 1, not ${alpha}.`, { alpha })
  if (!Number.isFinite(Ea) || !Number.isFinite(lnA)) {
    throw new KineticsError('bad-option', `A prediction needs finite Ea and ln A, not ${Ea} J/mol and ${lnA}.`, { Ea, lnA })
  }
  if (model.gZeroAt !== 0) return quantity(Number.NaN, 's')
  return quantity(Math.exp(Math.log(model.g(alpha)) - lnA + Ea / (gasConstant_J_per_mol_K * temperature)), 's')
}

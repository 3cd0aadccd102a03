import { bracketedRoot } from '../numerics/root.ts'
import type { ReactionModel } from '../reaction-models/model.ts'
import { lnPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'

/** A single step in any model. */
export interface SingleStep {
  readonly model: ReactionModel
  readonly Ea_J_per_mol: number
  readonly lnA: number
}

/** Temperature in K at which a run from T = 0 at a constant heating rate reaches a conversion: g(alpha) = (A Ea/(R beta)) p(Ea/(RT)). */
export function temperatureAtConversion({ model, Ea_J_per_mol, lnA }: SingleStep, heatingRate_K_per_s: number, alpha: number): number {
  const R = gasConstant_J_per_mol_K
  const target = Math.log(model.g(alpha)) - lnA - Math.log(Ea_J_per_mol / (R * heatingRate_K_per_s))
  // The search is in x, over which ln p is close to straight.
  const { x } = bracketedRoot((x) => lnPOfX(x) - target, 0.5, 5000)
  return Ea_J_per_mol / (R * x)
}

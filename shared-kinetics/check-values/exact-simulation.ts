import { bracketedRoot } from '../numerics/root.ts'
import { lnPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'

/** First-order steps that run side by side, each with its share of the conversion. */
export interface FirstOrderStep {
  readonly Ea_J_per_mol: number
  readonly A_per_s: number
  readonly share: number
}

/** Conversion and its rate in 1/s under a constant heating rate from T = 0, in closed form: 1 - alpha_i = exp(-A E/(R beta) p(E/RT)). */
export function underConstantRate(
  steps: readonly FirstOrderStep[],
  heatingRate_K_per_s: number,
  temperature_K: number,
): { readonly conversion: number; readonly rate_per_s: number } {
  let conversion = 0
  let rate_per_s = 0
  for (const { Ea_J_per_mol, A_per_s, share } of steps) {
    const x = Ea_J_per_mol / (gasConstant_J_per_mol_K * temperature_K)
    const g = Math.exp(Math.log((A_per_s * Ea_J_per_mol) / (gasConstant_J_per_mol_K * heatingRate_K_per_s)) + lnPOfX(x))
    conversion -= share * Math.expm1(-g)
    rate_per_s += share * A_per_s * Math.exp(-x - g)
  }
  return { conversion, rate_per_s }
}

/** Temperature in K at which the conversion reaches `level`. */
export function temperatureAt(steps: readonly FirstOrderStep[], heatingRate_K_per_s: number, level: number): number {
  return bracketedRoot((T) => underConstantRate(steps, heatingRate_K_per_s, T).conversion - level, 150, 2000).x
}

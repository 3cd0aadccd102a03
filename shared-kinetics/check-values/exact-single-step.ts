import { bracketedRoot } from '../numerics/root.ts'
import { lnPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { constantHeatingRate, type RunValues } from './series-of-values.ts'

/** f(alpha) and g(alpha) of solid-state models (Vyazovkin et al., Thermochim. Acta 520 (2011) 1, table 1). */
export const exactModels = {
  P2: { f: (a: number) => 2 * Math.sqrt(a), g: (a: number) => Math.sqrt(a) },
  F0: { f: () => 1, g: (a: number) => a },
  F1: { f: (a: number) => 1 - a, g: (a: number) => -Math.log1p(-a) },
  F2: { f: (a: number) => (1 - a) ** 2, g: (a: number) => a / (1 - a) },
  A3: { f: (a: number) => 3 * (1 - a) * (-Math.log1p(-a)) ** (2 / 3), g: (a: number) => Math.cbrt(-Math.log1p(-a)) },
  R2: { f: (a: number) => 2 * Math.sqrt(1 - a), g: (a: number) => 1 - Math.sqrt(1 - a) },
  D1: { f: (a: number) => 1 / (2 * a), g: (a: number) => a * a },
  D3: { f: (a: number) => (1.5 * (1 - a) ** (2 / 3)) / (1 - Math.cbrt(1 - a)), g: (a: number) => (1 - Math.cbrt(1 - a)) ** 2 },
} as const
export type ExactModel = keyof typeof exactModels

export interface ExactReaction {
  readonly Ea_J_per_mol: number
  readonly A_per_s: number
  readonly model: ExactModel
}

/** Temperature in K at which a run heated from T = 0 at a constant rate reaches a conversion: the root of g(alpha) = (A Ea/(R beta)) p(Ea/(R T)), in logarithms. */
export function exactTemperature({ Ea_J_per_mol: Ea, A_per_s, model }: ExactReaction, heatingRate_K_per_s: number, level: number): number {
  const wanted = Math.log((exactModels[model].g(level) * gasConstant_J_per_mol_K * heatingRate_K_per_s) / (A_per_s * Ea))
  // Far above any temperature of a laboratory: second-order tails at a low Ea/(RT) end there.
  const found = bracketedRoot((T) => lnPOfX(Ea / (gasConstant_J_per_mol_K * T)) - wanted, 20, 1e6)
  if (found.status !== 'converged') throw new Error(`no temperature gives conversion ${level} (${found.status})`)
  return found.x
}

/** The A in 1/s with which conversion 0.5 is reached at an Ea/(RT) of `x` at 10 K/min, so that a temperature of about Ea/(R x) follows. */
export function exactA(Ea_J_per_mol: number, model: ExactModel, x: number): number {
  return ((exactModels[model].g(0.5) * gasConstant_J_per_mol_K) / (6 * Ea_J_per_mol)) * Math.exp(-lnPOfX(x))
}

/**
 * One run heated at a constant rate, exact at every level: temperature, dalpha/dt, and the time since 0.35 times the temperature of the first level, where its history, a
 * straight ramp, begins: at an Ea/(RT) of 20 and more nothing that double precision could tell has reacted by then.
 */
export function exactRamp(
  reaction: ExactReaction,
  heatingRate_K_per_min: number,
  programmeGroup: number,
  levels: readonly number[],
): RunValues {
  const { Ea_J_per_mol, A_per_s, model } = reaction
  const rate = heatingRate_K_per_min / 60
  const temperature_K = levels.map((level) => exactTemperature(reaction, rate, level))
  const start = 0.35 * (temperature_K[0] ?? Number.NaN)
  const highest = (temperature_K.at(-1) ?? 0) + 10
  return {
    programme: constantHeatingRate(heatingRate_K_per_min),
    programmeGroup,
    temperature_K,
    time_s: temperature_K.map((T) => (T - start) / rate),
    reactionRate_per_s: temperature_K.map(
      (T, k) => A_per_s * Math.exp(-Ea_J_per_mol / (gasConstant_J_per_mol_K * T)) * exactModels[model].f(levels[k] ?? Number.NaN),
    ),
    history: { time_s: [0, (highest - start) / rate], temperature_K: [start, highest] },
  }
}

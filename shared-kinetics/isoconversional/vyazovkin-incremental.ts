import { largestEa } from './energy-grid.ts'
import { minimisingMethod } from './minimising-method.ts'
import type { MethodInfo } from './result.ts'
import { segmentIntegral } from './segment-integral.ts'

export const vyazovkinIncrementalInfo: MethodInfo = {
  id: 'vyazovkin-incremental',
  label: 'Vyazovkin incremental',
  sources: ['vyazovkin-2001', 'ictac-2011'],
  appliesTo: ['constant-heating-rate', 'isothermal', 'general'],
  evidence: 'minimum',
  byDefault: true,
}

/**
 * Vyazovkin's integral isoconversional method over small steps of conversion: at each level the Ea that minimises
 *
 *   Phi(Ea) = Σᵢ Σ_{j≠i} Jᵢ(Ea)/Jⱼ(Ea),   J(Ea) = ∫ exp(-Ea/(R T(t))) dt from the level before to this level (from alpha = 0 for the first),
 *
 * over the runs i, j. Between two levels A·J = Δg(alpha) is the same for every run. The steps are those between the levels asked for: Ea belongs to the step that ends
 * at the level, and is a mean over it, so that few coarse levels still smooth within each step. With levels 0.01 apart Ea follows the differential value (Friedman)
 * half a step back, without the noise of a reaction rate.
 *
 * J of a run heated at a constant rate is the time between the two levels times the mean of exp(-Ea/RT) over the temperatures passed: in closed form where the step is
 * 1 K wide or wider, by Gauss–Legendre where it is narrower. Where no time was measured it is ΔT/beta. A ramp that wanders by more than 1 %, a hold and any other
 * programme is integrated over its measured T(t) between the two times. Root, bracket, standard error, r2 and interval as for `vyazovkin`.
 *
 * Assumes Ea constant within each step only, so that it does not lag behind an Ea that varies with conversion; no systematic error of its own. Not to be preferred
 * where the noise of conversion is not small beside the step: two levels then differ by little more than their errors, and Ea scatters as Friedman's does.
 *
 * Statuses: `level-not-reached` (also where a run lacks the level before, or reaches the two at one time); `too-few-programmes`; `minimum-at-bound`; `minimum-flat`;
 * `several-minima`.
 *
 * @source vyazovkin-2001
 */
export const vyazovkinIncremental = minimisingMethod(vyazovkinIncrementalInfo, (run) => segmentIntegral(run, largestEa))

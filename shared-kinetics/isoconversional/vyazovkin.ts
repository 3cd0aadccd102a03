import { largestEa } from './energy-grid.ts'
import { minimisingMethod } from './minimising-method.ts'
import type { MethodInfo } from './result.ts'
import { timeIntegral } from './time-integral.ts'

export const vyazovkinInfo: MethodInfo = {
  id: 'vyazovkin',
  label: 'Vyazovkin',
  sources: ['vyazovkin-dollimore-1996', 'vyazovkin-1997', 'ictac-2011'],
  appliesTo: ['constant-heating-rate', 'isothermal', 'general'],
  evidence: 'minimum',
  byDefault: true,
}

/**
 * Vyazovkin's integral isoconversional method, integrated from zero: at each level the Ea that minimises
 *
 *   Phi(Ea) = Σᵢ Σ_{j≠i} Jᵢ(Ea)/Jⱼ(Ea),   J(Ea) = ∫ exp(-Ea/(R T(t))) dt from alpha = 0 to the level,
 *
 * over the runs i, j. At one conversion A·J = g(alpha) is the same for every run, so that all J are equal and Phi is n(n - 1) for error-free data.
 *
 * J is taken in closed form, (Ea/(R beta)) p(Ea/(R T)), for runs whose heating rate is constant within 1 % or was not measured, and over the measured T(t) from the
 * first sample of the history for all others; a series may mix them. The minimum is found as the root of dPhi/dEa inside a bracket of 1 to 1000 kJ/mol, whose sign is scanned in steps of 10 %.
 *
 * Standard error, by linearising ln Jᵢ in Ea at the root: with yᵢ = ln Jᵢ, uᵢ = -R dyᵢ/dEa (an effective 1/T) and s² = Σ(yᵢ - ȳ)²/(n - 2),
 * se(Ea) = R s/√Σ(uᵢ - ū)². r2 is that of the same linearised regression, yᵢ + Ea uᵢ/R against uᵢ. Since Phi ≈ n(n - 1) + n Σ(yᵢ - ȳ)² near its minimum, the interval
 * Ea ± t·se ends where Phi reaches phiThreshold = phiMinimum + n t² s²; Phi itself passes a little beside these ends, the more so the wider the interval.
 *
 * Assumes Ea constant from alpha = 0 to the level, and for histories that no reaction took place before their first sample. No approximation of the temperature
 * integral and no systematic error of its own; but where Ea varies with conversion it lags behind the differential value, as every integral taken from zero does.
 *
 * Statuses: `level-not-reached` (also where a level lies outside a run's history); `too-few-programmes`; `minimum-at-bound`: Phi is lowest at an end of the bracket;
 * `minimum-flat`: the runs' effective temperatures are the same, so that Phi does not depend on Ea; `several-minima`: another minimum lies below phiThreshold (without
 * an interval, one inside the bracket below 1.1 phiMinimum). Unlike programmes taken together can give Phi further minima high above the lowest; these are passed over.
 *
 * @source vyazovkin-dollimore-1996
 * @source vyazovkin-1997
 */
export const vyazovkin = minimisingMethod(vyazovkinInfo, (run) => timeIntegral(run, largestEa))

import { lineMethod, temperatureAtLevel } from './line-method.ts'
import type { MethodInfo } from './result.ts'

export const friedmanInfo: MethodInfo = {
  id: 'friedman',
  label: 'Friedman',
  sources: ['friedman-1964', 'ictac-2011'],
  appliesTo: ['constant-heating-rate', 'isothermal', 'general'],
  evidence: 'line',
  byDefault: true,
}

/**
 * Friedman's differential isoconversional method: at each level the line
 *
 *   ln(dalpha/dt) = ln[A f(alpha)] - Ea/(R T)
 *
 * through the runs, dalpha/dt in 1/s and T in K where each run reaches the level. Slope -Ea/R; intercept ln[A f(alpha)] with A in 1/s and its standard error.
 *
 * Assumes only that at one conversion the reaction rate depends on temperature alone. No f(alpha), no temperature integral, no assumption about the programme:
 * it serves ramps, holds, any other programme and mixtures of them, and has no systematic error of its own.
 * Not to be relied on where dalpha/dt is poorly known: noisy rates of an integral signal (mass) scatter Ea, and a wrong baseline of a differential signal (heat
 * flow) shifts it, most of all near alpha 0 and 1.
 *
 * Statuses: `rate-not-positive` where a run's dalpha/dt at the level is not above 0; `level-not-reached`; `too-few-programmes`; `line-not-determined`.
 *
 * @source friedman-1964
 */
export const friedman = lineMethod({
  info: friedmanInfo,
  temperature: temperatureAtLevel,
  // The logarithm of a rate that is 0 or negative is not finite, which is what gives the level its status.
  ordinate: (run, level) => Math.log(run.reactionRate_per_s[level] ?? Number.NaN),
  withoutOrdinate: 'rate-not-positive',
  slopeFactor: -1,
  interceptIsLnAf: true,
  integral: null,
})

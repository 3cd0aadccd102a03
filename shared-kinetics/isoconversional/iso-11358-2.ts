import { heatingRateOf, lineMethod, temperatureAtLevel } from './line-method.ts'
import type { MethodInfo } from './result.ts'

export const iso11358Part2Info: MethodInfo = {
  id: 'iso-11358-2',
  label: 'ISO 11358-2',
  sources: ['iso-11358-2', 'ozawa-1965', 'doyle-1962'],
  appliesTo: ['constant-heating-rate'],
  evidence: 'line',
  byDefault: false,
}

/** Slope of Doyle's line log10 p(x) = -2.315 - 0.4567 x. */
const doyleLogSlope = 0.4567

/**
 * Ea of the decomposition of polymers as ISO 11358-2 has it, for reports made by that standard: at each level the line
 *
 *   log10 beta = const - 0.4567 Ea/(R T)
 *
 * through the runs, beta the heating rate in K/s and T in K where each run reaches the level. Slope -0.4567 Ea/R: the method of Ozawa, without any refinement of the
 * constant (ASTM E1641 refines it, so that the two standards differ by up to several percent). 0.4567 ln 10 = 1.05159, which makes Ea 0.04 % larger than the 1.052 of
 * `ofw`.
 *
 * Scope of the standard: thermogravimetry of polymers; a single mechanism, or single steps that are clearly apart. Assumes a constant heating rate, Ea constant from
 * alpha = 0 to the level, and Doyle's line, made for 20 <= Ea/(RT) <= 60; its systematic error is +12.7 % at Ea/(RT) = 10, +4.2 % at 20, +1.2 % at 30, -1.8 % at 60. Not
 * for the final number where the report need not follow the standard: Starink, the corrected OFW or Vyazovkin have no such error.
 *
 * Statuses: `level-not-reached`, `too-few-programmes`, `line-not-determined`.
 *
 * @source iso-11358-2 (scope; equation remembered)
 */
export const iso11358Part2 = lineMethod({
  info: iso11358Part2Info,
  temperature: temperatureAtLevel,
  ordinate: (run) => Math.log10(heatingRateOf(run)),
  withoutOrdinate: 'line-not-determined',
  slopeFactor: -doyleLogSlope,
  interceptIsLnAf: false,
  integral: { temperatureExponent: 0, divisor: doyleLogSlope * Math.LN10 },
})

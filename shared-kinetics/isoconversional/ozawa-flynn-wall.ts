import { heatingRateOf, lineMethod, temperatureAtLevel } from './line-method.ts'
import type { MethodInfo } from './result.ts'

export const ozawaFlynnWallInfo: MethodInfo = {
  id: 'ofw',
  label: 'Ozawa–Flynn–Wall',
  sources: ['ozawa-1965', 'flynn-wall-1966', 'doyle-1962'],
  appliesTo: ['constant-heating-rate'],
  evidence: 'line',
  byDefault: true,
}

/** Slope of Doyle's line ln p(x) = -5.331 - 1.052 x. */
const doyleSlope = 1.052

/**
 * Integral isoconversional method of Ozawa and of Flynn and Wall (OFW): at each level the line
 *
 *   ln beta = const - 1.052 Ea/(R T)
 *
 * through the runs, beta the heating rate in K/s and T in K where each run reaches the level. Slope -1.052 Ea/R, from Doyle's linear form of the temperature
 * integral; no correction is applied.
 *
 * Assumes a constant heating rate, Ea constant from alpha = 0 to the level, and Doyle's line, made for 20 <= Ea/(RT) <= 60. The line alone causes a systematic
 * error of Ea of +12.7 % at Ea/(RT) = 10, +4.2 % at 20, +1.2 % at 30, -1.8 % at 60. Not to be used where Ea/(RT) is below about 13, nor for the final number where a
 * method with a better temperature integral (Starink, Vyazovkin) is at hand.
 *
 * Statuses: `level-not-reached`, `too-few-programmes`, `line-not-determined`.
 *
 * @source ozawa-1965
 * @source flynn-wall-1966
 * @source doyle-1962
 */
export const ozawaFlynnWall = lineMethod({
  info: ozawaFlynnWallInfo,
  temperature: temperatureAtLevel,
  ordinate: (run) => Math.log(heatingRateOf(run)),
  withoutOrdinate: 'line-not-determined',
  slopeFactor: -doyleSlope,
  interceptIsLnAf: false,
  integral: { temperatureExponent: 0, divisor: doyleSlope },
})

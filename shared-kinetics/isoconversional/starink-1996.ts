import type { MethodInfo } from './result.ts'
import { scaledLineMethod } from './scaled-line-method.ts'

export const starink1996Info: MethodInfo = {
  id: 'starink-1996',
  label: 'Starink 1996',
  sources: ['starink-1996'],
  appliesTo: ['constant-heating-rate'],
  evidence: 'line',
  byDefault: false,
}

const temperatureExponent = 1.8
const divisor = 1.0037

/**
 * Starink's integral isoconversional method in its form of 1996: at each level the line
 *
 *   ln(beta/T^1.8) = const - 1.0037 Ea/(R T)
 *
 * through the runs, beta the heating rate in K/s and T in K where each run reaches the level. Slope -1.0037 Ea/R. (The first form has the divisor
 * 1.007 - 1.2e-5 Ea/(kJ/mol), of which 1.0037 is the usual rounding for Ea near 275 kJ/mol.)
 *
 * Assumes a constant heating rate and Ea constant from alpha = 0 to the level. Systematic error of Ea from the temperature integral: +0.16 % at Ea/(RT) = 10, +0.21 % at
 * 20, +0.10 % at 30, -0.09 % at 60. For comparison with work that used it; the form of 2003 (`starink`) is more exact wherever Ea/(RT) is above 15.
 *
 * Statuses: `level-not-reached`, `too-few-programmes`, `line-not-determined`.
 *
 * @source starink-1996
 */
export const starink1996 = scaledLineMethod(starink1996Info, { temperatureExponent, divisor })

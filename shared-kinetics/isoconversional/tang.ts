import type { MethodInfo } from './result.ts'
import { scaledLineMethod } from './scaled-line-method.ts'

export const tangInfo: MethodInfo = {
  id: 'tang',
  label: 'Tang',
  sources: ['tang-2003'],
  appliesTo: ['constant-heating-rate'],
  evidence: 'line',
  byDefault: false,
}

/** Constants of ln p(x) ≈ -0.37773896 - 1.894661 ln x - 1.00145033 x. */
const temperatureExponent = 1.894661
const divisor = 1.00145033

/**
 * Integral isoconversional method of Tang, Liu, Zhang, Wang and Wang: at each level the line
 *
 *   ln(beta/T^1.894661) = const - 1.00145033 Ea/(R T)
 *
 * through the runs, beta the heating rate in K/s and T in K where each run reaches the level. Slope -1.00145033 Ea/R.
 *
 * Assumes a constant heating rate and Ea constant from alpha = 0 to the level. Systematic error of Ea from the temperature integral: -0.56 % at Ea/(RT) = 10, -0.04 % at
 * 20, within 0.01 % from 25 to 50, -0.06 % at 100. As exact as Starink's form of 2003 where thermal analysis works; it adds nothing beside that but comparison with
 * work that used it.
 *
 * Statuses: `level-not-reached`, `too-few-programmes`, `line-not-determined`.
 *
 * @source tang-2003
 */
export const tang = scaledLineMethod(tangInfo, { temperatureExponent, divisor })

import type { MethodInfo } from './result.ts'
import { scaledLineMethod } from './scaled-line-method.ts'

export const starinkInfo: MethodInfo = {
  id: 'starink',
  label: 'Starink',
  sources: ['starink-2003', 'ictac-2011'],
  appliesTo: ['constant-heating-rate'],
  evidence: 'line',
  byDefault: true,
}

/** Constants of ln p(x) ≈ -0.312 - 1.92 ln x - 1.0008 x. */
const temperatureExponent = 1.92
const divisor = 1.0008

/**
 * Starink's integral isoconversional method in its form of 2003: at each level the line
 *
 *   ln(beta/T^1.92) = const - 1.0008 Ea/(R T)
 *
 * through the runs, beta the heating rate in K/s and T in K where each run reaches the level. Slope -1.0008 Ea/R.
 *
 * Assumes a constant heating rate and Ea constant from alpha = 0 to the level. Systematic error of Ea from the temperature integral: -0.75 % at Ea/(RT) = 10,
 * -0.10 % at 20, within 0.02 % from 30 to 100: the most exact of the straight-line integral methods for the Ea/(RT) met in practice. Below about 10, or where Ea
 * varies with conversion, Friedman or Vyazovkin serve better.
 *
 * Statuses: `level-not-reached`, `too-few-programmes`, `line-not-determined`.
 *
 * @source starink-2003
 */
export const starink = scaledLineMethod(starinkInfo, { temperatureExponent, divisor })

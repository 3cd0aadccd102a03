import type { MethodInfo } from './result.ts'
import { scaledLineMethod } from './scaled-line-method.ts'

export const kissingerAkahiraSunoseInfo: MethodInfo = {
  id: 'kas',
  label: 'Kissinger–Akahira–Sunose',
  sources: ['akahira-sunose-1971', 'kissinger-1957', 'ictac-2011'],
  appliesTo: ['constant-heating-rate'],
  evidence: 'line',
  byDefault: true,
}

/**
 * Integral isoconversional method of Kissinger, Akahira and Sunose (KAS): at each level the line
 *
 *   ln(beta/T²) = const - Ea/(R T)
 *
 * through the runs, beta the heating rate in K/s and T in K where each run reaches the level. Slope -Ea/R, from p(x) ≈ e⁻ˣ/x².
 *
 * Assumes a constant heating rate and Ea constant from alpha = 0 to the level. Systematic error of Ea from the temperature integral: -1.5 % at Ea/(RT) = 10,
 * -0.42 % at 20, -0.05 % at 60. Where Ea varies with conversion it lags behind the differential value, as every integral taken from zero does.
 *
 * Statuses: `level-not-reached`, `too-few-programmes`, `line-not-determined`.
 *
 * @source akahira-sunose-1971
 * @source kissinger-1957
 */
export const kissingerAkahiraSunose = scaledLineMethod(kissingerAkahiraSunoseInfo, { temperatureExponent: 2, divisor: 1 })

import { KineticsError } from '../errors.ts'
import type { SourceKey } from '../sources.ts'
import { checkX } from './check-x.ts'
import type { TemperatureIntegralForm } from './form.ts'

/** Numerator and denominator in falling powers of x. Every degree is the [n - 1/n] Padé form of the asymptotic series of x eˣ p(x), solved in whole numbers. */
interface RationalForm {
  readonly numerator: readonly number[]
  readonly denominator: readonly number[]
  /** Largest relative error of p for x >= 5, which is where it is met at x = 5 and falls from there. */
  readonly largestErrorFrom5: number
}

export type SenumYangDegree = 1 | 2 | 3 | 4 | 5 | 6 | 7 | 8

/**
 * Coefficients of p(x) ≈ (e⁻ˣ/x)·N(x)/D(x) by degree. Two misprints are passed on in the literature and are not used: 88x for 86x in the numerator of the 4th degree,
 * and other numerators of the 7th and 8th degree, which are wrong by 0.6 % and 2.8 % at x = 5.
 */
export const senumYangCoefficients: Readonly<Record<SenumYangDegree, RationalForm>> = {
  1: { numerator: [1], denominator: [1, 2], largestErrorFrom5: 3.41e-2 },
  2: { numerator: [1, 4], denominator: [1, 6, 6], largestErrorFrom5: 2.36e-3 },
  3: { numerator: [1, 10, 18], denominator: [1, 12, 36, 24], largestErrorFrom5: 2.4e-4 },
  4: { numerator: [1, 18, 86, 96], denominator: [1, 20, 120, 240, 120], largestErrorFrom5: 3.14e-5 },
  5: { numerator: [1, 28, 246, 756, 600], denominator: [1, 30, 300, 1200, 1800, 720], largestErrorFrom5: 4.93e-6 },
  6: { numerator: [1, 40, 552, 3168, 7092, 4320], denominator: [1, 42, 630, 4200, 12600, 15120, 5040], largestErrorFrom5: 8.93e-7 },
  7: {
    numerator: [1, 54, 1070, 9720, 41112, 71856, 35280],
    denominator: [1, 56, 1176, 11760, 58800, 141120, 141120, 40320],
    largestErrorFrom5: 1.81e-7,
  },
  8: {
    numerator: [1, 70, 1878, 24600, 165720, 552240, 787824, 322560],
    denominator: [1, 72, 2016, 28224, 211680, 846720, 1693440, 1451520, 362880],
    largestErrorFrom5: 4.03e-8,
  },
}

export const senumYangDegrees: readonly SenumYangDegree[] = [1, 2, 3, 4, 5, 6, 7, 8]

/**
 * Scaled temperature integral π(x) = x² eˣ p(x) by the rational form of Senum and Yang: x·N(x)/D(x), N of degree n - 1 and D of degree n. p is always taken too
 * low; relative errors of p at x = 5, 10, 20: -3.4, -1.2, -0.38 % (degree 1); -3.1e-3, -9.9e-5, -1.6e-6 % (degree 4); -4.0e-6, -1.0e-8, -6.7e-12 % (degree 8).
 *
 * For comparison and for procedures that prescribe it: `scaledPOfX` is exact at every x.
 *
 * @param x - Ea/(RT), positive
 * @throws KineticsError `bad-option` where x is not a positive finite number or the degree is not 1 to 8
 * @source senum-yang-1977 (degrees 1 to 4)
 * @source flynn-1997 (misprint of the 4th degree)
 * @source perez-maqueda-criado-2000 (degrees up to 8)
 */
export function scaledPBySenumYang(x: number, degree: SenumYangDegree): number {
  checkX(x)
  const form = senumYangCoefficients[degree]
  if (form === undefined) throw new KineticsError('bad-option', `The rational forms have degree 1 to 8, not ${String(degree)}.`, { degree })
  const { numerator, denominator } = form
  // In powers of 1/x from x = 1, so that no power overflows.
  return x >= 1
    ? rising(numerator, 1 / x) / rising(denominator, 1 / x)
    : (x * rising(numerator.toReversed(), x)) / rising(denominator.toReversed(), x)
}

/** ln p(x) by the rational form of Senum and Yang; see `scaledPBySenumYang`. */
export function lnPBySenumYang(x: number, degree: SenumYangDegree): number {
  return -x - 2 * Math.log(x) + Math.log(scaledPBySenumYang(x, degree))
}

/** The rational forms as entries for a comparison, degree 1 first. */
export const senumYangForms: readonly TemperatureIntegralForm[] = senumYangDegrees.map((degree) => ({
  label: `Senum–Yang, degree ${degree}`,
  equation: 'p = (exp(-x)/x) N(x)/D(x)',
  lnP: (x) => lnPBySenumYang(x, degree),
  accuracy: [{ from: 5, to: 5000, largestError: senumYangCoefficients[degree].largestErrorFrom5 }],
  sources: sourcesOf(degree),
}))

function sourcesOf(degree: SenumYangDegree): readonly SourceKey[] {
  return degree <= 4 ? ['senum-yang-1977', 'flynn-1997'] : ['perez-maqueda-criado-2000']
}

/** c0 + c1 z + c2 z² + …, by Horner's scheme. */
function rising(coefficients: readonly number[], z: number): number {
  let value = 0
  for (let i = coefficients.length - 1; i >= 0; i--) value = value * z + (coefficients[i] ?? 0)
  return value
}

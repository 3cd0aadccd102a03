import { checkX } from './check-x.ts'
import type { TemperatureIntegralForm } from './form.ts'

export type ClosedFormId =
  | 'murray-white'
  | 'coats-redfern'
  | 'gorbachev'
  | 'agrawal'
  | 'li'
  | 'tang'
  | 'starink'
  | 'madhusudanan-krishnan-ninan'
  | 'doyle'
  | 'doyle-ln'

/** p = (e⁻ˣ/x²)·factor(x), above the x where the factor turns positive for good. */
const scaled =
  (factor: (x: number) => number, above = 0): ((x: number) => number) =>
  (x) => {
    checkX(x)
    return x > above ? -x - 2 * Math.log(x) + Math.log(factor(x)) : Number.NaN
  }

/** ln p = constant - power·ln x - slope·x. */
const logarithmic =
  (constant: number, power: number, slope: number): ((x: number) => number) =>
  (x) => {
    checkX(x)
    return constant - power * Math.log(x) - slope * x
  }

const doyleDecadic = logarithmic(-2.315 * Math.LN10, 0, 0.4567 * Math.LN10)

/**
 * Closed forms of the temperature integral p(x) = ∫ₓ^∞ e⁻ᵘ/u² du that methods and standards rest on, for comparison: the program itself integrates exactly.
 *
 * The two first ones give the line of Kissinger, Akahira and Sunose and that of Coats and Redfern; the logarithmic ones give the straight-line integral methods,
 * ln(beta/Tˢ) against 1/T with slope -B Ea/R, s being the factor of ln x and B that of x; Doyle's give that of Ozawa, Flynn and Wall and ASTM E1641. Doyle's line
 * stands in print with common and with natural logarithms; its two slopes, 0.4567 ln 10 = 1.05159 and 1.052, differ by 0.04 %.
 *
 * Errors of p are given for each; what they do to Ea is another thing (`systematicErrorAtTrueX`): a constant factor of p does nothing to it.
 */
export const closedForms: Readonly<Record<ClosedFormId, TemperatureIntegralForm>> = {
  'murray-white': {
    label: 'Murray–White',
    equation: 'p = exp(-x)/x²',
    lnP: scaled(() => 1),
    accuracy: [
      { from: 10, to: 100, largestError: 0.186 },
      { from: 20, to: 60, largestError: 0.0958 },
    ],
    sources: ['murray-white-1955'],
  },
  'coats-redfern': {
    label: 'Coats–Redfern',
    equation: 'p = (exp(-x)/x²)(1 - 2/x), x > 2',
    lnP: scaled((x) => 1 - 2 / x, 2),
    accuracy: [
      { from: 10, to: 100, largestError: 0.0518 },
      { from: 20, to: 60, largestError: 0.0138 },
    ],
    sources: ['coats-redfern-1964'],
  },
  gorbachev: {
    label: 'Gorbachev',
    equation: 'p = exp(-x)/(x (x + 2))',
    lnP: scaled((x) => x / (x + 2)),
    accuracy: [
      { from: 10, to: 100, largestError: 0.0123 },
      { from: 20, to: 60, largestError: 0.00383 },
    ],
    sources: ['gorbachev-1975'],
  },
  agrawal: {
    label: 'Agrawal',
    equation: 'p = (exp(-x)/x²)(1 - 2/x)/(1 - 5/x²), x > √5',
    lnP: scaled((x) => (1 - 2 / x) / (1 - 5 / (x * x)), Math.sqrt(5)),
    accuracy: [
      { from: 10, to: 100, largestError: 0.00201 },
      { from: 20, to: 60, largestError: 0.00131 },
    ],
    sources: ['agrawal-1987'],
  },
  li: {
    label: 'Li',
    equation: 'p = (exp(-x)/x²)(1 - 2/x)/(1 - 6/x²), x > √6',
    lnP: scaled((x) => (1 - 2 / x) / (1 - 6 / (x * x)), Math.sqrt(6)),
    accuracy: [
      { from: 10, to: 100, largestError: 0.00877 },
      { from: 20, to: 60, largestError: 0.00124 },
    ],
    sources: ['li-1985'],
  },
  tang: {
    label: 'Tang, Liu, Zhang, Wang and Wang',
    equation: 'ln p = -0.37773896 - 1.894661 ln x - 1.00145033 x',
    lnP: logarithmic(-0.37773896, 1.894661, 1.00145033),
    accuracy: [
      { from: 10, to: 100, largestError: 0.0206 },
      { from: 20, to: 60, largestError: 0.00118 },
    ],
    sources: ['tang-2003'],
  },
  starink: {
    label: 'Starink',
    equation: 'ln p = -0.312 - 1.92 ln x - 1.0008 x',
    lnP: logarithmic(-0.312, 1.92, 1.0008),
    accuracy: [
      { from: 10, to: 100, largestError: 0.0348 },
      { from: 20, to: 60, largestError: 0.00315 },
    ],
    sources: ['starink-2003'],
  },
  'madhusudanan-krishnan-ninan': {
    label: 'Madhusudanan, Krishnan and Ninan',
    equation: 'ln p = -0.297580 - 1.921503 ln x - 1.000953 x',
    lnP: logarithmic(-0.29758, 1.921503, 1.000953),
    accuracy: [
      { from: 10, to: 100, largestError: 0.0447 },
      { from: 20, to: 60, largestError: 0.0101 },
    ],
    sources: ['madhusudanan-1993'],
  },
  doyle: {
    label: 'Doyle',
    equation: 'log10 p = -2.315 - 0.4567 x, for 20 <= x <= 60',
    lnP: doyleDecadic,
    accuracy: [{ from: 20, to: 60, largestError: 0.244 }],
    sources: ['doyle-1962', 'ozawa-1965', 'flynn-wall-1966'],
  },
  'doyle-ln': {
    label: 'Doyle, natural logarithm',
    equation: 'ln p = -5.331 - 1.052 x, for 20 <= x <= 60',
    lnP: logarithmic(-5.331, 0, 1.052),
    accuracy: [{ from: 20, to: 60, largestError: 0.251 }],
    sources: ['doyle-1962'],
  },
}

import { KineticsError } from '../errors.ts'
import { withinRange, type ReactionModel } from './model.ts'
import { powerProductIntegral, type Stretch } from './power-product-integral.ts'

/**
 * The truncated equation of Šesták and Berggren, SB(m, n): f = c alpha^m (1 - alpha)^n, g = (1/c) ∫ alpha^(-m) (1 - alpha)^(-n) dalpha, an incomplete beta function.
 * It mimics most other models; its exponents need not mean a mechanism.
 *
 * For m >= 1 the rate starts from nothing and g counted from alpha = 0 is infinite: g is then counted from alpha = 0.5 (`gZeroAt`), and only its differences mean
 * something.
 *
 * @param m - exponent of alpha, any finite number
 * @param n - exponent of 1 - alpha, any finite number
 * @param c - positive factor; 1 leaves it to A
 * @throws KineticsError `bad-option` outside these
 * @source sestak-berggren-1971
 */
export function sestakBerggren(m: number, n: number, c = 1, code = `SB(${m}, ${n})`): ReactionModel {
  if (!Number.isFinite(m) || !Number.isFinite(n) || !(c > 0) || !Number.isFinite(c)) {
    throw new KineticsError('bad-option', `A Šesták–Berggren model needs finite m and n and c > 0, not ${m}, ${n} and ${c}.`, { m, n, c })
  }
  const gZeroAt = m < 1 ? 0 : 0.5
  return withinRange({
    code,
    label: `Šesták–Berggren, m = ${m}, n = ${n}`,
    equations: { f: 'c alpha^m (1 - alpha)^n', g: '(1/c) ∫ alpha^(-m) (1 - alpha)^(-n) dalpha' },
    f: (alpha) => c * alpha ** m * (1 - alpha) ** n,
    dfDalpha: (alpha) =>
      c * ((m === 0 ? 0 : m * alpha ** (m - 1) * (1 - alpha) ** n) - (n === 0 ? 0 : n * alpha ** m * (1 - alpha) ** (n - 1))),
    g: (alpha) => {
      if (gZeroAt === 0) return powerProductIntegral(m, n, fromStart(alpha)) / c
      return alpha < 0.5
        ? -powerProductIntegral(m, n, { from: alpha, to: 0.5, oneMinusFrom: 1 - alpha, oneMinusTo: 0.5, width: 0.5 - alpha }) / c
        : powerProductIntegral(m, n, { from: 0.5, to: alpha, oneMinusFrom: 0.5, oneMinusTo: 1 - alpha, width: alpha - 0.5 }) / c
    },
    gZeroAt,
    normalisation:
      m < 1 ? 'c may be taken into A.' : 'c may be taken into A. g is counted from alpha = 0.5: a constant may be added to it.',
    sources: ['sestak-berggren-1971', 'ictac-2011'],
  })
}

const fromStart = (alpha: number): Stretch => ({ from: 0, to: alpha, oneMinusFrom: 1, oneMinusTo: 1 - alpha, width: alpha })

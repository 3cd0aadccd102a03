import { KineticsError } from '../errors.ts'
import { withinRange, type ReactionModel } from './model.ts'
import { powerProductIntegral } from './power-product-integral.ts'

/**
 * Extended Prout–Tompkins model: f = (1 - alpha)^n [1 - q(1 - alpha)]^m. The initiation q just below 1 (0.99, 0.999) lets the rate start from (1 - q)^m instead of
 * from nothing, so that g is counted from alpha = 0. m = 0 is a reaction of order n.
 *
 * With w = 1 - q(1 - alpha), g = q^(n - 1) ∫ w^(-m) (1 - w)^(-n) dw from 1 - q to w: an incomplete beta function.
 *
 * @param n - exponent of 1 - alpha, any finite number
 * @param m - exponent of the autocatalytic factor, any finite number
 * @param q - inside (0, 1)
 * @throws KineticsError `bad-option` outside these
 * @source burnham-braun-1999
 */
export function extendedProutTompkins(n: number, m: number, q = 0.99, code = `ePT(${n}, ${m})`): ReactionModel {
  if (!Number.isFinite(n) || !Number.isFinite(m) || !(q > 0 && q < 1)) {
    throw new KineticsError('bad-option', `An extended Prout–Tompkins model needs finite n and m and 0 < q < 1, not ${n}, ${m}, ${q}.`, {
      n,
      m,
      q,
    })
  }
  // 1 - q(1 - alpha) as a sum of positive terms.
  const started = (alpha: number): number => 1 - q + q * alpha
  return withinRange({
    code,
    label: `Extended Prout–Tompkins, n = ${n}, m = ${m}, q = ${q}`,
    equations: { f: '(1 - alpha)^n [1 - q(1 - alpha)]^m', g: '∫ (1 - alpha)^(-n) [1 - q(1 - alpha)]^(-m) dalpha' },
    f: (alpha) => (1 - alpha) ** n * started(alpha) ** m,
    dfDalpha: (alpha) =>
      (m === 0 ? 0 : m * q * (1 - alpha) ** n * started(alpha) ** (m - 1)) -
      (n === 0 ? 0 : n * (1 - alpha) ** (n - 1) * started(alpha) ** m),
    g: (alpha) =>
      q ** (n - 1) *
      powerProductIntegral(m, n, {
        from: 1 - q,
        to: started(alpha),
        oneMinusFrom: q,
        oneMinusTo: q * (1 - alpha),
        width: q * alpha,
      }),
    gZeroAt: 0,
    normalisation: 'f(0) is (1 - q)^m, not 0; q is fixed, not fitted, and A depends on it.',
    sources: ['burnham-braun-1999'],
  })
}

/**
 * Natural logarithm of the regularised incomplete beta function, ln I_x(a, b), for x + y = 1.
 *
 * I_x(a, b) = x^a y^b / (a B(a, b)) · K, with K the continued fraction of Abramowitz & Stegun 26.5.8 evaluated by Lentz's forward recurrence; above
 * x = (a + 1)/(a + b + 2), where the fraction converges slowly, as 1 - I_y(b, a). The logarithm keeps far tails that the value itself would underflow.
 *
 * @param x - inside (0, 1); `y` is 1 - x, passed apart because the caller can often form it without cancellation
 * @param lnBeta - ln B(a, b), passed because its callers have it more exactly than a general ln Γ gives it
 * @source abramowitz-stegun-1964 26.5
 */
export function lnIncompleteBeta(a: number, b: number, x: number, y: number, lnBeta: number): number {
  if (x > (a + 1) / (a + b + 2)) return Math.log1p(-Math.exp(lnIncompleteBeta(b, a, y, x, lnBeta)))
  const lnX = x < 0.5 ? Math.log(x) : Math.log1p(-y)
  const lnY = y < 0.5 ? Math.log(y) : Math.log1p(-x)
  return a * lnX + b * lnY - Math.log(a) - lnBeta + Math.log(continuedFraction(a, b, x))
}

const tiny = 1e-300
const mostTerms = 100_000

/** Keeps a divisor of the recurrence away from 0. */
const kept = (value: number): number => (Math.abs(value) < tiny ? tiny : value)

function continuedFraction(a: number, b: number, x: number): number {
  let c = 1
  let d = 1 / kept(1 - ((a + b) * x) / (a + 1))
  let value = d
  for (let m = 1; m < mostTerms; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m))
    d = 1 / kept(1 + even * d)
    c = kept(1 + even / c)
    value *= d * c
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1))
    d = 1 / kept(1 + odd * d)
    c = kept(1 + odd / c)
    const factor = d * c
    value *= factor
    if (Math.abs(factor - 1) < Number.EPSILON) break
  }
  return value
}

import { checkX } from './check-x.ts'

/**
 * Scaled temperature integral π(x) = x² eˣ p(x), which lies between 0 and 1 and tends to 1 for large x.
 *
 * p(x) = ∫ₓ^∞ e⁻ᵘ/u² du = E₂(x)/x, x = Ea/(RT). The form e⁻ˣ/x - E₁(x) cancels about log10 x digits and is not used: from x = 1 the continued fraction
 * π(x) = x/(x + 2 - 1·2/(x + 4 - 2·3/(x + 6 - …))), below it π(x) = x(1 - x eˣ E₁(x)) with the power series of E₁, where at most a factor 2.5 cancels.
 * Relative error below 2e-15 for 0.001 <= x <= 5000 (against 40-digit values).
 *
 * @param x - positive
 * @throws KineticsError `bad-option` where x is not a positive finite number
 * @source abramowitz-stegun-1964 5.1.11, 5.1.22
 */
export function scaledPOfX(x: number): number {
  checkX(x)
  return x < switchToFraction ? x * (1 - x * Math.exp(x) * exponentialIntegral1(x)) : fraction(x)
}

/** ln p(x); does not overflow or underflow. The slope d ln p/dx is -1/π(x). */
export function lnPOfX(x: number): number {
  return -x - 2 * Math.log(x) + Math.log(scaledPOfX(x))
}

/** p(x). Loses digits above x = 690 and is 0 above about 730, where the value leaves the range of double precision: take `lnPOfX` there. */
export function pOfX(x: number): number {
  return (Math.exp(-x) / x / x) * scaledPOfX(x)
}

const switchToFraction = 1
const eulerGamma = 0.5772156649015329

/** E₁(x) = -γ - ln x - Σ (-x)ᵏ/(k·k!) for 0 < x < 1. */
function exponentialIntegral1(x: number): number {
  let sum = -eulerGamma - Math.log(x)
  let power = 1
  for (let k = 1; k < 40; k++) {
    power *= -x / k
    const term = power / k
    sum -= term
    if (Math.abs(term) < Number.EPSILON * Math.abs(sum)) break
  }
  return sum
}

/**
 * The continued fraction from its far end, which rounds least. It starts from what the denominators tend to, k + x/2 + 1 + √(kx); the number of terms then
 * leaves a remainder below 2e-16 at x = 1 and far less above.
 */
function fraction(x: number): number {
  const terms = 10 + Math.ceil(75 / x)
  let denominator = terms + 0.5 * x + 1 + Math.sqrt(terms * x)
  for (let k = terms; k > 0; k--) denominator = x + 2 * k - (k * (k + 1)) / denominator
  return x / denominator
}

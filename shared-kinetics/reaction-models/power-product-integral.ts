/** A stretch inside 0 to 1. Each end is given by its distance from 0 and from 1, since one of the two may be too small to be had from the other. */
export interface Stretch {
  readonly from: number
  readonly to: number
  readonly oneMinusFrom: number
  readonly oneMinusTo: number
  /** to - from. */
  readonly width: number
}

/**
 * ∫ a^(-m) (1 - a)^(-n) da over a stretch: the incomplete beta function with any exponents, Infinity where it diverges at an end.
 *
 * Below 1/2 the power series of (1 - a)^(-n) is integrated term by term, above it that of a^(-m) in 1 - a; each gains a factor 2 a term, and no digits are lost
 * where the stretch is short.
 */
export function powerProductIntegral(m: number, n: number, { from, to, oneMinusFrom, oneMinusTo, width }: Stretch): number {
  if (to <= 0.5) return lowerHalf(m, n, from, to, width)
  if (from >= 0.5) return lowerHalf(n, m, oneMinusTo, oneMinusFrom, width)
  return lowerHalf(m, n, from, 0.5, 0.5 - from) + lowerHalf(n, m, oneMinusTo, 0.5, 0.5 - oneMinusTo)
}

/** The same for 0 <= from <= to <= 1/2: Σ (n)ₖ/k! ∫ a^(k - m) da. */
function lowerHalf(m: number, n: number, from: number, to: number, width: number): number {
  if (width === 0) return 0
  let sum = 0
  let coefficient = 1
  for (let k = 0; k < 2000; k++) {
    const power = integralOfPower(k - m, from, to, width)
    const term = coefficient * power
    sum += term
    if (coefficient === 0 || !Number.isFinite(sum)) break
    // Later terms fall at least by the ratio (n + k)/(k + 1)·to, once that is below 1.
    const ratio = (Math.abs(n + k) / (k + 1)) * to
    if (ratio < 0.9 && Math.abs(term) < 0.05 * Number.EPSILON * Math.abs(sum)) break
    coefficient *= (n + k) / (k + 1)
  }
  return sum
}

/** ∫ a^power da from `from` to `to`, without cancellation for a short stretch or a power near -1. */
function integralOfPower(power: number, from: number, to: number, width: number): number {
  const e = power + 1
  if (from === 0) return e > 0 ? to ** e / e : Number.POSITIVE_INFINITY
  const lnRatio = Math.log1p(width / from)
  return e === 0 ? lnRatio : (to ** e * -Math.expm1(-e * lnRatio)) / e
}

import { lnPOfX, scaledPOfX } from './p-of-x.ts'

/**
 * Doyle's a(x) = -log10 p(x), x = Ea/(RT), computed exactly (relative error below 1e-15 of max(1, |a|)) instead of read from the rounded table that ASTM E1641
 * prints for 8 <= x <= 60.
 *
 * @throws KineticsError `bad-option` where x is not a positive finite number
 * @source doyle-1962
 * @source astm-e1641 (a of the pre-exponential factor)
 */
export function doyleA(x: number): number {
  return -lnPOfX(x) / Math.LN10
}

/**
 * The exact slope b(x) = -d log10 p/dx = 1/(ln 10·π(x)), π(x) = x² eˣ p(x): 0.51477 at x = 10, 0.46239 at 30.
 *
 * This is NOT what the b column of ASTM E1641 holds: see `doyleTableSlope`.
 *
 * @throws KineticsError `bad-option` where x is not a positive finite number
 * @source doyle-1962
 */
export function doyleSlope(x: number): number {
  return 1 / (Math.LN10 * scaledPOfX(x))
}

/**
 * The slope as the table of ASTM E1641 holds it: at whole x the backward difference a(x) - a(x - 1), between whole numbers a straight line. It is the slope half
 * a unit below x, so that Ea refined with it comes out lower than with the derivative: by 0.76 % at x = 10, 0.23 % at 20, 0.11 % at 30, 0.03 % at 60.
 *
 * Computed from exact a(x), which the printed columns follow to about one unit of their last digit.
 *
 * @param x - Ea/(RT) >= 2; the printed table runs from 8 to 60. Below 2 the difference reaches for a(0), which is infinite: NaN
 * @throws KineticsError `bad-option` where x is not a positive finite number
 * @source astm-e1641 (table of a and b; printed digits remembered, not re-read)
 */
export function doyleTableSlope(x: number): number {
  const below = Math.floor(x)
  const share = x - below
  if (x > 0 && below < 2) return Number.NaN
  const slope = backwardDifference(below)
  return share === 0 ? slope : slope + share * (backwardDifference(below + 1) - slope)
}

/** a(n) - a(n - 1) from the parts of ln p, since the difference of two a loses digits where they are large. */
function backwardDifference(n: number): number {
  return (1 - 2 * Math.log1p(-1 / n) - Math.log(scaledPOfX(n) / scaledPOfX(n - 1))) / Math.LN10
}

import { KineticsError } from '../errors.ts'

/**
 * Probability that a standard normal variable is at most `z`. Relative error below 2e-14 (against 40-digit values) down to where it underflows (z = -38).
 *
 * Near the middle by the series of positive terms φ(z)(z + z³/3 + z⁵/15 + …), in the tails by the continued fraction φ(z)/(z + 1/(z + 2/(z + …))).
 *
 * @source abramowitz-stegun-1964 26.2.11, 26.2.14
 */
export function normalProbability(z: number): number {
  if (Number.isNaN(z)) return Number.NaN
  const distance = Math.abs(z)
  if (distance < switchOfMethod) return 0.5 + Math.sign(z) * shareBetweenZeroAnd(distance)
  const tail = exponential(distance) * tailOverExponential(distance)
  return z < 0 ? tail : 1 - tail
}

/**
 * Quantile of the standard normal distribution: the z below which a share `probability` of it lies.
 *
 * Newton's method, between the quartiles on the share between 0 and z, in the tails on ln P, which is concave in z.
 *
 * @param probability - inside (0, 1)
 * @throws KineticsError `bad-option` outside it
 * @source abramowitz-stegun-1964 26.2
 */
export function normalQuantile(probability: number): number {
  if (!(probability > 0 && probability < 1)) {
    throw new KineticsError('bad-option', `A quantile needs a probability between 0 and 1, not ${probability}.`, { probability })
  }
  const fromMedian = probability - 0.5
  if (Math.abs(fromMedian) < 0.25) return Math.sign(fromMedian) * solveInside(Math.abs(fromMedian))
  return Math.sign(fromMedian) * solveOutside(Math.min(probability, 1 - probability))
}

const switchOfMethod = 2.5
const density0 = 1 / Math.sqrt(2 * Math.PI)

function solveInside(share: number): number {
  let z = share / density0
  for (let k = 0; k < 50; k++) {
    const step = (share - shareBetweenZeroAnd(z)) / (density0 * Math.exp(-0.5 * z * z))
    z += step
    if (Math.abs(step) <= 2 * Number.EPSILON * z) break
  }
  return z
}

function solveOutside(tail: number): number {
  const lnTarget = Math.log(tail)
  // Right of the root, since the tail is below exp(-z²/2): Newton's steps then come down from one side.
  let z = Math.sqrt(-2 * lnTarget)
  for (let k = 0; k < 50; k++) {
    const lnDensity = -0.5 * z * z
    const scaled = z < switchOfMethod ? (0.5 - shareBetweenZeroAnd(z)) / Math.exp(lnDensity) : tailOverExponential(z)
    const step = (lnDensity + Math.log(scaled) - lnTarget) * (scaled / density0)
    z += step
    if (Math.abs(step) <= 2 * Number.EPSILON * z) break
  }
  return z
}

/** exp(-z²/2) with the square split at a short number, whose own square is exact: rounding z² whole would cost 300 units in the last place at z = 26. */
function exponential(z: number): number {
  if (z > 40) return 0
  const short = Math.round(z * 64) / 64
  return Math.exp(-0.5 * short * short) * Math.exp(-0.5 * (z - short) * (z + short))
}

/** Φ(z) - 1/2 for 0 <= z < 2.5. */
function shareBetweenZeroAnd(z: number): number {
  let term = z
  let sum = z
  for (let k = 1; term > sum * 1e-17 && k < 200; k++) {
    term *= (z * z) / (2 * k + 1)
    sum += term
  }
  return sum * density0 * Math.exp(-0.5 * z * z)
}

/** (1 - Φ(z)) / exp(-z²/2) for z >= 2.5, the continued fraction from its far end; 120 terms leave no error in double precision at 2.5. */
function tailOverExponential(z: number): number {
  let rest = z
  for (let k = 120; k >= 1; k--) rest = z + k / rest
  return density0 / rest
}

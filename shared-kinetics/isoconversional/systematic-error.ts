import { bracketedRoot } from '../numerics/root.ts'
import { scaledPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'

/** What an approximate integral method takes for ln p(x), up to a constant: -s ln x - B x. Its line is ln(beta/Tˢ) against 1/T with slope -B Ea/R. */
export interface ApproximateIntegral {
  /** s, the power of T. */
  readonly temperatureExponent: number
  /** B, by which the slope is divided. */
  readonly divisor: number
}

/**
 * Error of the apparent Ea, as a share of the true Ea, of a method that puts ln(beta/Tˢ) against 1/T and divides the slope by B:
 *
 *   E_app/Ea - 1 = (h(x) - s/x)/B - 1,   h(x) = -d ln p/dx = 1/π(x),   x = Ea/(RT) of the TRUE Ea
 *
 * Exact for error-free data of one reaction at heating rates that lie close together; Friedman and exact integration have none. -4.76 % for KAS (s = 2, B = 1) at
 * x = 5, -0.42 % at 20; +12.7 % for OFW (0, 1.052) at 10.
 *
 * @throws KineticsError `bad-option` where x is not a positive finite number
 * @source ictac-2011
 */
export function systematicErrorAtTrueX(x: number, { temperatureExponent, divisor }: ApproximateIntegral): number {
  return (1 / scaledPOfX(x) - temperatureExponent / x) / divisor - 1
}

/**
 * The x = Ea/(RT) of the true Ea from that of the apparent one: the root of (x h(x) - s)/B = x_app.
 *
 * x h(x) = 1/(eˣ E₂(x)) rises strictly from 1 at x = 0, and lies between x + 1 and x + 2, since eˣ E₂(x) = ∫₁^∞ e^(-x(u - 1))/u² du falls strictly. So the root is
 * there, and the only one, for every x_app > (1 - s)/B; at or below that no positive Ea can show the apparent value, and the answer is NaN, as it is for an
 * x_app that is not finite.
 *
 * @param apparentX - E_app/(RT)
 */
export function trueXOf(apparentX: number, { temperatureExponent, divisor }: ApproximateIntegral): number {
  const target = divisor * apparentX + temperatureExponent
  if (!(target > 1) || !Number.isFinite(target)) return Number.NaN
  // Where the target is large its bounds are rounded, so that they are set a little apart.
  const lower = Math.max((target - 2) * (1 - 1e-14), smallestX)
  const upper = (target - 1) * (1 + 1e-14)
  if (!(upper > lower)) return Number.NaN
  const rise = (x: number): number => x / scaledPOfX(x) - target
  const { x } = bracketedRoot(rise, lower, upper)
  return x
}

/** Below it the root cannot be told from 0 in double precision: x h(x) - 1 is then about x ln(1/x). */
const smallestX = 1e-12

/**
 * Error of an apparent Ea by the method's own temperature integral, as a share of the true Ea: +0.02 means that the true Ea is the apparent one divided by 1.02.
 *
 * The true x is found first (`trueXOf`), since the error belongs to that. For heating rates that lie apart, T stands for the runs best as 1/mean(1/T).
 *
 * @param apparentEnergy_J_per_mol - Ea as the method gave it
 * @param temperature_K - where the runs reach the level
 * @returns NaN where no positive Ea can show the apparent one, or where an argument is NaN
 * @source ictac-2011
 */
export function systematicErrorOf(apparentEnergy_J_per_mol: number, temperature_K: number, integral: ApproximateIntegral): number {
  const apparentX = apparentEnergy_J_per_mol / (gasConstant_J_per_mol_K * temperature_K)
  return apparentX / trueXOf(apparentX, integral) - 1
}

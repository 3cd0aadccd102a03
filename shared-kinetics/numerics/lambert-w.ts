import { KineticsError } from '../errors.ts'

/**
 * Lambert's function of an exponential: w = W₀(e^z), the root of w + ln w = z. Taken by the logarithm of its argument, so that nothing overflows.
 *
 * Newton's method on w + ln w - z, from z - ln z above 1 and from e^z below; the function is concave in w, so that the steps close in from below.
 * Relative error below 1e-15·(1 + |z|) for -700 < z < 1e6 (against 40-digit values).
 *
 * @throws KineticsError `not-finite` where z is not a finite number
 */
export function lambertWOfExp(z: number): number {
  if (!Number.isFinite(z))
    throw new KineticsError('not-finite', `Lambert's function needs a finite logarithm of its argument, not ${z}.`, { z })
  let w = z > 1 ? z - Math.log(z) : Math.exp(Math.min(z, 1)) / (1 + Math.exp(Math.min(z, 1)))
  for (let i = 0; i < 50; i++) {
    const step = (w * (z - w - Math.log(w))) / (1 + w)
    w += step
    if (Math.abs(step) <= 2 * Number.EPSILON * w) break
  }
  return w
}

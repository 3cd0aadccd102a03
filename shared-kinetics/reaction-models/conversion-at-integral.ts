import type { ReactionModel } from './model.ts'

/**
 * The conversion at which g(alpha) has a value: g⁻¹, to the rounding of g. Where g counts from alpha = 0, values below 0 give 0 (the reaction has not begun), and values
 * from g(1) on give 1. By Newton's method on g(alpha) - value, whose slope is 1/f(alpha), inside a bracket that begins with 0 and 1; a step that would leave it, or is
 * not half as long as the one before, is a bisection.
 *
 * @param near - a conversion close to it, for speed only
 */
export function conversionAtIntegral(model: ReactionModel, value: number, near = 0.5): number {
  if (Number.isNaN(value)) return Number.NaN
  if (model.gZeroAt === 0 && value <= 0) return 0
  if (value >= model.g(1)) return 1
  let [low, high] = [0, 1]
  let alpha = near > 0 && near < 1 ? near : 0.5
  let stepBefore = 1
  for (let k = 0; k < mostSteps; k++) {
    const excess = model.g(alpha) - value
    if (excess === 0) return alpha
    if (excess < 0) low = alpha
    else high = alpha
    const f = model.f(alpha)
    let next = alpha - excess * f
    // Beside alpha = 1, where g runs away, a step may be short far from the root.
    const isNear = Math.abs(excess) <= 1e-3 * (1 + Math.abs(value))
    // As far as the rounding of alpha and of g goes.
    if (isNear && Math.abs(next - alpha) <= 2 * Number.EPSILON * (alpha + Math.min(1, Math.abs(value) * f)))
      return Math.min(high, Math.max(low, next))
    // alpha itself is an end of the bracket, so that a step of nothing is a bisection too.
    if (!(next > low && next < high) || Math.abs(next - alpha) > 0.5 * stepBefore) next = 0.5 * (low + high)
    if (next === alpha) return alpha
    stepBefore = Math.abs(next - alpha)
    alpha = next
  }
  return alpha
}

/** Bisection alone needs so many for the smallest conversion a number can hold. */
const mostSteps = 1200

import { bracketedRoot } from '../numerics/root.ts'
import type { ReactionModel } from './model.ts'

/**
 * The conversion at which z(alpha) = f(alpha) g(alpha) is highest, where f'(alpha) g(alpha) = -1: the conversion at the reaction-rate peak of a run at constant
 * heating rate, in the limit of large Ea/(RT). 0.632 for first order and every Avrami–Erofeev model, 0.704 for R3 and D3.
 *
 * @returns NaN for a model without such a peak (rate without decline, or g not counted from alpha = 0)
 * @source malek-1992
 */
export function conversionAtHighestZ(model: ReactionModel): number {
  if (model.gZeroAt !== 0) return Number.NaN
  return onlyRoot((alpha) => model.dfDalpha(alpha) * model.g(alpha) + 1)
}

/**
 * The conversion at which y(alpha), which goes as f(alpha), is highest: 0 for models whose rate declines from the start, 1 for those that only accelerate,
 * m/(m + n) for SB(m, n).
 *
 * @returns NaN for a constant f
 * @source malek-1992
 */
export function conversionAtHighestY(model: ReactionModel): number {
  const slopeAtStart = model.dfDalpha(closest)
  const slopeAtEnd = model.dfDalpha(1 - closest)
  if (slopeAtStart === 0 && slopeAtEnd === 0) return Number.NaN
  if (slopeAtStart <= 0) return 0
  if (slopeAtEnd >= 0) return 1
  return onlyRoot(model.dfDalpha)
}

const closest = 1e-12

/** A root between the ends, which may themselves be infinite. */
function onlyRoot(function_: (alpha: number) => number): number {
  return bracketedRoot(function_, closest, 1 - closest).x
}

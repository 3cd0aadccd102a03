import type { SourceKey } from '../sources.ts'

/**
 * A reaction model: dalpha/dt = k f(alpha), and g(alpha) = ∫ dalpha/f(alpha), so that g(alpha) = k t at constant temperature and g' f = 1 everywhere.
 *
 * The functions take alpha from 0 to 1, keep full relative accuracy to both ends (1 - alpha enters through log1p and expm1 only), and give the limit at the ends,
 * Infinity where there is one. Outside 0 to 1 they give NaN.
 */
export interface ReactionModel {
  /** Short name of the trade, e.g. `A2`, `RO(1.5)`. */
  readonly code: string
  readonly label: string
  /** f(alpha) and g(alpha) as they are to be read; L stands for -ln(1 - alpha). */
  readonly equations: { readonly f: string; readonly g: string }
  readonly f: (alpha: number) => number
  readonly dfDalpha: (alpha: number) => number
  readonly g: (alpha: number) => number
  /** The conversion at which g is 0: 0, but 0.5 for models whose rate starts from nothing, so that ∫ dalpha/f from 0 is infinite. */
  readonly gZeroAt: 0 | 0.5
  /** How f is scaled where tables differ: a factor c in f goes into A, which is then smaller by c. Empty where all agree. */
  readonly normalisation: string
  readonly sources: readonly SourceKey[]
}

/** The three functions of a model are asked for alpha from 0 to 1 only; outside they give NaN. */
export function withinRange(model: ReactionModel): ReactionModel {
  return { ...model, f: watched(model.f), dfDalpha: watched(model.dfDalpha), g: watched(model.g) }
}

const watched =
  (function_: (alpha: number) => number): ((alpha: number) => number) =>
  (alpha) =>
    alpha >= 0 && alpha <= 1 ? function_(alpha) : Number.NaN

/** L = -ln(1 - alpha), accurate for small alpha. */
export const lnInverseRest = (alpha: number): number => -Math.log1p(-alpha)

/** 1 - (1 - alpha)^power, accurate for small alpha. */
export const restPowerFromOne = (alpha: number, power: number): number => -Math.expm1(power * Math.log1p(-alpha))

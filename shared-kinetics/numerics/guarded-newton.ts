/** Outcome of a search for a root from a start. `x` is NaN unless `converged`. */
export interface GuardedNewtonResult {
  /** `converged`; `outside`: f still has the sign of the start at the end of the range towards which it falls off; `iteration-limit`. */
  readonly status: 'converged' | 'outside' | 'iteration-limit'
  readonly x: number
  readonly evaluations: number
}

export interface GuardedNewtonOptions {
  readonly lower: number
  readonly upper: number
  /** Stop when a step is smaller than this share of |x|. */
  readonly relativeTolerance: number
  readonly mostEvaluations?: number
}

/**
 * The root of f next to `start` by Newton's method, kept between points of unlike sign. As long as f was seen with one sign only, a step goes at most twice as far from the
 * start as the last one, and never out of [lower, upper]; once both signs were seen the root is bracketed, and a step that would leave the bracket, or is not half as
 * small as the one before, is a bisection.
 * A value or slope that is not finite counts by its sign, and is followed by a bisection.
 *
 * @param f - value and slope; the slope may be approximate, which costs steps, not digits
 */
export function guardedNewton(
  f: (x: number) => { readonly value: number; readonly slope: number },
  start: number,
  { lower, upper, relativeTolerance, mostEvaluations = 100 }: GuardedNewtonOptions,
): GuardedNewtonResult {
  let negative = Number.NaN
  let positive = Number.NaN
  let x = Math.min(upper, Math.max(lower, start))
  let stepBefore = Number.POSITIVE_INFINITY
  let reach = 0.05 * (upper - lower)
  for (let evaluations = 1; evaluations <= mostEvaluations; evaluations++) {
    const { value, slope } = f(x)
    if (value === 0) return { status: 'converged', x, evaluations }
    if (value < 0) negative = x
    else positive = x
    const bracketed = !Number.isNaN(negative) && !Number.isNaN(positive)
    const step = -value / slope
    let next = x + step
    if (Math.abs(step) <= relativeTolerance * Math.abs(x))
      return { status: 'converged', x: Math.min(upper, Math.max(lower, next)), evaluations }
    if (bracketed) {
      const inside = next > Math.min(negative, positive) && next < Math.max(negative, positive)
      if (!inside || Math.abs(step) > 0.5 * stepBefore) next = 0.5 * (negative + positive)
    } else {
      if (!Number.isFinite(step)) {
        // Nothing says which way to go: an end of the range may bracket the root.
        const end = endOfOtherSign(f, value, lower, upper)
        evaluations += 2
        if (end === undefined) return { status: 'outside', x: Number.NaN, evaluations }
        if (value < 0) positive = end
        else negative = end
        x = 0.5 * (x + end)
        continue
      }
      if (Math.abs(step) > reach) next = x + Math.sign(step) * reach
      reach *= 2
      next = Math.min(upper, Math.max(lower, next))
      if (next === x) return { status: 'outside', x: Number.NaN, evaluations }
    }
    stepBefore = Math.abs(next - x)
    if (stepBefore <= relativeTolerance * Math.abs(x)) return { status: 'converged', x: next, evaluations }
    x = next
  }
  return { status: 'iteration-limit', x: Number.NaN, evaluations: mostEvaluations }
}

const endOfOtherSign = (
  f: (x: number) => { readonly value: number; readonly slope: number },
  value: number,
  lower: number,
  upper: number,
): number | undefined => [lower, upper].find((edge) => f(edge).value < 0 !== value < 0)

/** Outcome of a search for a root. `x` is the best estimate, and NaN unless `converged`. */
export interface RootResult {
  /**
   * `converged`: the root lies within `tolerance` of `x`, or `f(x)` is exactly 0; `not-bracketed`: f has one sign at both ends; `not-finite`: f returned no
   * finite number; `iteration-limit`: neither within `mostEvaluations`.
   */
  readonly status: 'converged' | 'not-bracketed' | 'not-finite' | 'iteration-limit'
  readonly x: number
  readonly evaluations: number
}

export interface RootOptions {
  /** Stop when the bracket is narrower than this share of |x|; never below four units in the last place. */
  readonly relativeTolerance?: number
  /** Values of f at the ends, where the caller has them already. */
  readonly fLower?: number
  readonly fUpper?: number
  readonly mostEvaluations?: number
}

/**
 * A root of f inside [lower, upper], where f has opposite signs at the ends (Brent's method: inverse quadratic or linear interpolation, bisection where these do
 * not halve the bracket fast enough). The root stays bracketed throughout, so that convergence does not depend on a good start.
 *
 * @source brent-1973 chapter 4
 */
export function bracketedRoot(f: (x: number) => number, lower: number, upper: number, options: RootOptions = {}): RootResult {
  const { relativeTolerance = 0, mostEvaluations = 200 } = options
  let evaluations = 0
  const evaluate = (x: number): number => {
    evaluations++
    return f(x)
  }
  let a = lower
  let b = upper
  let fa = options.fLower ?? evaluate(a)
  let fb = options.fUpper ?? evaluate(b)
  if (!Number.isFinite(fa) || !Number.isFinite(fb)) return { status: 'not-finite', x: Number.NaN, evaluations }
  if (fa === 0) return { status: 'converged', x: a, evaluations }
  if (fb === 0) return { status: 'converged', x: b, evaluations }
  if (fa > 0 === fb > 0) return { status: 'not-bracketed', x: Number.NaN, evaluations }

  // b is the best estimate, c the end on the other side of the root, a the estimate before b.
  let c = a
  let fc = fa
  let step = b - a
  let stepBefore = step
  for (;;) {
    if (fb > 0 === fc > 0) {
      c = a
      fc = fa
      step = b - a
      stepBefore = step
    }
    if (Math.abs(fc) < Math.abs(fb)) {
      a = b
      b = c
      c = a
      fa = fb
      fb = fc
      fc = fa
    }
    const tolerance = Math.max(2 * Number.EPSILON, 0.5 * relativeTolerance) * Math.abs(b)
    const half = 0.5 * (c - b)
    if (Math.abs(half) <= tolerance || fb === 0) return { status: 'converged', x: b, evaluations }
    if (evaluations >= mostEvaluations) return { status: 'iteration-limit', x: Number.NaN, evaluations }

    const trial = Math.abs(stepBefore) >= tolerance && Math.abs(fa) > Math.abs(fb) ? interpolate(a, b, c, fa, fb, fc) : Number.NaN
    if (trial * half > 0 && Math.abs(trial) < Math.min(1.5 * Math.abs(half) - 0.5 * tolerance, 0.5 * Math.abs(stepBefore))) {
      stepBefore = step
      step = trial
    } else {
      step = half
      stepBefore = half
    }
    a = b
    fa = fb
    b += Math.abs(step) > tolerance ? step : Math.sign(half) * tolerance
    fb = evaluate(b)
    if (!Number.isFinite(fb)) return { status: 'not-finite', x: Number.NaN, evaluations }
  }
}

/** Step from b to where the secant (a = c) or the inverse parabola through the three points crosses zero. */
function interpolate(a: number, b: number, c: number, fa: number, fb: number, fc: number): number {
  if (a === c) return ((b - a) * fb) / (fa - fb)
  const q = fa / fc
  const r = fb / fc
  const s = fb / fa
  return -(s * ((c - b) * q * (q - r) - (b - a) * (r - 1))) / ((q - 1) * (r - 1) * (s - 1))
}

import { type Descent, type DescentPoint, descentPoint, type InnerProblem, type Linearisation, linearise } from './levenberg-marquardt.ts'
import { normOf, solveUpper } from './qr.ts'

/** What the end of a descent is: see `LeastSquaresStatus`, of which these are the ones a single start can have. */
export type EndStatus = 'converged' | 'at-bound' | 'plateau' | 'singular' | 'saddle' | 'iteration-limit' | 'not-finite'

export interface JudgedEnd {
  readonly status: EndStatus
  readonly end: DescentPoint
  readonly linear: Linearisation
  readonly iterations: number
  /** Rounding of the norm of the residuals. */
  readonly rounding: number
}

/** Length of an undamped step, in parts of the parameters' sizes, that leaves nothing to gain once it stops shrinking. */
const settledLength = 1e-11
/** Parts of the residuals that may be left along the model's surface at a minimum (Bates and Watts' relative offset). */
const offsetTolerance = 1e-6
/** Parts of a parameter's size that an undamped step may still be at a minimum. */
const stepTolerance = 1e-6
/** Effect of a whole parameter on the model, in parts of the largest there is, below which it has none. */
const effectTolerance = 1e-10
/** Independence of the columns below which they are dependent, with a Jacobian from differences and an analytic one. */
const dependence = { differences: 1e-9, analytic: 1e-12 } as const

/**
 * Takes undamped Gauss–Newton steps from the end of a descent for as long as they shrink, keeps the point where they are shortest, and says what the end is.
 *
 * The sum of squares settles a minimum only to half the digits of double precision, the undamped step to nearly all of them. `converged` asks for all of: no
 * parameter without effect, columns of the Jacobian independent, residuals at right angles to the model's surface, an undamped step that moves no parameter, and a
 * sum of squares that rises to both sides along every principal direction (at right angles alone it may be a maximum).
 *
 * @source bates-watts-1981
 */
export function settleAndJudge(problem: InnerProblem, start: DescentPoint, descent: Descent): JudgedEnd {
  const { end, linear } = settle(problem, descent.end)
  const status = linear.finite ? statusOf(problem, start, end, linear, descent.reason) : 'not-finite'
  return { status, end, linear, iterations: descent.iterations, rounding: roundingOf(problem, end, linear) }
}

function settle(problem: InnerProblem, from: DescentPoint): { readonly end: DescentPoint; readonly linear: Linearisation } {
  let here = from
  let linear = linearise(problem, here, 'fine')
  let best = { end: here, linear }
  let bestLength = Number.POSITIVE_INFINITY
  let sinceBest = 0
  let last: { readonly point: Float64Array; readonly step: Float64Array } | null = null
  for (let k = 0; k < 40; k++) {
    if (!linear.finite || linear.free.length === 0 || linear.independence < toleratedDependence(problem)) break
    const sizes = problem.sizes(here.point)
    const step = new Float64Array(problem.n)
    undampedStep(linear).forEach((delta, position) => {
      step[linear.free[position] ?? 0] = delta
    })
    const length = normOf(step.map((delta, j) => delta / at(sizes, j)))
    if (length < 0.9 * bestLength) sinceBest = 0
    else if (++sinceBest > (bestLength < settledLength ? 0 : 3)) break
    if (length < bestLength) {
      bestLength = length
      best = { end: here, linear }
    }
    if (length < 2 * Number.EPSILON) break
    const mixed = last === null ? step : mixedStep(here.point, step, last, sizes)
    const point = here.point.map((x, j) => Math.min(Math.max(x + at(mixed, j), at(problem.lower, j)), at(problem.upper, j)))
    const next = descentPoint(problem, point)
    // Rounding of the sum of squares itself must not stop a step that the sum cannot see any more.
    if (next === null || next.norm > best.end.norm * (1 + 1e-9) + roundingOf(problem, here, linear)) break
    last = { point: here.point, step }
    here = next
    linear = linearise(problem, here, 'fine')
  }
  return best
}

/**
 * An undamped step mixed with the one before by Anderson's rule of depth one: s - γ(Δx + Δs), γ = s·Δs/Δs·Δs. Where the residuals are large and the model curved,
 * undamped steps swing about the minimum and hardly shrink; the mixture takes the swing out.
 *
 * @source anderson-1965
 */
function mixedStep(
  point: Float64Array,
  step: Float64Array,
  last: { readonly point: Float64Array; readonly step: Float64Array },
  sizes: Float64Array,
): Float64Array {
  const change = step.map((delta, j) => delta - at(last.step, j))
  const squared = change.reduce((sum, value, j) => sum + (value / at(sizes, j)) ** 2, 0)
  if (!(squared > 0)) return step
  const gamma = change.reduce((sum, value, j) => sum + (value * at(step, j)) / at(sizes, j) ** 2, 0) / squared
  return step.map((delta, j) => delta - gamma * (at(point, j) - at(last.point, j) + at(change, j)))
}

function statusOf(
  problem: InnerProblem,
  start: DescentPoint,
  end: DescentPoint,
  linear: Linearisation,
  reason: Descent['reason'],
): EndStatus {
  const { free, columnNorms } = linear
  const sizes = problem.sizes(end.point)
  const effects = free.map((j, k) => at(columnNorms, k) * at(sizes, j))
  const leastEffect = effectTolerance * Math.max(end.norm, ...effects)
  if (effects.some((effect) => !(effect > leastEffect))) return 'plateau'
  if (linear.independence < toleratedDependence(problem)) return problem.ranAway(start.point, end.point) ? 'plateau' : 'singular'
  const rounding = roundingOf(problem, end, linear)
  const tangent = normOf(linear.z)
  const step = undampedStep(linear)
  const moves = free.some((j, k) => Math.abs(at(step, k)) > stepTolerance * at(sizes, j))
  const settled = (tangent <= offsetTolerance * end.norm && !moves) || tangent <= rounding
  if (!settled) return reason === 'iteration-limit' ? 'iteration-limit' : 'plateau'
  if (end.norm > rounding && fallsToASide(problem, end, linear)) return 'saddle'
  return bounded(problem, end, linear) ? 'at-bound' : 'converged'
}

/**
 * Whether the mean of the sums of squares at both ends of a short step is below that at its middle, along a column of R⁻¹. By the linear model alone it would lie
 * above it by the square of the step's length.
 */
function fallsToASide(problem: InnerProblem, end: DescentPoint, linear: Linearisation): boolean {
  const n = linear.free.length
  return linear.free.some((_, direction) => {
    const unit = new Float64Array(n)
    unit[direction] = probeLength * end.norm
    const step = inCoordinates(linear, solveUpper(linear.r, linear.r.length / n, n, unit))
    const rises = [1, -1].map((sign) => {
      const point = Float64Array.from(end.point)
      linear.free.forEach((j, k) => {
        point[j] = at(point, j) + sign * at(step, k)
      })
      if (point.some((x, j) => x < at(problem.lower, j) || x > at(problem.upper, j))) return Number.NaN
      const there = descentPoint(problem, point)
      return there === null ? Number.NaN : (there.norm / end.norm - 1) * (there.norm / end.norm + 1)
    })
    // What is not to be had beyond a bound or the model's reach says nothing.
    return at(rises, 0) + at(rises, 1) < -1e-3 * probeLength ** 2
  })
}

/** Length of the step, in parts of the residuals: its square is far above the rounding of a sum of squares, its fourth power below it. */
const probeLength = 1e-3

/** Whether a parameter that is not held rests at a bound. */
function bounded(problem: InnerProblem, end: DescentPoint, { free }: Linearisation): boolean {
  return end.point.some((_, j) => !free.includes(j) && at(problem.lower, j) < at(problem.upper, j))
}

/** -R⁻¹z in the problem's coordinates, by position among the free ones. */
function undampedStep(linear: Linearisation): Float64Array {
  const n = linear.free.length
  return inCoordinates(linear, solveUpper(linear.r, n === 0 ? 0 : linear.r.length / n, n, linear.z)).map((value) => -value)
}

/** A vector in the order of R, in units of the columns, as one by position among the free coordinates. */
function inCoordinates({ order, columnNorms }: Linearisation, scaled: Float64Array): Float64Array {
  const vector = new Float64Array(scaled.length)
  order.forEach((k, position) => {
    vector[k] = at(scaled, position) / at(columnNorms, k)
  })
  return vector
}

const toleratedDependence = (problem: InnerProblem): number => (problem.jacobian === null ? dependence.differences : dependence.analytic)

/** Rounding of the residuals, from the size of what they are differences of. */
function roundingOf(problem: InnerProblem, here: DescentPoint, { free, columnNorms }: Linearisation): number {
  const sizes = problem.sizes(here.point)
  return 1e-13 * free.reduce((sum, j, k) => sum + at(columnNorms, k) * at(sizes, j), 0)
}

const at = (values: ArrayLike<number>, i: number): number => values[i] ?? Number.NaN

import { type Descent, type DescentPoint, descentPoint, type InnerProblem, type Linearisation, linearise } from './levenberg-marquardt.ts'
import { normOf, solveUpper } from './qr.ts'

/** What the end of a descent is: see `LeastSquaresStatus`, of which these are the ones a single start can have. */
export type EndStatus = 'converged' | 'at-bound' | 'plateau' | 'singular' | 'iteration-limit' | 'not-finite'

export interface JudgedEnd {
  readonly status: EndStatus
  readonly end: DescentPoint
  readonly linear: Linearisation
  readonly iterations: number
  /** Rounding of the norm of the residuals. */
  readonly rounding: number
}

/** Parts of the residuals that may be left along the model's surface at a minimum (Bates and Watts' relative offset). */
const offsetTolerance = 1e-6
/** Parts of a parameter's size that an undamped step may still be at a minimum. */
const stepTolerance = 1e-6
/** Effect of a whole parameter on the model, in parts of the largest there is, below which it has none. */
const effectTolerance = 1e-10
/** Independence of the columns below which they are dependent, with a Jacobian from differences and an analytic one. */
const dependence = { differences: 1e-9, analytic: 1e-12 } as const

/**
 * Takes undamped Gauss–Newton steps from the end of a descent for as long as they shrink, then says what the end is.
 *
 * The sum of squares settles a minimum only to half the digits of double precision, the undamped step to nearly all of them. That the steps shrink also proves a
 * true minimum: they contract only where the second derivatives of the sum of squares are positive. `converged` asks for all of: no parameter without effect, columns of the Jacobian
 * independent, residuals at right angles to the model's surface, and an undamped step that moves no parameter.
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
  let lastLength = Number.POSITIVE_INFINITY
  for (let k = 0; k < 30; k++) {
    if (!linear.finite || linear.free.length === 0 || linear.independence < toleratedDependence(problem)) break
    const step = undampedStep(linear)
    const sizes = problem.sizes(here.point)
    const length = normOf(step.map((delta, k) => delta / at(sizes, linear.free[k] ?? 0)))
    if (!(length < 0.9 * lastLength)) break
    const point = Float64Array.from(here.point)
    linear.free.forEach((j, k) => {
      point[j] = Math.min(Math.max(at(point, j) + at(step, k), at(problem.lower, j)), at(problem.upper, j))
    })
    const next = descentPoint(problem, point)
    // Rounding of the sum of squares itself must not stop a step that the sum cannot see any more.
    if (next === null || next.norm > here.norm * (1 + 1e-9) + roundingOf(problem, here, linear)) break
    here = next
    linear = linearise(problem, here, 'fine')
    lastLength = length
    if (length < 2 * Number.EPSILON) break
  }
  return { end: here, linear }
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
  return bounded(problem, end, linear) ? 'at-bound' : 'converged'
}

/** Whether a parameter that is not held rests at a bound. */
function bounded(problem: InnerProblem, end: DescentPoint, { free }: Linearisation): boolean {
  return end.point.some((_, j) => !free.includes(j) && at(problem.lower, j) < at(problem.upper, j))
}

/** -R⁻¹z in the problem's coordinates, by position among the free ones. */
export function undampedStep(linear: Linearisation): Float64Array {
  const { free, order, columnNorms, r } = linear
  const n = free.length
  const scaled = solveUpper(r, n === 0 ? 0 : r.length / n, n, linear.z)
  const step = new Float64Array(n)
  order.forEach((k, position) => {
    step[k] = -at(scaled, position) / at(columnNorms, k)
  })
  return step
}

const toleratedDependence = (problem: InnerProblem): number => (problem.jacobian === null ? dependence.differences : dependence.analytic)

/** Rounding of the residuals, from the size of what they are differences of. */
function roundingOf(problem: InnerProblem, here: DescentPoint, { free, columnNorms }: Linearisation): number {
  const sizes = problem.sizes(here.point)
  return 1e-13 * free.reduce((sum, j, k) => sum + at(columnNorms, k) * at(sizes, j), 0)
}

const at = (values: ArrayLike<number>, i: number): number => values[i] ?? Number.NaN

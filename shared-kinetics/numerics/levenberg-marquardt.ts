import { dampedStep, type ReducedProblem } from './damped-step.ts'
import { type DifferencePoint, differenceJacobian, type ResidualFunction } from './jacobian.ts'
import { normOf, qrInPlace } from './qr.ts'

/** A least-squares problem in the coordinates it is solved in: minimise ‖r(x)‖² for lower <= x <= upper. */
export interface InnerProblem {
  readonly m: number
  readonly n: number
  readonly residuals: ResidualFunction
  /** Column-major, out[j·m + i] = d r_i / d x_j. */
  readonly jacobian: ((point: Float64Array, out: Float64Array) => void) | null
  readonly lower: Float64Array
  readonly upper: Float64Array
  readonly sizes: (point: Float64Array) => Float64Array
  /** Whether a coordinate went so far from its start that the descent is following a valley without a floor. */
  readonly ranAway: (start: Float64Array, end: Float64Array) => boolean
  readonly checkCancelled: () => void
}

/** Where a descent stands: a point, the residuals and their norm. */
export interface DescentPoint {
  readonly point: Float64Array
  readonly residuals: Float64Array
  readonly norm: number
}

/** The Jacobian over the coordinates that are free at a point, reduced by QR. */
export interface Linearisation {
  readonly free: readonly number[]
  /** Norms of the columns of the free coordinates. */
  readonly columnNorms: Float64Array
  /** R in its upper triangle, m rows; column k belongs to free coordinate `order[k]`. */
  readonly r: Float64Array
  readonly order: Int32Array
  /** Qᵀ·residuals, its first `free.length` elements. */
  readonly z: Float64Array
  /** Least diagonal of R over the largest after scaling the columns to unit length: 0 where the columns are dependent. */
  readonly independence: number
  readonly finite: boolean
}

/** Point, residuals and norm; null where a residual is not finite. */
export function descentPoint(problem: InnerProblem, point: Float64Array): DescentPoint | null {
  const residuals = new Float64Array(problem.m)
  problem.residuals(point, residuals)
  const norm = normOf(residuals)
  return Number.isFinite(norm) && residuals.every(Number.isFinite) ? { point, residuals, norm } : null
}

/**
 * Linearises at a point. A coordinate at a bound counts as free only where the sum of squares falls inwards. Columns are scaled to unit length before QR, so that
 * the pivots and `independence` do not depend on units.
 */
export function linearise(problem: InnerProblem, here: DescentPoint, accuracy: 'quick' | 'fine'): Linearisation {
  const { m, n } = problem
  const whole = new Float64Array(m * n)
  if (problem.jacobian === null) {
    const at: DifferencePoint = { ...here, size: problem.sizes(here.point), lower: problem.lower, upper: problem.upper }
    differenceJacobian(problem.residuals, at, accuracy, whole)
  } else {
    problem.jacobian(here.point, whole)
  }
  problem.checkCancelled()
  const free: number[] = []
  for (let j = 0; j < n; j++) if (isFree(problem, here, whole, j)) free.push(j)
  const r = new Float64Array(m * free.length)
  const columnNorms = Float64Array.from(free, (j) => normOf(whole, j * m, m))
  free.forEach((j, k) => {
    const scale = 1 / (at(columnNorms, k) || 1)
    for (let i = 0; i < m; i++) r[k * m + i] = at(whole, j * m + i) * scale
  })
  const z = Float64Array.from(here.residuals)
  const order = qrInPlace(r, z, m, free.length, true)
  let independence = 1
  for (let k = 0; k < free.length; k++) independence = Math.min(independence, Math.abs(at(r, k * m + k)))
  return { free, columnNorms, r, order, z: z.slice(0, free.length), independence, finite: columnNorms.every(Number.isFinite) }
}

function isFree({ lower, upper, m }: InnerProblem, here: DescentPoint, jacobian: Float64Array, j: number): boolean {
  const x = at(here.point, j)
  const atLower = x <= at(lower, j)
  const atUpper = x >= at(upper, j)
  if (!atLower && !atUpper) return true
  if (atLower && atUpper) return false
  let slope = 0
  for (let i = 0; i < m; i++) slope += at(jacobian, j * m + i) * at(here.residuals, i)
  return atLower ? slope < 0 : slope > 0
}

/** Where a descent ended, and whether for want of iterations or of progress. */
export interface Descent {
  readonly end: DescentPoint
  readonly reason: 'no-progress' | 'iteration-limit' | 'jacobian-not-finite'
  readonly iterations: number
}

/**
 * Descends by Levenberg and Marquardt's method within a trust region ‖D δ‖ <= radius (Moré 1978). D holds the largest norm each column of the Jacobian has had.
 * Steps are cut off at the bounds; a coordinate at its bound takes no part until the sum of squares falls inwards. The descent goes on until a step can change
 * neither the point nor the sum of squares within double precision: whether that is a minimum is for `judge` to say.
 *
 * @param firstRadius - radius of the first trust region in parts of ‖D x‖
 * @source levenberg-1944
 * @source marquardt-1963
 * @source more-1978
 */
export function descend(problem: InnerProblem, start: DescentPoint, firstRadius: number, mostIterations: number): Descent {
  const { m, n } = problem
  const scale = new Float64Array(n)
  let here = start
  let radius = 0
  let damping = 0
  for (let iteration = 0; iteration < mostIterations; iteration++) {
    const linear = linearise(problem, here, 'quick')
    if (!linear.finite) return { end: here, reason: 'jacobian-not-finite', iterations: iteration }
    const { free, columnNorms, order } = linear
    free.forEach((j, k) => {
      scale[j] = Math.max(at(scale, j), at(columnNorms, k))
    })
    if (iteration === 0) {
      const sizes = problem.sizes(here.point)
      radius = firstRadius * (normOf(sizes.map((size, j) => size * (at(scale, j) || 1))) || 1)
    }
    // In the unit of each column: δ_j = step_k / columnNorm_j.
    const weight = Float64Array.from(order, (k) => (at(scale, free[k] ?? 0) || 1) / (at(columnNorms, k) || 1))
    const reduced: ReducedProblem = { r: linear.r, stride: m, n: free.length, z: linear.z, weight, fullRank: linear.independence > 1e-14 }
    let accepted = false
    for (let refused = 0; !accepted; refused++) {
      problem.checkCancelled()
      if (free.length === 0 || refused > mostRefusals) return { end: here, reason: 'no-progress', iterations: iteration }
      const damped = dampedStep(reduced, radius, damping)
      damping = damped.damping
      if (!(damped.length > 0 && damped.length < Number.POSITIVE_INFINITY))
        return { end: here, reason: 'no-progress', iterations: iteration }
      if (iteration === 0) radius = Math.min(radius, damped.length)
      const point = Float64Array.from(here.point)
      const taken = new Float64Array(free.length)
      let clipped = false
      order.forEach((k, position) => {
        const j = free[k] ?? 0
        const wanted = at(point, j) + at(damped.step, position) / (at(columnNorms, k) || 1)
        point[j] = Math.min(Math.max(wanted, at(problem.lower, j)), at(problem.upper, j))
        clipped ||= point[j] !== wanted
        taken[position] = (at(point, j) - at(here.point, j)) * (at(columnNorms, k) || 1)
      })
      const predicted = predictedFall(reduced, taken, here.norm)
      const next = descentPoint(problem, point)
      const ratio = next === null ? -1 : fallRatio(here.norm, next.norm, predicted)
      const length = clipped ? normOf(taken.map((value, k) => value * at(weight, k))) : damped.length
      if (ratio <= 0.25) {
        const cut = next === null || next.norm > 10 * here.norm ? 0.1 : 0.4
        radius = cut * Math.min(radius, 10 * length)
        damping /= cut
      } else if (damping === 0 || ratio >= 0.75) {
        radius = Math.max(radius, 2 * length)
        damping /= 2
      }
      if (next !== null && ratio > 1e-4) {
        accepted = true
        const fall = (here.norm - next.norm) / here.norm
        here = next
        if (fall <= 1e-15 && predicted <= 1e-15) return { end: here, reason: 'no-progress', iterations: iteration + 1 }
      } else if (stepIsLost(here.point, point) || (!clipped && predicted <= 1e-15) || Number.isNaN(predicted)) {
        return { end: here, reason: 'no-progress', iterations: iteration + 1 }
      }
    }
  }
  return { end: here, reason: 'iteration-limit', iterations: mostIterations }
}

/** 1 - ‖r + J δ‖²/‖r‖², from R and Qᵀr: -(2 z + R δ)·R δ/‖r‖². In parts of ‖r‖², which itself may overflow. */
function predictedFall({ r, stride, n, z }: ReducedProblem, step: Float64Array, norm: number): number {
  let fall = 0
  for (let i = 0; i < n; i++) {
    let change = 0
    for (let j = i; j < n; j++) change += at(r, j * stride + i) * at(step, j)
    fall -= ((2 * at(z, i) + change) / norm) * (change / norm)
  }
  return fall
}

/** Fall of the sum of squares over the fall that the linear model foretold; negative where the sum rose or nothing was foretold. */
function fallRatio(before: number, after: number, predicted: number): number {
  if (!(predicted > 0)) return -1
  return ((1 - after / before) * (1 + after / before)) / predicted
}

/** Each refusal shortens the trust region to 0.4 of itself or less: after so many, nothing is left of it. */
const mostRefusals = 100

/** Whether no coordinate moved by more than its rounding. */
function stepIsLost(from: Float64Array, to: Float64Array): boolean {
  return from.every((x, j) => Math.abs(at(to, j) - x) <= 2 * Number.EPSILON * Math.abs(x))
}

const at = (values: ArrayLike<number>, i: number): number => values[i] ?? Number.NaN

import { normOf, qrInPlace, solveUpper, solveUpperTransposed } from './qr.ts'

/** A linearised problem, reduced: minimise ‖z + R δ‖ over δ, R upper triangular (n × n, column-major with `stride` rows). */
export interface ReducedProblem {
  readonly r: Float64Array
  readonly stride: number
  readonly n: number
  /** First n elements of Qᵀ·residuals. */
  readonly z: Float64Array
  /** Weight of each coordinate of δ in its length ‖D δ‖, above 0, in the order of R. */
  readonly weight: Float64Array
  /** Whether R may be divided by: no diagonal element is negligible. */
  readonly fullRank: boolean
}

/** δ, the damping it was found with, and its length ‖D δ‖. */
export interface DampedStep {
  readonly step: Float64Array
  readonly damping: number
  readonly length: number
}

/**
 * The step of Levenberg and Marquardt no longer than `radius`: δ = argmin ‖z + R δ‖² + λ‖D δ‖², with λ = 0 where the undamped step is short enough, else with
 * ‖D δ‖ = radius to a tenth. λ by Newton's method on 1/‖D δ(λ)‖, kept inside a bracket (Moré); each damped system is solved by QR of [R; √λ D], never by RᵀR.
 *
 * @source levenberg-1944
 * @source marquardt-1963
 * @source more-1978
 */
export function dampedStep(problem: ReducedProblem, radius: number, firstDamping: number): DampedStep {
  const { n, r, stride, z, weight } = problem
  let lowest = 0
  if (problem.fullRank) {
    const undamped = stepOf(problem, 0)
    if (undamped.length <= 1.1 * radius) return undamped
    lowest = (undamped.length - radius) / radius / undamped.response
  }
  const gradient = new Float64Array(n)
  for (let j = 0; j < n; j++) {
    let sum = 0
    for (let i = 0; i <= j; i++) sum += at(r, j * stride + i) * at(z, i)
    gradient[j] = sum / at(weight, j)
  }
  const gradientLength = normOf(gradient)
  if (gradientLength === 0) return { step: new Float64Array(n), damping: 0, length: 0 }
  let highest = gradientLength / radius
  let damping = Math.min(Math.max(firstDamping, lowest), highest)
  if (damping === 0) damping = Math.max(0.001 * highest, Math.sqrt(lowest * highest))
  let trial = stepOf(problem, damping)
  for (let k = 0; k < 12; k++) {
    const excess = trial.length - radius
    if (Math.abs(excess) <= 0.1 * radius) break
    if (excess > 0) lowest = Math.max(lowest, damping)
    else highest = Math.min(highest, damping)
    const next = damping + excess / radius / trial.response
    damping = next > lowest && next < highest ? next : Math.max(0.001 * highest, Math.sqrt(lowest * highest))
    trial = stepOf(problem, damping)
  }
  return trial
}

/** The step for one damping, and how fast its length answers to it: -d ln‖D δ‖/dλ. */
function stepOf(problem: ReducedProblem, damping: number): DampedStep & { readonly response: number } {
  const { n, r, stride, z, weight } = problem
  const rows = 2 * n
  const stacked = new Float64Array(rows * n)
  const right = new Float64Array(rows)
  const root = Math.sqrt(damping)
  for (let j = 0; j < n; j++) {
    for (let i = 0; i <= j; i++) stacked[j * rows + i] = at(r, j * stride + i)
    stacked[j * rows + n + j] = root * at(weight, j)
    right[j] = -at(z, j)
  }
  if (damping > 0) qrInPlace(stacked, right, rows, n, false)
  const step = solveUpper(stacked, rows, n, right)
  const weighted = step.map((value, j) => value * at(weight, j))
  const length = normOf(weighted)
  // d‖Dδ‖/dλ = -‖R_λ⁻ᵀ D²δ‖²/‖Dδ‖
  const inner = solveUpperTransposed(
    stacked,
    rows,
    n,
    weighted.map((value, j) => (value * at(weight, j)) / length),
  )
  return { step, damping, length, response: normOf(inner) ** 2 }
}

const at = (values: ArrayLike<number>, i: number): number => values[i] ?? Number.NaN

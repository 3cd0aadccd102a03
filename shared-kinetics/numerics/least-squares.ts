import { KineticsError } from '../errors.ts'
import { type FitParameter, type ParameterSpace, parameterSpace } from './fit-parameter.ts'
import { fitCovariance } from './fit-covariance.ts'
import type { ResidualFunction } from './jacobian.ts'
import { type EndStatus, type JudgedEnd, settleAndJudge } from './judge-fit.ts'
import { descend, descentPoint, type InnerProblem } from './levenberg-marquardt.ts'
import { startsAround } from './starts-around.ts'

/** What a fit rests on. Residuals and Jacobian take the parameters in the units and order of `parameters`, log-scaled or not. */
export interface LeastSquaresProblem {
  readonly parameters: readonly FitParameter[]
  readonly residualCount: number
  /** Writes the residuals (weighted, where they are) into `out`; one that is not finite marks parameters the model cannot have. */
  readonly residuals: ResidualFunction
  /** Writes d residual_i / d parameter_j into `out[j·residualCount + i]`; without it central differences are taken. */
  readonly jacobian?: (parameters: Float64Array, out: Float64Array) => void
}

export interface LeastSquaresOptions {
  /** Further starts, in the order of the parameters. */
  readonly starts?: readonly (readonly number[])[]
  /** Further starts drawn around the first: see `startsAround`. */
  readonly drawnStarts?: { readonly count: number; readonly seed: number }
  /** Descents stop after so many iterations; 500 by default. */
  readonly mostIterations?: number
  /** `known`: residuals are already in parts of their standard deviations, and the covariance is not scaled by s². Default `estimated`. */
  readonly noise?: 'estimated' | 'known'
  readonly checkCancelled?: () => void
}

/**
 * - `converged`: a minimum, its parameters all determined.
 * - `at-bound`: a minimum within the bounds with at least one parameter at its bound; the others are given with that one held.
 * - `plateau`: the sum of squares has stopped falling where there is no minimum: a parameter has no effect any more, or runs away.
 * - `singular`: the sum of squares is least along a whole line of parameters; they cannot be told apart.
 * - `saddle`: the sum of squares is stationary but falls to a side: give another start.
 * - `false-minimum`: a minimum, but another start went lower without arriving anywhere.
 * - `iteration-limit`, `not-finite` (no start gives finite residuals and derivatives), `too-few-points`.
 */
export type LeastSquaresStatus = EndStatus | 'false-minimum' | 'too-few-points'

/** How one descent ended: a start has several where its first did not arrive. `parameters` and the sum are where it stopped, an answer only for `converged`. */
export interface DescentOutcome {
  readonly status: EndStatus
  readonly start: Float64Array
  readonly parameters: Float64Array
  readonly residualSumOfSquares: number
  readonly iterations: number
}

export interface LeastSquaresFit {
  readonly status: LeastSquaresStatus
  /** NaN unless `converged` or `at-bound`; so are all numbers below but `dof` and `descents`. */
  readonly parameters: Float64Array
  /** NaN for a parameter that is held or at a bound, and for all where dof is 0 and the noise is not known. */
  readonly standardDeviations: Float64Array
  /** n × n, symmetric, element (i, j) at i·n + j. */
  readonly covariance: Float64Array
  readonly atBound: readonly ('no' | 'lower' | 'upper' | 'held')[]
  /** Residuals less parameters that are not held. */
  readonly dof: number
  readonly residuals: Float64Array
  readonly residualSumOfSquares: number
  /** √(sum / dof); NaN for dof 0. */
  readonly residualStandardDeviation: number
  /** How all descents ended, in the order of the starts. */
  readonly descents: readonly DescentOutcome[]
  /** Starts that arrived at the answer, and those that arrived at another, higher minimum. */
  readonly startsThatAgree: number
  readonly startsThatDisagree: number
}

/** Radii of the first trust region, in parts of the parameters' own sizes, tried in turn until one start arrives. */
const firstRadii = [1, 100, 0.01] as const
/** Two ends are one minimum where their sums of squares agree to this. */
const sameMinimum = 1e-8

/**
 * Fits parameters by least squares: minimises Σ r_i(p)² from one start or several, by Levenberg and Marquardt's method in a trust region (`descend`), ends it with
 * undamped Gauss–Newton steps, and judges the end (`settleAndJudge`). Of several starts the lowest minimum is the answer.
 *
 * Covariance s²(JᵀJ)⁻¹ by QR of the Jacobian with its columns scaled, s² = Σ r²/(m - n). For a log-scaled parameter p its standard deviation is p times that of ln p.
 *
 * One start cannot know of a lower minimum elsewhere: give several where the model is not nearly linear. What is no minimum is never given as an answer.
 *
 * @throws KineticsError `bad-option` for starts outside the bounds or of the wrong length
 * @source levenberg-1944
 * @source marquardt-1963
 * @source more-1978
 * @source bates-watts-1981
 */
export function leastSquares(problem: LeastSquaresProblem, options: LeastSquaresOptions = {}): LeastSquaresFit {
  const space = parameterSpace(problem.parameters)
  const inner = innerProblem(problem, space, options.checkCancelled ?? (() => {}))
  const dof = problem.residualCount - space.held.filter((held) => !held).length
  if (dof < 0) return withoutAnswer('too-few-points', problem, dof, [])

  const given = [problem.parameters.map(({ start }) => start), ...(options.starts ?? [])]
  for (const start of options.starts ?? []) assertStart(problem.parameters, start)
  const drawn = options.drawnStarts
  const starts = drawn ? [...given, ...startsAround(problem.parameters, drawn.count, drawn.seed)] : given
  const judged = starts.flatMap((start) => fromStart(inner, space.toInner(start), options.mostIterations ?? 500))
  const outcomes = judged.map(({ startPoint, judgement }): DescentOutcome => {
    const end = judgement?.end
    return {
      status: judgement?.status ?? 'not-finite',
      start: space.toOuter(startPoint),
      parameters: end ? space.toOuter(end.point) : none(space.n),
      residualSumOfSquares: end ? end.norm ** 2 : Number.NaN,
      iterations: judgement?.iterations ?? 0,
    }
  })

  const ends = judged.flatMap(({ judgement }) => (judgement === null ? [] : [judgement]))
  const minima = ends.filter(({ status }) => isMinimum(status))
  const best = lowest(minima)
  if (best === null) return withoutAnswer(lowest(ends)?.status ?? 'not-finite', problem, dof, outcomes)
  const isSame = (other: JudgedEnd): boolean => other.end.norm - best.end.norm <= sameMinimum * best.end.norm + best.rounding
  if (ends.some((other) => !isMinimum(other.status) && best.end.norm - other.end.norm > sameMinimum * best.end.norm + best.rounding)) {
    return withoutAnswer('false-minimum', problem, dof, outcomes)
  }
  const agree = minima.filter(isSame).length
  const sum = best.end.norm ** 2
  const residualStandardDeviation = dof > 0 ? Math.sqrt(sum / dof) : Number.NaN
  return {
    status: best.status,
    parameters: space.toOuter(best.end.point),
    ...fitCovariance(best, space, options.noise === 'known' ? 1 : residualStandardDeviation),
    dof,
    residuals: best.end.residuals,
    residualSumOfSquares: sum,
    residualStandardDeviation,
    descents: outcomes,
    startsThatAgree: agree,
    startsThatDisagree: minima.length - agree,
  }
}

const isMinimum = (status: EndStatus): boolean => status === 'converged' || status === 'at-bound'

function lowest(ends: readonly JudgedEnd[]): JudgedEnd | null {
  return ends.reduce<JudgedEnd | null>((best, end) => (best === null || end.end.norm < best.end.norm ? end : best), null)
}

/** All ends one start leads to: one for each radius that was tried, the last one the first that is a minimum. */
function fromStart(
  problem: InnerProblem,
  startPoint: Float64Array,
  mostIterations: number,
): { readonly startPoint: Float64Array; readonly judgement: JudgedEnd | null }[] {
  const start = descentPoint(problem, startPoint)
  if (start === null) return [{ startPoint, judgement: null }]
  const ends: { readonly startPoint: Float64Array; readonly judgement: JudgedEnd }[] = []
  for (const radius of firstRadii) {
    const judgement = settleAndJudge(problem, start, descend(problem, start, radius, mostIterations))
    ends.push({ startPoint, judgement })
    if (isMinimum(judgement.status)) break
  }
  return ends
}

function innerProblem(problem: LeastSquaresProblem, space: ParameterSpace, checkCancelled: () => void): InnerProblem {
  const m = problem.residualCount
  const outer = problem.jacobian
  return {
    m,
    n: space.n,
    residuals: (point, out) => problem.residuals(space.toOuter(point), out),
    jacobian: outer
      ? (point, out) => {
          outer(space.toOuter(point), out)
          space.slopes(point).forEach((slope, j) => {
            for (let i = j * m; i < (j + 1) * m; i++) out[i] = (out[i] ?? Number.NaN) * slope
          })
        }
      : null,
    lower: space.lower,
    upper: space.upper,
    sizes: space.sizes,
    ranAway: space.ranAway,
    checkCancelled,
  }
}

function assertStart(parameters: readonly FitParameter[], start: readonly number[]): void {
  if (start.length !== parameters.length) {
    throw new KineticsError('bad-option', `A start needs ${parameters.length} values, one for each parameter; it has ${start.length}.`, {
      values: start.length,
    })
  }
  parameterSpace(parameters.map((parameter, j) => ({ ...parameter, start: start[j] ?? Number.NaN })))
}

const none = (length: number): Float64Array => new Float64Array(length).fill(Number.NaN)

function withoutAnswer(
  status: LeastSquaresStatus,
  problem: LeastSquaresProblem,
  dof: number,
  descents: readonly DescentOutcome[],
): LeastSquaresFit {
  const n = problem.parameters.length
  return {
    status,
    parameters: none(n),
    standardDeviations: none(n),
    covariance: none(n * n),
    atBound: problem.parameters.map(() => 'no'),
    dof,
    residuals: none(problem.residualCount),
    residualSumOfSquares: Number.NaN,
    residualStandardDeviation: Number.NaN,
    descents,
    startsThatAgree: 0,
    startsThatDisagree: 0,
  }
}

import { studentTQuantile } from '../numerics/student-t.ts'
import { arrheniusLine } from './arrhenius-line.ts'
import type { RateConstantPoint } from './rate-constant-point.ts'

/** Whether the points bend away from their line. */
export interface LineCurvature {
  /** `not-testable`: fewer than four points or three distinct temperatures, or points that lie on their line within rounding. */
  readonly status: 'tested' | 'not-testable'
  /** t of a quadratic term in 1/T, n - 3 degrees of freedom; positive: ln k lies above its line at both ends, so Ea rises with temperature. */
  readonly t: number
  /** t(0.975; n - 3): a |t| beyond it has a chance of at most 5 % on a straight line. */
  readonly threshold: number
  readonly dof: number
  readonly isCurved: boolean
}

/**
 * Student-t test of a quadratic term: ln k = a + b (x - x̄) + c (x - x̄)², x = 1/T, against c = 0. The square is made orthogonal to constant and line first, so
 * that c comes from the residuals alone: c = Σ q r/Σ q², with n - 3 degrees of freedom.
 *
 * A bend is what a change of mechanism or phase, or a physical process that limits the rate, looks like; a straight line does not exclude them.
 *
 * @throws KineticsError `not-finite`, naming the row, where k or T is not above 0
 * @source draper-smith-1998
 */
export function lineCurvature(points: readonly RateConstantPoint[]): LineCurvature {
  const line = arrheniusLine(points)
  const dof = points.length - 3
  const none: LineCurvature = { status: 'not-testable', t: Number.NaN, threshold: Number.NaN, dof: Math.max(dof, 0), isCurved: false }
  // Below a billionth, scatter is the rounding of the numbers.
  if (line.status !== 'ok' || dof < 1 || line.residualStandardDeviation < 1e-9) return none
  const z = points.map((point) => 1 / point.temperature - line.fit.xMean)
  const spread = Math.max(...z.map(Math.abs))
  const scaled = z.map((value) => value / spread)
  const sum = (term: (value: number) => number): number => scaled.reduce((total, value) => total + term(value), 0)
  const meanSquare = sum((v) => v ** 2) / points.length
  const skew = sum((v) => v ** 3) / sum((v) => v ** 2)
  const q = scaled.map((v) => v ** 2 - meanSquare - skew * v)
  const qq = q.reduce((total, v) => total + v ** 2, 0)
  if (!(qq > 1e-12)) return none
  const c = q.reduce((total, v, i) => total + v * (line.residual[i] ?? Number.NaN), 0) / qq
  const rest = Math.max(line.fit.residualSumOfSquares - c ** 2 * qq, 0)
  const t = c / Math.sqrt(rest / dof / qq)
  const threshold = studentTQuantile(0.975, dof)
  return { status: 'tested', t, threshold, dof, isCurved: Math.abs(t) > threshold }
}

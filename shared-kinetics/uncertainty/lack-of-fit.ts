import type { LevelPoints } from '../isoconversional/result.ts'
import { fUpperTail } from '../numerics/f-distribution.ts'

export interface LackOfFit {
  /** Distinct programmes less 2. */
  readonly dofLackOfFit: number
  /** Runs less distinct programmes. */
  readonly dofPureError: number
  readonly F: number
  /** Probability of an F as large or larger where the line holds. */
  readonly p: number
}

/**
 * Tests a regression against the pure error of replicates: with residuals rᵢ from the line and r̄_g their means over the runs of one programme g, n runs and G programmes,
 *
 *   F = [Σ_g n_g r̄_g²/(G - 2)] / [Σ_g Σ_{i in g}(rᵢ - r̄_g)²/(n - G)],   p = P(F(G - 2, n - G) > F).
 *
 * Replicates of a run do not reach a level at quite the same 1/T: they count as approximate repeats, compared by their residuals, which have the slope of the common line taken
 * out. Both sums together are the residual sum of squares. For a minimising method the regression is the one linearised at the minimum.
 *
 * @param residual - one a run; of one level, or the runs' means over several levels
 * @param programmeGroup - one a run; runs of one programme share a number
 * @returns null without replicates, or with fewer than three distinct programmes
 * @source draper-smith-1998
 */
export function lackOfFit(residual: ArrayLike<number>, programmeGroup: readonly number[]): LackOfFit | null {
  const groups = new Map<number, number[]>()
  programmeGroup.forEach((group, i) => groups.set(group, [...(groups.get(group) ?? []), residual[i] ?? Number.NaN]))
  const dofLackOfFit = groups.size - 2
  const dofPureError = programmeGroup.length - groups.size
  if (dofLackOfFit < 1 || dofPureError < 1) return null
  let pureError = 0
  let lack = 0
  for (const members of groups.values()) {
    const mean = members.reduce((sum, value) => sum + value, 0) / members.length
    lack += members.length * mean * mean
    for (const value of members) pureError += (value - mean) ** 2
  }
  const F = lack / dofLackOfFit / (pureError / dofPureError)
  return { dofLackOfFit, dofPureError, F, p: Number.isNaN(F) ? Number.NaN : fUpperTail(F, dofLackOfFit, dofPureError) }
}

/** Residuals of the runs averaged over levels: what a run's own error leaves, and the noise of single levels does not. */
export function meanResiduals(points: readonly LevelPoints[]): Float64Array {
  const mean = new Float64Array(points[0]?.residual.length ?? 0)
  for (const { residual } of points) residual.forEach((value, i) => (mean[i] = (mean[i] as number) + value / points.length))
  return mean
}

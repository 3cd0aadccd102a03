import type { LevelPoints } from '../isoconversional/result.ts'

/**
 * Standard error in J/mol of the mean of Ea over levels, from the residuals of the runs.
 *
 * Every Eaₗ is a sum over the runs, pₗ Σᵢ kᵢₗ yᵢₗ with kᵢₗ = (xᵢₗ - x̄ₗ)/Σⱼ(xⱼₗ - x̄ₗ)² and pₗ = dEa/dslope, and so is their mean. An error of a run (of its temperature, mass or
 * heating rate) goes through all its levels, and averaging over levels does not make it smaller; one that differs from level to level (noise) is averaged out. The residuals tell
 * both apart by their covariance S over the L levels:
 *
 *   se² = Σᵢ Σₗ Σₘ cᵢₗ cᵢₘ Sₗₘ,   cᵢₗ = pₗ kᵢₗ/L,   Sₗₘ = Σⱼ rⱼₗ rⱼₘ/(n - 2),
 *
 * worked out as Σᵢ Σⱼ (Σₗ cᵢₗ rⱼₗ)²/(n - 2). Errors may be larger at some levels than at others, and Ea may differ between them.
 *
 * Assumes runs independent of each other and alike in variance at each level, whatever the correlation between levels of a run; where 1/T of the runs is spread alike at all levels,
 * within a factor, se² has n - 2 degrees of freedom, and elsewhere nearly so. Of one level it is the standard error of that level.
 * It takes Ea as it is at each level: that Ea may vary between levels is no part of it (see the spread beside it), and neither is an error that all runs share (`meanCombined`).
 *
 * @param points - of the levels that enter the mean, one entry a run in each
 * @returns NaN with fewer than three runs or without levels
 */
export function meanEnergyStandardError(points: readonly LevelPoints[]): number {
  const n = points[0]?.residual.length ?? 0
  if (n < 3) return Number.NaN
  /** Σₗ cᵢₗ rⱼₗ, [i · n + j]. */
  const products = new Float64Array(n * n)
  for (const { x_per_K: x, residual, energyPerSlope } of points) {
    let mean = 0
    for (const value of x) mean += value / n
    let spread = 0
    for (const value of x) spread += (value - mean) ** 2
    for (let i = 0; i < n; i++) {
      const c = (energyPerSlope * ((x[i] as number) - mean)) / (spread * points.length)
      for (let j = 0; j < n; j++) products[i * n + j] = (products[i * n + j] as number) + c * (residual[j] as number)
    }
  }
  let sum = 0
  for (const value of products) sum += value * value
  return Math.sqrt(sum / (n - 2))
}

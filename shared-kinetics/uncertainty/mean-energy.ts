import type { LevelPoints } from '../isoconversional/result.ts'
import { meanResiduals } from './lack-of-fit.ts'

/**
 * Standard error in J/mol of the mean of Ea over levels, from the residuals of the runs.
 *
 * Every Eaₗ is a sum over the runs, pₗ Σᵢ kᵢₗ yᵢₗ with kᵢₗ = (xᵢₗ - x̄ₗ)/Σⱼ(xⱼₗ - x̄ₗ)² and pₗ = dEa/dslope, and so is their mean. An error of a run (of its temperature, mass or
 * heating rate) goes through all its levels, and averaging over levels does not make it smaller; one that differs from level to level (noise) is averaged out. Both are
 * told apart by averaging each run's residuals over the L levels first, r̄ᵢ = Σₗ rᵢₗ/L:
 *
 *   se = s √Σᵢ cᵢ²,   cᵢ = Σₗ pₗ kᵢₗ/L,   s² = Σᵢ r̄ᵢ²/(n - 2).
 *
 * Assumes runs independent of each other and alike in variance, whatever the correlation between levels of a run, and 1/T of the runs spread alike at all levels, which holds
 * within a few percent; s² then is that of a regression of its own, with n - 2 degrees of freedom. Of one level it is the standard error of that level.
 * It takes Ea as it is at each level: that Ea may vary between levels is no part of it (see the spread beside it).
 *
 * @param points - of the levels that enter the mean, one entry a run in each
 * @returns NaN with fewer than three runs or without levels
 */
export function meanEnergyStandardError(points: readonly LevelPoints[]): number {
  const n = points[0]?.residual.length ?? 0
  if (n < 3) return Number.NaN
  const weight = new Float64Array(n)
  for (const { x_per_K: x, energyPerSlope } of points) {
    let mean = 0
    for (const value of x) mean += value / n
    let spread = 0
    for (const value of x) spread += (value - mean) ** 2
    for (let i = 0; i < n; i++) {
      weight[i] = (weight[i] as number) + (energyPerSlope * ((x[i] as number) - mean)) / (spread * points.length)
    }
  }
  return Math.sqrt((sumOfSquares(meanResiduals(points)) / (n - 2)) * sumOfSquares(weight))
}

const sumOfSquares = (values: Float64Array): number => values.reduce((sum, value) => sum + value * value, 0)

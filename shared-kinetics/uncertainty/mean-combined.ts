import type { IsoconversionalResult } from '../isoconversional/result.ts'
import { normalQuantile } from '../numerics/normal.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import type { Budget } from './budget.ts'
import { meanEnergyStandardError } from './mean-energy.ts'
import type { UncertaintySource } from './measured-sources.ts'

export interface MeanUncertainty {
  readonly standardUncertainty: number
  /** Of the 95 % interval. */
  readonly half: number
}

const z = normalQuantile(0.975)

/**
 * Uncertainty in J/mol of the mean of Ea over levels: the scatter of the runs (`meanEnergyStandardError`) with those sources that no scatter shows. Each of these moves all levels
 * together, so that its effects on L levels are averaged with their signs before they are squared,
 *
 *   u² = se² + Σ_s (Σₗ δₗₛ/L)²,   U² = [t(0.975; n - 2) se]² + z(0.975)² Σ_s (Σₗ δₗₛ/L)²,
 *
 * δₗₛ what one standard uncertainty of source s does to Ea at level l, n runs. They do not average out: of a common temperature error the mean has what each level has.
 *
 * @param signed - of `signedBudgetOf`
 * @param levels - positions of the levels that enter the mean
 * @param added - the sources summed over: `addedToScatter`
 * @returns NaN without levels, without a standard error, or where a source cannot be told at one of the levels
 * @source jcgm-100-2008 5.2 (fully correlated quantities add with their signs)
 * @source abernethy-1985
 */
export function meanCombined(
  { points, interval: { dof } }: IsoconversionalResult,
  signed: Budget,
  levels: readonly number[],
  added: readonly UncertaintySource[],
): MeanUncertainty {
  const se = dof > 0 ? meanEnergyStandardError(levels.flatMap((level) => points[level] ?? [])) : Number.NaN
  const stated = Math.hypot(
    ...added.map((source) => levels.reduce((sum, level) => sum + (signed[source][level] ?? Number.NaN), 0) / levels.length),
  )
  return {
    standardUncertainty: Math.hypot(se, stated),
    half: Math.hypot((dof > 0 ? studentTQuantile(0.975, dof) : Number.NaN) * se, z * stated),
  }
}

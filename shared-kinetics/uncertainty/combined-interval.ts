import { studentTQuantile } from '../numerics/student-t.ts'
import type { IsoconversionalResult } from '../isoconversional/result.ts'
import { column, type Column } from '../units/quantity.ts'
import type { UncertaintySource } from './measured-sources.ts'
import { shownByScatter, type Budget } from './budget.ts'

export interface CombinedInterval {
  readonly standardUncertainty: Column<'J/mol'>
  readonly lower95: Column<'J/mol'>
  readonly upper95: Column<'J/mol'>
  /** Effective degrees of freedom by the formula of Welch and Satterthwaite. */
  readonly dof: Float64Array
}

/**
 * The regression's own standard error with those sources that its scatter cannot show, at each level: u² = se² + Σ u(source)², Ea ± t(0.975; ν)·u, where
 * ν = (n - 2) u⁴/se⁴, the stated sources counting as known exactly. NaN where the level has no standard error.
 *
 * @source jcgm-100-2008 annex G
 */
export function combinedInterval(result: IsoconversionalResult, budget: Budget): CombinedInterval {
  const levels = result.Ea.length
  const empty = (): Float64Array => new Float64Array(levels).fill(Number.NaN)
  const combined = { u: empty(), lower: empty(), upper: empty(), dof: empty() }
  const added = (Object.keys(shownByScatter) as UncertaintySource[]).filter((source) => !shownByScatter[source])
  for (let level = 0; level < levels; level++) {
    const Ea = result.Ea[level] as number
    const se = result.standardError[level] as number
    if (Number.isNaN(se)) continue
    const u2 = added.reduce((sum, source) => sum + (budget[source][level] as number) ** 2, se ** 2)
    const dof = result.interval.dof * (u2 / se ** 2) ** 2
    // Beyond some 1e9 Student's t is the normal distribution, also where the points show no scatter at all.
    const t = studentTQuantile(0.975, Math.min(1e9, Number.isNaN(dof) ? 1e9 : dof))
    combined.u[level] = Math.sqrt(u2)
    combined.lower[level] = Ea - t * Math.sqrt(u2)
    combined.upper[level] = Ea + t * Math.sqrt(u2)
    combined.dof[level] = dof
  }
  return {
    standardUncertainty: column(combined.u, 'J/mol'),
    lower95: column(combined.lower, 'J/mol'),
    upper95: column(combined.upper, 'J/mol'),
    dof: combined.dof,
  }
}

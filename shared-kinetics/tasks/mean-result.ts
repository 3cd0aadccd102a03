import type { IsoconversionalResult } from '../isoconversional/result.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import { meanEnergyStandardError } from '../uncertainty/mean-energy.ts'
import { joulesToKilojoules } from '../units/convert.ts'
import { maybe } from './maybe.ts'
import type { MeanEnergy } from './study-result.ts'

/** Levels are compared with the ends of a range within rounding, so that 0.1 belongs to 0.1 … 0.9 however it was made. */
const rounding = 1e-9

/** Positions of the levels that enter a mean over a range: those with an Ea above 0. One at or below 0 means nothing, and neither would a mean that it entered. */
export const levelsInMean = (Ea: ArrayLike<number>, levels: readonly number[], range: readonly [number, number]): number[] =>
  levelsWithin(levels, range).filter((i) => (Ea[i] ?? Number.NaN) > 0)

const levelsWithin = (levels: readonly number[], [from, to]: readonly [number, number]): number[] =>
  levels.flatMap((level, i) => (level >= from - rounding && level <= to + rounding ? [i] : []))

/** Mean of Ea over a range of conversion with its interval, t(0.975; n - 2) standard errors on each side, and the spread of Ea there. */
export function meanResult(
  { Ea, points, interval: { dof } }: IsoconversionalResult,
  levels: readonly number[],
  range: readonly [number, number],
): MeanEnergy {
  const used = levelsInMean(Ea, levels, range)
  const values = used.map((i) => joulesToKilojoules(Ea[i] ?? Number.NaN))
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length
  const standardError = dof > 0 ? joulesToKilojoules(meanEnergyStandardError(used.flatMap((i) => points[i] ?? []))) : Number.NaN
  const half = dof > 0 ? studentTQuantile(0.975, dof) * standardError : Number.NaN
  return {
    from: range[0],
    to: range[1],
    Ea_kJ_per_mol: maybe(mean),
    spread_kJ_per_mol: used.length === 0 ? null : Math.max(...values) - Math.min(...values),
    standardError_kJ_per_mol: maybe(standardError),
    lower95_kJ_per_mol: maybe(mean - half),
    upper95_kJ_per_mol: maybe(mean + half),
    levelsUsed: used.length,
    levelsInRange: levelsWithin(levels, range).length,
    firstLevel: levels[used[0] ?? -1] ?? null,
    lastLevel: levels[used.at(-1) ?? -1] ?? null,
  }
}

import type { IsoconversionalResult } from '../isoconversional/result.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import type { Budget } from '../uncertainty/budget.ts'
import { meanCombined } from '../uncertainty/mean-combined.ts'
import { meanEnergyStandardError } from '../uncertainty/mean-energy.ts'
import type { UncertaintySource } from '../uncertainty/measured-sources.ts'
import { joulesToKilojoules } from '../units/convert.ts'
import { leftOut } from './budget-entries.ts'
import { maybe } from './maybe.ts'
import type { AnalysisSettings } from './study-input.ts'
import type { BudgetEntry, CombinedMean, MeanEnergy } from './study-result.ts'

/** Levels are compared with the ends of a range within rounding, so that 0.1 belongs to 0.1 … 0.9 however it was made. */
const rounding = 1e-9

/** Positions of the levels that enter a mean over a range: those with an Ea above 0. One at or below 0 means nothing, and neither would a mean that it entered. */
export const levelsInMean = (Ea: ArrayLike<number>, levels: readonly number[], range: readonly [number, number]): number[] =>
  levelsWithin(levels, range).filter((i) => (Ea[i] ?? Number.NaN) > 0)

/** Positions of the levels inside a range, its ends included. */
export const levelsWithin = (levels: readonly number[], [from, to]: readonly [number, number]): number[] =>
  levels.flatMap((level, i) => (level >= from - rounding && level <= to + rounding ? [i] : []))

/** What the interval of a mean from the scatter of the runs cannot hold. */
const noteOnScatter =
  'From the scatter of the runs alone. What moves all runs alike does not show in it and does not average out over levels: an error common to all temperatures, thermal lag, the ' +
  'choice of baseline. The combined interval of the mean holds these.'

/** Mean of Ea over a range of conversion with its interval from the scatter of the runs, t(0.975; n - 2) standard errors on each side, and the spread of Ea there. */
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
    note: noteOnScatter,
  }
}

/**
 * The same mean with an interval that holds besides the scatter of the runs what moves them all alike.
 *
 * @param signed - of `signedBudgetOf`
 * @param sources - those added: `addedToScatter`
 * @param entries - of the method's budget, for the words
 * @returns null where there is no mean, or no interval by the scatter of the runs (fewer than three distinct programmes)
 */
export function combinedMeanResult(
  result: IsoconversionalResult,
  { levels, meanRange }: Pick<AnalysisSettings, 'levels' | 'meanRange'>,
  signed: Budget,
  sources: readonly UncertaintySource[],
  entries: readonly BudgetEntry[],
): CombinedMean | null {
  const used = levelsInMean(result.Ea, levels, meanRange)
  if (used.length === 0 || result.interval.dof < 1) return null
  const mean = used.reduce((sum, i) => sum + joulesToKilojoules(result.Ea[i] ?? Number.NaN), 0) / used.length
  const { standardUncertainty, half } = meanCombined(result, signed, used, sources)
  return {
    Ea_kJ_per_mol: mean,
    standardUncertainty_kJ_per_mol: maybe(joulesToKilojoules(standardUncertainty)),
    lower95_kJ_per_mol: maybe(mean - joulesToKilojoules(half)),
    upper95_kJ_per_mol: maybe(mean + joulesToKilojoules(half)),
    note: noteOnCombinedMean(entries, Number.isNaN(half)),
  }
}

function noteOnCombinedMean(entries: readonly BudgetEntry[], isMissing: boolean): string {
  const added = entries.filter((entry) => !entry.shownByScatter && entry.reason === null)
  const how =
    `The scatter of the runs with what no scatter shows: ${added.map(({ label, magnitude }) => `${label} (${magnitude})`).join('; ')}. Each of these moves all levels together: ` +
    "its effects are averaged over the levels with their signs. Student's t times the one and the normal quantile times the other, added in squares; the sizes stated or assumed count as known exactly." +
    leftOut(entries)
  if (!isMissing) return how
  return `${how} Not to be had here: one of these sources cannot be told at some level of the mean.`
}

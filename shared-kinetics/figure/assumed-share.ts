import type { BudgetEntry, UncertaintyProfile } from '../tasks/study-result.ts'
import type { UncertaintySource } from '../uncertainty/measured-sources.ts'

/** More than this part of the variance of the combined interval is most of it. */
const most = 0.5

/** An assumption that nobody stated, and that makes most of a combined interval. */
export interface AssumedShare {
  readonly source: UncertaintySource
  readonly label: string
  /** What is assumed, with its unit. */
  readonly magnitude: string
  /** Part of u², median over the levels. */
  readonly share: number
}

/**
 * The assumed sources that make more than half of the variance u² = se² + Σ u(source)² of the combined interval, by the median over levels. Such an interval tells
 * what was assumed rather than what was measured.
 *
 * @param positions - of the levels that are looked at: those of the mean, or one
 */
export function assumedShares({ budget, intervals }: UncertaintyProfile, positions: readonly number[]): AssumedShare[] {
  const combined = intervals.find(({ kind }) => kind === 'combined')
  if (combined === undefined) return []
  return budget
    .filter((entry) => entry.assumed && !entry.shownByScatter)
    .flatMap((entry) => {
      const share = median(positions.flatMap((i) => shareAt(entry, combined.standardUncertainty_kJ_per_mol[i] ?? null, i)))
      return share > most ? [{ source: entry.source, label: entry.label, magnitude: assumedOnly(entry.magnitude), share }] : []
    })
}

/** The same in a sentence. `how` names where to state it, e.g. `--lag`. */
export const assumedShareText = (label: string, magnitude: string, share: string, how: string): string =>
  `${label}, ${magnitude}, is assumed: nobody has stated it, and it makes ${share} of the variance of the combined interval. State your own (${how})`

/** Why half a combined interval is no fixed multiple of its standard uncertainty. */
export const whyNotAMultiple =
  "half the interval is no fixed multiple of u: Student's t times the standard error of the scatter and 1.96 times the other sources are added in squares, and t is large where runs are few"

function shareAt(entry: BudgetEntry, combined: number | null, level: number): number[] {
  const own = entry.standardUncertainty_kJ_per_mol[level] ?? null
  return own === null || combined === null || !(combined > 0) ? [] : [(own / combined) ** 2]
}

const assumedOnly = (magnitude: string): string => magnitude.replace(/, assumed.*$/, '')

function median(values: readonly number[]): number {
  const sorted = values.toSorted((a, b) => a - b)
  const middle = sorted.length >> 1
  const upper = sorted[middle] ?? Number.NaN
  return sorted.length % 2 === 1 ? upper : (upper + (sorted[middle - 1] ?? Number.NaN)) / 2
}

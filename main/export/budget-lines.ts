import { assumedShares, assumedShareText } from '../../shared-kinetics/figure/assumed-share.ts'
import { levelsWithin } from '../../shared-kinetics/tasks/mean-result.ts'
import type {
  BudgetEntry,
  MeanEnergy,
  ProfileResult,
  UncertaintyProfile,
  UncertaintyResult,
} from '../../shared-kinetics/tasks/study-result.ts'
import type { UncertaintySource } from '../../shared-kinetics/uncertainty/measured-sources.ts'

/** One source of a method's budget: what was assumed, stated or found, and what it brings to Ea over the levels of the mean. */
export function budgetLine(
  label: string,
  entry: BudgetEntry,
  { from, to }: Pick<MeanEnergy, 'from' | 'to'>,
  levels: readonly number[],
): string {
  const shown = entry.shownByScatter ? '; shown by the scatter of the points already' : ''
  const of = levelsWithin(levels, [from, to]).flatMap((i) => entry.standardUncertainty_kJ_per_mol[i] ?? [])
  const range = `over conversion ${from} to ${to}`
  if (of.length === 0)
    return `${label}: ${entry.label}, ${entry.magnitude}${shown}; u(Ea) unknown ${range}${entry.reason === null ? '' : `. ${entry.reason}`}`
  return `${label}: ${entry.label}, ${entry.magnitude}${shown}; u(Ea) ${leastToMost(of)} kJ/mol ${range}`
}

/** What intervals rest on that nobody stated, and what they do not hold, one line each; the same for all methods, so each once. */
export function assumptionLines({ profiles }: UncertaintyResult): string[] {
  const lines = profiles.flatMap(({ budget }) =>
    budget.flatMap(({ label, magnitude, assumed, reason }) => {
      if (reason !== null) return [`${label} is in no interval: ${reason}`]
      return assumed ? [`${label}: ${magnitude}`] : []
    }),
  )
  return [...new Set(lines)]
}

/** Where a source is stated: on the command line, and on the sheet. */
const statedWith: Readonly<Partial<Record<UncertaintySource, string>>> = {
  'temperature-common': '--temperature-common, or in the budget on the sheet',
  'temperature-run': '--temperature-run, or in the budget on the sheet',
  'temperature-lag': '--lag, or in the budget on the sheet',
}

/** Of one method, over the levels of its mean: each assumption that makes most of the combined interval. */
export const assumedShareLines = ({ mean: { from, to } }: ProfileResult, apart: UncertaintyProfile, levels: readonly number[]): string[] =>
  assumedShares(apart, levelsWithin(levels, [from, to])).map(({ source, label, magnitude, share }) =>
    assumedShareText(label, magnitude, percent(share), howToState(source)),
  )

/** The same for all methods in one line a source, with the least and the largest share, and the methods where it is not all of them. */
export function assumedSharesOfAll(profiles: readonly ProfileResult[], { profiles: apart, levels }: UncertaintyResult): string[] {
  const withInterval = apart.filter(({ intervals }) => intervals.some(({ kind }) => kind === 'combined'))
  const found = withInterval.flatMap((one) => {
    const profile = profiles.find(({ method }) => method === one.method)
    return profile === undefined
      ? []
      : assumedShares(one, levelsWithin(levels, [profile.mean.from, profile.mean.to])).map((share) => ({ ...share, method: profile.label }))
  })
  return [...new Map(found.map((one) => [one.source, one])).values()].map(({ source, label, magnitude }) => {
    const same = found.filter((one) => one.source === source)
    const [least, largest] = [Math.min(...same.map(({ share }) => share)), Math.max(...same.map(({ share }) => share))]
    const range = percent(least) === percent(largest) ? percent(least) : `${percent(least).replace(' %', '')} to ${percent(largest)}`
    const of = same.length === withInterval.length ? '' : ` (${same.map(({ method }) => method).join(', ')})`
    return assumedShareText(label, magnitude, `${range}${of}`, howToState(source))
  })
}

const howToState = (source: UncertaintySource): string => statedWith[source] ?? 'in the budget on the sheet'
const percent = (share: number): string => `${(100 * share).toFixed(0)} %`

/** Standard uncertainty and half interval of the combined one over the levels of the mean. */
export function combinedLines(
  { label, mean: { from, to }, Ea_kJ_per_mol: Ea }: ProfileResult,
  apart: UncertaintyProfile,
  levels: readonly number[],
): string[] {
  const combined = apart.intervals.find(({ kind }) => kind === 'combined')
  if (combined === undefined) return []
  const known = levelsWithin(levels, [from, to]).flatMap((i) => {
    const [u, energy, upper] = [combined.standardUncertainty_kJ_per_mol[i] ?? null, Ea[i] ?? null, combined.upper95_kJ_per_mol[i] ?? null]
    return u === null || energy === null || upper === null ? [] : [{ u, half: upper - energy }]
  })
  if (known.length === 0) return []
  return [
    `${label}: combined, u(Ea) ${leastToMost(known.map(({ u }) => u))} kJ/mol and half the 95 % interval ${leastToMost(known.map(({ half }) => half))} kJ/mol over conversion ${from} to ${to}`,
  ]
}

function leastToMost(values: readonly number[]): string {
  const [least, most] = [Math.min(...values).toFixed(2), Math.max(...values).toFixed(2)]
  return least === most ? least : `${least} to ${most}`
}

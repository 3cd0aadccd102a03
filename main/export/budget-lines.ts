import { levelsWithin } from '../../shared-kinetics/tasks/mean-result.ts'
import type { BudgetEntry, MeanEnergy, UncertaintyResult } from '../../shared-kinetics/tasks/study-result.ts'

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
  const [least, most] = [Math.min(...of).toFixed(2), Math.max(...of).toFixed(2)]
  return `${label}: ${entry.label}, ${entry.magnitude}${shown}; u(Ea) ${least === most ? least : `${least} to ${most}`} kJ/mol ${range}`
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

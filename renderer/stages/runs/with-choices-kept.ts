import type { RateConstantTable } from '../../../shared-kinetics/contract/study-result.ts'
import { rowOfHold } from './row-of-hold.ts'

/**
 * A table made anew from holds, with what was chosen in the one before: temperatures of predictions and, where that one was made from holds too, the unit of temperature,
 * labels, and which holds are used. One that was taken out comes back unused.
 */
export function withChoicesKept(made: RateConstantTable, before: RateConstantTable | null): RateConstantTable {
  if (before === null) return made
  const predictAt_K = before.predictAt_K
  if (before.source.kind !== 'isothermal-runs') return { ...made, predictAt_K }
  const fitted = before.holdFits?.holds ?? []
  const rows = made.rows.map((row) => {
    const known = before.rows[rowOfHold(before.rows, row, fitted)]
    if (known !== undefined) return { ...row, label: known.label, use: known.use }
    return { ...row, use: !fitted.some((hold) => hold.label === row.label && hold.temperature_K === row.temperature_K) }
  })
  return { ...made, rows, predictAt_K, temperatureUnitShown: before.temperatureUnitShown }
}

import type { RateConstantRow } from '../../../shared-kinetics/contract/study-result.ts'

type Named = Pick<RateConstantRow, 'label' | 'temperature_K'>

const isSame = (one: Named, other: Named): boolean => one.label === other.label && one.temperature_K === other.temperature_K

/**
 * Where the rate constant of a hold stands among the rows of a table; -1 where it was taken out. A row whose label was typed over is known by its temperature.
 *
 * @param holds - all that the table was made from
 */
export function rowOfHold(rows: readonly Named[], hold: Named, holds: readonly Named[]): number {
  const named = rows.findIndex((row) => isSame(row, hold))
  if (named >= 0) return named
  return rows.findIndex((row) => row.temperature_K === hold.temperature_K && !holds.some((other) => isSame(row, other)))
}

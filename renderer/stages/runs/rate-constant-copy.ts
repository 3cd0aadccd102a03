import type { RateConstantRow, RateConstantTable } from '../../../shared-kinetics/contract/study-result.ts'
import type { DataColumn } from '../../sheet/data-table.ts'
import { rateConstantText, temperatureText } from './rate-constant-cells.ts'
import { inUnit, temperatureUnitWords } from './rate-constant-edits.ts'

/** The table as typed, for the clipboard. */
export function gridCopyColumns(table: RateConstantTable): readonly DataColumn<RateConstantRow>[] {
  const { temperatureUnitShown: shown, rateUnit } = table
  const column = (
    id: string,
    heading: string,
    unit: string,
    text: (row: RateConstantRow) => string,
    value: (row: RateConstantRow) => number | string | null,
  ): DataColumn<RateConstantRow> => ({ id, heading, unit, numeric: true, text, value })
  return [
    column(
      'temperature',
      'T',
      temperatureUnitWords[shown],
      (row) => temperatureText(row.temperature_K, shown),
      (row) => Number(inUnit(row.temperature_K, shown).toFixed(6)),
    ),
    column(
      'k',
      'k',
      rateUnit,
      (row) => rateConstantText(row.rateConstant),
      (row) => row.rateConstant,
    ),
    column(
      'uncertainty',
      'u(k)',
      rateUnit,
      (row) => rateConstantText(row.standardUncertainty),
      (row) => row.standardUncertainty,
    ),
    column(
      'label',
      'label',
      '',
      (row) => row.label ?? '',
      (row) => row.label,
    ),
    column(
      'use',
      'use',
      '',
      (row) => (row.use ? 'yes' : 'no'),
      (row) => (row.use ? 'yes' : 'no'),
    ),
  ]
}

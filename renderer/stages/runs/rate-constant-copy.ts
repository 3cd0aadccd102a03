import type { RateConstantRow, RateConstantTable } from '../../../shared-kinetics/contract/study-result.ts'
import type { DataColumn } from '../../sheet/data-table.ts'
import { rateConstantText, temperatureText } from './rate-constant-cells.ts'
import { inUnit, temperatureUnitWords } from './rate-constant-edits.ts'

/** The table as typed, for the clipboard. */
export function gridCopyColumns({ temperatureUnitShown: shown, rateUnit }: RateConstantTable): readonly DataColumn<RateConstantRow>[] {
  return [
    {
      ...numeric('temperature', 'T', temperatureUnitWords[shown]),
      text: (row) => temperatureText(row.temperature_K, shown),
      value: (row) => Number(inUnit(row.temperature_K, shown).toFixed(6)),
    },
    { ...numeric('k', 'k', rateUnit), text: (row) => rateConstantText(row.rateConstant), value: (row) => row.rateConstant },
    {
      ...numeric('uncertainty', 'u(k)', rateUnit),
      text: (row) => rateConstantText(row.standardUncertainty),
      value: (row) => row.standardUncertainty,
    },
    { id: 'label', heading: 'label', unit: '', numeric: false, text: (row) => row.label ?? '', value: (row) => row.label },
    { id: 'use', heading: 'use', unit: '', numeric: false, text: useWord, value: useWord },
  ]
}

const numeric = (id: string, heading: string, unit: string) => ({ id, heading, unit, numeric: true }) as const
const useWord = (row: RateConstantRow): string => (row.use ? 'yes' : 'no')

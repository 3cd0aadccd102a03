import type { RateConstantRow, RateConstantTable, TemperatureUnit } from '../../../shared-kinetics/contract/study-result.ts'
import { celsiusToKelvin, fahrenheitToKelvin, kelvinToCelsius } from '../../../shared-kinetics/units/convert.ts'
import { parseRateUnit } from '../../../shared-kinetics/units/rate-unit.ts'

export const temperatureUnitWords: Readonly<Record<TemperatureUnit, string>> = { K: 'K', C: '°C', F: '°F' }

export const inUnit = (temperature_K: number, unit: TemperatureUnit): number =>
  unit === 'K' ? temperature_K : unit === 'C' ? kelvinToCelsius(temperature_K) : kelvinToCelsius(temperature_K) * 1.8 + 32

export const toKelvin = (temperature: number, unit: TemperatureUnit): number =>
  unit === 'K' ? temperature : unit === 'C' ? celsiusToKelvin(temperature) : fahrenheitToKelvin(temperature)

/** A table without a row: what typing begins with. */
export const emptyTable: RateConstantTable = {
  rows: [],
  rateUnit: '',
  temperatureUnitShown: 'C',
  predictAt_K: [],
  source: { kind: 'typed', name: null, sha256: null },
  notes: [],
}

/** Rows made from runs follow from them: their numbers are not typed over. */
export const hasOwnNumbers = ({ source }: RateConstantTable): boolean => source.kind !== 'isothermal-runs'

/** The numbers are no longer those of the file that the source names. */
function withTypedRows(table: RateConstantTable, rows: readonly RateConstantRow[]): RateConstantTable {
  const { source } = table
  const changed =
    source.kind === 'file' ? ({ kind: 'typed', name: `${source.name ?? 'a file'}, then changed by hand`, sha256: null } as const) : source
  return { ...table, rows, source: changed }
}

type Numbers = Pick<RateConstantRow, 'temperature_K' | 'rateConstant' | 'standardUncertainty'>

export function withNumbers(table: RateConstantTable, index: number, numbers: Partial<Numbers>): RateConstantTable {
  return withTypedRows(
    table,
    table.rows.map((row, i) => (i === index ? { ...row, ...numbers } : row)),
  )
}

export const withRows = (table: RateConstantTable, added: readonly RateConstantRow[]): RateConstantTable =>
  withTypedRows(table, [...table.rows, ...added])

export const withoutRow = (table: RateConstantTable, index: number): RateConstantTable =>
  withTypedRows(
    table,
    table.rows.filter((_, i) => i !== index),
  )

export const withUse = (table: RateConstantTable, index: number, use: boolean): RateConstantTable => ({
  ...table,
  rows: table.rows.map((row, i) => (i === index ? { ...row, use } : row)),
})

export const withLabel = (table: RateConstantTable, index: number, label: string | null): RateConstantTable => ({
  ...table,
  rows: table.rows.map((row, i) => (i === index ? { ...row, label } : row)),
})

/** The same numbers meant in another unit of temperature; null where one of them cannot be. */
export function withTemperaturesMeantIn(table: RateConstantTable, unit: TemperatureUnit): RateConstantTable | null {
  const rows = table.rows.map((row) => {
    const number = Number(inUnit(row.temperature_K, table.temperatureUnitShown).toFixed(9))
    return { ...row, temperature_K: toKelvin(number, unit) }
  })
  return rows.every((row) => row.temperature_K > 0) ? { ...table, rows, temperatureUnitShown: unit } : null
}

/** How many of the first unit make one of the second, where both are the same but for their time; null where they are not, or one is not known. */
export function ratioOfUnits(from: string, to: string): number | null {
  const [first, second] = [parseRateUnit(from), parseRateUnit(to)]
  if (!first.ok || !second.ok) return null
  return withoutTime(first.value.text) === withoutTime(second.value.text) ? first.value.perSecond / second.value.perSecond : null
}

const withoutTime = (unit: string): string => unit.replace(/\b(?:s|min|h|d|week|a)\b(?=\)?$)/, 't')

/** The table in another unit of the same kind, its numbers converted; null where the units are not of one kind. */
export function convertedTo(table: RateConstantTable, unit: string): RateConstantTable | null {
  const ratio = ratioOfUnits(table.rateUnit, unit)
  const parsed = parseRateUnit(unit)
  if (ratio === null || !parsed.ok) return null
  return {
    ...table,
    rateUnit: parsed.value.text,
    rows: table.rows.map((row) => ({
      ...row,
      rateConstant: row.rateConstant * ratio,
      standardUncertainty: row.standardUncertainty === null ? null : row.standardUncertainty * ratio,
    })),
  }
}

/** The units that the table's own can be converted to, by their time; none where its unit is not stated. */
export function unitsOfSameKind(rateUnit: string): readonly string[] {
  if (!parseRateUnit(rateUnit).ok) return []
  return ['s', 'min', 'h', 'd'].map((time) => rateUnit.replace(/\b(?:s|min|h|d|week|a)\b(?=\)?$)/, time))
}

/** Rows of another table at the end of this one, in this one's unit of k; null where the units do not agree, or only one of them is stated. */
export function joined(table: RateConstantTable, other: RateConstantTable): RateConstantTable | null {
  if (table.rows.length === 0) return { ...table, ...other, predictAt_K: table.predictAt_K }
  const known = table.rateUnit === other.rateUnit ? other : convertedTo(other, table.rateUnit)
  return known === null ? null : { ...withRows(table, known.rows), notes: [...table.notes, ...other.notes] }
}

import type { RateConstantRow, RateConstantTable } from '../../../shared-kinetics/contract/study-result.ts'
import { rateConstantLimits } from '../../../shared-kinetics/contract/rate-constant-schema.ts'
import type { Parsed } from '../../../shared-kinetics/units/parse-quantity.ts'
import {
  parseCellRateConstant,
  parseCellTemperature,
  parseCellUncertainty,
  rateConstantText,
  temperatureText,
  type CellRateConstant,
} from './rate-constant-cells.ts'
import { withLabel, withNumbers, withRows } from './rate-constant-edits.ts'

export const gridColumns = ['temperature', 'rateConstant', 'standardUncertainty', 'label'] as const
export type GridColumn = (typeof gridColumns)[number]
export type RowTexts = Readonly<Partial<Record<GridColumn, string>>>

/** A row as it stands in the cells. */
export const cellTexts = (row: RateConstantRow, table: RateConstantTable): Readonly<Record<GridColumn, string>> => ({
  temperature: temperatureText(row.temperature_K, table.temperatureUnitShown),
  rateConstant: rateConstantText(row.rateConstant),
  standardUncertainty: rateConstantText(row.standardUncertainty),
  label: row.label ?? '',
})

/** The table after one cell was typed, or why the text cannot be meant. */
export function enterCell(table: RateConstantTable, index: number, column: GridColumn, text: string): Parsed<RateConstantTable> {
  const row = table.rows[index]
  if (row === undefined) return { ok: true, value: table }
  switch (column) {
    case 'temperature':
      return then(parseCellTemperature(text, table.temperatureUnitShown), (temperature_K) => withNumbers(table, index, { temperature_K }))
    case 'rateConstant':
      return then(parseRateConstant(text, table, table.rows.length - 1), ({ rateConstant, rateUnit }) => ({
        ...withNumbers(table, index, { rateConstant }),
        rateUnit,
      }))
    case 'standardUncertainty':
      return then(parseCellUncertainty(text, row, table.rateUnit), (standardUncertainty) =>
        withNumbers(table, index, { standardUncertainty }),
      )
    case 'label':
      return { ok: true, value: withLabel(table, index, labelOf(text)) }
  }
}

export type EnteredRow = { readonly ok: true; readonly table: RateConstantTable } | { readonly ok: false; readonly reasons: RowTexts }

/** The table with one more row, or, by column, why there is none yet. */
export function enterRow(table: RateConstantTable, texts: RowTexts): EnteredRow {
  const temperature = parseCellTemperature(texts.temperature ?? '', table.temperatureUnitShown)
  const k = parseRateConstant(texts.rateConstant ?? '', table, table.rows.length)
  const uncertainty = k.ok
    ? parseCellUncertainty(texts.standardUncertainty ?? '', k.value, k.value.rateUnit)
    : ({ ok: true, value: null } as const)
  if (!temperature.ok || !k.ok || !uncertainty.ok) {
    return {
      ok: false,
      reasons: {
        ...(temperature.ok ? {} : { temperature: temperature.reason }),
        ...(k.ok ? {} : { rateConstant: k.reason }),
        ...(uncertainty.ok ? {} : { standardUncertainty: uncertainty.reason }),
      },
    }
  }
  if (table.rows.length >= rateConstantLimits.rows)
    return { ok: false, reasons: { temperature: `A table holds ${rateConstantLimits.rows} rows at most.` } }
  const row: RateConstantRow = {
    temperature_K: temperature.value,
    rateConstant: k.value.rateConstant,
    standardUncertainty: uncertainty.value,
    label: labelOf(texts.label ?? ''),
    use: true,
  }
  return { ok: true, table: { ...withRows(table, [row]), rateUnit: k.value.rateUnit } }
}

/** A unit behind one k gives the table its unit only where no other row stands without one. */
function parseRateConstant(text: string, table: RateConstantTable, otherRows: number): Parsed<CellRateConstant> {
  const parsed = parseCellRateConstant(text, table.rateUnit)
  if (!parsed.ok || parsed.value.rateUnit === table.rateUnit || otherRows === 0) return parsed
  return { ok: false, reason: 'The other rows have no unit of k: state it above the table, for all rows.' }
}

function labelOf(text: string): string | null {
  const label = text.replace(/\s+/g, ' ').trim().slice(0, rateConstantLimits.text)
  return label === '' ? null : label
}

const then = <From, To>(parsed: Parsed<From>, next: (value: From) => To): Parsed<To> =>
  parsed.ok ? { ok: true, value: next(parsed.value) } : parsed

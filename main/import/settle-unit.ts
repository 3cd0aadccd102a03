import type { ImportNote } from '../../shared-kinetics/series/run.ts'
import { type FileUnit, unitOf } from './file-unit.ts'
import { quoted, type Refuse } from './import-refusal.ts'
import { type PlannedColumn, words } from './plan-columns.ts'

export interface SettledUnit {
  readonly unit: FileUnit
  /** Set where the values told the unit. */
  readonly note: ImportNote | null
}

/** What the unit of a time can be told from. */
export interface TimeEvidence {
  readonly temperatureSpan_K: number
  readonly nominal_K_per_s: number | null
}

/**
 * The unit of a column: what the file or a person says, else what the values leave as the only one possible, with a note.
 * @returns null where the values leave several
 */
export function settleUnit(column: PlannedColumn, values: Float64Array, evidence: TimeEvidence | null): SettledUnit | null {
  if (column.unit !== null) return { unit: column.unit, note: null }
  const told = column.quantity === 'time' && evidence !== null ? timeUnit(values, evidence) : valueUnit(column, values)
  const unit = told === null ? null : unitOf(told.word)
  if (told === null || unit === null) return null
  const message = `${quoted(column.label)} has no unit; its values were read as ${unit.word === '1' ? 'a fraction of 1' : unit.word}, because ${told.because}.`
  return { unit, note: { code: 'unit-from-values', severity: told.severity, message, evidence: { column: column.label, unit: unit.word } } }
}

interface Told {
  readonly word: string
  readonly because: string
  readonly severity: 'caution' | 'note'
}

function valueUnit(column: PlannedColumn, values: Float64Array): Told | null {
  const first = values[0] ?? Number.NaN
  const { least, greatest } = extremes(values)
  switch (column.quantity) {
    case 'temperature':
      // In kelvin this would be far below any start of a measurement; degrees Fahrenheit are always named.
      return first < 120 && greatest < 2500 && greatest - Math.min(least, 0) > 1
        ? { word: '°C', because: `they start at ${first}, which no run does in kelvin`, severity: 'caution' }
        : null
    case 'conversion':
      if (least > -0.2 && greatest <= 1.2 && greatest > 0.2)
        return { word: '1', because: `they lie between ${least} and ${greatest}`, severity: 'note' }
      return least > -20 && greatest > 20 && greatest <= 120 ? { word: '%', because: `they reach ${greatest}`, severity: 'caution' } : null
    case 'mass':
      if (column.as !== 'value') return null
      if (Math.abs(first - 100) <= 0.5 && least > -5 && greatest < 110)
        return { word: '%', because: `they start at ${first}`, severity: 'caution' }
      return Math.abs(first - 1) <= 0.005 && least > -0.05 && greatest < 1.1
        ? { word: '1', because: `they start at ${first}`, severity: 'caution' }
        : null
    case 'time':
    case 'heat-flow':
    case 'heat-release':
    case null:
      return null
  }
}

const longestRun_s = 48 * 3600
const fastestHeating_K_per_s = 5

function timeUnit(values: Float64Array, { temperatureSpan_K, nominal_K_per_s }: TimeEvidence): Told | null {
  const span = (values.at(-1) ?? Number.NaN) - (values[0] ?? Number.NaN)
  if (!(span > 0) || !(temperatureSpan_K > 0)) return null
  if (nominal_K_per_s !== null) {
    const expected = temperatureSpan_K / nominal_K_per_s
    const fitting = (['s', 'min', 'h'] as const).filter((word) => {
      const ratio = (unitOf(word)?.toSI(span) ?? Number.NaN) / expected
      return ratio > 0.4 && ratio < 4
    })
    const [only] = fitting
    if (fitting.length === 1 && only !== undefined) {
      const because = `only so they fit the heating rate of ${Number((nominal_K_per_s * 60).toPrecision(6))} K/min`
      return { word: only, because, severity: 'caution' }
    }
    return null
  }
  // Minutes and hours cannot be told apart without a heating rate; seconds can where minutes would make a run of days.
  if (span * 60 <= longestRun_s || temperatureSpan_K / span > fastestHeating_K_per_s) return null
  return { word: 's', because: `in minutes the run would last ${Math.round(span / 60)} hours`, severity: 'caution' }
}

function extremes(values: Float64Array): { readonly least: number; readonly greatest: number } {
  let least = Number.POSITIVE_INFINITY
  let greatest = Number.NEGATIVE_INFINITY
  for (const value of values) {
    if (value < least) least = value
    if (value > greatest) greatest = value
  }
  return { least, greatest }
}

/** Refusal of a column whose unit nothing tells. */
export function unitUnknown(column: PlannedColumn, line: number, refuse: Refuse): ReturnType<Refuse> {
  const quantity = column.quantity === null ? 'this quantity' : words(column.quantity)
  const reason = `Nothing says in which unit column ${column.index + 1}, ${quoted(column.label)}, holds ${quantity}, and its values leave it open.`
  return refuse(line, reason, `State the unit of “column ${column.index + 1}”.`)
}

import { runTones } from '../../../shared-kinetics/figure/run-place.ts'
import type { StudyDocument } from '../../../shared-kinetics/contract/study-document.ts'
import type { RunInfo, RunResult, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { kelvinToCelsius, perSecondToPerMinute } from '../../../shared-kinetics/units/convert.ts'
import { atLevel, formatAtLevel, levelPlaces, type LevelQuantity } from '../../sheet/at-level.ts'
import type { DataColumn } from '../../sheet/data-table.ts'
import {
  decimals,
  formatCelsius,
  formatHeatingRate,
  formatLevel,
  formatRateError,
  formatWindow,
  nominalSourceWords,
  programmeWords,
  rateDecimals,
} from '../../sheet/format.ts'
import { runsWithoutHeatingRate } from './questions.ts'

/** One run of the study: as imported, and as evaluated where it was used and could be. */
export interface RunRow {
  readonly run: RunInfo
  readonly result: RunResult | null
  /** Colour place and marker in every chart; null for a run that is not drawn. */
  readonly tone: { readonly place: number; readonly index: number } | null
  /** Why a used run was not evaluated, in a sentence; null where it was. */
  readonly unusable: string | null
}

/** Evaluated runs slowest programme first, as in every chart; a run that is not evaluated keeps its place behind the run it was added after. */
export function runRows(document: StudyDocument, result: StudyResult | null): readonly RunRow[] {
  const tones = result === null ? [] : runTones(result)
  const evaluated = (result?.runs ?? []).flatMap((one, i): RunRow[] => {
    const run = document.runs.find((candidate) => candidate.id === one.runId)
    return run === undefined || !run.use ? [] : [{ run, result: one, tone: tones[i] ?? null, unusable: null }]
  })
  const shown = new Set(evaluated.map((row) => row.run.id))
  const asked = new Set(runsWithoutHeatingRate(document).map((run) => run.id))
  const rows = [...evaluated]
  for (const [i, run] of document.runs.entries()) {
    if (shown.has(run.id)) continue
    const before = document.runs[i - 1]?.id
    const place = rows.findIndex((row) => row.run.id === before) + 1
    rows.splice(place, 0, { run, result: null, tone: null, unusable: run.use ? unusableText(result, run, asked) : null })
  }
  return rows
}

function unusableText(result: StudyResult | null, run: RunInfo, asked: ReadonlySet<string>): string | null {
  if (result === null) return null
  if (asked.has(run.id)) return 'Its heating rate is asked for above.'
  return result.findings.find((finding) => finding.run === run.id && finding.code === 'run-unusable')?.message ?? null
}

/** What stands in the table of runs and what is copied from it; the last column follows the level rail. */
export function runColumns(level: number | null, levelIndex: number, quantity: LevelQuantity): readonly DataColumn<RunRow>[] {
  return [
    words('label', 'Run', (row) => row.run.label),
    {
      ...numbers(
        'measured',
        'Heating rate measured',
        'K/min',
        (row) => measuredText(row.result),
        (row) => row.result?.heatingRate_K_per_min ?? null,
      ),
      places: ratePlaces,
    },
    {
      ...numbers(
        'measured-error',
        '± standard error',
        'K/min',
        (row) => formatRateError(row.result?.heatingRateStandardError_K_per_min ?? null),
        (row) => row.result?.heatingRateStandardError_K_per_min ?? null,
      ),
      places: ratePlaces,
    },
    numbers('nominal', 'nominal', 'K/min', nominalText, (row) => toDigits(nominal_K_per_min(row), 5)),
    words('programme', 'Programme', (row) => (row.result === null ? '' : programmeWords[row.result.programme])),
    numbers('mass', 'Mass', 'mg', (row) => decimals(mass_mg(row), 2), mass_mg, 3),
    numbers(
      'rows',
      'Rows',
      '',
      (row) => String(row.run.rows),
      (row) => row.run.rows,
    ),
    { ...words('window', 'Window', (row) => (row.result === null ? '' : formatWindow(row.result.window))), numeric: true },
    numbers(
      'peak',
      'Peak',
      '°C',
      (row) => formatCelsius(row.result?.peak_K),
      (row) => celsius(row.result?.peak_K ?? null),
      2,
    ),
    numbers(
      'level',
      `${quantity.symbol} at α${level === null ? '' : `\u00a0${formatLevel(level)}`}`,
      quantity.unit,
      (row) => formatAtLevel(row.result, levelIndex, quantity),
      (row) => atLevel(row.result, levelIndex, quantity),
      levelPlaces(quantity) + 1,
    ),
  ]
}

/** What the clipboard gets besides what stands on the screen. */
export const runCopyColumns = (level: number | null, levelIndex: number, quantity: LevelQuantity): readonly DataColumn<RunRow>[] => [
  ...runColumns(level, levelIndex, quantity),
  words('use', 'Use', (row) => (row.run.use ? 'yes' : 'no')),
  words('file', 'File', (row) => row.run.file.name),
]

/** What stands beneath a run's label: its rows, its file where the label does not name it, and a programme that the next column does not tell. */
export function runFacts({ run, result }: RunRow): string {
  const stem = run.file.name.replace(/\.[^.]*$/, '')
  const file = run.label === run.file.name || run.label === stem ? [] : [run.file.name]
  return [...(result?.programme === 'general' ? [`${programmeWords.general} programme`] : []), `${run.rows} rows`, ...file].join(', ')
}

function measuredText(result: RunResult | null): string {
  if (result === null) return ''
  if (result.programme === 'isothermal') return `held at ${formatCelsius(result.holdTemperature_K)} °C`
  if (result.heatingRateSource !== null && result.heatingRateSource !== 'measured') return 'not measured'
  return formatHeatingRate(result.heatingRate_K_per_min, result.heatingRateStandardError_K_per_min)
}

function nominalText(row: RunRow): string {
  const value = nominal_K_per_min(row)
  return value === null ? '' : String(toDigits(value, 4))
}

const toDigits = (value: number | null, digits: number): number | null => (value === null ? null : Number(value.toPrecision(digits)))
const ratePlaces = ({ result }: RunRow): number => rateDecimals(result?.heatingRateStandardError_K_per_min ?? null) + 1

export function nominalSource(row: RunRow): string {
  const nominal = row.run.nominalHeatingRate
  return nominal === null ? '' : `${nominalSourceWords[nominal.source]}: ${nominal.text}`
}

const nominal_K_per_min = (row: RunRow): number | null =>
  row.run.nominalHeatingRate === null ? null : perSecondToPerMinute(row.run.nominalHeatingRate.heatingRate_K_per_s)
const mass_mg = (row: RunRow): number | null => (row.run.initialMass_kg === null ? null : row.run.initialMass_kg * 1e6)
const celsius = (temperature_K: number | null): number | null => (temperature_K === null ? null : kelvinToCelsius(temperature_K))

const words = (id: string, heading: string, text: (row: RunRow) => string): DataColumn<RunRow> => ({
  id,
  heading,
  unit: '',
  numeric: false,
  text,
  value: text,
})

const numbers = (
  id: string,
  heading: string,
  unit: string,
  text: DataColumn<RunRow>['text'],
  value: DataColumn<RunRow>['value'],
  places?: number,
): DataColumn<RunRow> => ({ id, heading, unit, numeric: true, text, value, ...(places === undefined ? {} : { places }) })

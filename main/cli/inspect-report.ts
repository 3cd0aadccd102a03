import type { RefusedFile } from '../../shared-kinetics/contract/host-api.ts'
import type { RunInfo } from '../../shared-kinetics/series/run.ts'
import { isOnlyRounding } from '../export/heating-rate-error.ts'
import { extentOf } from '../../shared-kinetics/figure/nice-axis.ts'
import { kelvinToCelsius, perSecondToPerMinute } from '../../shared-kinetics/units/convert.ts'
import type { InspectedFile, InspectedRun } from './commands/inspect.ts'
import { temperatureSegments, type TemperatureSegment } from './temperature-segments.ts'

/** What `inspect` prints of one file. */
export function inspectText({ file, runs }: InspectedFile): string {
  const [first] = runs
  const decisions = first?.run.info.importDecisions ?? []
  return [
    file.path,
    ...table(decisions.map(({ step, value, reason }) => [step, value, reason])),
    ...runs.flatMap((run) => ['', ...runText(run, runs)]),
    '',
  ].join('\n')
}

function runText({ run: { info, columns }, result, findings }: InspectedRun, all: readonly InspectedRun[]): string[] {
  const [coldest, hottest] = extentOf(columns.temperature_K).map(kelvinToCelsius)
  const ownDecisions = all[0]?.run.info === info ? [] : info.importDecisions.filter((one) => !hasDecision(all[0]?.run.info, one))
  const segments = temperatureSegments(columns)
  const rows: string[][] = [
    ['rows', String(info.rows), ''],
    ['time', ...timeTexts(columns.time_s)],
    ['temperature', `${coldest?.toFixed(1)} to ${hottest?.toFixed(1)} °C`, ''],
    ...segments.map((segment, i) => [
      `segment ${i + 1}`,
      segmentText(segment),
      `${minutes(segment.start_s)} to ${minutes(segment.end_s)} min`,
    ]),
    ...info.signals.map(({ quantity, label, fileUnit }) => [quantity, label, fileUnit === '' ? 'no unit' : `in ${fileUnit}`]),
    ...ownDecisions.map(({ step, value, reason }) => [step, value, reason]),
    ['heating rate', measuredText(result, findings.length > 0), nominalText(info)],
    ...ofReaction(result, segments.length),
    ...(info.initialMass_kg === null ? [] : [['sample mass', `${(info.initialMass_kg * 1e6).toPrecision(4)} mg`, '']]),
    ...(info.exothermic === null ? [] : [['exothermic', info.exothermic, '']]),
    ...info.metadata.map(({ key, value }) => [key, value, '']),
  ]
  const notes = findings.map((finding) => `  ${finding.severity}: ${finding.message}`)
  return [`  run ${info.label}`, ...table(rows).map((line) => `  ${line}`), ...notes]
}

/** How long it takes, and where its clock begins and ends where that is not at 0: segments go by that clock. */
function timeTexts(time_s: Float64Array | null): readonly [string, string] {
  if (time_s === null) return ['none', '']
  const [start, end] = [time_s[0] ?? 0, time_s.at(-1) ?? 0]
  return [`${((end - start) / 60).toFixed(2)} min`, minutes(start) === '0.0' ? '' : `${minutes(start)} to ${minutes(end)} min in the file`]
}

/** A heating rate is that of the reaction: the line through T(t) over its window, which is not the rate of a whole segment. */
function ofReaction(result: InspectedRun['result'], segments: number): string[][] {
  if (result === null || segments === 0 || result.programme !== 'constant-heating-rate' || result.heatingRateSource !== 'measured')
    return []
  const { window } = result
  const range =
    window.kind === 'temperature'
      ? `${kelvinToCelsius(window.start_K).toFixed(1)} to ${kelvinToCelsius(window.end_K).toFixed(1)} °C`
      : `${minutes(window.start_s)} to ${minutes(window.end_s)} min`
  return [['  fitted over', range, 'the window of the reaction, ± one standard error; a segment has its median rate']]
}

const minutes = (time_s: number): string => (time_s / 60).toFixed(1)

/** A hold is told by its end: at its beginning the furnace may still be on its way. */
function segmentText({ kind, end_K, rate_K_per_s }: TemperatureSegment): string {
  return kind === 'hold'
    ? `hold at ${kelvinToCelsius(end_K).toFixed(1)} °C`
    : `${kind} at ${Math.abs(perSecondToPerMinute(rate_K_per_s)).toFixed(1)} K/min to ${kelvinToCelsius(end_K).toFixed(1)} °C`
}

const hasDecision = (info: RunInfo | undefined, one: RunInfo['importDecisions'][number]): boolean =>
  info?.importDecisions.some((other) => other.step === one.step && other.value === one.value) ?? false

function measuredText(result: InspectedRun['result'], isReasonBelow: boolean): string {
  if (result === null) return isReasonBelow ? 'of the reaction: not worked out, see below' : 'of the reaction: not worked out'
  if (result.programme === 'isothermal' && result.holdTemperature_K !== null)
    return `hold at ${kelvinToCelsius(result.holdTemperature_K).toFixed(2)} °C`
  if (result.programme !== 'constant-heating-rate' || result.heatingRate_K_per_min === null) return 'no constant heating rate'
  const error = result.heatingRateStandardError_K_per_min
  if (error !== null && isOnlyRounding(error, result.heatingRate_K_per_min))
    return `${result.heatingRate_K_per_min.toFixed(3)} K/min, set or calculated, not measured`
  return `${result.heatingRate_K_per_min.toFixed(3)}${error === null ? '' : ` ±${errorText(error)}`} K/min, ${result.heatingRateSource ?? 'stated'}`
}

function nominalText({ nominalHeatingRate }: RunInfo): string {
  if (nominalHeatingRate === null) return 'no nominal heating rate'
  const { heatingRate_K_per_s, source, text } = nominalHeatingRate
  return `nominal ${Number(perSecondToPerMinute(heatingRate_K_per_s).toPrecision(6))} K/min from the ${source}: ${text}`
}

/** Three columns, the first two as wide as they need to be. */
function table(rows: readonly (readonly string[])[]): string[] {
  const width = (column: number): number => Math.min(34, Math.max(0, ...rows.map((row) => row[column]?.length ?? 0)))
  const [first, second] = [width(0), width(1)]
  return rows.map(([a = '', b = '', c = '']) => `  ${a.padEnd(first)}  ${b.padEnd(second)}  ${c}`.trimEnd())
}

/** The same as JSON, format `rampfold.inspect/1`. */
export function inspectJson(files: readonly InspectedFile[], refused: readonly RefusedFile[], version: string): string {
  const content = {
    format: 'rampfold.inspect/1',
    program: { name: 'rampfold', version },
    files: files.map(({ file, runs }) => ({
      path: file.path,
      file: file.fileName,
      byteLength: file.bytes.byteLength,
      runs: runs.map(runFields),
    })),
    refused,
  }
  return `${JSON.stringify(content, (_key, value: unknown) => (typeof value === 'number' && !Number.isFinite(value) ? null : value), 1)}\n`
}

function runFields({ run: { info, columns }, result, findings }: InspectedRun): Record<string, unknown> {
  const [coldest_K, hottest_K] = extentOf(columns.temperature_K)
  return {
    label: info.label,
    sha256: info.file.sha256,
    rows: info.rows,
    hasTime: info.hasTime,
    start_s: columns.time_s?.[0] ?? null,
    end_s: columns.time_s?.at(-1) ?? null,
    coldest_K,
    hottest_K,
    segments: temperatureSegments(columns),
    columns: info.signals.map(({ quantity, label, fileUnit, unit }) => ({ quantity, heading: label, unit: fileUnit, heldIn: unit })),
    decisions: info.importDecisions,
    metadata: info.metadata,
    initialMass_mg: info.initialMass_kg === null ? null : info.initialMass_kg * 1e6,
    exothermic: info.exothermic,
    nominalHeatingRate_K_per_min:
      info.nominalHeatingRate === null ? null : perSecondToPerMinute(info.nominalHeatingRate.heatingRate_K_per_s),
    nominalHeatingRateSource: info.nominalHeatingRate?.source ?? null,
    programme: result?.programme ?? null,
    heatingRate_K_per_min: result?.heatingRate_K_per_min ?? null,
    heatingRateStandardError_K_per_min: result?.heatingRateStandardError_K_per_min ?? null,
    heatingRateSource: result?.heatingRateSource ?? null,
    holdTemperature_K: result?.holdTemperature_K ?? null,
    notes: info.importNotes,
    findings,
  }
}

/** One significant digit; what is smaller than the last printed digit of the rate can only be called small. */
const errorText = (error: number): string => (error < 0.0005 ? '<0.001' : String(Number(error.toPrecision(1))))

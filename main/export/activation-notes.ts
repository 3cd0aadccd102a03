import type { AnalysisSettings } from '../../shared-kinetics/tasks/study-input.ts'
import type { Window } from '../../shared-kinetics/series/run.ts'
import type { RunResult } from '../../shared-kinetics/tasks/study-result.ts'
import { meanCaution } from '../../shared-kinetics/figure/mean-not-alone.ts'
import { kelvinToCelsius } from '../../shared-kinetics/units/convert.ts'
import { uncertaintyOf, type ExportSource } from './activation-json.ts'
import { caution } from './caution.ts'
import { isOnlyRounding } from './heating-rate-error.ts'
import { intervalLines, meanLines } from './interval-lines.ts'
import { preExponentialLines } from './pre-exponential.ts'
import { peakMethodLines } from './peak-method-lines.ts'

/** The text of `activation.csv.txt`, which stands beside the table: caution, intervals, settings, where the runs came from, findings. */
export function activationNotes(source: ExportSource): string {
  const { document, result, program } = source
  const used = new Set(result.runs.map((run) => run.runId))
  const leftOut = document.runs.filter((run) => !used.has(run.id))
  const sections: readonly (readonly [string, readonly string[]])[] = [
    ['Caution', [caution]],
    ['Intervals', intervalLines(source)],
    [
      'Means',
      result.profiles.flatMap((profile) => meanLines(profile, uncertaintyOf(profile, source.uncertainty), meanCaution(result.findings))),
    ],
    ['Pre-exponential factors by standards', result.profiles.flatMap((profile) => preExponentialLines(profile, result))],
    ['Peak and single-run methods', result.peakMethods.flatMap(peakMethodLines)],
    ['Settings', settingLines(document.settings, result.signal)],
    ['Runs', result.runs.flatMap(runLines)],
    ['Runs not used', leftOut.map((run) => `${run.label}: ${run.file.name}, SHA-256 ${run.file.sha256}`)],
    [
      'Findings',
      result.findings.map((finding) => {
        const label = document.runs.find((run) => run.id === finding.run)?.label
        return `${finding.severity}, ${finding.code}${label === undefined ? '' : ` (${label})`}: ${finding.message} Rule: ${finding.basis}`
      }),
    ],
  ]
  const text = sections
    .filter(([, lines]) => lines.length > 0)
    .map(([heading, lines]) => `${heading}\n${lines.map((line) => `  ${oneLine(line)}\n`).join('')}`)
    .join('\n')
  return `Activation energy against conversion, ${oneLine(document.name)}\n${program.name} ${program.version}\n\n${text}`
}

function settingLines(settings: AnalysisSettings, signal: string | null): string[] {
  return [
    `signal: ${signal ?? 'none'}${settings.signal === null ? ' (chosen by the program)' : ''}`,
    `levels of conversion: ${settings.levels.map((level) => String(Number(level.toPrecision(6)))).join(' ')}`,
    `methods: ${settings.methods === null ? 'all that apply' : settings.methods.join(', ')}`,
    `window of the series: ${settings.window === null ? 'found in the data' : windowText(settings.window)}`,
    `baseline under heat flow: ${settings.baseline}`,
    `range of the mean: ${settings.meanRange[0]} to ${settings.meanRange[1]}`,
  ]
}

function runLines(run: RunResult): string[] {
  return [
    `${run.label}: ${run.fileName}, column ${run.column}, SHA-256 ${run.sha256}`,
    `  ${programmeText(run)}; ${run.rows} rows; window ${windowText(run.window)}${run.peak_K === null ? '' : `; peak ${kelvinAndCelsius(run.peak_K)}`}${enthalpyText(
      run,
    )}`,
  ]
}

/** Exothermic is negative; a magnitude says that it has no sign. */
function enthalpyText({ enthalpy_J_per_g: signed, enthalpyMagnitude_J_per_g: magnitude }: RunResult): string {
  if (signed !== null) return `; enthalpy ${signed.toFixed(1)} J/g (exothermic is negative)`
  return magnitude === null ? '' : `; enthalpy ${magnitude.toFixed(1)} J/g, its sign not known`
}

function programmeText(run: RunResult): string {
  const nominal = run.nominalHeatingRate_K_per_min === null ? '' : `, nominal ${run.nominalHeatingRate_K_per_min} K/min`
  if (run.programme === 'constant-heating-rate' && run.heatingRate_K_per_min !== null) {
    const error = run.heatingRateStandardError_K_per_min
    const rate = `heating rate ${run.heatingRate_K_per_min.toFixed(3)} K/min`
    if (error !== null && isOnlyRounding(error, run.heatingRate_K_per_min))
      return `${rate} (of a temperature set or calculated, its error not measured${nominal})`
    const spread = error === null ? '' : `, standard error ${error.toPrecision(2)} K/min`
    return `${rate} (${run.heatingRateSource ?? 'stated'}${spread}${nominal})`
  }
  if (run.programme === 'isothermal' && run.holdTemperature_K !== null) return `isothermal at ${kelvinAndCelsius(run.holdTemperature_K)}`
  return `general temperature programme${nominal}`
}

const windowText = (window: Window): string =>
  window.kind === 'temperature'
    ? `${kelvinAndCelsius(window.start_K)} to ${kelvinAndCelsius(window.end_K)}`
    : `${(window.start_s / 60).toFixed(3)} to ${(window.end_s / 60).toFixed(3)} min`

const kelvinAndCelsius = (kelvin: number): string => `${kelvin.toFixed(2)} K (${kelvinToCelsius(kelvin).toFixed(2)} °C)`
const oneLine = (text: string): string => text.replaceAll(/\s*[\r\n]+\s*/g, ' ')

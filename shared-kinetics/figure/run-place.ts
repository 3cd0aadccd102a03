import type { RunResult, StudyResult } from '../tasks/study-result.ts'
import { kelvinToCelsius } from '../units/convert.ts'
import type { Tone } from './figure.ts'

/** Place of each run on the scale of heating rates, 0 slowest to 1 fastest, in equal steps; replicates share one. Runs come slowest first. */
export function runPlaces(runs: readonly Pick<RunResult, 'programmeGroup'>[]): readonly number[] {
  const groups = [...new Set(runs.map((run) => run.programmeGroup))]
  const last = Math.max(1, groups.length - 1)
  return runs.map((run) => groups.indexOf(run.programmeGroup) / last)
}

/** Colour place and marker of every run, in the order of `result.runs`. */
export function runTones(result: Pick<StudyResult, 'runs'>): readonly Extract<Tone, { kind: 'run' }>[] {
  return runPlaces(result.runs).map((place, index) => ({ kind: 'run', place, index }))
}

/** What a legend calls each run: its programme, numbered where replicates follow it; its label where the programme has no single number. */
export function runNames(runs: readonly RunResult[]): readonly string[] {
  return runs.map((run, i) => {
    const programme = programmeText(run)
    if (programme === '') return run.label
    const isReplicate = (other: RunResult): boolean => other.programmeGroup === run.programmeGroup
    if (runs.filter(isReplicate).length === 1) return programme
    return `${programme} (${runs.slice(0, i).filter(isReplicate).length + 1})`
  })
}

function programmeText(run: RunResult): string {
  if (run.programme === 'constant-heating-rate' && run.heatingRate_K_per_min !== null) {
    return `${shortNumber(run.heatingRate_K_per_min, 3)} K/min`
  }
  if (run.programme === 'isothermal' && run.holdTemperature_K !== null) return `${kelvinToCelsius(run.holdTemperature_K).toFixed(1)} °C`
  return ''
}

const shortNumber = (value: number, digits: number): string => String(Number(value.toPrecision(digits)))

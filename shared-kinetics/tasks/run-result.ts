import type { LevelsRead } from '../conversion/levels.ts'
import { valueAt } from '../series/value-at.ts'
import type { RunInfo, SignalInfo } from '../series/run.ts'
import { perSecondToPerMinute } from '../units/convert.ts'
import type { ConvertedRun } from './convert-run.ts'
import { maybe, maybes } from './maybe.ts'
import type { Maybe, RunResult } from './study-result.ts'

/** One evaluated run in the terms of `StudyResult`. */
export function runResult(
  info: RunInfo,
  signal: SignalInfo,
  run: ConvertedRun,
  read: LevelsRead,
  programmeGroup: number,
  curve: RunResult['curve'],
): RunResult {
  const { programme } = run.told
  const constant = programme.kind === 'constant-heating-rate' ? programme : null
  const perGram = areaPerGram(info, signal, run.converted.area)
  return {
    runId: info.id,
    label: info.label,
    fileName: info.file.name,
    column: signal.label,
    sha256: info.file.sha256,
    signal: signal.quantity,
    signalUnit: signal.unit,
    programme: programme.kind,
    programmeGroup,
    nominalHeatingRate_K_per_min:
      info.nominalHeatingRate === null ? null : perSecondToPerMinute(info.nominalHeatingRate.heatingRate_K_per_s),
    heatingRate_K_per_min: constant === null ? null : perSecondToPerMinute(constant.heatingRate),
    heatingRateStandardError_K_per_min: constant === null ? null : maybe(perSecondToPerMinute(constant.standardError)),
    heatingRateSource: constant?.source ?? null,
    holdTemperature_K: programme.kind === 'isothermal' ? programme.temperature : null,
    holdStart_s: maybe(run.holdStart_s),
    conversionBeforeHold: maybe(run.conversionBeforeHold),
    rows: info.rows,
    initialMass_kg: info.initialMass_kg,
    window: run.window,
    peak_K: maybe(run.peak_K),
    enthalpy_J_per_g: signedEnthalpy(info, signal, perGram),
    enthalpyMagnitude_J_per_g: perGram === null ? null : Math.abs(perGram),
    temperatureAtLevel_K: maybes(read.temperature_K),
    timeAtLevel_s: maybes(read.time_s),
    reactionRateAtLevel_per_s: maybes(read.reactionRate_per_s),
    signalAtLevel: Array.from(read.time_s, (time) => maybe(valueAt(run.rows.time_s, run.rows.signal, time))),
    curve,
  }
}

/** Area of the peak per gram of sample in J/g, upwards positive; null where the signal is no heat, or a heat flow in W without the sample's mass. */
function areaPerGram(info: RunInfo, signal: SignalInfo, area: number): Maybe {
  if (signal.unit !== 'W' && signal.unit !== 'W/kg') return null
  const perKilogram = signal.unit === 'W/kg' ? area : area / (info.initialMass_kg ?? Number.NaN)
  return maybe(perKilogram / 1000)
}

/**
 * By the convention of thermodynamics exothermic is negative and endothermic positive, where the run says which way an exothermic event points (a heat-release rate
 * always is exothermic). Where it does not there is no sign to give.
 */
function signedEnthalpy(info: RunInfo, signal: SignalInfo, perGram: Maybe): Maybe {
  if (perGram === null) return null
  if (signal.quantity === 'heat-release') return -perGram
  if (info.exothermic === null) return null
  return info.exothermic === 'up' ? -perGram : perGram
}

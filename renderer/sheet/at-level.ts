import { kelvinToCelsius } from '../../shared-kinetics/units/convert.ts'
import type { Maybe, RunResult, StudyResult } from '../../shared-kinetics/contract/study-result.ts'
import { decimals } from './format.ts'

/** By what runs are compared at a level: the temperature at which they reach it or, where one is held or goes its own way, the time. */
export interface LevelQuantity {
  readonly kind: 'temperature' | 'time'
  readonly symbol: 'T' | 't'
  readonly unit: '°C' | 'min'
}

const temperature: LevelQuantity = { kind: 'temperature', symbol: 'T', unit: '°C' }
const time: LevelQuantity = { kind: 'time', symbol: 't', unit: 'min' }

export function levelQuantity(result: Pick<StudyResult, 'runs'> | null): LevelQuantity {
  return result === null || result.runs.every((run) => run.programme === 'constant-heating-rate') ? temperature : time
}

/** Where a run reaches a level, in the quantity's unit; null where it does not. */
export function atLevel(run: RunResult | null | undefined, levelIndex: number, quantity: LevelQuantity): Maybe {
  if (run === null || run === undefined) return null
  if (quantity.kind === 'time') {
    const seconds = run.timeAtLevel_s[levelIndex] ?? null
    return seconds === null ? null : seconds / 60
  }
  const kelvins = run.temperatureAtLevel_K[levelIndex] ?? null
  return kelvins === null ? null : kelvinToCelsius(kelvins)
}

/** Decimals on the screen. */
export const levelPlaces = ({ kind }: LevelQuantity): number => (kind === 'time' ? 2 : 1)

export const formatAt = (value: Maybe, quantity: LevelQuantity): string => decimals(value, levelPlaces(quantity))

export const formatAtLevel = (run: RunResult | null | undefined, levelIndex: number, quantity: LevelQuantity): string =>
  formatAt(atLevel(run, levelIndex, quantity), quantity)

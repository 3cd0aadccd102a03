import type { StudyChange } from '../../shared-kinetics/contract/study-change.ts'
import { defaultUncertainty, statedKeys, studyLimits } from '../../shared-kinetics/contract/study-document.ts'
import { parsePercent, parseTemperatureDifference, parseTime, type Parsed } from '../../shared-kinetics/units/parse-quantity.ts'
import { UsageError } from './cli-io.ts'
import type { ParsedWords } from './parse-words.ts'

/** Options that state how well was measured; to name one of them asks for the intervals that rest on it. */
export const uncertaintyOptionKinds = {
  uncertainty: 'flag',
  'temperature-common': 'value',
  'temperature-run': 'value',
  lag: 'value',
  'stated-heating-rate': 'value',
  draws: 'value',
  seed: 'value',
} as const

/** What the words state, and whether intervals by resampling and from measured sources are asked for. `--seed` alone asks for nothing. @throws UsageError */
export function uncertaintyFrom(words: ParsedWords): { readonly wanted: boolean; readonly changes: readonly StudyChange[] } {
  const read = <Value>(option: keyof typeof uncertaintyOptionKinds, parse: (text: string) => Value): Value | null => {
    const text = words.value(option)
    return text === undefined ? null : parse(text)
  }
  const stated = {
    temperatureCommon_K: read('temperature-common', (text) => notNegative('--temperature-common', parseTemperatureDifference(text))),
    temperatureRun_K: read('temperature-run', (text) => notNegative('--temperature-run', parseTemperatureDifference(text))),
    lag_s: read('lag', (text) => notNegative('--lag', inSeconds(text))),
    statedHeatingRate_share: read('stated-heating-rate', (text) => below('--stated-heating-rate', 1, parsePercent(text))),
    draws: read('draws', (text) => whole('--draws', text, 100, studyLimits.draws)),
    seed: read('seed', (text) => whole('--seed', text, 0, Number.MAX_SAFE_INTEGER)),
  }
  const given = Object.entries(stated).filter(([, value]) => value !== null)
  const named = statedKeys.filter((key) => stated[key] !== null)
  const uncertainty = { ...defaultUncertainty, ...Object.fromEntries(given), ...(named.length === 0 ? {} : { stated: named }) }
  return {
    wanted: words.flag('uncertainty') || given.some(([name]) => name !== 'seed'),
    changes: given.length === 0 ? [] : [{ kind: 'set-uncertainty', uncertainty }],
  }
}

/** A bare number is in seconds here, where others of a time are in minutes. */
const inSeconds = (text: string): Parsed<number> => parseTime(/^[\d.,\s]+$/.test(text) ? `${text} s` : text)

function notNegative(option: string, parsed: Parsed<number>): number {
  if (!parsed.ok) throw new UsageError(`${option}: ${parsed.reason}.`)
  if (!(parsed.value >= 0)) throw new UsageError(`${option}: a standard uncertainty is not negative.`)
  return parsed.value
}

function below(option: string, limit: number, parsed: Parsed<number>): number {
  const value = notNegative(option, parsed)
  if (!(value < limit)) throw new UsageError(`${option}: must be below ${100 * limit} %.`)
  return value
}

function whole(option: string, text: string, least: number, most: number): number {
  const value = Number(text)
  if (text.trim() === '' || !Number.isSafeInteger(value) || value < least || value > most) {
    throw new UsageError(`${option}: write a whole number from ${least} to ${most}, not "${text}".`)
  }
  return value
}

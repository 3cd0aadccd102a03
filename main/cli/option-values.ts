import { studyLimits } from '../../shared-kinetics/contract/study-document.ts'
import { methodIds, type MethodId } from '../../shared-kinetics/isoconversional/result.ts'
import type { Window } from '../../shared-kinetics/series/run.ts'
import { signalQuantities, type SignalQuantity } from '../../shared-kinetics/series/signal-quantity.ts'
import { baselineKinds, type BaselineKind } from '../../shared-kinetics/tasks/study-input.ts'
import { parseHeatingRate, parseTemperature, parseTime, type Parsed } from '../../shared-kinetics/units/parse-quantity.ts'
import type { TableStyle } from '../../shared-kinetics/contract/host-api.ts'
import { tableStyle } from '../export/csv-table.ts'
import { UsageError } from './cli-io.ts'

/** Levels as `0.05:0.95:0.05` (first, last, step) or as a list `0.1,0.5,0.9`; ascending. @throws UsageError */
export function levelsOption(text: string): readonly number[] {
  const levels = text.includes(':') ? levelRange(text) : text.split(',').map((part) => plainNumber(part, '--levels'))
  for (const level of levels) {
    if (!(level > 0 && level < 1)) throw new UsageError(`--levels: ${level} is not between 0 and 1.`)
  }
  const ascending = levels.toSorted((a, b) => a - b)
  if (new Set(ascending).size < ascending.length) throw new UsageError('--levels: a level is given twice.')
  if (ascending.length > studyLimits.levels) throw new UsageError(`--levels: at most ${studyLimits.levels} levels are possible.`)
  return ascending
}

function levelRange(text: string): readonly number[] {
  const parts = text.split(':').map((part) => plainNumber(part, '--levels'))
  const [first, last, step] = parts
  if (parts.length !== 3 || first === undefined || last === undefined || step === undefined || !(step > 0) || last < first) {
    throw new UsageError('--levels: write first level, last level and step, for example 0.05:0.95:0.05, or a list such as 0.1,0.5,0.9.')
  }
  const count = Math.floor((last - first) / step + 1e-6) + 1
  if (count > studyLimits.levels) throw new UsageError(`--levels: at most ${studyLimits.levels} levels are possible.`)
  // Twelve digits: 0.05 + 2 · 0.05 is 0.15 here, not 0.15000000000000002.
  return Array.from({ length: count }, (_, i) => Number((first + i * step).toPrecision(12)))
}

/** Ids of methods, as a list. @throws UsageError with the ids that are known */
export function methodsOption(text: string): readonly MethodId[] {
  return [...new Set(text.split(',').map((part) => oneOf('--methods', part.trim(), methodIds)))]
}

/** Nominal heating rates in K/min (another unit may be named), one a run. @throws UsageError */
export function heatingRatesOption(text: string): readonly number[] {
  return text.split(',').map((part) => valueOf('--heating-rates', parseHeatingRate(part)))
}

/** One window for all runs: `430K:870K`, `156C:500C`, `10min:90min`. @throws UsageError */
export function windowOption(text: string): Window {
  const [start, end, more] = text.split(':')
  if (start === undefined || end === undefined || more !== undefined || !/[a-z]\s*$/i.test(start) || !/[a-z]\s*$/i.test(end)) {
    throw new UsageError('--window: write start and end with their unit, for example 430K:870K, 156C:500C or 10min:90min.')
  }
  const [startTime, endTime] = [parseTime(start), parseTime(end)]
  if (startTime.ok && endTime.ok) {
    return inOrder({ kind: 'time', start_s: startTime.value, end_s: endTime.value }, startTime.value, endTime.value)
  }
  if (startTime.ok || endTime.ok) throw new UsageError('--window: start and end must both be temperatures or both be times.')
  const [start_K, end_K] = [valueOf('--window', parseTemperature(start)), valueOf('--window', parseTemperature(end))]
  return inOrder({ kind: 'temperature', start_K, end_K }, start_K, end_K)
}

function inOrder(window: Window, start: number, end: number): Window {
  if (start < end) return window
  throw new UsageError('--window: the end must lie above the start.')
}

export const signalOption = (text: string): SignalQuantity => oneOf('--signal', text, signalQuantities)
export const baselineOption = (text: string): BaselineKind => oneOf('--baseline', text, baselineKinds)

const decimalSigns: Readonly<Record<string, TableStyle['decimal']>> = { point: '.', '.': '.', comma: ',', ',': ',' }
const separators: Readonly<Record<string, TableStyle['separator']>> = {
  comma: ',',
  ',': ',',
  semicolon: ';',
  ';': ';',
  tab: '\t',
  '\t': '\t',
  '\\t': '\t',
}

/** Decimal sign and separator of the table. @throws UsageError */
export function tableStyleOption(decimal: string | undefined, separator: string | undefined): TableStyle {
  const decimalSign = decimal === undefined ? undefined : decimalSigns[decimal]
  const separatorSign = separator === undefined ? undefined : separators[separator]
  if (decimal !== undefined && decimalSign === undefined) throw new UsageError('--decimal is one of: point, comma.')
  if (separator !== undefined && separatorSign === undefined) throw new UsageError('--separator is one of: comma, semicolon, tab.')
  if (separatorSign === (decimalSign ?? '.')) throw new UsageError('--decimal and --separator cannot be the same sign.')
  return tableStyle(decimalSign, separatorSign)
}

/** One of the words that an option takes. @throws UsageError with all of them */
export function oneOf<Word extends string>(option: string, text: string, words: readonly Word[]): Word {
  const found = words.find((word) => word === text)
  if (found === undefined)
    throw new UsageError(`${option}: ${text === '' ? 'nothing' : text} is not known; known are: ${words.join(', ')}.`)
  return found
}

function plainNumber(text: string, option: string): number {
  if (!/^\s*\d*\.?\d+(e-?\d+)?\s*$/i.test(text)) throw new UsageError(`${option}: "${text}" is not a number. Numbers have a decimal point.`)
  return Number(text)
}

function valueOf<T>(option: string, parsed: Parsed<T>): T {
  if (parsed.ok) return parsed.value
  throw new UsageError(`${option}: ${parsed.reason}.`)
}

import { rateConstantLimits, type RateConstantReadOptions } from '../../shared-kinetics/contract/rate-constant-schema.ts'
import type { TableStyle } from '../../shared-kinetics/contract/host-api.ts'
import { decimalSignWords, delimiterWords, encodingWords, type ImportOptions } from '../../shared-kinetics/contract/import-options.ts'
import { temperatureUnits, type TemperatureUnit } from '../../shared-kinetics/rate-constants/rate-constant-table.ts'
import { reactionModelCodes, type ReactionModelCode } from '../../shared-kinetics/reaction-models/registry.ts'
import { parseTemperature } from '../../shared-kinetics/units/parse-quantity.ts'
import { parseRateUnit } from '../../shared-kinetics/units/rate-unit.ts'
import { UsageError } from './cli-io.ts'
import { importOptionKinds, importOptionsFrom } from './import-words.ts'
import { oneOf, tableStyleOption } from './option-values.ts'
import type { ParsedWords } from './parse-words.ts'

export const rateConstantKinds = {
  out: 'value',
  at: 'value',
  model: 'value',
  'zero-in-time': 'value',
  range: 'value',
  'temperature-unit': 'value',
  'rate-unit': 'value',
  decimal: 'value',
  separator: 'value',
  strict: 'flag',
  quiet: 'flag',
  ...importOptionKinds,
} as const

/** Isothermal runs and the model their rate constants are read under. */
export interface RunsOrder {
  readonly kind: 'runs'
  readonly model: ReactionModelCode
  readonly zeroInTime: 'free' | 'fixed'
  readonly range: readonly [number, number]
  readonly importOptions: ImportOptions
}

export interface RateConstantOrder {
  readonly from: { readonly kind: 'table'; readonly options: RateConstantReadOptions } | RunsOrder
  /** With the unit that each was asked in. */
  readonly predictAt: readonly { readonly temperature_K: number; readonly unit: TemperatureUnit }[]
  readonly tableStyle: TableStyle
}

const ofRuns = ['zero-in-time', 'range', 'heading-line', 'first-data-line', 'exothermic', 'column'] as const
const ofTables = ['temperature-unit', 'rate-unit'] as const

/** What the words of a call ask for; with `--model` the paths are isothermal runs, without it they are a table. @throws UsageError */
export function rateConstantOrder(words: ParsedWords): RateConstantOrder {
  const model = words.value('model')
  const stray = (model === undefined ? ofRuns : ofTables).find((option) => words.values(option).length > 0)
  if (stray !== undefined) {
    throw new UsageError(
      model === undefined
        ? `--${stray} is for isothermal runs; name their reaction model with --model.`
        : `--${stray} is for a table, and with --model the paths are runs.`,
    )
  }
  return {
    from: model === undefined ? { kind: 'table', options: readOptions(words) } : runsOrder(model, words),
    predictAt: predictAt(words.value('at')),
    tableStyle: tableStyleOption(words.value('decimal'), words.value('separator')),
  }
}

function runsOrder(model: string, words: ParsedWords): RunsOrder {
  const zero = words.value('zero-in-time')
  return {
    kind: 'runs',
    model: oneOf('--model', model.toUpperCase(), reactionModelCodes),
    zeroInTime: zero === undefined ? 'free' : oneOf('--zero-in-time', zero, ['free', 'fixed'] as const),
    range: rangeOption(words.value('range')),
    importOptions: importOptionsFrom(words),
  }
}

function rangeOption(text = '0.1:0.9'): readonly [number, number] {
  const match = /^\s*(\d*\.?\d+)\s*:\s*(\d*\.?\d+)\s*$/.exec(text)
  const [low, high] = [Number(match?.[1]), Number(match?.[2])]
  if (!(low >= 0 && high <= 1 && low < high)) throw new UsageError('--range: write two conversions from 0 to 1, for example 0.1:0.9.')
  return [low, high]
}

function readOptions(words: ParsedWords): RateConstantReadOptions {
  const choose = <Word extends string>(option: string, known: readonly Word[]): Word | undefined => {
    const text = words.value(option)
    return text === undefined ? undefined : oneOf(`--${option}`, text, known)
  }
  const temperatureUnit = temperatureUnitOption(words.value('temperature-unit'))
  const rateUnit = words.value('rate-unit')
  if (rateUnit !== undefined) {
    const parsed = parseRateUnit(rateUnit)
    if (!parsed.ok) throw new UsageError(`--rate-unit: ${parsed.reason}.`)
  }
  const encoding = choose('encoding', encodingWords)
  const delimiter = choose('delimiter', delimiterWords)
  const decimalSign = choose('decimal-sign', decimalSignWords)
  return {
    ...(temperatureUnit === undefined ? {} : { temperatureUnit }),
    ...(rateUnit === undefined ? {} : { rateUnit }),
    ...(encoding === undefined ? {} : { encoding }),
    ...(delimiter === undefined ? {} : { delimiter }),
    ...(decimalSign === undefined ? {} : { decimalSign }),
  }
}

const temperatureUnitOption = (text: string | undefined): (typeof temperatureUnits)[number] | undefined =>
  text === undefined ? undefined : oneOf('--temperature-unit', text.replace(/^(?:°|deg)\s*/i, '').toUpperCase(), temperatureUnits)

/** Temperatures at which k is to be predicted: `25C,310K`, each with its unit, since 25 and 310 may be either. A decimal comma needs semicolons between them. */
function predictAt(text: string | undefined): RateConstantOrder['predictAt'] {
  if (text === undefined) return []
  const parts = text
    .split(text.includes(';') ? ';' : ',')
    .map((part) => part.trim())
    .filter((part) => part !== '')
  if (parts.length === 0) throw new UsageError('--at: write temperatures with their unit, for example "25C,310K".')
  if (parts.length > rateConstantLimits.predictions)
    throw new UsageError(`--at: at most ${rateConstantLimits.predictions} temperatures are possible.`)
  return parts.map((part) => {
    if (!/[a-z]\s*$/i.test(part)) throw new UsageError(`--at: "${part}" has no unit; write ${part}C or ${part}K.`)
    const parsed = parseTemperature(part)
    if (!parsed.ok) throw new UsageError(`--at: ${parsed.reason}.`)
    if (parsed.value > 10_000) throw new UsageError(`--at: ${part} is hotter than any rate constant is predicted for.`)
    return { temperature_K: parsed.value, unit: /f\w*\s*$/i.test(part) ? 'F' : /k\w*\s*$/i.test(part) ? 'K' : 'C' }
  })
}

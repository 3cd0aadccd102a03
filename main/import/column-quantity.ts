import type { ColumnQuantity } from '../../shared-kinetics/contract/import-options.ts'
import type { Dimension, FileUnit } from './file-unit.ts'

export type NamedQuantity = Exclude<ColumnQuantity, 'set-aside'>

/** What a column's name says it holds. */
export type ColumnName =
  | {
      readonly quantity: NamedQuantity
      /** Of several columns of one quantity the lowest is meant: the sample's own temperature before any other, a total before its parts. */
      readonly rank: number
      /** Mass only: written as what is gone, or as the change since the start. */
      readonly as: 'value' | 'loss' | 'change'
    }
  | { readonly quantity: 'derivative' }
  | { readonly quantity: 'other' }

/** Dimensions in which each quantity may be written. */
export const dimensionsOf: Readonly<Record<NamedQuantity, readonly Dimension[]>> = {
  time: ['time'],
  temperature: ['temperature'],
  mass: ['mass', 'fraction'],
  conversion: ['fraction'],
  'heat-release': ['power', 'specific-power'],
  'heat-flow': ['power', 'specific-power'],
}

const derivative =
  /\bderiv|\bd(?:tg|tga|dsc|dta)\b|(?:^|[^a-z])d\s*\(?\s*[\p{L}%. ]{1,14}\)?\s*\/\s*d\s*\(?\s*(?:t|temp|time)|\bd[mw\u03b1]dt\b|\b(?:mass|weight)(?: loss)? rate|\bmlr\b|rate of (?:mass|weight|conversion)|\b(?:conversion|reaction|heating|cooling) rate/iu
const otherTemperature =
  /\b(?:program(?:med|me)?|set|setpoint|furnace|oven|reference|ref|block|heater|target|ambient|room|jacket|wall|junction|difference)\b/
const notTheHeatFlow = /\b(?:phase|amplitude|baseline|calibration|modulated|cumulative|integral|integrated|capacity)\b/

const value = (quantity: NamedQuantity, rank = 1): ColumnName => ({ quantity, rank, as: 'value' })

/**
 * The quantity a column's name stands for, in English names and the trade's abbreviations. Where a name alone leaves it open
 * (`t` and `T`), the unit tells.
 */
export function quantityOfName(name: string, unit: FileUnit | null): ColumnName {
  if (derivative.test(name)) return { quantity: 'derivative' }
  const exact = name
    .replace(/[^\p{L}\p{N}%]+/gu, ' ')
    .trim()
    .replace(/(\p{L})\d+(?=\s|$)/gu, '$1')
    .replace(/(?:\s\d+)+$/, '')
  const words = exact.normalize('NFKC').toLowerCase()

  if (/^t$/.test(words)) {
    if (unit?.dimension === 'time') return value('time')
    if (unit?.dimension === 'temperature') return value('temperature')
    return value(exact === 't' ? 'time' : 'temperature')
  }
  if (/^t ?s$/.test(words) || /^(?:t sample|sample t)$/.test(words)) return value('temperature', 0)
  if (/^t ?(?:r|ref|prog|program|set|f|furnace)$/.test(words)) return value('temperature', 2)
  // `T a (°C)`, `m 2 (mg)`: the unit vouches for a symbol with something behind it.
  if (/^t\b/.test(words) && unit?.dimension === 'time') return value('time')
  if (/\b(?:temp|temperature)\b/.test(words) || (/^t\b/.test(words) && unit?.dimension === 'temperature')) {
    return value('temperature', otherTemperature.test(words) ? 2 : /\bsample\b/.test(words) ? 0 : 1)
  }
  if (/^(?:(?:elapsed|run|test|total|measurement|measuring|experiment|scan|segment) )?time\b/.test(words)) {
    return /\b(?:constant|stamp|of day)\b/.test(words) ? { quantity: 'other' } : value('time', /\bsegment\b/.test(words) ? 2 : 1)
  }
  if (/\bhrr\b|\b(?:heat release rate|rate of heat release|heat release)\b/.test(words)) {
    return notTheHeatFlow.test(words) || /\b(?:total|thr|peak)\b/.test(words) ? { quantity: 'other' } : value('heat-release')
  }
  if (/\bheat ?(?:flow|flux)\b|\bheatflow\b|\bdsc\b|^hfr?$|^q$/.test(words)) {
    return notTheHeatFlow.test(words) ? { quantity: 'other' } : value('heat-flow', /\btotal\b/.test(words) ? 0 : 1)
  }
  if (/\bconversion\b|\bconv\b|\balpha\b|^\u03b1$|\bextent\b|\bdegree of (?:cure|conversion|reaction)\b/.test(words))
    return value('conversion')
  if (/\b(?:flow|spec|spectrum|spectrometer|number|charge|initial)\b/.test(words)) return { quantity: 'other' }
  if (/^[mw]\b/.test(words) && unit?.dimension === 'mass') return value('mass')
  if (/\b(?:mass|weight|wt|tg|tga)\b|^[mw]$|^(?:\u03b4|delta) ?[mw]$/.test(words)) {
    const as = /\bloss\b/.test(words) ? 'loss' : /\bchange\b|\u03b4|\bdelta\b/.test(words) ? 'change' : 'value'
    return { quantity: 'mass', rank: as === 'value' ? 1 : 2, as }
  }
  return { quantity: 'other' }
}

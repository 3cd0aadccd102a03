import { zeroCelsius_K } from '../../shared-kinetics/units/constants.ts'
import { applyScale, type LinearScale, unscaled } from './linear-scale.ts'

export type Dimension = 'time' | 'temperature' | 'mass' | 'fraction' | 'power' | 'specific-power'

/** A unit as files write it, and the way to the SI unit of its dimension: s, K, kg, 1, W, W/kg. */
export interface FileUnit {
  /** One spelling of it, the same for all ways of writing it. */
  readonly word: string
  readonly dimension: Dimension
  readonly scale: LinearScale
  readonly toSI: (value: number) => number
}

function fileUnit(word: string, dimension: Dimension, parts: Partial<LinearScale>): FileUnit {
  const scale = { ...unscaled, ...parts }
  return { word, dimension, scale, toSI: (value) => applyScale(scale, value) }
}
const times = (word: string, dimension: Dimension, factor: number): FileUnit => fileUnit(word, dimension, { factor })
const over = (word: string, dimension: Dimension, divisor: number): FileUnit => fileUnit(word, dimension, { divisor })

const celsius = fileUnit('°C', 'temperature', { offset: zeroCelsius_K })
const fahrenheit = fileUnit('°F', 'temperature', { zero: 32, divisor: 1.8, offset: zeroCelsius_K })
const kelvin = times('K', 'temperature', 1)
const percent = over('%', 'fraction', 100)
const one = times('1', 'fraction', 1)

const spellings: readonly (readonly [FileUnit, readonly string[]])[] = [
  [times('s', 'time', 1), ['s', 'sec', 'secs', 'second', 'seconds']],
  [times('min', 'time', 60), ['min', 'mins', 'min.', 'minute', 'minutes']],
  [times('h', 'time', 3600), ['h', 'hr', 'hrs', 'hour', 'hours']],
  [over('ms', 'time', 1000), ['ms', 'msec', 'millisecond', 'milliseconds']],
  [kelvin, ['k', 'kelvin', 'degk']],
  [celsius, ['c', 'degc', 'celsius', 'degcelsius']],
  [fahrenheit, ['f', 'degf', 'fahrenheit', 'degfahrenheit']],
  [over('mg', 'mass', 1e6), ['mg', 'milligram', 'milligrams']],
  [over('g', 'mass', 1e3), ['g', 'gram', 'grams']],
  [over('ug', 'mass', 1e9), ['ug', 'microgram', 'micrograms']],
  [times('kg', 'mass', 1), ['kg']],
  [
    percent,
    ['%', 'percent', 'pct', 'wt%', 'wt.%', 'wt-%', 'mass%', 'mass-%', 'w%', 'm%', '%wt', '%mass', '%w/w', 'weight%', 'weightpercent'],
  ],
  [one, ['1', '-', '\u2013', '\u2014', 'fraction', 'dimensionless', 'mg/mg', 'g/g', 'kg/kg']],
  [over('mW', 'power', 1e3), ['mw', 'mj/s', 'milliwatt']],
  [times('W', 'power', 1), ['w', 'j/s', 'watt']],
  [over('uW', 'power', 1e6), ['uw', 'microwatt']],
  [times('W/g', 'specific-power', 1e3), ['w/g', 'mw/mg', 'kw/kg', 'j/s/g', 'j/gs', 'w/gram']],
  [times('mW/g', 'specific-power', 1), ['mw/g', 'uw/mg', 'w/kg']],
]

const byKey: ReadonlyMap<string, FileUnit> = new Map(spellings.flatMap(([unit, keys]) => keys.map((key) => [key, unit] as const)))

/** Signs that stand where a degree sign was before somebody's decoding: all are one character in front of C, F or K. */
const degreeSigns =
  /^(?:\u00e2?[\u00b0\u00ba\u02da]|deg(?:rees?)?\.?|o|\?|\ufffd|\u221e|\u00a1|\u00f8)\s*(?=[ckf]|celsius|fahrenheit|kelvin)/

/**
 * The unit a piece of text names, brackets around it allowed: `[mg]`, `(°C)`, `mW/mg`, `W g⁻¹`, `W per g`, `wt.-%`; null for anything else.
 * Capitals do not matter: `[k]` is kelvin.
 */
export function unitOf(text: string): FileUnit | null {
  if (text.length > 40) return null
  let key = text.trim()
  const bracketed = /^[([{]\s*(.*?)\s*[)\]}]$/.exec(key)
  if (bracketed !== null && !/[()[\]{}]/.test(bracketed[1] ?? '')) key = bracketed[1] ?? ''
  // NFKC would turn the ordinal sign that some write for a degree into an o.
  key = key.replace(/\u2103/g, '\u00b0C').replace(/\u2109/g, '\u00b0F')
  key = key
    .replace(/[\u00ba\u02da]/g, '\u00b0')
    .normalize('NFKC')
    .replace(/[\u03bc\u00b5]/g, 'u')
    .replace(/\u2212/g, '-')
    .toLowerCase()
  key = key.replace(degreeSigns, '')
  key = key.replace(/\s*\bper\b\s*/g, '/').replace(/[\s\u00b7\u22c5*]*\b([a-z]+)\s*\^?\s*\(?-\s*1\)?$/, '/$1')
  key = key.replace(/\s+/g, '').replace(/^wt\.-%$/, 'wt%')
  return byKey.get(key) ?? null
}

/** SI unit of a signal column by the dimension it was written in. */
export const signalUnitOf = { mass: 'kg', fraction: '1', power: 'W', 'specific-power': 'W/kg' } as const

import type { Parsed } from './parse-quantity.ts'
import { plainSuperscripts } from './plain-superscripts.ts'

/** The unit of a rate constant: one over a time, with or without a concentration: 1/s, 1/min, L/(mol s), … */
export interface RateUnit {
  /** One spelling of it, the same for all ways of writing it: `1/s`, `L/(mol s)`. */
  readonly text: string
  /** Times k in this unit is k per second, whatever else the unit holds. */
  readonly perSecond: number
  /** Nothing but a time: k of a first-order reaction, or of any model whose g(alpha) is a pure number. */
  readonly isPerTimeOnly: boolean
}

const secondsPer: Readonly<Record<string, number>> = { s: 1, min: 60, h: 3600, d: 86_400, week: 604_800, a: 31_557_600 }
const timeNames: Readonly<Record<string, string>> = {
  s: 's',
  sec: 's',
  secs: 's',
  second: 's',
  seconds: 's',
  min: 'min',
  mins: 'min',
  minute: 'min',
  minutes: 'min',
  h: 'h',
  hr: 'h',
  hrs: 'h',
  hour: 'h',
  hours: 'h',
  d: 'd',
  day: 'd',
  days: 'd',
  week: 'week',
  weeks: 'week',
  a: 'a',
  yr: 'a',
  year: 'a',
  years: 'a',
}
const otherNames: Readonly<Record<string, string>> = { l: 'L', litre: 'L', liter: 'L', mole: 'mol', moles: 'mol', percent: '%' }
/** What else stands in units of rate constants; anything else is a word, not a unit. */
const others =
  /^(?:L|mL|uL|dL|mol|mmol|umol|nmol|kmol|M|mM|uM|nM|m|dm|cm|mm|g|mg|ug|kg|%|molecule|molecules|Pa|kPa|MPa|bar|atm|Torr|N|J|K)$/

type Powers = ReadonlyMap<string, number>

/**
 * The unit of a rate constant as written: `1/s`, `s-1`, `min^-1`, `h⁻¹`, `per day`, `L/(mol s)`, `L mol-1 s-1`, `M-1 s-1`, `dm3/mol/s`, `cm³ molecule⁻¹ s⁻¹`.
 * A year is 365.25 days. What follows a slash stays below it where only so a time is left below (`L/mol s`).
 *
 * @returns the unit, or the reason in words; a unit without a time below is none of a rate constant
 */
export function parseRateUnit(text: string): Parsed<RateUnit> {
  const written = plain(text)
  if (written === '' || text.length > 60) return { ok: false, reason: `"${text.trim().slice(0, 60)}" is no unit of a rate constant` }
  const readings = (['next', 'rest'] as const).map((below) => powersOf(written, below)).filter((powers) => powers !== null)
  if (readings.length === 0) return { ok: false, reason: `"${text.trim()}" is no unit; units are such as 1/s, 1/min, 1/h or L/(mol s)` }
  for (const powers of readings) {
    const times = [...powers].filter(([name]) => secondsPer[name] !== undefined)
    const [time] = times
    if (times.length !== 1 || time?.[1] !== -1) continue
    const unit = { text: spelled(powers), perSecond: 1 / (secondsPer[time[0]] ?? Number.NaN), isPerTimeOnly: powers.size === 1 }
    return { ok: true, value: unit }
  }
  return { ok: false, reason: `"${text.trim()}" has no time below the line; a rate constant is per s, min, h or d` }
}

function plain(text: string): string {
  return plainSuperscripts(text.trim())
    .replaceAll('−', '-')
    .replaceAll('–', '-')
    .replaceAll('µ', 'u')
    .replaceAll('μ', 'u')
    .replaceAll(/\bper\b|_per_/gi, '/')
    .replaceAll(/[·⋅×*]|(?<=[a-z])\.(?=[a-z])/gi, ' ')
    .replaceAll(/\s*([/^()])\s*/g, '$1')
    .replaceAll(/\^\((-?\d+)\)/g, '^$1')
    .trim()
}

/** Powers of each symbol; `below` tells whether a slash takes the next factor or all the rest with it. Null for what is no unit. */
function powersOf(text: string, below: 'next' | 'rest'): Powers | null {
  const powers = new Map<string, number>()
  let at = 0
  const group = (sign: 1 | -1): boolean => {
    let direction = sign
    let isFirst = true
    while (at < text.length && text[at] !== ')') {
      if (text[at] === '/') {
        direction = -sign as 1 | -1
        at++
      } else if (text[at] === ' ') {
        if (below === 'next') direction = sign
        at++
        continue
      } else if (!isFirst && text[at - 1] !== ' ' && text[at - 1] !== '/' && text[at] !== '(') return false
      if (!factor(direction)) return false
      if (below === 'next') direction = sign
      isFirst = false
    }
    return true
  }
  const factor = (direction: 1 | -1): boolean => {
    if (text[at] === '(') {
      at++
      const isWhole = group(direction) && text[at] === ')'
      at++
      return isWhole
    }
    const match = /^(?:(1)(?![\d.])|([a-z%]+)(?:\^?(-?\d))?)/i.exec(text.slice(at))
    if (match === null) return false
    at += match[0].length
    if (match[1] !== undefined) return true
    const name = nameOf(match[2] ?? '')
    if (name === null) return false
    powers.set(name, (powers.get(name) ?? 0) + direction * Number(match[3] ?? 1))
    return true
  }
  if (!group(1) || at < text.length || powers.size === 0 || powers.size > 4) return null
  return new Map([...powers].filter(([, power]) => power !== 0))
}

function nameOf(symbol: string): string | null {
  const lower = symbol.toLowerCase()
  // Case tells M (mol/L) from m; times and words are written either way.
  return timeNames[lower] ?? otherNames[lower] ?? (others.test(symbol) ? symbol : null)
}

function spelled(powers: Powers): string {
  const side = (sign: 1 | -1): string[] =>
    [...powers].flatMap(([name, power]) => (power * sign > 0 ? [power * sign === 1 ? name : `${name}^${power * sign}`] : []))
  const [above, under] = [side(1), side(-1).toSorted((a, b) => Number(isTime(a)) - Number(isTime(b)))]
  const top = above.length === 0 ? '1' : above.join(' ')
  return `${top}/${under.length === 1 ? (under[0] ?? '') : `(${under.join(' ')})`}`
}

const isTime = (name: string): boolean => secondsPer[name.replace(/\^.*/, '')] !== undefined

import { type FileUnit, unitOf } from './file-unit.ts'
import { type HeatingRateText, heatingRatesIn } from './heating-rate-text.ts'
import { dimensionsOf, quantityOfName } from './column-quantity.ts'

/** A column heading taken apart. */
export interface Heading {
  /** As the file has it. */
  readonly text: string
  /** What is left without unit and heating rate. */
  readonly name: string
  readonly unit: FileUnit | null
  /** Text that stands where a unit stands; null where there is none. */
  readonly unitText: string | null
  readonly heatingRate: HeatingRateText | null
}

/**
 * Takes a heading apart: `Time (s)`, `T/degC`, `Heat flow/mW/mg`, `Mass, mg`, `temperature_C`, `Mass%`,
 * `Reversing Heat Flow (Normalized) W/g`, `Temp 4 K/min (°C)`.
 */
export function parseHeading(text: string): Heading {
  const plain = text
    .replace(/[\u2212]/g, '-')
    .replace(/\u2103/g, '\u00b0C')
    .replace(signWords, ' ')
    .replace(/\s+/g, ' ')
    .trim()
  const rates = heatingRatesIn(plain)
  const heatingRate = rates.length === 1 ? (rates[0] ?? null) : null
  const withoutRate = heatingRate === null ? plain : removeRate(plain, heatingRate.text)
  // In `d(Mass)/dT` the slash stands before no unit.
  const parts = /[/)]\s*d[tT]\s*$/.test(withoutRate) ? null : (bracketUnit(withoutRate) ?? wordUnit(withoutRate))
  const name = (parts?.name ?? withoutRate)
    .replace(/[\s/,;:_]+$/, '')
    .replace(/\s+/g, ' ')
    .trim()
  return { text: text.trim(), name, unit: parts?.unit ?? null, unitText: parts?.unitText ?? null, heatingRate }
}

/** Which way exothermic events point: read elsewhere, and no part of name or unit. */
const signWords = /[([]?[\s,;]*\b(?:exo|endo)(?:thermic)?\s*(?:up|down|\u2191|\u2193)(?![a-z])\s*[)\]]?/gi

type Parts = Pick<Heading, 'name' | 'unit' | 'unitText'>

function removeRate(heading: string, rate: string): string {
  const at = heading.indexOf(rate)
  if (at < 0) return heading
  const before = heading.slice(0, at).replace(/(?:\bat|@)\s*$/, '')
  return `${before} ${heading.slice(at + rate.length)}`
    .replace(/[([{]\s*[)\]}]/g, ' ')
    .replace(/\s+/g, ' ')
    .trim()
}

/** The last bracket that holds a unit; else one at the end that looks like a unit we do not know. */
function bracketUnit(heading: string): Parts | null {
  const brackets = [...heading.matchAll(/[([{]([^()[\]{}]*)[)\]}]/g)].reverse()
  for (const { 0: whole, 1: inside = '', index } of brackets) {
    const unit = unitOf(inside)
    if (unit !== null) return { name: `${heading.slice(0, index)} ${heading.slice(index + whole.length)}`, unit, unitText: inside.trim() }
  }
  const [last] = brackets
  if (last === undefined || last.index === 0 || last.index + last[0].length < heading.length) return null
  const inside = (last[1] ?? '').trim()
  const isWord = /^[a-z][a-z .-]{2,}$/i.test(inside) || inside === '' || /^\d+$/.test(inside)
  // A unit may still stand elsewhere: `Heat flow W/g (corr 2)`.
  const elsewhere = wordUnit(heading.slice(0, last.index))
  if (elsewhere !== null && elsewhere.unit !== null) return { ...elsewhere, name: `${elsewhere.name} ${last[0]}` }
  return isWord ? null : { name: heading.slice(0, last.index), unit: null, unitText: inside }
}

// Last words before a slash: in `Heat flow W/g` the slash belongs to the unit.
const wordUnit = (heading: string): Parts | null => trailingUnit(heading) ?? slashUnit(heading) ?? commaUnit(heading)

function slashUnit(heading: string): Parts | null {
  const slash = heading.indexOf('/')
  if (slash <= 0) return null
  const name = heading.slice(0, slash).trim()
  const unitText = heading.slice(slash + 1).trim()
  const unit = unitOf(unitText)
  if (unit !== null) return { name, unit, unitText }
  // `DSC/µV`: a known name with a unit that is none of ours.
  const known = quantityOfName(name, null)
  return known.quantity !== 'other' && !/\s/.test(unitText) ? { name, unit: null, unitText } : null
}

function commaUnit(heading: string): Parts | null {
  const comma = Math.max(heading.lastIndexOf(','), heading.lastIndexOf(';'))
  if (comma <= 0) return null
  const unitText = heading.slice(comma + 1).trim()
  const unit = unitOf(unitText)
  return unit === null ? null : { name: heading.slice(0, comma), unit, unitText }
}

/** A unit as the last words, or glued to the name: `heat_flow_W_per_g`, `Temp. in °C`, `Mass%`. */
function trailingUnit(heading: string): Parts | null {
  const words = heading.split(/[\s_]+/)
  let unknown: Parts | null = null
  for (const count of [3, 2, 1]) {
    if (words.length <= count) continue
    const unitText = words.slice(-count).join(' ')
    const unit = unitOf(unitText)
    const name = words
      .slice(0, -count)
      .join(' ')
      .replace(/\s+in$/i, '')
    if (unit === null || unit.word === '1') continue
    const fit = fits(name, unit)
    // In `Sample mass %` the unit is `%` and not `mass %`: a name that is known counts for more.
    if (fit === 'known') return { name, unit, unitText }
    if (fit === 'unknown name') unknown ??= { name, unit, unitText }
  }
  if (unknown !== null) return unknown
  const glued = /^(.*[A-Za-z.)])(%|\u00b0[CFK])$/.exec(heading)
  const unit = glued === null ? null : unitOf(glued[2] ?? '')
  return glued === null || unit === null ? null : { name: glued[1] ?? '', unit, unitText: glued[2] ?? '' }
}

/** A single letter at the end of a name is a unit only where the name asks for one of its kind: `Temperature C`, not `Sample C`. */
function fits(name: string, unit: FileUnit): 'known' | 'unknown name' | 'no' {
  const { quantity } = quantityOfName(name, unit)
  if (quantity === 'other' || quantity === 'derivative') {
    return !/^[a-z]$/i.test(unit.word) && unit.dimension !== 'temperature' ? 'unknown name' : 'no'
  }
  return dimensionsOf[quantity].includes(unit.dimension) ? 'known' : 'no'
}

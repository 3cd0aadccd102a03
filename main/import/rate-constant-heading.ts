import type { TemperatureUnit } from '../../shared-kinetics/rate-constants/rate-constant-table.ts'
import { plainSuperscripts } from '../../shared-kinetics/units/plain-superscripts.ts'
import { parseRateUnit } from '../../shared-kinetics/units/rate-unit.ts'
import { unitOf } from './file-unit.ts'
import { parseHeading } from './parse-heading.ts'

/** What a column of a table of rate constants holds, as its heading says. */
export type RateConstantColumn =
  | { readonly role: 'temperature'; readonly unit: TemperatureUnit | null }
  /** `factor`/T, e.g. 1000/T in 1/K. */
  | { readonly role: 'inverse-temperature'; readonly factor: 1 | 1000 }
  /** `scale`: the column times this is k (or ln k, log10 k). */
  | {
      readonly role: 'rate-constant'
      readonly form: 'k' | 'ln' | 'log10'
      readonly scale: number
      readonly unit: string | null
      readonly unitText: string
      readonly remark: string | null
    }
  | { readonly role: 'uncertainty'; readonly relative: 'no' | 'fraction' | 'percent'; readonly unit: string | null }
  | { readonly role: 'label' }
  | { readonly role: 'other' }
  /** Two meanings are possible. */
  | { readonly role: 'unclear'; readonly why: string }

const temperatureNames = /^(?:t|temp|temperature|temperatur|ϑ|θ)(?:[\s_.,:;/()[\]°]|$)/i
const inverseNames = /^(?:(?:1000|1e3|10\^?3)\s*k?|1)\s*\/\s*\(?\s*t\b|^t\s*\^?\s*-1\b|^(?:inverse|reciprocal)\s+(?:absolute\s+)?temp/i
const rateNames =
  /^(?:k[\s_]*\{?(?:obs|app|eff|exp|calc|\d)\}?|k(?:\s*\(T\))?|rate[\s_]*const(?:ant|\.)?(?:[\s_]*\(?k\)?(?![a-z]))?|rate[\s_]*coefficient(?:[\s_]*\(?k\)?(?![a-z]))?)(?![a-z])/i
const uncertaintyNames =
  /^(?:u\s*\(|±|\+\/-|σ|sigma|s\.?\s?e\.?(?![a-z])|s\.?\s?d\.?(?![a-z])|std|stdev|standard\s+(?:error|deviation|uncertainty)|(?:relative\s+)?(?:uncertainty|error)|rel\.?\s+|d(?:elta\s*)?k(?![a-z])|Δk|err(?![a-z]))/i
const labelNames = /^(?:sample|label|run|name|no\.?|nr\.?|number|#|id|point|note|remark|comment|source|ref)(?![a-z])/i

/**
 * Reads a heading: `T (°C)`, `T/K`, `temperature_K`, `1000/T (1/K)`, `k / s-1`, `k (min^-1)`, `k_per_s`, `10^5 k (1/s)`, `k (10^-5 1/s)`, `ln k`, `ln(k/s-1)`,
 * `log10 k`, `u(k)`, `relative uncertainty (%)`, `sample`.
 *
 * A power of ten outside the unit is what k was multiplied by for the table; inside the unit it is part of the unit (quantity calculus). `k × 10^-5` and
 * `(×10^5 1/s)` are used both ways and called unclear.
 */
export function rateConstantHeading(text: string): RateConstantColumn {
  const heading = plain(text)
  if (heading === '') return { role: 'other' }
  if (inverseNames.test(heading)) return { role: 'inverse-temperature', factor: /1000|1e3|10\^?-?3/i.test(heading) ? 1000 : 1 }
  if (/^k[\s_]+(?:standard |std |rel\w*\.? )?(?:err|uncert|s\.?[ed]\b|dev)/i.test(heading)) return uncertainty(heading)
  const rate = rateConstant(heading)
  if (rate !== null) return rate
  if (uncertaintyNames.test(heading)) return uncertainty(heading)
  if (labelNames.test(heading)) return { role: 'label' }
  const unit = parseHeading(heading).unit ?? unitOf(heading)
  if (unit?.dimension === 'temperature') return { role: 'temperature', unit: shortUnit(unit.word) }
  if (temperatureNames.test(heading)) {
    const rest = heading.replace(/^[a-zϑθ]+/i, '').replaceAll(/[\s_.,:;/()[\]]/g, '')
    return rest === '' || !/[a-z%]/i.test(rest) ? { role: 'temperature', unit: null } : { role: 'other' }
  }
  // A unit alone.
  const alone = parseRateUnit(heading)
  return alone.ok
    ? { role: 'rate-constant', form: 'k', scale: 1, unit: alone.value.text, unitText: heading, remark: null }
    : { role: 'other' }
}

const shortUnit = (word: string): TemperatureUnit => (word === '°C' ? 'C' : word === '°F' ? 'F' : 'K')

function plain(text: string): string {
  return plainSuperscripts(text.replace(/^\s*#+\s*/, ''))
    .replaceAll(/[−–]/g, '-')
    .replaceAll(/[×⋅·*]/g, '·')
    .replaceAll('℃', '°C')
    .replaceAll(/\s+/g, ' ')
    .trim()
}

const power = /^(?:10\s*\^?\s*\(?\s*(-?\d{1,2})\s*\)?|1?e(-?\d{1,2}))(?![\d.])/i

function rateConstant(heading: string): RateConstantColumn | null {
  // 10^5 k: the power stands before the name.
  const before = power.exec(heading)
  const named = before === null ? heading : heading.slice(before[0].length).replace(/^[\s·x]+/i, '')
  const log = /^(ln|log_?10|lg|log)\s*[([{]?\s*(?=k\b|rate)/i.exec(named)
  const name = named.slice(log?.[0].length ?? 0)
  const match = rateNames.exec(name)
  // A lone capital K is kelvin.
  if (match === null || (log === null && /^K(?![a-z_])/.test(name) && name.length === 1)) return null
  const form = log === null ? 'k' : /^ln/i.test(log[1] ?? '') ? 'ln' : 'log10'
  let rest = name.slice(match[0].length)
  // `ln(k) …` closes its bracket behind k, `ln(k/s-1)` at the end.
  if (log !== null && /[([{]\s*$/.test(log[0]))
    rest = /^\s*[)\]}]/.test(rest) ? rest.replace(/^\s*[)\]}]/, '') : rest.replace(/[)\]}]\s*$/, '')
  const after = /^\s*(?:·|x)\s*/i.exec(rest)
  const afterPower = after === null ? null : power.exec(rest.slice(after[0].length))
  if (after !== null && afterPower !== null) rest = rest.slice(after[0].length + afterPower[0].length)
  const outside = exponentOf(before) ?? exponentOf(afterPower)
  const unit = unitPart(rest, form)
  if (unit === null) return { role: 'unclear', why: `the unit in it, “${rest.trim()}”, is not known as one of a rate constant` }
  if (outside !== null && outside < 0) return { role: 'unclear', why: `k may have been multiplied or divided by 10^${outside} for it` }
  if (unit.isTimes && unit.exponent > 0)
    return { role: 'unclear', why: `k may have been multiplied or divided by 10^${unit.exponent} for it` }
  if (form !== 'k' && (outside !== null || unit.exponent !== 0))
    return { role: 'unclear', why: 'it takes a logarithm and a power of ten together' }
  const scale = Number(`1e${unit.exponent - (outside ?? 0)}`)
  const said = [
    form === 'log10' && /^log$/i.test(log?.[1] ?? '') ? 'log was read as the decimal logarithm' : '',
    scale === 1 ? '' : `its numbers were multiplied by 10^${unit.exponent - (outside ?? 0)}`,
    unit.remark,
  ].filter((part) => part !== '')
  return { role: 'rate-constant', form, scale, unit: unit.text, unitText: unit.written, remark: said.length === 0 ? null : said.join('; ') }
}

const exponentOf = (match: RegExpExecArray | null): number | null => (match === null ? null : Number(match[1] ?? match[2]))

interface UnitPart {
  readonly text: string | null
  readonly written: string
  /** Power of ten inside the unit. */
  readonly exponent: number
  /** A sign of multiplication stands before that power. */
  readonly isTimes: boolean
  readonly remark: string
}

/** null where something stands there that is no unit. */
function unitPart(rest: string, form: 'k' | 'ln' | 'log10'): UnitPart | null {
  const none: UnitPart = { text: null, written: '', exponent: 0, isTimes: false, remark: '' }
  const spaced = rest.replaceAll('_', ' ').replaceAll(/\s+/g, ' ').trim()
  let body = spaced.replace(/^in /i, '').replace(/^[,;:]\s*/, '')
  const isBelow = body.startsWith('/')
  body = unwrapped(isBelow ? body.slice(1).trim() : body)
  if (body === '' || /^(?:-|\?)$/.test(body)) return none
  const times = /^·\s*/.exec(body)
  if (times !== null) body = body.slice(times[0].length)
  const scale = power.exec(body)
  const symbols = scale === null ? body : body.slice(scale[0].length).replace(/^[\s·]+/, '')
  const exponent = exponentOf(scale) ?? 0
  const written = symbols
  const parsed = parseRateUnit(symbols)
  const base = { written, exponent, isTimes: times !== null && scale !== null }
  if (parsed.ok) return { ...base, text: parsed.value.text, remark: '' }
  // `k/min` is meant as k per minute, though it says k divided by a minute; `ln(k·s)` takes k times a second.
  const below = isBelow || (form !== 'k' && times !== null) ? parseRateUnit(`1/${symbols}`) : parsed
  return below.ok ? { ...base, text: below.value.text, isTimes: false, remark: `its unit was read as ${below.value.text}` } : null
}

/** Without brackets around the whole; one pass, however deep they are. */
function unwrapped(text: string): string {
  const closedAt = new Map<number, number>()
  const open: number[] = []
  for (let i = 0; i < text.length; i++) {
    if ('([{'.includes(text.charAt(i))) open.push(i)
    else if (')]}'.includes(text.charAt(i))) closedAt.set(open.pop() ?? -1, i)
  }
  let [from, to] = [0, text.length]
  while (closedAt.get(from) === to - 1) {
    from++
    to--
    while (text[from] === ' ') from++
    while (to > from && text[to - 1] === ' ') to--
  }
  return text.slice(from, to)
}

function uncertainty(heading: string): RateConstantColumn {
  const isPercent = heading.includes('%')
  const isRelative = isPercent || /^rel|relative|ln\s*\(?k/i.test(heading)
  if (isRelative) return { role: 'uncertainty', relative: isPercent ? 'percent' : 'fraction', unit: null }
  const written = /[([]([^()[\]]*(?:\([^()]*\))?[^()[\]]*)[)\]]\s*$/.exec(heading)?.[1] ?? heading.split(' / ')[1] ?? ''
  const unit = parseRateUnit(written)
  return { role: 'uncertainty', relative: 'no', unit: unit.ok ? unit.value.text : null }
}

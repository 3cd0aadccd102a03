import type { RateConstantRow, TemperatureUnit } from '../../../shared-kinetics/contract/study-result.ts'
import { parseTemperature, type Parsed } from '../../../shared-kinetics/units/parse-quantity.ts'
import { cellWithPlainPowers, hasPowerWithoutSign, powerWithoutSign, withPlainPowers } from '../../../shared-kinetics/units/plain-powers.ts'
import { parseRateUnit } from '../../../shared-kinetics/units/rate-unit.ts'
import { inUnit, ratioOfUnits, temperatureUnitWords } from './rate-constant-edits.ts'

/** Hotter than any reaction is measured; the schema of a study takes no more. */
const hottest_K = 10_000

const no = (reason: string): { readonly ok: false; readonly reason: string } => ({ ok: false, reason })

/** `25`, `25,5`, `298 K`, `77 °F`; a bare number is in the table's own unit. */
export function parseCellTemperature(text: string, unit: TemperatureUnit): Parsed<number> {
  const whole = /[a-z]\s*$/i.test(text) ? text : `${text} ${unit}`
  const parsed = parseTemperature(whole)
  if (!parsed.ok) return no(text.trim() === '' ? 'A temperature is missing.' : `${sentence(parsed.reason)}.`)
  return parsed.value <= hottest_K ? parsed : no(`${text.trim()} is hotter than any reaction is measured.`)
}

/** k with the unit that stands behind it, if one does. */
export interface CellRateConstant {
  readonly rateConstant: number
  /** The unit the table gets by it: its own, or the one typed where it has none. */
  readonly rateUnit: string
}

/** `3.46e-5`, `3,46·10⁻⁵`, `2.1e-3 1/min`: a unit of the same kind is converted to the table's own. */
export function parseCellRateConstant(text: string, rateUnit: string): Parsed<CellRateConstant> {
  const lost = lostPower(text)
  if (lost !== null) return lost
  const split = splitNumber(text)
  if (split === null) return no(text.trim() === '' ? 'A rate constant is missing.' : `“${text.trim()}” is no number; write k as 3.46e-5.`)
  if (!(split.number > 0)) return no(`A rate constant is greater than 0; ${text.trim()} has no logarithm.`)
  if (split.rest === '') return { ok: true, value: { rateConstant: split.number, rateUnit } }
  const typed = parseRateUnit(split.rest)
  if (!typed.ok) return no(`${sentence(typed.reason)}.`)
  if (rateUnit === '') return { ok: true, value: { rateConstant: split.number, rateUnit: typed.value.text } }
  const ratio = ratioOfUnits(typed.value.text, rateUnit)
  return ratio === null
    ? no(`${typed.value.text} cannot be converted to ${rateUnit}, the unit of this table.`)
    : { ok: true, value: { rateConstant: split.number * ratio, rateUnit } }
}

/** One standard uncertainty of k: in the unit of k, or as a share of it (`5 %`); empty for none. */
export function parseCellUncertainty(text: string, row: Pick<RateConstantRow, 'rateConstant'>, rateUnit: string): Parsed<number | null> {
  if (text.trim() === '') return { ok: true, value: null }
  const lost = lostPower(text)
  if (lost !== null) return lost
  const split = splitNumber(text)
  if (split === null) return no(`“${text.trim()}” is no number; write u(k) as 2e-6 or as 5 %.`)
  if (!(split.number > 0)) return no('An uncertainty is greater than 0; leave the cell empty where there is none.')
  if (split.rest === '%') return { ok: true, value: (row.rateConstant * split.number) / 100 }
  const value = parseCellRateConstant(text, rateUnit)
  return value.ok ? { ok: true, value: value.value.rateConstant } : value
}

/** Temperatures at which k is wanted: `25 C, 310 K`, `25,5; 30`; bare numbers are in the table's own unit. A comma parts them where a blank or a letter stands beside it. */
export function parseTemperatures(text: string, unit: TemperatureUnit): Parsed<readonly number[]> {
  const parts = text
    .split(/;|\band\b|,(?=\s)|(?<=[a-z])\s*,/i)
    .map((part) => part.trim())
    .filter((part) => part !== '')
  const values: number[] = []
  for (const part of parts) {
    const parsed = parseCellTemperature(part, unit)
    if (!parsed.ok) return parsed
    values.push(parsed.value)
  }
  return { ok: true, value: values }
}

export const temperaturesText = (temperatures_K: readonly number[], unit: TemperatureUnit): string =>
  temperatures_K.map((T) => `${temperatureText(T, unit)} ${temperatureUnitWords[unit]}`).join('; ')

/** What stands in the field of predictions: what was typed, as long as the study asks for just that; else the temperatures in the table's unit. */
export function predictionsText(
  temperatures_K: readonly number[],
  unit: TemperatureUnit,
  typed: { readonly text: string; readonly temperatures_K: readonly number[] } | null,
): string {
  const isAsTyped = typed?.temperatures_K.length === temperatures_K.length && typed.temperatures_K.every((T, i) => T === temperatures_K[i])
  return isAsTyped ? typed.text : temperaturesText(temperatures_K, unit)
}

/** The number as it stands in a cell: nothing of a conversion's rounding, nothing lost of what was typed. */
export const temperatureText = (temperature_K: number, unit: TemperatureUnit): string =>
  String(Number(inUnit(temperature_K, unit).toFixed(6))).replace('-', '−')

/** k as it can be typed: all its digits, with a power of ten where it is small or large. */
export function rateConstantText(value: number | null): string {
  if (value === null) return ''
  const digits = Number(value.toPrecision(10))
  return digits < 1e-2 || digits >= 1e5 ? digits.toExponential().replace('e+', 'e') : String(digits)
}

const shape = /^([+-]?(?:\d+(?:[.,]\d*)?|[.,]\d+))(?:e([+-]?\d+))?\s*(.*)$/i

/**
 * A number with decimal point or comma and, perhaps, a power of ten, and what stands behind it; null for what is no number. Powers of ten are read as in a table that is
 * pasted.
 */
function splitNumber(text: string): { readonly number: number; readonly rest: string } | null {
  const plain = cellWithPlainPowers(withPlainPowers(text.trim())).replaceAll('−', '-')
  const match = shape.exec(plain)
  if (match === null) return null
  const number = Number(`${(match[1] ?? '').replace(',', '.')}e${match[2] ?? '0'}`)
  return Number.isFinite(number) ? { number, rest: (match[3] ?? '').trim() } : null
}

/** Why a number cannot be told: its power of ten lost height and sign; null for any other text. */
const lostPower = (text: string): { readonly ok: false; readonly reason: string } | null =>
  hasPowerWithoutSign(withPlainPowers(text)) ? no(`“${text.trim()}” ${powerWithoutSign.reason} ${powerWithoutSign.remedy}`) : null

const sentence = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1)

import { celsiusToKelvin, fahrenheitToKelvin } from './convert.ts'
import type { Quantity } from './quantity.ts'

/** What a person typed, or why it cannot be meant. */
export type Parsed<T> = { readonly ok: true; readonly value: T } | { readonly ok: false; readonly reason: string }

interface NumberWithUnit {
  readonly number: number
  /** Lower case, without blanks and degree signs; empty where none was typed. */
  readonly unit: string
}

const shape = /^\s*([+-]?(?:\d+(?:[.,]\d*)?|[.,]\d+)(?:e[+-]?\d+)?)\s*(.*?)\s*$/i

function splitNumber(text: string): Parsed<NumberWithUnit> {
  const match = shape.exec(text.replaceAll('−', '-'))
  if (match === null) return { ok: false, reason: `"${text.trim()}" does not start with a number` }
  const unit = (match[2] ?? '').replaceAll(/[\s°º˚]/g, '').toLowerCase()
  return { ok: true, value: { number: Number((match[1] ?? '').replace(',', '.')), unit } }
}

/**
 * A temperature as typed: "250 C", "523 K", "482 °F", with decimal point or comma.
 * @param assumed - unit of a bare number
 * @returns kelvin above absolute zero, or the reason in words
 */
export function parseTemperature(text: string, assumed: 'K' | 'C' = 'C'): Parsed<Quantity<'K'>> {
  const split = splitNumber(text)
  if (!split.ok) return split
  const { number, unit } = split.value
  const name = unit === '' ? assumed.toLowerCase() : unit
  let value: Quantity<'K'>
  if (['k', 'kelvin'].includes(name)) value = number as Quantity<'K'>
  else if (['c', 'degc', 'celsius'].includes(name)) value = celsiusToKelvin(number)
  else if (['f', 'degf', 'fahrenheit'].includes(name)) value = fahrenheitToKelvin(number)
  else return { ok: false, reason: `"${unit}" is no unit of temperature; K, C and F are` }
  return value > 0 ? { ok: true, value } : { ok: false, reason: `${text.trim()} lies below absolute zero` }
}

const secondsPer: Readonly<Record<string, number>> = {
  s: 1,
  sec: 1,
  min: 60,
  h: 3600,
  hr: 3600,
  d: 86_400,
}

/** A time as typed: "90 s", "10 min", "1,5 h"; a bare number is in minutes. */
export function parseTime(text: string): Parsed<Quantity<'s'>> {
  const split = splitNumber(text)
  if (!split.ok) return split
  const { number, unit } = split.value
  const factor = secondsPer[unit === '' ? 'min' : unit]
  if (factor === undefined) return { ok: false, reason: `"${unit}" is no unit of time; s, min, h and d are` }
  return { ok: true, value: (number * factor) as Quantity<'s'> }
}

/** A heating rate as typed: "10 K/min", "10,4", "0.2 K/s"; a bare number is in K/min. Differences in °C and K are the same. */
export function parseHeatingRate(text: string): Parsed<Quantity<'K/s'>> {
  const split = splitNumber(text)
  if (!split.ok) return split
  const { number, unit } = split.value
  const match = /^(?:(?:deg)?[kcf])(?:\/|per|·|\*)?(s|sec|min|h|hr)(?:\^?-1|⁻¹)?$/.exec(unit === '' ? 'k/min' : unit)
  const per = secondsPer[match?.[1] ?? '']
  if (per === undefined) return { ok: false, reason: `"${unit}" is no unit of heating rate; K/min and K/s are` }
  const kelvins = /^(deg)?f/.test(unit) ? number / 1.8 : number
  return kelvins > 0
    ? { ok: true, value: (kelvins / per) as Quantity<'K/s'> }
    : { ok: false, reason: 'a heating rate is greater than zero' }
}

/** A difference of temperatures as typed: "0.5 K", "0,5", "1 °F"; a bare number is in K, and °C are as large. */
export function parseTemperatureDifference(text: string): Parsed<Quantity<'K'>> {
  const split = splitNumber(text)
  if (!split.ok) return split
  const { number, unit } = split.value
  const match = /^(?:deg)?([kcf]?)$/.exec(unit)
  if (match === null) return { ok: false, reason: `"${unit}" is no unit of a temperature difference; K, °C and °F are` }
  return { ok: true, value: (match[1] === 'f' ? number / 1.8 : number) as Quantity<'K'> }
}

/** A share as typed: "2 %", "2", "0,5 %"; a bare number is in percent. */
export function parsePercent(text: string): Parsed<Quantity<'1'>> {
  const split = splitNumber(text)
  if (!split.ok) return split
  const { number, unit } = split.value
  if (unit !== '' && unit !== '%') return { ok: false, reason: `"${unit}" is no unit of a share; % is` }
  return { ok: true, value: (number / 100) as Quantity<'1'> }
}

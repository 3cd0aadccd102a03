import type {
  LevelStatus,
  Maybe,
  MethodId,
  ProfileResult,
  RunInfo,
  SignalQuantity,
  Window,
} from '../../shared-kinetics/contract/study-result.ts'
import { kelvinToCelsius } from '../../shared-kinetics/units/convert.ts'

/** A number with a fixed count of decimals and a true minus sign; the empty text where it is not to be had. */
export function decimals(value: Maybe | undefined, count: number): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return ''
  return value.toFixed(count).replace('-', '−')
}

export const formatLevel = (level: number): string => {
  const text = String(Number(level.toPrecision(6)))
  return text.length < 4 ? level.toFixed(2) : text
}

export const formatCelsius = (temperature_K: Maybe | undefined): string =>
  temperature_K === null || temperature_K === undefined ? '' : decimals(kelvinToCelsius(temperature_K), 1)

/** Half the width of an interval, where both ends are had. */
export function halfWidth(lower: Maybe | undefined, upper: Maybe | undefined): Maybe {
  if (lower === null || lower === undefined || upper === null || upper === undefined) return null
  return (upper - lower) / 2
}

/** Whether an interval lies so unevenly about its value that ± would mislead: by more than a twentieth of its width. */
export function isLopsided(value: Maybe | undefined, lower: Maybe | undefined, upper: Maybe | undefined): boolean {
  if (value === null || value === undefined || lower === null || lower === undefined || upper === null || upper === undefined) return false
  return Math.abs((upper + lower) / 2 - value) > (upper - lower) / 20
}

/**
 * The interval about a value: `4.8`, `−4.1 +5.6` where it is lopsided by more than a twentieth of its width, `−4.1, open above` where it has one end only, and its ends,
 * `120.4 … 124.0`, where it does not hold the value.
 */
export function formatInterval(value: Maybe | undefined, lower: Maybe | undefined, upper: Maybe | undefined, count = 1): string {
  if (value === null || value === undefined) return ''
  const [low, high] = [lower ?? null, upper ?? null]
  if (low === null || high === null) {
    if (low !== null) return `−${decimals(value - low, count)}, open above`
    return high === null ? '' : `open below, +${decimals(high - value, count)}`
  }
  if (value < low || value > high) return `${decimals(low, count)} … ${decimals(high, count)}`
  if (isLopsided(value, low, high)) return `−${decimals(value - low, count)} +${decimals(high - value, count)}`
  const half = (high - low) / 2
  return half < 0.5 * 10 ** -count ? `< ${(10 ** -count).toFixed(count)}` : decimals(half, count)
}

/** A value with its interval: `146.1 ± 1.0`, `146.1 −4.1 +5.6`; the value alone where there is no interval. */
export function formatWithInterval(value: Maybe | undefined, lower: Maybe | undefined, upper: Maybe | undefined, count = 1): string {
  const interval = formatInterval(value, lower, upper, count)
  const number = decimals(value, count)
  if (interval === '') return number
  if (interval.includes('…')) return `${number} (${interval})`
  return /^[\d<]/.test(interval) ? `${number} ± ${interval}` : `${number} ${interval}`
}

/** A number with its sign, `+1.20`; 0 without one. */
export function formatSigned(value: Maybe | undefined, count: number): string {
  const text = decimals(value, count)
  if (text === '' || value === null || value === undefined) return text
  if (Number(value.toFixed(count)) === 0) return text.replace('−', '')
  return value > 0 ? `+${text}` : text
}

/** A heating rate in K/min to as many decimals as its standard error supports, two at least and four at most. */
export function formatHeatingRate(rate: Maybe, standardError: Maybe): string {
  return decimals(rate, rateDecimals(standardError))
}

export function formatRateError(standardError: Maybe): string {
  if (standardError === null) return ''
  const count = rateDecimals(standardError)
  return standardError < 0.5 * 10 ** -count ? `< ${(10 ** -count).toFixed(count)}` : decimals(standardError, count)
}

export const rateDecimals = (standardError: Maybe): number =>
  standardError === null || !(standardError > 0) ? 2 : Math.min(4, Math.max(2, Math.ceil(-Math.log10(standardError))))

export function formatWindow(window: Window): string {
  if (window.kind === 'temperature')
    return `${decimals(kelvinToCelsius(window.start_K), 0)} … ${decimals(kelvinToCelsius(window.end_K), 0)} °C`
  return `${decimals(window.start_s / 60, 1)} … ${decimals(window.end_s / 60, 1)} min`
}

export const count = (n: number, one: string, several = `${one}s`): string => `${n} ${n === 1 ? one : several}`

export const signalWords: Readonly<Record<SignalQuantity, string>> = {
  mass: 'Mass',
  conversion: 'Conversion',
  'heat-release': 'Heat release rate',
  'heat-flow': 'Heat flow',
}

/** Method names short enough for a heading or a button; the whole name is `ProfileResult.label`. */
export const shortMethodNames: Readonly<Record<MethodId, string>> = {
  friedman: 'Friedman',
  ofw: 'OFW',
  'ofw-corrected': 'OFW corrected',
  kas: 'KAS',
  starink: 'Starink',
  vyazovkin: 'Vyazovkin',
  'vyazovkin-incremental': 'Incremental',
  'isothermal-integral': 'Isothermal integral',
  'starink-1996': 'Starink 1996',
  tang: 'Tang',
  'astm-e1641': 'ASTM E1641',
  'iso-11358-2': 'ISO 11358-2',
}

/** The short name and, where it is short for something, the whole one: what a button is called. */
export function wholeMethodName({ method, label }: Pick<ProfileResult, 'method' | 'label'>): string {
  const short = shortMethodNames[method]
  return short === label ? label : `${short}, ${label}`
}

export const programmeWords = {
  'constant-heating-rate': 'constant heating rate',
  isothermal: 'isothermal',
  general: 'general',
} as const

/** Why a level has no number, short enough for a cell. */
export const statusWords: Readonly<Record<LevelStatus, string>> = {
  ok: '',
  'level-not-reached': 'not reached',
  'too-few-programmes': 'too few programmes',
  'rate-not-positive': 'dα/dt not positive',
  'line-not-determined': 'line not determined',
  'minimum-at-bound': 'minimum at bound',
  'minimum-flat': 'minimum flat',
  'several-minima': 'several minima',
}

export const nominalSourceWords: Readonly<Record<NonNullable<RunInfo['nominalHeatingRate']>['source'], string>> = {
  option: 'typed',
  heading: 'from the heading',
  preamble: 'from the preamble',
  name: 'from the file name',
}

/** A moment as `2026-12-01 14:05` in the reader's own time. */
export function formatMoment(iso: string): string {
  const moment = new Date(iso)
  if (Number.isNaN(moment.getTime())) return iso
  return `${moment.getFullYear()}-${twoDigits(moment.getMonth() + 1)}-${twoDigits(moment.getDate())} ${twoDigits(moment.getHours())}:${twoDigits(moment.getMinutes())}`
}

const twoDigits = (part: number): string => String(part).padStart(2, '0')

import { kelvinToCelsius } from '../units/convert.ts'
import type { ReviewedRun } from './review-input.ts'

/** Numbers as sentences give them: so many significant digits, no padding; very large and very small ones with a raised power of ten. */
export function digits(value: number, significant = 3): string {
  const rounded = Number(value.toPrecision(significant))
  const size = Math.abs(rounded)
  if (!Number.isFinite(size) || size === 0 || (size >= 1e-6 && size < 1e7)) return String(rounded)
  const [mantissa = '', power = ''] = rounded.toExponential().split('e')
  return `${mantissa} × 10${raised(String(Number(power)))}`
}

const raised = (power: string): string => power.replace(/[-\d]/g, (sign) => (sign === '-' ? '⁻' : ('⁰¹²³⁴⁵⁶⁷⁸⁹'[Number(sign)] ?? sign)))

export const percent = (share: number): string => `${digits(100 * share, 2)} %`

/** In both units, since a file may have either (or °F). */
export const celsiusAndKelvin = (kelvin: number): string => `${celsius(kelvin)} (${kelvin.toFixed(1)} K)`

export const celsius = (kelvin: number): string => `${(Math.round(kelvinToCelsius(kelvin) * 10) / 10).toFixed(1)} °C`

/** `a`, `a and b`, `a, b and c`. */
export function list(items: readonly string[]): string {
  const last = items.at(-1)
  return items.length <= 1 ? (last ?? '') : `${items.slice(0, -1).join(', ')} and ${last}`
}

/** Levels in one breath: single ones, or first to last where there are many. */
export function levelsInWords(levels: readonly number[]): string {
  const [first, last] = [levels[0], levels.at(-1)]
  if (first === undefined || last === undefined) return ''
  return levels.length <= 3 ? list(levels.map((level) => digits(level))) : `${digits(first)} to ${digits(last)} (${levels.length} levels)`
}

/** Runs of each distinct programme, slow to fast. */
export function programmesOf<Run extends Pick<ReviewedRun, 'result'>>(runs: readonly Run[]): Run[][] {
  const groups = new Map<number, Run[]>()
  for (const run of runs) groups.set(run.result.programmeGroup, [...(groups.get(run.result.programmeGroup) ?? []), run])
  return [...groups.entries()].sort(([a], [b]) => a - b).map(([, members]) => members)
}

export const mean = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0) / values.length

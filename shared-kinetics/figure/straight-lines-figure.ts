import type { MethodId } from '../isoconversional/result.ts'
import type { TemperatureUnit } from '../rate-constants/rate-constant-table.ts'
import type { LineResult, ProfileResult, StudyResult } from '../tasks/study-result.ts'
import { celsiusToKelvin, fahrenheitToKelvin, kelvinToCelsius } from '../units/convert.ts'
import type { Axis, Figure, Mark } from './figure.ts'
import { extentOf, levelText, niceAxis, niceStep, tickText } from './nice-axis.ts'
import { runNames, runTones } from './run-place.ts'

interface Ordinate {
  readonly label: string
  readonly unit: string
  /** Added to y, which methods hold with K/s and s, to reach the units drawn. */
  readonly shift: number
}

const perMinute = Math.log(60)
const perMinuteLog10 = Math.log10(60)
const none: Ordinate = { label: '', unit: '', shift: 0 }
const ordinates: Readonly<Record<MethodId, Ordinate>> = {
  friedman: { label: 'ln(dα/dt)', unit: 'dα/dt in 1/s', shift: 0 },
  ofw: { label: 'ln β', unit: 'β in K/min', shift: perMinute },
  'ofw-corrected': { label: 'ln β − δ', unit: 'β in K/min', shift: perMinute },
  kas: { label: 'ln(β/T²)', unit: 'β in K/min, T in K', shift: perMinute },
  starink: { label: 'ln(β/T^1.92)', unit: 'β in K/min, T in K', shift: perMinute },
  'isothermal-integral': { label: 'ln t', unit: 't in min', shift: -perMinute },
  'starink-1996': { label: 'ln(β/T^1.8)', unit: 'β in K/min, T in K', shift: perMinute },
  tang: { label: 'ln(β/T^1.894661)', unit: 'β in K/min, T in K', shift: perMinute },
  'astm-e1641': { label: 'log β', unit: 'β in K/min', shift: perMinuteLog10 },
  'iso-11358-2': { label: 'log β', unit: 'β in K/min', shift: perMinuteLog10 },
  vyazovkin: none,
  'vyazovkin-incremental': none,
}

/**
 * The straight lines a line method reads Ea from: one faint line a level over the points of its runs, against 1000/T, with °C along the
 * opposite edge. The axes hold every level, so that they stand still while the level moves. No marks for a method without lines.
 */
export function straightLinesFigure(result: StudyResult, methodId: MethodId): Figure {
  const profile = lineProfile(result, methodId)
  const { label, unit, shift } = ordinates[methodId]
  const lines = profile?.lines ?? []
  const marks: Mark[] = lines.flatMap((line, i) => {
    const drawn = drawnLine(line, shift)
    return drawn === null ? [] : [{ kind: 'line', name: levelName(result, i), tone: { kind: 'faint' }, ...drawn }]
  })
  const points = lines.flatMap((line) => pointsOf(line, shift))
  if (points.length > 0) {
    const [x, y] = [points.map((point) => point.x), points.map((point) => point.y)]
    marks.push({ kind: 'points', name: 'Runs at every level', tone: { kind: 'faint' }, x, y, joined: false })
  }
  const yAxis = niceAxis(...extentOf(points.map((point) => point.y)), 5)
  return {
    id: 'straight-lines',
    title: 'Straight lines at each conversion',
    description: `${profile?.label ?? methodId}: ${label} against 1000/T, one line through ${result.runs.length} runs at each of ${lines.length} levels of conversion; the slope gives Ea.`,
    x: inverseTemperatureAxis(points.map((point) => point.x)),
    y: { label, unit, min: yAxis.min, max: yAxis.max, second: null },
    marks,
  }
}

/** The line of one level in ink, and a point a run on it. */
export function straightLinesAtLevel(result: StudyResult, methodId: MethodId, levelIndex: number): Mark[] {
  const line = lineProfile(result, methodId)?.lines[levelIndex]
  if (line === undefined) return []
  const { shift } = ordinates[methodId]
  const drawn = drawnLine(line, shift)
  const marks: Mark[] = drawn === null ? [] : [{ kind: 'line', name: levelName(result, levelIndex), tone: { kind: 'ink' }, ...drawn }]
  const names = runNames(result.runs)
  for (const [i, tone] of runTones(result).entries()) {
    const point = pointOf(line, i, shift)
    if (point !== null) marks.push({ kind: 'points', name: names[i] ?? '', tone, x: [point.x], y: [point.y], joined: false })
  }
  return marks
}

function lineProfile(result: StudyResult, methodId: MethodId): ProfileResult | undefined {
  return result.profiles.find((profile) => profile.method === methodId && profile.evidence === 'line')
}

const levelName = (result: StudyResult, levelIndex: number): string => `α ${levelText(result.levels[levelIndex] ?? Number.NaN)}`

export interface Point {
  readonly x: number
  readonly y: number
}

/** A run's point as drawn, its ordinate moved by `shift`; null where the run has none. */
export function pointOf(line: LineResult, run: number, shift: number): Point | null {
  const x = line.x_per_K[run] ?? null
  const y = line.y[run] ?? null
  return x === null || y === null ? null : { x: x * 1000, y: y + shift }
}

const pointsOf = (line: LineResult, shift: number): Point[] =>
  line.x_per_K.map((_, run) => pointOf(line, run, shift)).filter((point) => point !== null)

/** The fitted line over its own points and a little beyond; null where the line is not determined. */
export function drawnLine(line: LineResult, shift: number): { readonly x: readonly number[]; readonly y: readonly number[] } | null {
  const { slope_K, intercept } = line
  const [low, high] = extentOf(line.x_per_K)
  if (slope_K === null || intercept === null || !Number.isFinite(low)) return null
  const overhang = (high - low) * 0.04
  const ends = [low - overhang, high + overhang]
  return { x: ends.map((x) => x * 1000), y: ends.map((x) => intercept + slope_K * x + shift) }
}

/** The axis of 1000/T around values of it, with round temperatures along the opposite edge, in °C where nothing else is asked for. */
export function inverseTemperatureAxis(x: readonly number[], unit: TemperatureUnit = 'C'): Axis {
  const [low, high] = extentOf(x)
  const { min, max } = niceAxis(low, high)
  return {
    label: '1000/T',
    unit: '1/K',
    min,
    max,
    second: { label: 'Temperature', unit: scales[unit].unit, ticks: temperatureTicks(min, max, scales[unit]) },
  }
}

interface TemperatureScale {
  readonly unit: string
  readonly fromKelvin: (temperature_K: number) => number
  readonly toKelvin: (temperature: number) => number
}

const scales: Readonly<Record<TemperatureUnit, TemperatureScale>> = {
  K: { unit: 'K', fromKelvin: (T) => T, toKelvin: (T) => T },
  C: { unit: '°C', fromKelvin: kelvinToCelsius, toKelvin: celsiusToKelvin },
  F: { unit: '°F', fromKelvin: (T) => kelvinToCelsius(T) * 1.8 + 32, toKelvin: fahrenheitToKelvin },
}

function temperatureTicks(
  min: number,
  max: number,
  { fromKelvin, toKelvin }: TemperatureScale,
): readonly { readonly at: number; readonly text: string }[] {
  if (!(min > 0)) return []
  const [coldest, hottest] = [fromKelvin(1000 / max), fromKelvin(1000 / min)]
  const step = niceStep((hottest - coldest) / 6)
  const ticks: { at: number; text: string }[] = []
  for (let i = Math.ceil(coldest / step - 1e-9); i * step <= hottest + step * 1e-9; i += 1) {
    ticks.push({ at: 1000 / toKelvin(i * step), text: tickText(i * step, step) })
  }
  return ticks.toReversed()
}

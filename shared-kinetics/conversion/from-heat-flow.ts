import { KineticsError } from '../errors.ts'
import { lineFit } from '../numerics/line-fit.ts'
import { areaProportionalBaseline, fitTangent, straightBaseline, tangentAt } from '../signal/baseline.ts'
import { cellMeans } from '../signal/cell-means.ts'
import { lowerBound } from '../signal/lower-bound.ts'
import { noiseOf } from '../signal/noise.ts'
import { findQuietEnds, lowestPeak, type QuietStretch } from '../signal/quiet-ends.ts'
import { kelvinToCelsius } from '../units/convert.ts'
import type { Column } from '../units/quantity.ts'
import type { Converted, HeatFlowBaseline } from './converted.ts'
import { fromPartialArea } from './partial-area.ts'
import { plateauAtEnd } from './plateau.ts'
import type { BaselineLine, DrawnBaseline } from './smooth-curve.ts'

/** A flank that has not come down to half the height of the peak where the data end leaves neither width nor baseline to be told. */
const highestStanding = 0.5
/** Without a quiet stretch at an end, the tangent there is level through the outermost share of the window. */
const outermost = 0.02

/**
 * Conversion from heat flow: α = partial area over area between signal and baseline, over time.
 *
 * - `area-proportional`: from the tangent before the peak to the tangent after it, in proportion to α itself. The tangents are fitted to the straight stretches at
 *   the ends of the window; an end without one gets a level line through its outermost 2 %.
 * - `straight`: between the ends of the window (the line through the outermost 2 % of it at either end).
 * - `level-at-end`: for holds, whose reaction may run from the first moment on: level through the plateau at the end of the window.
 *
 * A baseline is drawn through the ends of the window, so that the rate there is 0 by construction. `rateAtEnds` therefore tells how high the signal itself stands at
 * an end where its flank does not come to its foot, and for a hold how far it still drifts over the last fifth, as a share of its largest height.
 *
 * @param heatFlow - W or W/kg, either direction
 * @throws KineticsError `empty-window` where there is no peak inside the window, it ends above half the height of the peak, or no baseline can be drawn
 * @source hemminger-sarge-1991; ictac-2014
 */
export function fromHeatFlow(
  time_s: Column<'s'>,
  temperature_K: Column<'K'>,
  heatFlow: Float64Array,
  kind: HeatFlowBaseline,
  label: string,
): Converted {
  const last = time_s.length - 1
  const noise = noiseOf(time_s, heatFlow, 0, last)
  if (kind === 'level-at-end') return levelledAtEnd(time_s, temperature_K, heatFlow, noise, label)
  const quiet = findQuietEnds(time_s, heatFlow, 0, last)
  if (!(Math.abs(quiet.height) > lowestPeak * noise)) throw noPeak(label)
  const { standing } = quiet
  // At the start a drift that the furnace leaves behind can stand as high, with the whole peak after it: that is for a person to judge.
  if (standing.after > highestStanding) throw cutPeak(label, standing.after, temperature_K)
  const drawn: DrawnBaseline =
    kind === 'straight'
      ? { passes: 'with-time', lines: endLines(time_s, heatFlow) }
      : { passes: 'with-conversion', lines: tangents(time_s, heatFlow, quiet) }
  const baseline = kind === 'straight' ? straightBetweenEnds(time_s, drawn.lines) : areaProportional(time_s, heatFlow, drawn.lines, label)
  const converted = fromPartialArea(time_s, temperature_K, heatFlow, baseline, label, drawn)
  return {
    ...converted,
    baselineKind: kind,
    rateAtEnds: {
      start: Math.max(standing.before, converted.rateAtEnds?.start ?? 0),
      end: Math.max(standing.after, converted.rateAtEnds?.end ?? 0),
    },
  }
}

const noPeak = (label: string): KineticsError =>
  new KineticsError(
    'empty-window',
    `${label}: there is no peak in the heat flow inside the window. Move the window to where the reaction is.`,
    {
      run: label,
    },
  )

function cutPeak(label: string, standing: number, temperature_K: Column<'K'>): KineticsError {
  return new KineticsError(
    'empty-window',
    `${label}: at the end of the window the heat flow stands at ${Math.round(100 * standing)} % of the height of its peak, so that neither baseline nor area ` +
      `can be told. The window used is ${inWords(temperature_K[0])} to ${inWords(temperature_K.at(-1))}. Widen the window to the whole peak, or measure further.`,
    { run: label, standingAtEnd: standing },
  )
}

const inWords = (kelvin = Number.NaN): string => `${kelvin.toFixed(2)} K (${kelvinToCelsius(kelvin).toFixed(2)} °C)`

type Stretch = Pick<QuietStretch, 'inner' | 'outer'>

const excursionCells = 200
/** Part of a hold, at its end, over which its drift is read. */
const lastPart = 0.2

function levelledAtEnd(time_s: Column<'s'>, temperature_K: Column<'K'>, heatFlow: Float64Array, noise: number, label: string): Converted {
  const n = time_s.length
  const { value: level, rows, varianceOfMean } = plateauAtEnd(time_s, heatFlow, 'end', noise)
  const { y } = cellMeans(time_s, heatFlow, 0, n - 1, Math.min(excursionCells, Math.floor(n / 2)))
  const excursion = y.reduce((most, value) => Math.max(most, Math.abs(value - level)), 0)
  if (!(excursion > lowestPeak * noise)) throw noPeak(label)
  const [from_s, to_s] = [time_s[n - rows] ?? Number.NaN, time_s[n - 1] ?? Number.NaN]
  const line = { end: 'end', from_s, to_s, x: to_s, value: level, slope: 0, hasSlope: false, varianceOfMean } as const
  const drawn: DrawnBaseline = { passes: 'level', lines: [line] }
  const converted = fromPartialArea(time_s, temperature_K, heatFlow, new Float64Array(n).fill(level), label, drawn)
  const part = lastPart * ((time_s[n - 1] ?? 0) - (time_s[0] ?? 0))
  const from = Math.min(n - 3, lowerBound(time_s, (time_s[n - 1] ?? 0) - part))
  const { slope, slopeStandardError } = lineFit(time_s.subarray(from), heatFlow.subarray(from))
  // Two standard errors less, so that noise alone is no drift.
  const drift = Math.max(0, Math.abs(slope) - 2 * slopeStandardError) * part
  return { ...converted, baselineKind: 'level-at-end', rateAtEnds: { start: converted.rateAtEnds?.start ?? 0, end: drift / excursion } }
}

function areaProportional(time: Float64Array, heatFlow: Float64Array, lines: readonly BaselineLine[], label: string): Float64Array {
  const [before, after] = lines
  if (before === undefined || after === undefined) throw new RangeError('an area-proportional baseline needs two tangents')
  const { baseline, status } = areaProportionalBaseline(time, heatFlow, before, after)
  if (status === 'ok') return baseline
  throw new KineticsError(
    'empty-window',
    `${label}: the area between heat flow and baseline does not settle, so that no area-proportional baseline can be drawn. ` +
      'Set a window from one straight part of the heat flow to the other, or choose the straight baseline.',
    { run: label },
  )
}

/** The lines before and after a peak: through the straight stretches, and level through the outermost part of an end without one. */
export function tangents(
  time: Float64Array,
  heatFlow: Float64Array,
  { before, after }: { readonly before: Stretch | null; readonly after: Stretch | null },
): readonly BaselineLine[] {
  return [
    before === null ? levelAt(time, heatFlow, 'start') : lineThrough(time, heatFlow, 'start', before.outer, before.inner),
    after === null ? levelAt(time, heatFlow, 'end') : lineThrough(time, heatFlow, 'end', after.inner, after.outer),
  ]
}

function outermostPart(time: Float64Array, end: 'start' | 'end'): readonly [from: number, to: number] {
  const start = time[0] ?? 0
  const finish = time.at(-1) ?? 0
  const part = outermost * (finish - start)
  return end === 'start' ? [start, start + part] : [finish - part, finish]
}

function lineThrough(time: Float64Array, heatFlow: Float64Array, end: 'start' | 'end', from_s: number, to_s: number): BaselineLine {
  return { end, from_s, to_s, ...fitTangent(time, heatFlow, from_s, to_s), hasSlope: true, varianceOfMean: 1 }
}

const levelAt = (time: Float64Array, heatFlow: Float64Array, end: 'start' | 'end'): BaselineLine => ({
  ...lineThrough(time, heatFlow, end, ...outermostPart(time, end)),
  slope: 0,
  hasSlope: false,
})

/** Lines through the outermost rows at either end. */
const endLines = (time: Float64Array, heatFlow: Float64Array): readonly BaselineLine[] =>
  (['start', 'end'] as const).map((end) => lineThrough(time, heatFlow, end, ...outermostPart(time, end)))

function straightBetweenEnds(time: Float64Array, lines: readonly BaselineLine[]): Float64Array {
  const [start, end] = lines.map((line) => {
    const x = (line.end === 'start' ? time[0] : time.at(-1)) ?? Number.NaN
    return { x, y: tangentAt(line, x) }
  })
  if (start === undefined || end === undefined) throw new RangeError('a straight baseline needs two ends')
  return straightBaseline(time, start, end)
}

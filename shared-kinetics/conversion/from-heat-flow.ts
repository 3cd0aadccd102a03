import { KineticsError } from '../errors.ts'
import { areaProportionalBaseline, fitTangent, straightBaseline, tangentAt, type Tangent } from '../signal/baseline.ts'
import { noiseOf } from '../signal/noise.ts'
import { findQuietEnds, type QuietEnds } from '../signal/quiet-ends.ts'
import type { Column } from '../units/quantity.ts'
import type { Converted } from './converted.ts'
import { fromPartialArea } from './partial-area.ts'
import { valueAtEnd } from './plateau.ts'

export type HeatFlowBaseline = 'area-proportional' | 'straight' | 'level-at-end'

/** A peak lower than so many standard deviations of the noise is none. */
const lowestPeak = 5
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
 * @param heatFlow - W or W/kg, either direction
 * @throws KineticsError `empty-window` where there is no peak inside the window
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
  if (kind === 'level-at-end') {
    const level = valueAtEnd(time_s, heatFlow, 'end', noise)
    return fromPartialArea(time_s, temperature_K, heatFlow, new Float64Array(heatFlow.length).fill(level), label)
  }
  const quiet = findQuietEnds(time_s, heatFlow, 0, last)
  if (!(Math.abs(quiet.height) > lowestPeak * noise)) {
    throw new KineticsError(
      'empty-window',
      `${label}: there is no peak in the heat flow inside the window. Move the window to where the reaction is.`,
      {
        run: label,
      },
    )
  }
  const baseline =
    kind === 'straight'
      ? straightBetweenEnds(time_s, heatFlow)
      : areaProportionalBaseline(time_s, heatFlow, ...tangents(time_s, heatFlow, quiet)).baseline
  return fromPartialArea(time_s, temperature_K, heatFlow, baseline, label)
}

function tangents(time: Float64Array, heatFlow: Float64Array, { before, after }: QuietEnds): readonly [before: Tangent, after: Tangent] {
  return [
    before === null ? levelAt(time, heatFlow, 'start') : fitTangent(time, heatFlow, before.outer, before.inner),
    after === null ? levelAt(time, heatFlow, 'end') : fitTangent(time, heatFlow, after.inner, after.outer),
  ]
}

function outermostPart(time: Float64Array, end: 'start' | 'end'): readonly [from: number, to: number] {
  const start = time[0] ?? 0
  const finish = time.at(-1) ?? 0
  const part = outermost * (finish - start)
  return end === 'start' ? [start, start + part] : [finish - part, finish]
}

function levelAt(time: Float64Array, heatFlow: Float64Array, end: 'start' | 'end'): Tangent {
  const tangent = fitTangent(time, heatFlow, ...outermostPart(time, end))
  return { ...tangent, slope: 0 }
}

function straightBetweenEnds(time: Float64Array, heatFlow: Float64Array): Float64Array {
  const point = (end: 'start' | 'end'): { x: number; y: number } => {
    const x = (end === 'start' ? time[0] : time.at(-1)) ?? Number.NaN
    return { x, y: tangentAt(fitTangent(time, heatFlow, ...outermostPart(time, end)), x) }
  }
  return straightBaseline(time, point('start'), point('end'))
}

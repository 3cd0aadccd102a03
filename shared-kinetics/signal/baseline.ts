import { lineFit } from '../numerics/line-fit.ts'
import { cumulativeIntegral } from './cumulative-integral.ts'
import { lowerBound } from './lower-bound.ts'

/** A straight line y = value at `x` + slope·(x - `x`). */
export interface Tangent {
  readonly x: number
  readonly value: number
  readonly slope: number
}

export const tangentAt = (tangent: Tangent, x: number): number => tangent.value + tangent.slope * (x - tangent.x)

/** Straight line fitted to the samples with x from `from` to `to`; horizontal through their mean where they do not carry a slope. */
export function fitTangent(x: Float64Array, y: Float64Array, from: number, to: number): Tangent {
  const first = Math.max(0, Math.min(lowerBound(x, from), x.length - 2))
  let end = lowerBound(x, to)
  if (end < x.length && x[end] === to) end++
  end = Math.min(x.length, Math.max(end, first + 2))
  const line = lineFit(x.subarray(first, end), y.subarray(first, end))
  return { x: line.xMean, value: line.valueAtMean, slope: line.status === 'ok' ? line.slope : 0 }
}

/** Straight baseline between two points. */
export function straightBaseline(x: Float64Array, start: { x: number; y: number }, end: { x: number; y: number }): Float64Array {
  const slope = (end.y - start.y) / (end.x - start.x)
  return x.map((at) => start.y + slope * (at - start.x))
}

export interface AreaProportionalBaseline {
  readonly baseline: Float64Array
  /** `not-settled`: the area between signal and baseline vanishes or the steps do not shrink; the baseline is then that of the last step. */
  readonly status: 'ok' | 'not-settled'
  readonly iterations: number
}

const mostIterations = 100
/** Largest change of the conversion in the last step. */
const settled = 1e-10

/**
 * Baseline that passes from the tangent before the peak to the one after it in proportion to the area already swept: B = (1 - a)·T₁ + a·T₂, where a is the share
 * of ∫(y - B) dx up to there, iterated until a and B agree. Right where the heat capacity passes from that of the reactant to that of the product as the
 * reaction proceeds; without meaning where the tangents stand for anything else.
 *
 * @param x - ascending (time)
 * @source hemminger-sarge-1991; ictac-2014
 */
export function areaProportionalBaseline(x: Float64Array, y: Float64Array, before: Tangent, after: Tangent): AreaProportionalBaseline {
  const n = x.length
  const x0 = x[0] ?? 0
  const span = (x[n - 1] ?? 1) - x0
  let share = x.map((at) => (at - x0) / span)
  const line1 = x.map((at) => tangentAt(before, at))
  const line2 = x.map((at) => tangentAt(after, at))
  let baseline = new Float64Array(n)
  for (let iterations = 1; ; iterations++) {
    baseline = y.map((_, i) => (1 - (share[i] ?? 0)) * (line1[i] ?? 0) + (share[i] ?? 0) * (line2[i] ?? 0))
    const area = cumulativeIntegral(
      x,
      y.map((value, i) => value - (baseline[i] ?? 0)),
    )
    const whole = area[n - 1] ?? 0
    if (whole === 0 || !Number.isFinite(whole)) return { baseline, status: 'not-settled', iterations }
    let change = 0
    const next = area.map((value, i) => {
      const now = value / whole
      change = Math.max(change, Math.abs(now - (share[i] ?? 0)))
      return now
    })
    if (change < settled) return { baseline, status: 'ok', iterations }
    if (iterations === mostIterations) return { baseline, status: 'not-settled', iterations }
    share = next
  }
}

import { orderStatistic } from '../numerics/order-statistic.ts'
import type { RowRange } from './main-heating.ts'

/** A step of time longer than so many usual ones is a gap. */
const gapInSteps = 10
/** A step of temperature larger than so many usual ones, and than `smallestSplice_K`, is a splice. */
const spliceInSteps = 10
const smallestSplice_K = 3

/** The steps of time from `first` to `last` that are more than ten times as long as the usual (median) one: each as the row before it and the row after it. */
export function gapsOfTime(time_s: Float64Array, first: number, last: number): RowRange[] {
  const steps = stepsOf(time_s, first, last)
  const gap = gapInSteps * middle(steps)
  const gaps: RowRange[] = []
  for (let i = 0; i < steps.length; i++) if ((steps[i] as number) > gap) gaps.push({ first: first + i, last: first + i + 1 })
  return gaps
}

/**
 * The longest stretch of rows, in time, without a gap of time and without a jump of temperature: what a slope of T(t) may be fitted to. Recordings that were put
 * together from pieces have both.
 */
export function longestGapFreeStretch(time_s: Float64Array, temperature_K: Float64Array, first: number, last: number): RowRange {
  const temperatureSteps = stepsOf(temperature_K, first, last)
  for (let i = 0; i < temperatureSteps.length; i++) temperatureSteps[i] = Math.abs(temperatureSteps[i] as number)
  const splice = Math.max(smallestSplice_K, spliceInSteps * middle(temperatureSteps))
  const gaps = new Set(gapsOfTime(time_s, first, last).map((gap) => gap.first))
  let best: RowRange = { first, last: first }
  let from = first
  for (let i = first; i <= last; i++) {
    if (i < last && !gaps.has(i) && !((temperatureSteps[i - first] ?? 0) > splice)) continue
    if ((time_s[i] ?? 0) - (time_s[from] ?? 0) > (time_s[best.last] ?? 0) - (time_s[best.first] ?? 0)) best = { first: from, last: i }
    from = i + 1
  }
  return best
}

function stepsOf(values: Float64Array, first: number, last: number): Float64Array {
  const steps = new Float64Array(Math.max(0, last - first))
  for (let i = 0; i < steps.length; i++) steps[i] = (values[first + i + 1] as number) - (values[first + i] as number)
  return steps
}

const middle = (values: Float64Array): number => (values.length === 0 ? 0 : orderStatistic(values.slice(), values.length >> 1))

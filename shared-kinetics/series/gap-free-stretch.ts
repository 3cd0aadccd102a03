import type { RowRange } from './main-heating.ts'

/** A step of time longer than so many usual ones is a gap. */
const gapInSteps = 10
/** A step of temperature larger than so many usual ones, and than `smallestSplice_K`, is a splice. */
const spliceInSteps = 10
const smallestSplice_K = 3

/**
 * The longest stretch of rows, in time, without a gap of time and without a jump of temperature: what a slope of T(t) may be fitted to. Recordings that were put
 * together from pieces have both.
 */
export function longestGapFreeStretch(time_s: Float64Array, temperature_K: Float64Array, first: number, last: number): RowRange {
  const timeSteps: number[] = []
  const temperatureSteps: number[] = []
  for (let i = first + 1; i <= last; i++) {
    timeSteps.push((time_s[i] ?? 0) - (time_s[i - 1] ?? 0))
    temperatureSteps.push(Math.abs((temperature_K[i] ?? 0) - (temperature_K[i - 1] ?? 0)))
  }
  const gap = gapInSteps * middle(timeSteps)
  const splice = Math.max(smallestSplice_K, spliceInSteps * middle(temperatureSteps))
  let best: RowRange = { first, last: first }
  let from = first
  for (let i = first; i <= last; i++) {
    const next = i - first
    const broken = i === last || (timeSteps[next] ?? 0) > gap || (temperatureSteps[next] ?? 0) > splice
    if (!broken) continue
    if ((time_s[i] ?? 0) - (time_s[from] ?? 0) > (time_s[best.last] ?? 0) - (time_s[best.first] ?? 0)) best = { first: from, last: i }
    from = i + 1
  }
  return best
}

const middle = (values: readonly number[]): number => values.toSorted((a, b) => a - b)[values.length >> 1] ?? 0

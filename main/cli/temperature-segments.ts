import type { RunColumns } from '../../shared-kinetics/series/run.ts'

/** A stretch of a run over which the temperature rises, falls or stands at one rate. */
export interface TemperatureSegment {
  readonly kind: 'heating' | 'hold' | 'cooling'
  readonly start_s: number
  readonly end_s: number
  readonly start_K: number
  readonly end_K: number
  /** Median over the stretch, so that a furnace's start and stop do not count; of a cooling that slows down the mean. Negative where it cools. */
  readonly rate_K_per_s: number
}

const nodes = 200
/** A change of rate counts when it lasts, and is more than a furnace wavers. */
const lasting = 4
const shareOfRate = 0.15
const smallest_K_per_s = 0.25 / 60

/**
 * The segments of a temperature programme as it was measured: T(t) is read at 200 equal steps of time, and a new segment begins where the rate
 * differs from the segment's own by more than 15 % (and 0.25 K/min) for at least four steps. Empty without time.
 */
export function temperatureSegments({ time_s, temperature_K }: RunColumns): readonly TemperatureSegment[] {
  if (time_s === null || time_s.length < 2) return []
  const [start, end] = [time_s[0] ?? 0, time_s.at(-1) ?? 0]
  const step = (end - start) / nodes
  const T = readAt(time_s, temperature_K, start, step)
  const rates = Array.from({ length: nodes }, (_, i) => ((T[i + 1] ?? 0) - (T[i] ?? 0)) / step)
  const segments = boundaries(rates).map(([first, last]): TemperatureSegment => {
    const [start_K, end_K] = [T[first] ?? 0, T[last] ?? 0]
    const rate = median(rates.slice(first, last))
    const kind = Math.abs(rate) <= smallest_K_per_s ? 'hold' : rate > 0 ? 'heating' : 'cooling'
    return { kind, start_s: start + first * step, end_s: start + last * step, start_K, end_K, rate_K_per_s: rate }
  })
  return withCoolingJoined(segments)
}

/** A furnace cools at the rate it can: what slows down on the way is one cooling. */
function withCoolingJoined(segments: readonly TemperatureSegment[]): readonly TemperatureSegment[] {
  const joined: TemperatureSegment[] = []
  for (const segment of segments) {
    const before = joined.at(-1)
    if (before?.kind === 'cooling' && segment.kind === 'cooling')
      joined.splice(-1, 1, {
        ...before,
        end_s: segment.end_s,
        end_K: segment.end_K,
        rate_K_per_s: (segment.end_K - before.start_K) / (segment.end_s - before.start_s),
      })
    else joined.push(segment)
  }
  return joined
}

function boundaries(rates: readonly number[]): readonly (readonly [number, number])[] {
  const found: (readonly [number, number])[] = []
  let first = 0
  let odd = 0
  for (const [i, rate] of rates.entries()) {
    const own = median(rates.slice(first, Math.max(first + 1, i - odd)))
    odd = Math.abs(rate - own) > Math.max(shareOfRate * Math.abs(own), smallest_K_per_s) ? odd + 1 : 0
    if (odd < lasting) continue
    const change = i + 1 - odd
    if (change > first) found.push([first, change])
    first = change
    odd = 0
  }
  found.push([first, rates.length])
  return found
}

const median = (values: readonly number[]): number => values.toSorted((a, b) => a - b)[Math.floor(values.length / 2)] ?? 0

/** T at `nodes + 1` equal steps of time, by straight lines between rows. */
function readAt(time_s: Float64Array, temperature_K: Float64Array, start: number, step: number): readonly number[] {
  let row = 1
  return Array.from({ length: nodes + 1 }, (_, i) => {
    const t = start + i * step
    while (row < time_s.length - 1 && (time_s[row] ?? 0) < t) row += 1
    const [t0, t1] = [time_s[row - 1] ?? 0, time_s[row] ?? 0]
    const [T0, T1] = [temperature_K[row - 1] ?? 0, temperature_K[row] ?? 0]
    return t1 > t0 ? T0 + ((T1 - T0) * (t - t0)) / (t1 - t0) : T1
  })
}

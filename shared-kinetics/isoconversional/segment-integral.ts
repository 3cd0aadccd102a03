import { gaussLegendre } from '../numerics/quadrature.ts'
import type { TemperatureHistory } from '../series/programme.ts'
import type { RunAtLevels } from '../series/series-at-levels.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column, quantity, type Column } from '../units/quantity.ts'
import { constantRateIntegral } from './constant-rate-integral.ts'
import { historyIntegral } from './history-integral.ts'
import { followsRamp, timeIntegral, type IntegralValue, type TimeIntegral } from './time-integral.ts'

/**
 * J(Ea) = ∫ exp(-Ea/(R T(t))) dt of one run from each level to the next: entry k runs from level k - 1 to level k, entry 0 from alpha = 0 (what `timeIntegral` gives).
 *
 * A run heated at a constant rate is taken as straight between two levels: (its duration)·(mean of exp(-Ea/RT) over the temperatures passed). Any other is integrated
 * over its measured history between the two times. An integral is never the difference of two integrals from zero, which would lose the more digits the closer levels lie.
 *
 * A level is reached where the run has both it and the level before, in this order of time.
 *
 * @param largestEa - in J/mol
 */
export function segmentIntegral(run: RunAtLevels, largestEa: number): TimeIntegral {
  const first = timeIntegral(run, largestEa)
  return followsRamp(run) ? rampSegments(run, first) : historySegments(run, first, largestEa)
}

/** Below this width a segment is summed by Gauss–Legendre, above it the closed form loses no digits that matter. */
const narrow_K = 1

/**
 * Rules by the change of the exponent Ea/(R T) over a segment, at most 1.4 over 1 K at 300 K within the range of Ea: n points err by d^(2n) (n!)⁴/((2n + 1)((2n)!)³),
 * which these limits keep below 2e-16.
 */
const rules = [
  { upTo: 0.02, rule: gaussLegendre(3) },
  { upTo: 0.15, rule: gaussLegendre(4) },
  { upTo: 0.9, rule: gaussLegendre(6) },
  { upTo: Number.POSITIVE_INFINITY, rule: gaussLegendre(8) },
] as const

function rampSegments(run: RunAtLevels, first: TimeIntegral): TimeIntegral {
  const { temperature_K, time_s } = run
  const heatingRate = run.programme.kind === 'constant-heating-rate' ? run.programme.heatingRate : Number.NaN
  const fromZero = constantRateIntegral(quantity(1, 'K/s'), temperature_K)
  const temperatureAt = (level: number): number => temperature_K[level] ?? Number.NaN

  /** The measured time where there is one: it is known far better than a difference of two temperatures divided by a rate. */
  const duration = temperature_K.map((T, level) => {
    const measured = (time_s[level] ?? Number.NaN) - (time_s[level - 1] ?? Number.NaN)
    return Number.isNaN(measured) ? (T - temperatureAt(level - 1)) / heatingRate : measured
  })

  const lnDurations = duration.map(Math.log)

  const atLevel = (Ea: number, level: number): IntegralValue => {
    if (level === 0) return first.atLevel(Ea, 0)
    const from = temperatureAt(level - 1)
    const to = temperatureAt(level)
    const lnDuration = lnDurations[level] ?? Number.NaN
    if (Math.abs(to - from) < narrow_K) {
      const { lnJ, inverseT } = meanOverNarrow(Ea, from, to)
      return { lnJ: lnJ + lnDuration, inverseT }
    }
    const upper = fromZero.atLevel(Ea, to > from ? level : level - 1)
    const lower = fromZero.atLevel(Ea, to > from ? level - 1 : level)
    const share = Math.exp(lower.lnJ - upper.lnJ)
    return {
      lnJ: upper.lnJ + Math.log1p(-share) - Math.log(Math.abs(to - from)) + lnDuration,
      inverseT: (upper.inverseT - share * lower.inverseT) / (1 - share),
    }
  }
  const reaches = (level: number): boolean =>
    level === 0 ? first.reaches(0) : temperatureAt(level) > 0 && temperatureAt(level - 1) > 0 && (duration[level] ?? Number.NaN) > 0
  return {
    ...withAllLevels(temperature_K.length, atLevel, reaches),
    passes: (level) => [level === 0 ? 0 : temperatureAt(level - 1), temperatureAt(level)],
  }
}

/** ln of the mean of exp(-Ea/RT) over the temperatures between two, and the mean of 1/T with that weight. */
function meanOverNarrow(Ea: number, from_K: number, to_K: number): IntegralValue {
  const k = Ea / gasConstant_J_per_mol_K
  const reference = 1 / Math.max(from_K, to_K)
  const change = k * (1 / Math.min(from_K, to_K) - reference)
  let r = 0
  while (change > (rules[r] as (typeof rules)[number]).upTo) r++
  const { rule } = rules[r] as (typeof rules)[number]
  let sum = 0
  let first = 0
  for (let i = 0; i < rule.nodes.length; i++) {
    const offset = 1 / (from_K + 0.5 * (1 + (rule.nodes[i] as number)) * (to_K - from_K)) - reference
    const term = 0.5 * (rule.weights[i] as number) * Math.exp(-k * offset)
    sum += term
    first += term * offset
  }
  return { lnJ: Math.log(sum) - k * reference, inverseT: reference + first / sum }
}

function historySegments(run: RunAtLevels, first: TimeIntegral, largestEa: number): TimeIntegral {
  const segments = Array.from(run.time_s, (to, level): TimeIntegral => {
    if (level === 0) return first
    const from = run.time_s[level - 1] ?? Number.NaN
    if (!(from >= 0) || !(to > from)) return unreached
    const end = column(Float64Array.of(to - from), 's')
    return historyIntegral(between(run.history, from, to), end, largestEa)
  })
  const segmentOf = (level: number): TimeIntegral => segments[level] ?? unreached
  return withAllLevels(
    segments.length,
    (Ea, level) => segmentOf(level).atLevel(Ea, 0),
    (level) => segmentOf(level).reaches(0),
  )
}

const unreached: TimeIntegral = {
  reaches: () => false,
  atLevel: () => ({ lnJ: Number.NaN, inverseT: Number.NaN }),
  atAllLevels: () => undefined,
}

/** The part of a history between two times, counted from its first sample, with a sample of its own at either end; empty where it ends before `to_s`. */
function between({ time_s, temperature_K }: TemperatureHistory, from_s: number, to_s: number): TemperatureHistory {
  const start = time_s[0] ?? Number.NaN
  const last = time_s.length - 1
  // A level read at the very last sample may lie a rounding beyond it.
  if (!(to_s <= ((time_s[last] ?? Number.NaN) - start) * (1 + 1e-9))) return nothing
  const after = firstWhere(time_s, (time) => time - start > from_s)
  const until = Math.max(
    after,
    firstWhere(time_s, (time) => time - start >= to_s),
  )
  const time = new Float64Array(until - after + 2)
  const temperature = new Float64Array(until - after + 2)
  time.set(
    time_s.subarray(after, until).map((value) => value - start),
    1,
  )
  temperature.set(temperature_K.subarray(after, until), 1)
  const [first, end] = [0, time.length - 1]
  time[first] = from_s
  time[end] = to_s
  temperature[first] = interpolated(time_s, temperature_K, start + from_s, Math.min(after, last))
  temperature[end] = interpolated(time_s, temperature_K, start + to_s, Math.min(until, last))
  return { time_s: column(time, 's'), temperature_K: column(temperature, 'K') }
}

const nothing: TemperatureHistory = { time_s: column(new Float64Array(0), 's'), temperature_K: column(new Float64Array(0), 'K') }

/** Index of the first sample of which `holds` is true, where it is so of all that follow; the number of samples where there is none. */
function firstWhere(time_s: Column<'s'>, holds: (time: number) => boolean): number {
  let low = 0
  let high = time_s.length
  while (low < high) {
    const middle = (low + high) >> 1
    if (holds(time_s[middle] as number)) high = middle
    else low = middle + 1
  }
  return low
}

/** By the straight line between the sample before `next` and that. */
function interpolated(time_s: Column<'s'>, temperature_K: Column<'K'>, time: number, next: number): number {
  const [ta, tb] = [time_s[next - 1] ?? Number.NaN, time_s[next] ?? Number.NaN]
  const [Ta, Tb] = [temperature_K[next - 1] ?? Number.NaN, temperature_K[next] ?? Number.NaN]
  return tb > ta ? Ta + (Tb - Ta) * Math.min(1, (time - ta) / (tb - ta)) : Tb
}

const withAllLevels = (levels: number, atLevel: TimeIntegral['atLevel'], reaches: TimeIntegral['reaches']): TimeIntegral => ({
  reaches,
  atLevel,
  atAllLevels(Ea, lnJ, inverseT) {
    for (let level = 0; level < levels; level++) {
      if (!reaches(level)) continue
      const value = atLevel(Ea, level)
      lnJ[level] = value.lnJ
      inverseT[level] = value.inverseT
    }
  },
})

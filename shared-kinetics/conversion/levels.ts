import { bracketedRoot } from '../numerics/root.ts'
import { valueAt } from '../series/value-at.ts'
import { hermiteValue, monotoneEnds } from '../signal/hermite.ts'
import { isotonic } from '../signal/isotonic.ts'
import { localPolynomialAt } from '../signal/local-polynomial.ts'
import { lowerBound } from '../signal/lower-bound.ts'
import { noiseOf } from '../signal/noise.ts'
import { column, type Column } from '../units/quantity.ts'
import { reactionRateAt, type ConversionCurve } from './smooth-curve.ts'

/** Where a run stands at each level; NaN where it does not reach the level inside its window, or passes it in a gap of its rows. */
export interface LevelsRead {
  /** On the clock of the run. */
  readonly time_s: Column<'s'>
  readonly temperature_K: Column<'K'>
  readonly reactionRate_per_s: Column<'1/s'>
}

/**
 * Reads a conversion curve at the levels.
 *
 * Between two samples the curve is the cubic through both with the smoothed slopes, limited so that it rises only once. A curve that noise lets cross a level
 * several times is read at the crossing nearest to that of its never-falling (isotonic) fit: neither the first nor the last, which noise would push outwards.
 *
 * @param levels - inside (0, 1)
 * @throws Cancelled, by `checkCancelled`
 * @source fritsch-carlson-1980; barlow-1972
 */
export function readAtLevels(curve: ConversionCurve, levels: ArrayLike<number>, checkCancelled: () => void = () => undefined): LevelsRead {
  const rising = risingFit(curve)
  const temperature = temperatureReader(curve)
  const time_s = new Float64Array(levels.length).fill(Number.NaN)
  const temperature_K = new Float64Array(levels.length).fill(Number.NaN)
  const reactionRate_per_s = new Float64Array(levels.length).fill(Number.NaN)
  for (let i = 0; i < levels.length; i++) {
    checkCancelled()
    const time = crossing(curve, rising, levels[i] ?? Number.NaN)
    if (Number.isNaN(time)) continue
    time_s[i] = time
    temperature_K[i] = temperature(time)
    reactionRate_per_s[i] = reactionRateAt(curve, time)
  }
  return { time_s: column(time_s, 's'), temperature_K: column(temperature_K, 'K'), reactionRate_per_s: column(reactionRate_per_s, '1/s') }
}

const risingFits = new WeakMap<ConversionCurve, Float64Array>()
const temperatureReaders = new WeakMap<ConversionCurve, (time: number) => number>()

/** The never-falling fit of a curve, made once for a curve, which is read at other levels again and again. */
function risingFit(curve: ConversionCurve): Float64Array {
  const known = risingFits.get(curve)
  if (known !== undefined) return known
  const fit = isotonic(curve.conversion)
  risingFits.set(curve, fit)
  return fit
}

function crossing(curve: ConversionCurve, rising: Float64Array, level: number): number {
  const { time_s, conversion } = curve
  const n = conversion.length
  const about = lowerBound(rising, level)
  if (about === 0 || about === n) return Number.NaN
  const crosses = (i: number): boolean => i >= 1 && i < n && (conversion[i - 1] ?? 1) < level && (conversion[i] ?? 0) >= level
  for (let away = 0; away < n; away++) {
    const i = crosses(about + away) ? about + away : crosses(about - away) ? about - away : -1
    if (i < 0) continue
    if (curve.gaps.some((gap) => gap.first === i - 1)) return Number.NaN
    const x0 = time_s[i - 1] ?? Number.NaN
    const x1 = time_s[i] ?? Number.NaN
    const y0 = conversion[i - 1] ?? Number.NaN
    const y1 = conversion[i] ?? Number.NaN
    const slope0 = curve.reactionRate_per_s[i - 1] ?? Number.NaN
    const slope1 = curve.reactionRate_per_s[i] ?? Number.NaN
    const ends = monotoneEnds({ x0, x1, y0, y1, slope0, slope1 })
    return bracketedRoot((x) => hermiteValue(ends, x) - level, x0, x1, { fLower: y0 - level, fUpper: y1 - level }).x
  }
  return Number.NaN
}

/** Noise of the temperature that does no harm: 0.02 K of some 40 K between the runs of a series. */
const harmlessNoise_K = 0.02
/** Never smoothed over more than this share of the reaction's duration on either side, which would round off the corners of a programme. */
const widestShare = 0.05

/** T(t) by straight lines between samples, or where its noise would show, by a line through as many neighbours as it takes to hide it. */
export function temperatureReader(curve: ConversionCurve): (time: number) => number {
  const known = temperatureReaders.get(curve)
  if (known !== undefined) return known
  const reader = readerOf(curve)
  temperatureReaders.set(curve, reader)
  return reader
}

function readerOf({ time_s, temperature_K, reaction, duration_s }: ConversionCurve): (time: number) => number {
  const noise = noiseOf(time_s, temperature_K, reaction.first, reaction.last)
  if (!(noise > harmlessNoise_K)) return (time) => valueAt(time_s, temperature_K, time)
  const spacing = ((time_s[reaction.last] ?? 0) - (time_s[reaction.first] ?? 0)) / Math.max(1, reaction.last - reaction.first)
  const halfWidth = Math.min(0.5 * (noise / harmlessNoise_K) ** 2 * spacing, widestShare * duration_s)
  return (time) => localPolynomialAt(time_s, temperature_K, time, { halfWidth, degree: 1 }).value
}

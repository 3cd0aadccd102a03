import { describe, expect, it } from 'vitest'
import { randomStream } from '../numerics/random.ts'
import { median } from '../signal/median.ts'
import { column } from '../units/quantity.ts'
import type { HeatFlowBaseline } from './converted.ts'
import { fromHeatFlow } from './from-heat-flow.ts'
import { fromMass } from './from-mass.ts'
import { readAtLevels } from './levels.ts'
import { noiseAtLevels } from './noise-at-levels.ts'
import type { ConversionCurve } from './smooth-curve.ts'

const levels = [0.05, 0.1, 0.3, 0.5, 0.7, 0.9, 0.95]
const replicates = 150
/** What is told is looked at in so many of them. */
const toldOf = 25

const logistic = (t: number): number => 1 / (1 + Math.exp(-(t - 300) / 20))

const typical = (values: readonly number[]): number => median(Float64Array.from(values))

/** Rows every 0.5 s from one time to another, and what noise makes of the levels read there: standard deviations over many repetitions, over the typical one told. */
function ratios(
  from_s: number,
  to_s: number,
  signal: (t: number) => number,
  curveOf: (time: Float64Array, T: Float64Array, values: Float64Array) => ConversionCurve,
  noise: number,
  autocorrelation: number,
): { readonly time: number[]; readonly lnRate: number[]; readonly correlation: number[] } {
  const time = Float64Array.from({ length: 2 * (to_s - from_s) + 1 }, (_, i) => from_s + 0.5 * i)
  const temperature = time.map((t) => 500 + 0.2 * t)
  const clean = time.map(signal)
  const rows = levels.map(() => ({
    time: [] as number[],
    lnRate: [] as number[],
    toldTime: [] as number[],
    toldRate: [] as number[],
    together: [] as number[],
  }))
  for (let k = 0; k < replicates; k++) {
    const random = randomStream(31, k)
    let before = random.normal()
    const noisy = clean.map((value) => {
      before = autocorrelation * before + Math.sqrt(1 - autocorrelation ** 2) * random.normal()
      return value + noise * before
    })
    const curve = curveOf(time, temperature, noisy)
    const read = readAtLevels(curve, levels)
    rows.forEach((row, i) => {
      row.time.push(read.time_s[i] ?? Number.NaN)
      row.lnRate.push(Math.log(read.reactionRate_per_s[i] ?? Number.NaN))
    })
    if (k >= toldOf) continue
    const at = noiseAtLevels(curve, levels, read, 'sought')
    rows.forEach((row, i) => {
      row.toldTime.push(at.time_s[i] ?? Number.NaN)
      row.toldRate.push(
        Math.hypot(at.lnReactionRate[i] ?? Number.NaN, (at.lnReactionRateSlope_per_s[i] ?? Number.NaN) * (at.time_s[i] ?? Number.NaN)),
      )
      row.together.push(at.correlationWithBefore[i] ?? Number.NaN)
    })
  }
  return {
    time: rows.map((row) => robust(row.time) / typical(row.toldTime)),
    lnRate: rows.map((row) => robust(row.lnRate) / typical(row.toldRate)),
    correlation: rows.map((row, i) => (i === 0 ? 0 : typical(row.together) - correlation(row.time, rows[i - 1]?.time ?? []))),
  }
}

const mean = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0) / values.length
const deviation = (values: readonly number[]): number => Math.sqrt(mean(values.map((value) => (value - mean(values)) ** 2)))
/** By the median distance from the median, over that of a normal distribution. */
function robust(values: readonly number[]): number {
  const middle = median(Float64Array.from(values))
  return 1.4826 * median(Float64Array.from(values, (value) => Math.abs(value - middle)))
}
const correlation = (a: readonly number[], b: readonly number[]): number =>
  mean(a.map((value, i) => (value - mean(a)) * ((b[i] ?? Number.NaN) - mean(b)))) / (deviation(a) * deviation(b))

/** A peak of height 1 on a drift that steps with the reaction; under a hold on a level. */
const drift = (t: number): number => 0.1 + 2e-4 * t + 0.05 * logistic(t)
const peak = (t: number): number => 4 * logistic(t) * (1 - logistic(t))
const curveUnder =
  (kind: HeatFlowBaseline) =>
  (time: Float64Array, T: Float64Array, values: Float64Array): ConversionCurve =>
    fromHeatFlow(column(time, 's'), column(T, 'K'), values, kind, 'Run').curve

const outside = (what: string, values: readonly number[], least: number, most: number): string[] =>
  values.flatMap((value, i) => (value > least && value < most ? [] : [`${what} at ${levels[i]}: ${value}`]))

/**
 * What is not alike, in words. 150 repetitions know a spread that wild ones do not touch to 11 %, and the width of the smoothing follows the noise itself.
 */
function unlike({ time, lnRate, correlation }: ReturnType<typeof ratios>): string[] {
  return [...outside('time', time, 0.6, 1.6), ...outside('rate', lnRate, 0.5, 1.7), ...outside('correlation', correlation, -0.4, 0.4)]
}

const massOf = (time: Float64Array, T: Float64Array, values: Float64Array): ConversionCurve =>
  fromMass(column(time, 's'), column(T, 'K'), values, 'Run').curve

describe('what noise leaves in the conversion under a baseline drawn through the same rows', () => {
  it.each([
    ['straight', 180, 420, 0],
    ['straight', 100, 500, 0],
    ['area-proportional', 180, 420, 0],
    ['area-proportional', 100, 500, 0],
    ['area-proportional', 0, 900, 0],
    // As a filter leaves it, whose time constant is ten rows.
    ['straight', 0, 700, 0.9],
  ] as const)('is what noisy repetitions show: %s from %i to %i s, autocorrelation %f', (kind, from, to, autocorrelation) => {
    expect(unlike(ratios(from, to, (t) => peak(t) + drift(t), curveUnder(kind), 0.01, autocorrelation))).toEqual([])
  })

  it('is told to half of what it is where a filter has spread it and tangents are sought in it', () => {
    const { time } = ratios(0, 700, (t) => peak(t) + drift(t), curveUnder('area-proportional'), 0.01, 0.9)
    expect(Math.max(...time)).toBeLessThan(2)
    expect(Math.min(...time)).toBeGreaterThan(0.7)
  })

  it('is what noisy repetitions show of a hold, levelled at its end', () => {
    expect(unlike(ratios(250, 900, (t) => peak(t) + 0.1, curveUnder('level-at-end'), 0.01, 0))).toEqual([])
  })
})

describe('noise of a mass', () => {
  it.each([0, 0.9])('is what noisy repetitions show with autocorrelation %f', (autocorrelation) => {
    expect(unlike(ratios(0, 700, (t) => 1 - logistic(t), massOf, 0.002, autocorrelation))).toEqual([])
  })
})

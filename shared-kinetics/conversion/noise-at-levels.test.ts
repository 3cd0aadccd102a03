import { describe, expect, it } from 'vitest'
import { randomStream } from '../numerics/random.ts'
import { column } from '../units/quantity.ts'
import { median } from '../signal/median.ts'
import { fromMass } from './from-mass.ts'
import { readAtLevels } from './levels.ts'
import { noiseAtLevels } from './noise-at-levels.ts'
import { curveFromExtent, curveFromRate } from './smooth-curve.ts'

const rows = 1200
const levels = [0.1, 0.3, 0.32, 0.5, 0.8]
const replicates = 300
const noise = 0.002

/** A bell of rate and its integral over 600 s; heating at 0.2 K/s. */
const time = Float64Array.from({ length: rows }, (_, i) => i * 0.5)
const temperature = column(
  time.map((t) => 500 + 0.2 * t),
  'K',
)
const logistic = (t: number): number => 1 / (1 + Math.exp(-(t - 300) / 25))
const extent = time.map(logistic)
const rate = time.map((t) => (logistic(t) * (1 - logistic(t))) / 25)

/** Standard deviations over many noisy repetitions beside the standard errors that are told from one of them on the average. */
function observed(kind: 'extent' | 'rate'): {
  sd: Record<'time' | 'lnRate' | 'correlation', number[]>
  told: Record<'time' | 'lnRate' | 'correlation', number[]>
} {
  const times: number[][] = []
  const lnRates: number[][] = []
  const told = { time: levels.map(() => 0), lnRate: levels.map(() => 0), correlation: levels.map(() => 0) }
  for (let k = 0; k < replicates; k++) {
    const random = randomStream(11, k)
    const clean = kind === 'extent' ? extent : rate
    const scale = kind === 'extent' ? noise : 0.02 * Math.max(...rate)
    const noisy = clean.map((value) => value + scale * random.normal())
    const curve = kind === 'extent' ? curveFromExtent(column(time, 's'), temperature, noisy) : curveOfRate(noisy)
    const read = readAtLevels(curve, levels)
    const at = noiseAtLevels(curve, levels, read)
    times.push([...read.time_s])
    lnRates.push([...read.reactionRate_per_s].map(Math.log))
    levels.forEach((_, i) => {
      told.time[i] = (told.time[i] ?? 0) + (at.time_s[i] ?? Number.NaN) / replicates
      told.lnRate[i] =
        (told.lnRate[i] ?? 0) +
        Math.hypot(at.lnReactionRate[i] ?? Number.NaN, (at.lnReactionRateSlope_per_s[i] ?? Number.NaN) * (at.time_s[i] ?? Number.NaN)) /
          replicates
      told.correlation[i] = (told.correlation[i] ?? 0) + (at.correlationWithBefore[i] ?? Number.NaN) / replicates
    })
  }
  return {
    sd: {
      time: levels.map((_, i) => deviation(times.map((row) => row[i] ?? Number.NaN))),
      lnRate: levels.map((_, i) => deviation(lnRates.map((row) => row[i] ?? Number.NaN))),
      correlation: levels.map((_, i) =>
        i === 0
          ? 0
          : correlation(
              times.map((row) => row[i - 1] ?? Number.NaN),
              times.map((row) => row[i] ?? Number.NaN),
            ),
      ),
    },
    told,
  }
}

function curveOfRate(noisy: Float64Array): ReturnType<typeof curveFromRate> {
  const partial = new Float64Array(rows)
  for (let i = 1; i < rows; i++) partial[i] = (partial[i - 1] ?? 0) + 0.25 * ((noisy[i - 1] ?? 0) + (noisy[i] ?? 0))
  const area = partial.at(-1) ?? 1
  return curveFromRate(
    column(time, 's'),
    temperature,
    noisy.map((value) => value / area),
    partial.map((value) => value / area),
  )
}

const mean = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0) / values.length
const deviation = (values: readonly number[]): number => Math.sqrt(mean(values.map((value) => (value - mean(values)) ** 2)))
const correlation = (a: readonly number[], b: readonly number[]): number =>
  mean(a.map((value, i) => (value - mean(a)) * ((b[i] ?? Number.NaN) - mean(b)))) / (deviation(a) * deviation(b))

describe('what noise leaves in the values read at the levels', () => {
  // 300 repetitions know a standard deviation to 4 %; the width of the smoothing, which follows the noise itself, and the noise that partial area and rate share take the rest.
  it.each(['extent', 'rate'] as const)('is what noisy repetitions show, for a signal of %s', (kind) => {
    const { sd, told } = observed(kind)
    levels.forEach((_, i) => {
      expect((told.time[i] ?? 0) / (sd.time[i] ?? 0)).toBeGreaterThan(0.7)
      expect((told.time[i] ?? 0) / (sd.time[i] ?? 0)).toBeLessThan(1.43)
      expect((told.lnRate[i] ?? 0) / (sd.lnRate[i] ?? 0)).toBeGreaterThan(0.7)
      expect((told.lnRate[i] ?? 0) / (sd.lnRate[i] ?? 0)).toBeLessThan(1.43)
      expect(Math.abs((told.correlation[i] ?? 0) - (sd.correlation[i] ?? 0))).toBeLessThan(0.2)
    })
  })

  it('holds what noise leaves in the masses before and after the reaction, from which conversion is counted', () => {
    // Every sixth row, from 75 s before the middle on: 15 rows at the start, and less at the end. Mass falls by 4 mg.
    const kept = Array.from({ length: 80 }, (_, i) => 250 + 6 * i).filter((i) => i < 1000)
    const times = column(
      Float64Array.from(kept, (i) => time[i] ?? Number.NaN),
      's',
    )
    const T = column(
      Float64Array.from(kept, (i) => temperature[i] ?? Number.NaN),
      'K',
    )
    const near = [0.1, 0.12, 0.5, 0.9]
    const reads: number[][] = []
    const told = near.map((): number[] => [])
    const correlations: number[] = []
    for (let k = 0; k < 2 * replicates; k++) {
      const random = randomStream(12, k)
      const mass = Float64Array.from(kept, (i) => 8e-6 - 4e-6 * (extent[i] ?? Number.NaN) + 4e-8 * random.normal())
      const { curve } = fromMass(times, T, mass, 'Run')
      const read = readAtLevels(curve, near)
      const at = noiseAtLevels(curve, near, read)
      reads.push([...read.time_s])
      near.forEach((_, i) => told[i]?.push(at.time_s[i] ?? Number.NaN))
      expect(curve.ends.start).toBeGreaterThan(0)
      correlations.push(at.correlationWithBefore[1] ?? Number.NaN)
    }
    const [first, second] = [0, 1].map((i) => reads.map((row) => row[i] ?? Number.NaN))
    expect(Math.abs(mean(correlations) - correlation(first ?? [], second ?? []))).toBeLessThan(0.2)
    near.forEach((_, i) => {
      const sd = deviation(reads.map((row) => row[i] ?? Number.NaN))
      expect(median(Float64Array.from(told[i] ?? [])) / sd).toBeGreaterThan(0.75)
      expect(median(Float64Array.from(told[i] ?? [])) / sd).toBeLessThan(1.3)
    })
  })

  it('is nothing for a curve without noise', () => {
    const curve = curveFromExtent(column(time, 's'), temperature, extent)
    const at = noiseAtLevels(curve, levels, readAtLevels(curve, levels))
    for (const value of at.time_s) expect(value).toBeLessThan(1e-3)
    for (const value of at.correlationWithBefore) expect(value).not.toBeNaN()
  })

  it('is not to be had at a level that the run does not reach', () => {
    const curve = curveFromExtent(column(time.slice(0, 600), 's'), column(temperature.slice(0, 600), 'K'), extent.slice(0, 600))
    const at = noiseAtLevels(curve, [0.3, 0.8], readAtLevels(curve, [0.3, 0.8]))
    expect(at.time_s[0]).not.toBeNaN()
    expect(at.time_s[1]).toBeNaN()
  })
})

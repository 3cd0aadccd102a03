import { describe, expect, it } from 'vitest'
import { temperatureAt, underConstantRate } from '../check-values/exact-simulation.ts'
import { constantHeatingRate, constantRateSeries, hold, quiet, seriesOf } from '../check-values/series-of-values.ts'
import { methods } from '../isoconversional/registry.ts'
import { methodIds, type MethodId } from '../isoconversional/result.ts'
import { randomStream } from '../numerics/random.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import type { SeriesAtLevels } from '../series/series-at-levels.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { bootstrap } from './bootstrap.ts'
import { designCoverage } from './design-coverage.ts'
import { deleteOne, jackknife } from './jackknife.ts'
import { resampledEnergies } from './resampled-energies.ts'
import { resamplesOf } from './resamples.ts'

const step = { Ea_J_per_mol: 150_000, A_per_s: 1e12, share: 1 }
const levels = [0.2, 0.4, 0.6, 0.8]
const rates = [1, 2, 5, 10, 20]
const random = randomStream(2)

/** Runs at constant heating rates whose temperatures are off by some 0.5 K, and whose rates are those of the temperatures. */
const heated: SeriesAtLevels = seriesOf(
  levels,
  rates.map((rate, i) => {
    const offset = 0.5 * random.normal()
    const temperature_K = levels.map((level) => temperatureAt([step], rate / 60, level) + offset)
    const start = (temperature_K[0] as number) - 100
    return {
      programme: constantHeatingRate(rate),
      programmeGroup: i,
      temperature_K,
      reactionRate_per_s: temperature_K.map((T) => underConstantRate([step], rate / 60, T).rate_per_s),
      time_s: temperature_K.map((T) => ((T - start) * 60) / rate),
      history: { time_s: [0, (300 * 60) / rate], temperature_K: [start, start + 300] },
    }
  }),
)
const held: SeriesAtLevels = seriesOf(
  levels,
  [480, 490, 500, 510].map((T, i) => {
    const time_s = levels.map(
      (level) => (-Math.log(1 - level) * Math.exp(0.03 * random.normal())) / (1e12 * Math.exp(-150_000 / (gasConstant_J_per_mol_K * T))),
    )
    return {
      programme: hold(T),
      programmeGroup: i,
      temperature_K: levels.map(() => T),
      time_s,
      history: { time_s: [0, 1e9], temperature_K: [T, T] },
    }
  }),
)

/** The series with each run taken so many times, as the method itself would see it. */
const repeated = (series: SeriesAtLevels, times: ArrayLike<number>): SeriesAtLevels => ({
  ...series,
  runs: series.runs.flatMap((run, i) => Array.from({ length: times[i] ?? 0 }, () => run)),
})

describe('Ea of resampled runs', () => {
  const each = methodIds.map((id): [MethodId, SeriesAtLevels] => [id, id === 'isothermal-integral' ? held : heated])
  it.each(each)('by %s is what the method gives with runs left out and repeated', (id, series) => {
    const { run } = methods[id]
    const all = run(series, quiet)
    expect(all.status).toEqual(levels.map(() => 'ok'))
    const energies = resampledEnergies(series, all, quiet)
    const resamples =
      series.runs.length === 5
        ? [
            [1, 1, 1, 1, 1],
            [2, 0, 1, 1, 1],
            [0, 3, 0, 1, 1],
            [1, 1, 1, 0, 2],
          ]
        : [
            [1, 1, 1, 1],
            [0, 2, 1, 1],
            [2, 0, 1, 1],
          ]
    for (const times of resamples) {
      const resampled = energies(times)
      const anew = run(repeated(series, times), quiet)
      anew.Ea.forEach((Ea, level) => {
        expect(Math.abs((resampled[level] as number) / Ea - 1), `${times.join(' ')} at ${levels[level]}`).toBeLessThan(2e-8)
      })
    }
  })

  it('is not to be had from runs of one temperature', () => {
    const all = methods.kas.run(heated, quiet)
    expect([...resampledEnergies(heated, all, quiet)([5, 0, 0, 0, 0])].every(Number.isNaN)).toBe(true)
  })
})

describe('resamples', () => {
  // Number of multisets of n out of n, C(2n - 1, n), less those of one or two runs: n and C(n, 2)(n - 1).
  it.each([
    [4, 35 - 4 - 6 * 3],
    [5, 126 - 5 - 10 * 4],
    [6, 462 - 6 - 15 * 5],
  ])('of %i runs are all %i distinct ones of three runs or more, with their probabilities', (n, count) => {
    const programmes = Array.from({ length: n }, (_, i) => i)
    const resamples = resamplesOf(programmes, 1)
    expect(resamples?.times.length).toBe(count)
    expect(resamples?.made).toBe('every')
    expect(new Set(resamples?.times.map((times) => times.join(' '))).size).toBe(count)
    expect(resamples?.probability.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 12)
    // One run n times: n/n^n. Two runs: C(n, 2)(2^n - 2)/n^n.
    expect(resamples?.droppedShare).toBeCloseTo((n + ((n * (n - 1)) / 2) * (2 ** n - 2)) / n ** n, 12)
    const once = resamples?.times.findIndex((times) => times.every((m) => m === 1)) ?? -1
    const factorial = programmes.reduce((product, i) => product * (i + 1), 1)
    expect((resamples?.probability[once] ?? 0) * (1 - (resamples?.droppedShare ?? 0))).toBeCloseTo(factorial / n ** n, 12)
  })

  it('count programmes, not replicates', () => {
    for (const times of resamplesOf([0, 0, 1, 2, 3], 1)?.times ?? [new Uint8Array(5)]) {
      const taken = [(times[0] as number) + (times[1] as number), times[2], times[3], times[4]]
      expect(taken.filter((m) => m !== 0).length).toBeGreaterThanOrEqual(3)
    }
  })

  it('of more than six runs are drawn from a seed, and are the same for the same seed', () => {
    const programmes = [0, 1, 2, 3, 4, 5, 6]
    const one = resamplesOf(programmes, 7)
    expect(one?.made).toBe('drawn')
    expect(one).toEqual(resamplesOf(programmes, 7))
    expect(one).not.toEqual(resamplesOf(programmes, 8))
    expect((one?.times.length ?? 0) / (1 - (one?.droppedShare ?? 0))).toBeCloseTo(2000, 6)
    // Each run is taken once on the average: 2,000 draws know that to 0.02 (one standard error), here for the fourth.
    const mean = (one?.times ?? []).reduce((sum, times) => sum + (times[3] as number), 0) / (one?.times.length ?? 1)
    expect(Math.abs(mean - 1)).toBeLessThan(0.08)
  })

  it('are none of fewer than four distinct programmes, of which all would have to be in every one', () => {
    expect(resamplesOf([0, 1, 2], 1)).toBeNull()
    expect(resamplesOf([0, 1, 1, 2], 1)).toBeNull()
    expect(resamplesOf([0, 0, 0, 1, 1, 1, 2, 2, 2], 1)).toBeNull()
  })
})

describe('the jackknife', () => {
  it('is of a mean the ordinary standard error of the mean', () => {
    const values = [3, 1, 4, 1, 5]
    const mean = 14 / 5
    const left = values.map((value) => (14 - value) / 4)
    const { standardUncertainty, lower95, upper95 } = jackknife(mean, left)
    // s² = Σ(x - x̄)²/4 = (52 - 14²/5)/4.
    expect(standardUncertainty).toBeCloseTo(Math.sqrt((52 - 196 / 5) / 4 / 5), 12)
    expect(upper95 - mean).toBeCloseTo(studentTQuantile(0.975, 4) * standardUncertainty, 12)
    expect(mean - lower95).toBeCloseTo(upper95 - mean, 12)
  })

  it('needs four runs, and three programmes without any one of them', () => {
    expect(deleteOne([0, 1, 2])).toBeNull()
    expect(deleteOne([0, 0, 1, 2])).toBeNull()
    expect(deleteOne([0, 0, 1, 1, 2, 2])?.length).toBe(6)
    expect(deleteOne([0, 1, 2, 3])?.map((times) => times.join(''))).toEqual(['0111', '1011', '1101', '1110'])
    expect(jackknife(1, [1, Number.NaN, 1, 1]).standardUncertainty).toBeNaN()
  })
})

/**
 * Starink's method and its resampled Ea on runs of exact kinetics whose temperatures err by 0.4 K each: share of 1,500 replicates in which the intervals hold the Ea without
 * errors.
 */
function coverageOf(heatingRates: readonly number[]): { readonly jackknife: number; readonly bootstrap: number } {
  const groups = heatingRates.map((rate) => heatingRates.indexOf(rate))
  const exact = heatingRates.map((rate) => temperatureAt([step], rate / 60, 0.5))
  const seriesWith = (error: readonly number[]): SeriesAtLevels => {
    const made = constantRateSeries([0.5], heatingRates, [exact.map((T, i) => T + (error[i] ?? 0))])
    return { ...made, runs: made.runs.map((run, i) => ({ ...run, programmeGroup: groups[i] ?? 0 })) }
  }
  const truth = methods.starink.run(seriesWith([]), quiet).Ea[0] as number
  const [left, resamples] = [deleteOne(groups), resamplesOf(groups, 1)]
  const replicates = 1500
  let [byJackknife, byBootstrap] = [0, 0]
  for (let k = 0; k < replicates; k++) {
    const { normal } = randomStream(9, k)
    const series = seriesWith(heatingRates.map(() => 0.4 * normal()))
    const all = methods.starink.run(series, quiet)
    const energies = resampledEnergies(series, all, quiet)
    const ofEach = (times: readonly Uint8Array[]): number[] => times.map((taken) => energies(taken)[0] as number)
    const holds = ({ lower95, upper95 }: { readonly lower95: number; readonly upper95: number }): boolean =>
      lower95 <= truth && truth <= upper95
    if (left !== null && holds(jackknife(all.Ea[0] as number, ofEach(left)))) byJackknife++
    if (resamples !== null && holds(bootstrap(ofEach(resamples.times), resamples))) byBootstrap++
  }
  return { jackknife: byJackknife / replicates, bootstrap: byBootstrap / replicates }
}

/** 1/T falls with the logarithm of the heating rate, almost as a straight line. */
const toldOf = (heatingRates: readonly number[]) => {
  const groups = heatingRates.map((rate) => heatingRates.indexOf(rate))
  return designCoverage(
    heatingRates.map((rate) => -Math.log(rate)),
    deleteOne(groups),
    resamplesOf(groups, 1),
    () => undefined,
  )
}

describe('the coverage that is told of the runs at hand', () => {
  // Distinct, unevenly spread and replicated heating rates: what holds for one design does not for another.
  it.each([[[1, 2, 5, 10]], [[2, 5, 10, 10, 10, 20]], [[1, 2, 5, 10, 20]], [[1, 20, 21, 22]], [[2, 5, 5, 10, 20]]])(
    'is what the method shows in simulated runs at %j K/min',
    (heatingRates) => {
      const groups = heatingRates.map((rate) => heatingRates.indexOf(rate))
      const x = heatingRates.map((rate) => 1 / temperatureAt([step], rate / 60, 0.5))
      const told = designCoverage(x, deleteOne(groups), resamplesOf(groups, 1), () => undefined)
      const found = coverageOf(heatingRates)
      // Both by simulation: at 0.65 they differ by 0.016 (one standard error), at 0.95 by 0.007.
      expect(Math.abs(told.bootstrap - found.bootstrap), `bootstrap ${told.bootstrap}, found ${found.bootstrap}`).toBeLessThan(0.05)
      expect(Math.abs(told.jackknife - found.jackknife), `jackknife ${told.jackknife}, found ${found.jackknife}`).toBeLessThan(0.025)
    },
  )

  it('is for distinct programmes about 64 % of four and 87 % of five, and falls where one of them has most of the runs', () => {
    // 4,000 replicates of the same straight line in an independent program (NumPy) gave 0.62 to 0.65, 0.874, and 0.75 and 0.94, 0.76 and 0.91.
    expect(toldOf([1, 2, 5, 10]).bootstrap).toBeCloseTo(0.63, 1)
    expect(toldOf([1, 2, 5, 10, 20]).bootstrap).toBeCloseTo(0.87, 1)
    expect(Math.abs(toldOf([2, 5, 10, 10, 10, 20]).bootstrap - 0.76)).toBeLessThan(0.03)
    const crowded = toldOf([2, 5, 5, 5, 5, 5, 10, 20])
    expect(Math.abs(crowded.bootstrap - 0.76)).toBeLessThan(0.03)
    expect(Math.abs(crowded.jackknife - 0.913)).toBeLessThan(0.02)
    // Nothing is told of what is not given.
    expect(toldOf([5, 10, 10, 20])).toEqual({ jackknife: Number.NaN, bootstrap: Number.NaN })
  })
})

describe('the bootstrap', () => {
  it('takes the 2.5 and 97.5 % points of the weighted Ea, alike from below and above', () => {
    const resamples = { times: [], probability: Float64Array.of(0.02, 0.006, 0.948, 0.006, 0.02), droppedShare: 0, made: 'every' } as const
    expect(bootstrap([5, 4, 3, 2, 1], resamples)).toMatchObject({ lower95: 2, upper95: 4 })
    const { standardUncertainty } = bootstrap([5, 4, 3, 2, 1], resamples)
    expect(standardUncertainty).toBeCloseTo(Math.sqrt(2 * (0.02 * 4 + 0.006)), 12)
  })

  it('is not to be had where more than a hundredth of the resamples have no Ea', () => {
    const resamples = { times: [], probability: Float64Array.of(0.5, 0.48, 0.02), droppedShare: 0, made: 'every' } as const
    expect(bootstrap([1, 2, Number.NaN], resamples).lower95).toBeNaN()
    expect(bootstrap([1, 2, 3], resamples).lower95).toBe(1)
  })
})

import { describe, expect, it } from 'vitest'
import { constantRateSeries, quiet } from '../check-values/series-of-values.ts'
import { underConstantRate, temperatureAt } from '../check-values/exact-simulation.ts'
import { friedman } from '../isoconversional/friedman.ts'
import { starink } from '../isoconversional/starink.ts'
import { vyazovkin } from '../isoconversional/vyazovkin.ts'
import type { IsoconversionalMethod } from '../isoconversional/result.ts'
import { randomStream } from '../numerics/random.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import type { SeriesAtLevels } from '../series/series-at-levels.ts'
import { meanEnergyStandardError } from './mean-energy.ts'

const steps = [{ Ea_J_per_mol: 150_000, A_per_s: 1e12, share: 1 }]
const rates = [1, 2, 5, 10, 20]
const levels = [0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9]
const exact = levels.map((level) => rates.map((rate) => temperatureAt(steps, rate / 60, level)))

/** A series whose temperatures are off by what `error` gives for a level and a run, in K. */
const disturbed = (error: (level: number, run: number) => number): SeriesAtLevels =>
  constantRateSeries(
    levels,
    rates,
    exact.map((row, level) => row.map((T, run) => T + error(level, run))),
  )

const meanOf = (values: ArrayLike<number>): number => Array.from(values).reduce((sum, value) => sum + value / values.length, 0)

/** Share of replicates in which the interval of the mean holds the method's own mean without errors. */
function coverage(
  method: IsoconversionalMethod,
  replicates: number,
  error: (random: () => number) => (level: number, run: number) => number,
): number {
  const truth = meanOf(
    method(
      disturbed(() => 0),
      quiet,
    ).Ea,
  )
  const t = studentTQuantile(0.975, 3)
  let covered = 0
  for (let k = 0; k < replicates; k++) {
    const result = method(disturbed(error(randomStream(5, k).normal)), quiet)
    if (Math.abs(meanOf(result.Ea) - truth) <= t * meanEnergyStandardError(result.points)) covered++
  }
  return covered / replicates
}

/** A thermometer off by some 0.5 K in each run. */
function ofEachRun(random: () => number): (level: number, run: number) => number {
  const offset = rates.map(() => 0.5 * random())
  return (_, run) => offset[run] as number
}

describe('the standard error of a mean of Ea over levels', () => {
  it('is, of a single level, that of the level', () => {
    const random = randomStream(1)
    const series = disturbed(() => 0.4 * random.normal())
    for (const method of [starink, vyazovkin, friedmanOf]) {
      const { points, standardError } = method(series, quiet)
      points.forEach((level, i) => {
        expect(meanEnergyStandardError([level]) / (standardError[i] as number)).toBeCloseTo(1, 10)
      })
    }
  })

  it('is about that of each level for an error that goes through the whole run: averaging does not help', () => {
    const offset = [0.5, -0.4, 0.1, -0.3, 0.2]
    const { points, standardError } = starink(
      disturbed((_, run) => offset[run] as number),
      quiet,
    )
    expect(Math.abs(meanEnergyStandardError(points) / meanOf(standardError) - 1)).toBeLessThan(0.02)
  })

  // 2,000 replicates know a share of 0.95 to ±0.01 (two standard errors), 300 to ±0.025.
  it('makes an interval of 95 % where each run has an error of its own', () => {
    expect(Math.abs(coverage(starink, 2000, ofEachRun) - 0.95)).toBeLessThan(0.015)
    expect(Math.abs(coverage(vyazovkin, 300, ofEachRun) - 0.95)).toBeLessThan(0.03)
  })

  it('makes an interval of 95 % where errors differ from level to level, and where both kinds are present', () => {
    expect(Math.abs(coverage(starink, 2000, (random) => () => 0.5 * random()) - 0.95)).toBeLessThan(0.015)
    const both = coverage(starink, 2000, (random) => {
      const offset = rates.map(() => 0.3 * random())
      return (_, run) => (offset[run] as number) + 0.5 * random()
    })
    expect(Math.abs(both - 0.95)).toBeLessThan(0.015)
  })

  // Ea rises with conversion, and the error of each run grows through it: levels that err most weigh most. 4,000 replicates know a standard deviation to 1.1 %.
  it.each([
    [140_000, 300_000, 5],
    [100_000, 420_000, 7],
  ])('is the scatter of the mean where Ea rises from %i to %i J/mol and the errors grow %i-fold', (from, to, growth) => {
    const rising = levels.map((level, l) => {
      const Ea_J_per_mol = from + ((to - from) * l) / (levels.length - 1)
      // Each level about 12 K above the one before at 5 K/min.
      const A_per_s = Math.exp(Ea_J_per_mol / (8.314462618 * (480 + 12 * l))) * 1e-3
      return rates.map((rate) => temperatureAt([{ Ea_J_per_mol, A_per_s, share: 1 }], rate / 60, level))
    })
    const seriesWith = (offset: readonly number[]) =>
      constantRateSeries(
        levels,
        rates,
        rising.map((row, l) => row.map((T, run) => T + (offset[run] ?? 0) * (1 + ((growth - 1) * l) / (levels.length - 1)))),
      )
    const truth = meanOf(starink(seriesWith([]), quiet).Ea)
    const t = studentTQuantile(0.975, 3)
    const replicates = 4000
    let [squares, variances, covered] = [0, 0, 0]
    for (let k = 0; k < replicates; k++) {
      const { normal } = randomStream(11, k)
      const { Ea, points } = starink(seriesWith(rates.map(() => 0.1 * normal())), quiet)
      const error = meanOf(Ea) - truth
      const standardError = meanEnergyStandardError(points)
      squares += error ** 2
      variances += standardError ** 2
      if (Math.abs(error) <= t * standardError) covered++
    }
    expect(Math.abs(Math.sqrt(variances / squares) - 1)).toBeLessThan(0.04)
    expect(Math.abs(covered / replicates - 0.95)).toBeLessThan(0.015)
  })

  it('is that of the formula with the covariance written out', () => {
    const random = randomStream(3)
    const { points } = starink(
      disturbed((level) => (0.2 + 0.1 * level) * random.normal()),
      quiet,
    )
    const n = rates.length
    const covariance = (l: number, m: number): number =>
      points[l]!.residual.reduce((sum, r, j) => sum + r * (points[m]!.residual[j] as number), 0) / (n - 2)
    const c = points.map(({ x_per_K: x, energyPerSlope }) => {
      const mean = meanOf(x)
      const spread = Array.from(x).reduce((sum, value) => sum + (value - mean) ** 2, 0)
      return Array.from(x, (value) => (energyPerSlope * (value - mean)) / spread / levels.length)
    })
    let variance = 0
    for (let i = 0; i < n; i++)
      for (const l of levels.keys()) for (const m of levels.keys()) variance += c[l]![i]! * c[m]![i]! * covariance(l, m)
    expect(meanEnergyStandardError(points) / Math.sqrt(variance)).toBeCloseTo(1, 10)
  })

  it('is not to be had from two runs, or from no level', () => {
    const two = constantRateSeries(
      levels,
      rates.slice(0, 2),
      exact.map((row) => row.slice(0, 2)),
    )
    expect(meanEnergyStandardError(starink(two, quiet).points)).toBeNaN()
    expect(meanEnergyStandardError([])).toBeNaN()
  })
})

const friedmanOf: IsoconversionalMethod = (series, context) =>
  friedman(
    {
      ...series,
      runs: series.runs.map((run, i) => ({
        ...run,
        reactionRate_per_s: run.temperature_K.map(
          (T) => underConstantRate(steps, (rates[i] as number) / 60, T).rate_per_s,
        ) as typeof run.reactionRate_per_s,
      })),
    },
    context,
  )

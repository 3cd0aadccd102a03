import { describe, expect, it } from 'vitest'
import { temperatureAt, underConstantRate, type FirstOrderStep } from '../check-values/exact-simulation.ts'
import { constantHeatingRate, quiet, seriesOf } from '../check-values/series-of-values.ts'
import { methods } from '../isoconversional/registry.ts'
import { column } from '../units/quantity.ts'
import type { SeriesAtLevels } from '../series/series-at-levels.ts'
import { budgetOf } from './budget.ts'
import { disturbedEnergy, roomFor } from './disturbed-energy.ts'
import { energyModel } from './energy-model.ts'
import type { MeasuredSources } from './measured-sources.ts'
import { drawEnergies } from './monte-carlo.ts'

const levels = [0.1, 0.5]
const step: FirstOrderStep = { Ea_J_per_mol: 150e3, A_per_s: 1e13, share: 1 }
/** Exact runs whose temperatures are all off, each by its own. */
const seriesAt = (rates_K_per_min: readonly number[], shift_K: readonly number[] = []): SeriesAtLevels =>
  seriesOf(
    levels,
    rates_K_per_min.map((rate, i) => {
      const T = levels.map((level) => temperatureAt([step], rate / 60, level))
      return {
        programme: constantHeatingRate(rate),
        programmeGroup: i,
        temperature_K: T.map((value) => value + (shift_K[i] ?? 0)),
        time_s: T.map((value) => (value - 300) / (rate / 60)),
        reactionRate_per_s: T.map((value) => underConstantRate([step], rate / 60, value).rate_per_s),
      }
    }),
  )
const series = seriesAt([2, 5, 10])
const zeros = (length: number): Float64Array => new Float64Array(length)

/** The other baseline leaves no positive reaction rate at the first level of the first run. */
const withoutRate: MeasuredSources = {
  stated: { temperatureCommon_K: 0.5, temperatureRun_K: 0.5, lag_s: 1, statedHeatingRate_share: 0 },
  heatingRate_share: zeros(3),
  noise: { time_s: column(zeros(6), 's'), lnReactionRate: zeros(6), lnReactionRateSlope_per_s: zeros(6), correlationWithBefore: zeros(6) },
  baseline: {
    time_s: column(Float64Array.of(1, 2, 3, 1, 2, 3), 's'),
    lnReactionRate: Float64Array.of(Number.NaN, 0.01, 0.02, 0.03, 0.04, 0.06),
    reason: null,
  },
}

describe('a reaction rate that another baseline does not leave', () => {
  it.each(['kas', 'ofw', 'starink', 'vyazovkin', 'vyazovkin-incremental', 'astm-e1641'] as const)('is nothing to %s', (method) => {
    const model = energyModel(series, methods[method].run(series, quiet))
    for (const u of budgetOf(model, withoutRate).baseline) expect(u).toBeGreaterThan(0)
    const [energies] = drawEnergies([model], withoutRate, { seed: 1, from: 0, to: 20 }, quiet)
    for (const Ea of energies ?? [Number.NaN]) expect(Ea).toBeGreaterThan(0)
  })

  it('leaves Friedman without that entry of the budget at the level, and at no other', () => {
    const model = energyModel(series, methods.friedman.run(series, quiet))
    const budget = budgetOf(model, withoutRate)
    expect(budget.baseline[0]).toBeNaN()
    expect(budget.baseline[1]).toBeGreaterThan(0)
    for (const u of budget['temperature-common']) expect(u).toBeGreaterThan(0)
  })
})

describe('an error of temperature that all runs share', () => {
  it.each(['kas', 'ofw', 'ofw-corrected', 'starink', 'vyazovkin', 'vyazovkin-incremental'] as const)(
    'moves %s by what the budget says',
    (method) => {
      const only = { ...withoutRate, stated: { temperatureCommon_K: 1, temperatureRun_K: 0, lag_s: 0, statedHeatingRate_share: 0 } }
      const told = budgetOf(energyModel(series, methods[method].run(series, quiet)), only)['temperature-common']
      const up = methods[method].run(seriesAt([2, 5, 10], [0.5, 0.5, 0.5]), quiet).Ea
      const down = methods[method].run(seriesAt([2, 5, 10], [-0.5, -0.5, -0.5]), quiet).Ea
      // A finite difference of the method itself.
      levels.forEach((_, level) => expect((told[level] ?? 0) / Math.abs((up[level] ?? 0) - (down[level] ?? 0))).toBeCloseTo(1, 2))
    },
  )
})

describe('errors that move Ea far on straight ramps', () => {
  it.each(['vyazovkin', 'vyazovkin-incremental'] as const)(
    'give %s what it finds itself, up to half of Ea, and beyond that nothing',
    (method) => {
      const near = seriesAt([8, 10, 12])
      const model = energyModel(near, methods[method].run(near, quiet))
      const cases = [-4, -2, -1.5, -1, 1, 1.5, 2, 4].flatMap((spread) => {
        const shift_K = [-spread, 0.3 * spread, spread]
        const { Ea } = methods[method].run(seriesAt([8, 10, 12], shift_K), quiet)
        const temperature_K = Float64Array.from(shift_K)
        const disturbance = { temperature_K, lnHeatingRate: zeros(3), lag_s: 0, time_s: zeros(6), lnReactionRate: zeros(6) }
        return levels.map((_, level) => {
          const from = model.Ea[level] ?? Number.NaN
          const change = (Ea[level] ?? Number.NaN) - from
          return { share: Math.abs(change) / from, change, found: disturbedEnergy(model, level, disturbance, roomFor(3)) - from }
        })
      })
      const within = cases.filter(({ share }) => share < 0.48)
      for (const { change, found } of within) expect(Math.abs(found - change)).toBeLessThan(0.03 * Math.abs(change) + 20)
      const beyond = cases.filter(({ share }) => !(share <= 0.52))
      for (const { found } of beyond) expect(found).toBeNaN()
      expect(Math.max(...within.map(({ share }) => share))).toBeGreaterThan(0.3)
      expect(beyond.length).toBeGreaterThan(0)
    },
  )
})

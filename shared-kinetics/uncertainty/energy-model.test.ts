import { describe, expect, it } from 'vitest'
import { temperatureAt } from '../check-values/exact-simulation.ts'
import { constantRateSeries, quiet } from '../check-values/series-of-values.ts'
import { methods } from '../isoconversional/registry.ts'
import { methodIds } from '../isoconversional/result.ts'
import { column } from '../units/quantity.ts'
import { budgetOf } from './budget.ts'
import { energyModel } from './energy-model.ts'
import { drawEnergies } from './monte-carlo.ts'

describe('the model of a method', () => {
  // At the second level faster runs stand at lower temperatures: no method that looks for a positive Ea finds one.
  const rates = [1, 2, 5, 10]
  const exact = rates.map((rate) => temperatureAt([{ Ea_J_per_mol: 150e3, A_per_s: 1e12, share: 1 }], rate / 60, 0.5))
  const series = constantRateSeries([0.4, 0.5], rates, [exact.map((T) => T - 5), exact.toReversed()])
  const table = (value: number): Float64Array => new Float64Array(rates.length * 2).fill(value)
  const sources = {
    stated: { temperatureCommon_K: 0.5, temperatureRun_K: 0.5, lag_s: 1, statedHeatingRate_share: 0.02 },
    heatingRate_share: new Float64Array(rates.length),
    noise: {
      time_s: column(table(0.1), 's'),
      lnReactionRate: table(0.01),
      lnReactionRateSlope_per_s: table(0),
      correlationWithBefore: table(0),
    },
    baseline: null,
  }

  it.each(methodIds.filter((id) => id !== 'friedman' && methods[id].info.appliesTo.includes('constant-heating-rate')))(
    'by %s has numbers only where there is an Ea, and does not stop where there is none',
    (id) => {
      const result = methods[id].run(series, quiet)
      const model = energyModel(series, result)
      const budget = budgetOf(model, sources)
      const [draws] = drawEnergies([model], sources, { seed: 1, from: 0, to: 20 }, quiet)
      expect(Array.from(budget['temperature-common'], Number.isNaN)).toEqual(Array.from(result.Ea, Number.isNaN))
      expect(Number.isNaN(draws?.[1] ?? 0)).toBe(Number.isNaN(result.Ea[1] as number))
      expect(draws?.[0]).toBeGreaterThan(100e3)
    },
  )

  it('has one method at least without an Ea at such a level', () => {
    expect(methods['ofw-corrected'].run(series, quiet).Ea[1]).toBeNaN()
  })
})

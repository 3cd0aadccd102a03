import { describe, expect, it } from 'vitest'
import disturbed from '../check-values/computed/disturbed-line.json'
import { constantRateSeries, quiet } from '../check-values/series-of-values.ts'
import { vyazovkin } from './vyazovkin.ts'
import { vyazovkinIncremental } from './vyazovkin-incremental.ts'

const T = disturbed.exactTemperature_K.map((text, i) => Number(text) + (disturbed.disturbance_K[i] as number))

describe('the interval of Vyazovkin and Wight beside a minimum of Phi', () => {
  // The first step of the incremental form is from zero, too.
  it.each([
    ['vyazovkin', vyazovkin],
    ['vyazovkin-incremental', vyazovkinIncremental],
  ] as const)('has the printed ends by %s', (_, method) => {
    const { otherIntervals } = method(constantRateSeries([0.5], disturbed.heatingRate_K_per_min, [T]), quiet)
    expect(otherIntervals.map((interval) => interval.kind)).toEqual(['vyazovkin-wight-f'])
    const ends = [otherIntervals[0]?.lower95[0] ?? Number.NaN, otherIntervals[0]?.upper95[0] ?? Number.NaN]
    expect(ends.map((end) => (end / 1000).toFixed(3))).toEqual(disturbed.vyazovkin.varianceRatioInterval_kJ_per_mol)
  })

  it('is not given for two programmes, nor at a level without Ea', () => {
    expect(vyazovkin(constantRateSeries([0.5], [1, 2], [T.slice(0, 2)]), quiet).otherIntervals).toEqual([])
    const series = constantRateSeries([0.5, 0.6], disturbed.heatingRate_K_per_min, [T, [...T.slice(0, 4), Number.NaN]])
    const { otherIntervals, status } = vyazovkin(series, quiet)
    expect(status).toEqual(['ok', 'level-not-reached'])
    expect(otherIntervals[0]?.lower95[0]).toBeGreaterThan(0)
    expect(otherIntervals[0]?.lower95[1]).toBeNaN()
  })
})

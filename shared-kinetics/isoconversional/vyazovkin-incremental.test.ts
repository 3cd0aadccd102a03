import { describe, expect, it } from 'vitest'
import programmes from '../check-values/computed/ramp-hold-ramp.json'
import twoSteps from '../check-values/computed/two-independent-steps.json'
import { temperatureAt, underConstantRate } from '../check-values/exact-simulation.ts'
import { constantHeatingRate, constantRateSeries, hold, quiet, seriesOf, type RunValues } from '../check-values/series-of-values.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { friedman } from './friedman.ts'
import { vyazovkinIncremental } from './vyazovkin-incremental.ts'
import { vyazovkin } from './vyazovkin.ts'

const R = gasConstant_J_per_mol_K

const steps = twoSteps.steps.map(({ Ea_kJ_per_mol, A_per_min }) => ({
  Ea_J_per_mol: Ea_kJ_per_mol * 1000,
  A_per_s: A_per_min / 60,
  share: 0.5,
}))

/** The two independent steps at the rates of the check values, read at levels. */
const twoStepSeries = (levels: readonly number[]) =>
  seriesOf(
    levels,
    twoSteps.heatingRate_K_per_min.map((beta, i): RunValues => {
      const temperature_K = levels.map((level) => temperatureAt(steps, beta / 60, level))
      return {
        programme: constantHeatingRate(beta),
        programmeGroup: i,
        temperature_K,
        time_s: temperature_K.map((T) => ((T - 250) * 60) / beta),
        reactionRate_per_s: temperature_K.map((T) => underConstantRate(steps, beta / 60, T).rate_per_s),
      }
    }),
  )

/** Ea by Friedman in J/mol as printed. */
const printed = (level: number): number => Number(twoSteps.levels.find((row) => row.level === level)?.friedman) * 1000

describe('two independent steps, levels 0.01 apart', () => {
  const levels = Array.from({ length: 99 }, (_, k) => (k + 1) / 100)
  const incremental = vyazovkinIncremental(twoStepSeries(levels), quiet).Ea
  const differential = friedman(twoStepSeries(levels), quiet).Ea
  const fromZero = vyazovkin(twoStepSeries(levels), quiet).Ea
  // Ea of a step is a mean over it, which is that in its middle to second order.
  const middle = levels.map((level) => level - 0.005)
  const inTheMiddle = friedman(twoStepSeries(middle), quiet).Ea

  it('give the incremental method the Ea of Friedman, half a step back', () => {
    for (let k = 4; k < 95; k++) expect(Math.abs(incremental[k]! - inTheMiddle[k]!), `alpha ${levels[k]}`).toBeLessThan(20)
    // At the level itself the difference is half a step of the slope, at most 250 J/mol here.
    for (let k = 4; k < 95; k++) expect(Math.abs(incremental[k]! - differential[k]!), `alpha ${levels[k]}`).toBeLessThan(300)
  })

  it('which the printed values of Friedman confirm', () => {
    for (const row of twoSteps.levels) {
      const k = Math.round(row.level * 100) - 1
      // Halfway between the steps that end and begin at the level.
      const atLevel = 0.5 * (incremental[k]! + incremental[k + 1]!)
      expect(Math.abs(atLevel / 1000 - Number(row.friedman)), `alpha ${row.level}`).toBeLessThan(0.02)
    }
  })

  it('while the integral from zero lags behind by up to 11 kJ/mol', () => {
    const lag = differential.map((value, k) => value - fromZero[k]!)
    expect(Math.max(...lag) / 1000).toBeGreaterThan(10)
    expect(Math.max(...lag) / 1000).toBeLessThan(12)
  })

  it('and few coarse levels smooth within their steps alone', () => {
    const coarse = vyazovkinIncremental(twoStepSeries([0.1, 0.3, 0.5, 0.7, 0.9]), quiet).Ea
    // Between the Ea at the two ends of each step.
    ;[
      [0.1, 0.3],
      [0.3, 0.5],
      [0.5, 0.7],
      [0.7, 0.9],
    ].forEach(([from, to], i) => {
      expect(coarse[i + 1]).toBeGreaterThan(printed(from!))
      expect(coarse[i + 1]).toBeLessThan(printed(to!))
    })
  })
})

describe('other programmes', () => {
  const levels = programmes.runs[0]!.at.map((row) => row.level)
  const general = { kind: 'general' } as const
  const rampHoldRamp = (every: number): RunValues[] =>
    programmes.runs.map((run, i) => {
      const [holdStarts, holdEnds, ends] = [Number(run.holdStarts_s), Number(run.holdEnds_s), Number(run.ends_s)]
      const times = Array.from({ length: Math.floor(ends / every) + 1 }, (_, k) => k * every)
      return {
        programme: general,
        programmeGroup: i,
        temperature_K: run.at.map((row) => Number(row.temperature_K)),
        time_s: run.at.map((row) => Number(row.time_s)),
        history: {
          time_s: times,
          temperature_K: times.map((t) =>
            t <= holdStarts
              ? run.start_K + (run.rate1_K_per_min * t) / 60
              : t <= holdEnds
                ? run.hold_K
                : run.hold_K + (run.rate2_K_per_min * (t - holdEnds)) / 60,
          ),
        },
      }
    })

  it('of ramp, hold and ramp give the true Ea, sampled coarsely or finely', () => {
    for (const every of [1, 15]) {
      const result = vyazovkinIncremental(seriesOf(levels, rampHoldRamp(every)), quiet)
      expect(result.status).toEqual(levels.map(() => 'ok'))
      for (const Ea of result.Ea) expect(Math.abs(Ea / programmes.Ea_J_per_mol - 1)).toBeLessThan(1e-8)
    }
  })

  it('give it together with ramps and holds of the same reaction', () => {
    const step = { Ea_J_per_mol: programmes.Ea_J_per_mol, A_per_s: programmes.A_per_s, share: 1 }
    const ramps = [2, 20].map((beta, i): RunValues => {
      const temperature_K = levels.map((level) => temperatureAt([step], beta / 60, level))
      const time_s = temperature_K.map((T) => ((T - 300) * 60) / beta)
      return { programme: constantHeatingRate(beta), programmeGroup: 10 + i, temperature_K, time_s }
    })
    const holds = [430, 445].map((T, i): RunValues => {
      const time_s = levels.map((alpha) => -Math.log(1 - alpha) / (step.A_per_s * Math.exp(-step.Ea_J_per_mol / (R * T))))
      const history = { time_s: [0, 1e5], temperature_K: [T, T] }
      return { programme: hold(T), programmeGroup: 20 + i, temperature_K: levels.map(() => T), time_s, history }
    })
    const result = vyazovkinIncremental(seriesOf(levels, [...ramps, ...holds, ...rampHoldRamp(15)]), quiet)
    expect(result.status).toEqual(levels.map(() => 'ok'))
    for (const value of result.Ea) expect(Math.abs(value / step.Ea_J_per_mol - 1)).toBeLessThan(1e-8)
  })
})

describe('levels without a number', () => {
  it('not reached: a run lacks the level or the one before; the next step is whole again', () => {
    const T = [
      [500, 510, 520],
      [505, Number.NaN, 525],
      [510, 521, 532],
      [515, 526, 538],
    ]
    const result = vyazovkinIncremental(constantRateSeries([0.2, 0.4, 0.6, 0.8], [1, 2, 5], T), quiet)
    expect(result.status).toEqual(['ok', 'level-not-reached', 'level-not-reached', 'ok'])
    expect(Array.from(result.Ea, Number.isFinite)).toEqual([true, false, false, true])
    expect(Array.from(result.systematicError, Number.isFinite)).toEqual([true, false, false, true])
  })

  it('at the bound: the run that is hotter takes the longer time', () => {
    const T = [
      [500, 510, 520],
      [501, 514, 530],
    ]
    const result = vyazovkinIncremental(constantRateSeries([0.2, 0.4], [1, 2, 4], T), quiet)
    expect(result.status).toEqual(['ok', 'minimum-at-bound'])
  })

  it('too few programmes: replicates of one', () => {
    const { runs, levels } = constantRateSeries([0.5], [5, 5], [[500, 500.2]])
    const result = vyazovkinIncremental({ levels, runs: runs.map((run) => ({ ...run, programmeGroup: 0 })) }, quiet)
    expect(result.status).toEqual(['too-few-programmes'])
  })
})

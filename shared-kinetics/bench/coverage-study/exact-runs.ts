import { temperatureAtConversion } from '../../check-values/exact-model-curve.ts'
import { seriesOf, type RunValues } from '../../check-values/series-of-values.ts'
import type { RandomStream } from '../../numerics/random.ts'
import type { SeriesAtLevels } from '../../series/series-at-levels.ts'
import { column, quantity } from '../../units/quantity.ts'
import { gasConstant_J_per_mol_K } from '../../units/constants.ts'
import type { MeasuredSources, StatedUncertainties } from '../../uncertainty/measured-sources.ts'
import { heatingRates_K_per_min, levels, type Reaction } from './design.ts'

/** One exact run at the levels. */
export interface ExactRun {
  readonly heatingRate_K_per_s: number
  readonly temperature_K: readonly number[]
  readonly reactionRate_per_s: readonly number[]
}

/** One exact run a heating rate. */
export const exactRuns = (reaction: Reaction): ExactRun[] =>
  heatingRates_K_per_min.map((rate) => {
    const heatingRate_K_per_s = rate / 60
    const temperature_K = levels.map((level) => temperatureAtConversion(reaction, heatingRate_K_per_s, level))
    const reactionRate_per_s = temperature_K.map(
      (T, k) => Math.exp(reaction.lnA - reaction.Ea_J_per_mol / (gasConstant_J_per_mol_K * T)) * reaction.model.f(levels[k] ?? Number.NaN),
    )
    return { heatingRate_K_per_s, temperature_K, reactionRate_per_s }
  })

/** Errors of one run: added to its temperatures, and to the logarithm of the heating rate that is stated for it. */
export interface RunErrors {
  readonly temperature_K: number
  readonly lnHeatingRate: number
}

export const noErrors: readonly RunErrors[] = heatingRates_K_per_min.map(() => ({ temperature_K: 0, lnHeatingRate: 0 }))

/** Errors of the sizes stated, for all six runs; those of one run are the same whichever series it belongs to. */
export function drawErrors(made: StatedUncertainties, runs: readonly ExactRun[], random: RandomStream): RunErrors[] {
  const common = made.temperatureCommon_K * random.normal()
  const lag_s = made.lag_s * random.normal()
  return runs.map((run) => {
    const ofRun = made.temperatureRun_K * random.normal()
    const lnHeatingRate = made.statedHeatingRate_share * random.normal()
    return { temperature_K: common + ofRun + lag_s * run.heatingRate_K_per_s, lnHeatingRate }
  })
}

/**
 * The series as it would be read from runs with these errors. With an error of the heating rate the runs have no time but one that was rebuilt from that rate, so that the
 * reaction rate bears the error as well; otherwise time and heating rate are measured.
 */
export function seriesWithErrors(runs: readonly ExactRun[], errors: readonly RunErrors[], timeIsRebuilt: boolean): SeriesAtLevels {
  return seriesOf(
    levels,
    runs.map((run, i): RunValues => {
      const { temperature_K: shift, lnHeatingRate } = errors[i] ?? { temperature_K: Number.NaN, lnHeatingRate: Number.NaN }
      const factor = Math.exp(lnHeatingRate)
      const heatingRate = run.heatingRate_K_per_s * factor
      const start_K = 300
      return {
        programme: {
          kind: 'constant-heating-rate',
          heatingRate: quantity(heatingRate, 'K/s'),
          standardError: quantity(timeIsRebuilt ? Number.NaN : 0, 'K/s'),
          source: timeIsRebuilt ? 'nominal' : 'measured',
        },
        programmeGroup: i,
        temperature_K: run.temperature_K.map((T) => T + shift),
        time_s: run.temperature_K.map((T) => (T - start_K) / heatingRate),
        reactionRate_per_s: run.reactionRate_per_s.map((rate) => rate * factor),
      }
    }),
  )
}

/** What (d) is told of runs without signal noise: the errors that were made, and no others. */
export function sourcesOf(made: StatedUncertainties, runs: number): MeasuredSources {
  const zeros = (): Float64Array => new Float64Array(runs * levels.length)
  return {
    stated: made,
    heatingRate_share: new Float64Array(runs).fill(made.statedHeatingRate_share),
    noise: { time_s: column(zeros(), 's'), lnReactionRate: zeros(), lnReactionRateSlope_per_s: zeros(), correlationWithBefore: zeros() },
    baseline: null,
  }
}

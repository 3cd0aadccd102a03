import { quiet } from '../../check-values/series-of-values.ts'
import type { IsoconversionalResult } from '../../isoconversional/result.ts'
import type { SeriesAtLevels } from '../../series/series-at-levels.ts'
import { intervalsByResampling, resamplingOf } from '../../tasks/intervals-by-resampling.ts'
import { budgetOf } from '../../uncertainty/budget.ts'
import { combinedInterval } from '../../uncertainty/combined-interval.ts'
import { drawInterval } from '../../uncertainty/draw-interval.ts'
import { energyModel, type EnergyModel } from '../../uncertainty/energy-model.ts'
import type { MeasuredSources } from '../../uncertainty/measured-sources.ts'
import { drawEnergies } from '../../uncertainty/monte-carlo.ts'
import { drawsPerReplicate, levels, type StudiedInterval } from './design.ts'

/** One analysed series: what every kind of interval is made from. */
export interface Analysis {
  readonly series: SeriesAtLevels
  /** One a studied method. */
  readonly results: readonly IsoconversionalResult[]
  readonly sources: MeasuredSources
  readonly seedOfDraws: number
}

/** Ends of an interval in J/mol, one entry a level; NaN where there is none. */
export interface Ends {
  readonly lower: ArrayLike<number>
  readonly upper: ArrayLike<number>
}

/** Intervals of one analysis: for each studied method those that it has. */
export type Intervals = readonly Partial<Readonly<Record<StudiedInterval, Ends>>>[]
export type IntervalMaker = (analysis: Analysis) => Intervals

/** (a) and, for minimising methods, (b): they come with the method. */
export const regressionIntervals: IntervalMaker = ({ results }) =>
  results.map((result) => {
    const varianceRatio = result.otherIntervals.find(({ kind }) => kind === 'vyazovkin-wight-f')
    return { 'student-t': ends(result), ...(varianceRatio === undefined ? {} : { 'vyazovkin-wight-f': ends(varianceRatio) }) }
  })

/** (c), where there are runs enough. */
export const resamplingIntervals: IntervalMaker = ({ series, results, seedOfDraws }) => {
  const resampling = resamplingOf(series, seedOfDraws)
  return results.map((result) =>
    Object.fromEntries(
      intervalsByResampling(series, result, resampling, quiet).map(({ kind, lower95_kJ_per_mol, upper95_kJ_per_mol }) => [
        kind,
        { lower: joules(lower95_kJ_per_mol), upper: joules(upper95_kJ_per_mol) },
      ]),
    ),
  )
}

/** (d), and the regression combined with the part of it that its scatter cannot show. */
export const sourceIntervals: IntervalMaker = ({ series, results, sources, seedOfDraws }) => {
  const models = results.map((result) => energyModel(series, result))
  const draws = drawEnergies(models, sources, { seed: seedOfDraws, from: 0, to: drawsPerReplicate }, quiet)
  return results.map((result, m) => ({
    'measured-sources': ends(drawInterval(draws.slice(m, m + 1), levels.length)),
    combined: ends(combinedInterval(result, budgetOf(energyModelAt(models, m), sources))),
  }))
}

const makers: readonly IntervalMaker[] = [regressionIntervals, resamplingIntervals, sourceIntervals]

/** All intervals that the program gives, by the functions that it gives them by. */
export const intervalsOf: IntervalMaker = (analysis) => {
  const made = makers.map((maker) => maker(analysis))
  return analysis.results.map((_, m) => made.reduce((all, intervals) => ({ ...all, ...intervals[m] }), {}))
}

function energyModelAt(models: readonly EnergyModel[], m: number): EnergyModel {
  const model = models[m]
  if (model === undefined) throw new RangeError(`no model ${m}`)
  return model
}

const ends = ({ lower95, upper95 }: { readonly lower95: ArrayLike<number>; readonly upper95: ArrayLike<number> }): Ends => ({
  lower: lower95,
  upper: upper95,
})

const joules = (values: readonly (number | null)[]): number[] => values.map((value) => 1000 * (value ?? Number.NaN))

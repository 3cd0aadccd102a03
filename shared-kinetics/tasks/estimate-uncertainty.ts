import type { IsoconversionalResult, TaskContext } from '../isoconversional/result.ts'
import type { RunColumns } from '../series/run.ts'
import type { SeriesAtLevels } from '../series/series-at-levels.ts'
import { budgetOf, type Budget } from '../uncertainty/budget.ts'
import { bootstrap } from '../uncertainty/bootstrap.ts'
import { combinedInterval } from '../uncertainty/combined-interval.ts'
import { energyModel, type EnergyModel } from '../uncertainty/energy-model.ts'
import { deleteOne, jackknife } from '../uncertainty/jackknife.ts'
import type { UncertaintySettings } from '../uncertainty/measured-sources.ts'
import { resampledEnergies } from '../uncertainty/resampled-energies.ts'
import { resamplesOf, type ResampledInterval, type Resamples } from '../uncertainty/resamples.ts'
import { budgetEntries, noteOnCombined } from './budget-entries.ts'
import type { DrawOrder } from './draw-uncertainty.ts'
import { intervalResult, type IntervalColumns } from './interval-result.ts'
import type { EvaluationCache } from './memo.ts'
import { measuredSourcesOf } from './measured-sources-of.ts'
import { seriesOfStudy } from './series-of-study.ts'
import type { StudyInput } from './study-input.ts'
import type { BudgetEntry, IntervalResult, UncertaintyProfile, UncertaintyResult } from './study-result.ts'

/** What resampling and propagation say, and what the draws of measured sources are to be made from (`drawShare`, `intervalsOfDraws`). */
export interface UncertaintyEstimate {
  readonly result: UncertaintyResult
  readonly order: DrawOrder
}

/**
 * What takes longer than an evaluation: for each method of the study intervals by resampling the runs, the budget of measured sources, and the regression combined with
 * those that its scatter cannot show. A method without an interval of its own (two programmes) has none of them.
 *
 * Pure, and the same for the same seed. What `evaluateStudy` left in `cache` is not worked out again.
 *
 * @param columns - by `RunInfo.columnsKey`
 * @throws KineticsError `bad-levels`; Cancelled
 */
export function estimateUncertainty(
  study: StudyInput,
  columns: ReadonlyMap<string, RunColumns | undefined>,
  settings: UncertaintySettings,
  context: TaskContext,
  cache: EvaluationCache = new Map(),
): UncertaintyEstimate {
  const { runs, series, chosen, resultOf } = seriesOfStudy(study, columns, context, cache)
  const { draws, seed, ...stated } = settings
  const sources = measuredSourcesOf(runs, study.settings, stated, columns, context)
  const models: EnergyModel[] = []
  const profiles = chosen.map((info, done): UncertaintyProfile => {
    context.progress(done, chosen.length)
    const result = resultOf(info)
    const resampled = intervalsByResampling(series, result, seed, context)
    if (result.Ea.every(Number.isNaN)) return { method: info.id, intervals: resampled, budget: [] }
    const model = energyModel(series, result)
    models.push(model)
    const budget = budgetOf(model, sources)
    const entries = budgetEntries(budget, sources)
    const intervals = [...resampled, ...(result.interval.dof > 0 ? [combined(result, budget, entries)] : [])]
    return { method: info.id, intervals, budget: entries }
  })
  context.progress(chosen.length, chosen.length)
  return { result: { levels: study.settings.levels, seed, draws, profiles }, order: { models, sources } }
}

const combined = (result: IsoconversionalResult, budget: Budget, entries: readonly BudgetEntry[]): IntervalResult =>
  intervalResult('combined', combinedInterval(result, budget), noteOnCombined(entries))

/** Jackknife and bootstrap over the runs, each where there are runs enough for it. */
export function intervalsByResampling(
  series: SeriesAtLevels,
  result: IsoconversionalResult,
  seed: number,
  context: TaskContext,
): IntervalResult[] {
  const programmeGroup = series.runs.map((run) => run.programmeGroup)
  const energies = resampledEnergies(series, result, context)
  const ofEach = (times: readonly ArrayLike<number>[]): Float64Array[] =>
    times.map((taken) => {
      context.checkCancelled()
      return energies(taken)
    })
  const atLevels = (
    resampled: readonly Float64Array[],
    intervalOf: (energies: readonly number[], Ea: number) => ResampledInterval,
  ): IntervalColumns =>
    columnsOf(
      Array.from(result.Ea, (Ea, level) =>
        intervalOf(
          resampled.map((row) => row[level] ?? Number.NaN),
          Ea,
        ),
      ),
    )

  const intervals: IntervalResult[] = []
  const left = deleteOne(programmeGroup)
  if (left !== null) {
    const columns = atLevels(ofEach(left), (without, Ea) => jackknife(Ea, without))
    const note = `Each of ${left.length} runs left out once; Student's t with ${left.length - 1} degrees of freedom. Pointwise, and approximate with so few runs.`
    intervals.push(intervalResult('jackknife', columns, note))
  }
  const resamples = resamplesOf(programmeGroup, seed)
  if (resamples !== null) {
    const columns = atLevels(ofEach(resamples.times), (values) => bootstrap(values, resamples))
    intervals.push(intervalResult('bootstrap', columns, noteOnBootstrap(resamples, programmeGroup.length, seed)))
  }
  return intervals
}

const columnsOf = (intervals: readonly ResampledInterval[]): IntervalColumns => ({
  standardUncertainty: intervals.map((interval) => interval.standardUncertainty),
  lower95: intervals.map((interval) => interval.lower95),
  upper95: intervals.map((interval) => interval.upper95),
})

function noteOnBootstrap({ times, made, droppedShare }: Resamples, runs: number, seed: number): string {
  const dropped = `${(100 * droppedShare).toFixed(1)} % of the probability, resamples of fewer than three distinct programmes, was dropped`
  const how =
    made === 'every'
      ? `All ${times.length} distinct resamples of ${runs} runs, each with its probability; ${dropped}.`
      : `${times.length} resamples of ${runs} runs drawn with seed ${seed}; ${dropped}.`
  return `${how} 2.5 and 97.5 % points. Pointwise and approximate: with independent errors they hold the true value in about 64 % of cases for 4 runs, 88 % for 5, 90 % for 6.`
}

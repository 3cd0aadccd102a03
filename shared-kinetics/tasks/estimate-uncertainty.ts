import type { IsoconversionalResult, TaskContext } from '../isoconversional/result.ts'
import type { RunColumns } from '../series/run.ts'
import { addedToScatter, signedBudgetOf, withoutSigns, type Budget } from '../uncertainty/budget.ts'
import { combinedInterval } from '../uncertainty/combined-interval.ts'
import { energyModel, type EnergyModel } from '../uncertainty/energy-model.ts'
import type { MeasuredSources, UncertaintySettings } from '../uncertainty/measured-sources.ts'
import { onSharedMemory } from '../uncertainty/shared-memory.ts'
import { budgetEntries, givenOf, noteOnCombined } from './budget-entries.ts'
import type { DrawOrder } from './draw-uncertainty.ts'
import { intervalResult } from './interval-result.ts'
import { intervalsByResampling, resamplingOf, withCoverage } from './intervals-by-resampling.ts'
import type { EvaluationCache } from './memo.ts'
import { combinedMeanResult } from './mean-result.ts'
import { measuredSourcesOf } from './measured-sources-of.ts'
import { seriesOfStudy } from './series-of-study.ts'
import type { StudyInput } from './study-input.ts'
import type { BudgetEntry, IntervalResult, UncertaintyProfile, UncertaintyResult } from './study-result.ts'

/** What resampling and propagation say, and what the draws of measured sources are to be made from (`drawShare`, `intervalsOfDraws`), on memory that threads share. */
export interface UncertaintyEstimate {
  readonly result: UncertaintyResult
  readonly order: DrawOrder
}

/**
 * What takes longer than an evaluation: for each method of the study intervals by resampling the runs, the budget of measured sources, and the regression combined with
 * those that its scatter cannot show, at each level and for the mean over levels. A method without an interval of its own (two programmes) has none of them.
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
  const resampling = withCoverage(resamplingOf(series, seed), series, context)
  const models: EnergyModel[] = []
  const profiles = chosen.map((info, done): UncertaintyProfile => {
    context.progress(done, chosen.length)
    const result = resultOf(info)
    const resampled = intervalsByResampling(series, result, resampling, context)
    if (result.Ea.every(Number.isNaN)) return { method: info.id, intervals: resampled, budget: [], mean: null }
    const model = energyModel(series, result, context)
    context.checkCancelled()
    models.push(onSharedMemory(model))
    const signed = signedBudgetOf(model, sources, context.checkCancelled)
    const budget = withoutSigns(signed)
    const entries = budgetEntries(budget, sources)
    const intervals = [...resampled, ...(result.interval.dof > 0 ? [combined(result, budget, sources, entries)] : [])]
    const mean = combinedMeanResult(result, study.settings, signed, addedToScatter(sources), entries)
    return { method: info.id, intervals, budget: entries, mean }
  })
  context.progress(chosen.length, chosen.length)
  return { result: { levels: study.settings.levels, seed, draws, profiles }, order: { models, sources: onSharedMemory(sources) } }
}

const combined = (
  result: IsoconversionalResult,
  budget: Budget,
  sources: MeasuredSources,
  entries: readonly BudgetEntry[],
): IntervalResult =>
  intervalResult(
    'combined',
    combinedInterval(result, budget, addedToScatter(sources)),
    noteOnCombined(entries),
    result.Ea,
    () => 'source-unknown',
    givenOf(sources),
  )

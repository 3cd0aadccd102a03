import { noiseAtLevels } from '../conversion/noise-at-levels.ts'
import { methods } from '../isoconversional/registry.ts'
import type { TaskContext } from '../isoconversional/result.ts'
import { review } from '../review/review.ts'
import type { RunColumns, RunInfo, SignalInfo } from '../series/run.ts'
import type { SignalQuantity } from '../series/signal-quantity.ts'
import { quantity } from '../units/quantity.ts'
import { pointsOfRun } from './apply-borchardt-daniels.ts'
import { applyPeakMethods, type PeakResults } from './apply-peak-methods.ts'
import { conversionAtTemperature } from './conversion-at-temperature.ts'
import { halfHeights } from './half-heights.ts'
import { curveToDraw, noCurve } from './curve-to-draw.ts'
import { memoryOf, remember, type EvaluationCache } from './memo.ts'
import { profileResult } from './profile-result.ts'
import { runResult } from './run-result.ts'
import { seriesOfStudy, type GroupedRun } from './series-of-study.ts'
import type { StudyInput } from './study-input.ts'
import type { RunResult, StudyResult } from './study-result.ts'

/**
 * Everything that follows from a study: raw columns to conversion, to runs read at common levels, to Ea by every method asked for, to findings.
 *
 * Pure. A run that cannot be used becomes a finding `run-unusable` of severity stop and is left out; it never sinks the study. Each step is remembered in `cache`
 * under what it depends on, so that e.g. another choice of methods does no conversion again.
 *
 * @param columns - by `RunInfo.columnsKey`
 * @throws KineticsError `bad-levels`; Cancelled
 */
export function evaluateStudy(
  study: StudyInput,
  columns: ReadonlyMap<string, RunColumns | undefined>,
  context: TaskContext,
  cache: EvaluationCache = new Map(),
): StudyResult {
  const { settings } = study
  const used = study.runs.filter((run) => run.use).length
  // Methods that turn out not to apply make the total smaller, so that the share done never falls.
  const steps = { done: 0, total: used + (settings.methods?.length ?? methodsByDefault) + 1 }
  const step = (): void => {
    context.checkCancelled()
    context.progress(++steps.done, steps.total)
  }
  const { signal, toChooseFrom, runs, unusable, chosen, leftOut, resultOf } = seriesOfStudy(study, columns, context, cache, step)
  steps.total = used + chosen.length + 1
  const groups = runs.map((run) => run.group)
  const profiles = chosen.map((info) => {
    const result = resultOf(info)
    step()
    return profileResult(info, result, settings.levels, settings.meanRange, groups, study.withoutCurves !== true, context.checkCancelled)
  })
  const curveOf = ({ info, order, converted }: GroupedRun): RunResult['curve'] => {
    const measured = columns.get(info.columnsKey)
    if (study.withoutCurves === true || measured === undefined) return noCurve
    return remember(cache, JSON.stringify(['draw', drawVersion, order.key]), () => curveToDraw(order, measured, converted), memoryOf)
  }
  const { kissinger, peakMethods, leftOut: kissingerLeftOut } = peakResultsOf(runs, signal, context.checkCancelled)
  const result = {
    levels: settings.levels,
    signal,
    signalsToChooseFrom: toChooseFrom,
    runs: runs.map((run) => {
      context.checkCancelled()
      return runResult(run.info, run.signal, run.converted, run.levels, run.group, curveOf(run))
    }),
    profiles,
    kissinger,
    peakMethods,
  }
  const findings = review(
    {
      study,
      result,
      runs: runs.map(({ info, converted, levels }, i) => ({
        info,
        result: itemAt(result.runs, i),
        heatingRateSpread: converted.told.heatingRateSpread,
        steadiness: converted.steadiness,
        rateAtEnds: converted.converted.rateAtEnds,
        baselineKind: converted.converted.baselineKind,
        sampling: converted.sampling,
        timeNoiseAtLevel_s: noiseAtLevels(converted.converted.curve, settings.levels, levels, 'held', context.checkCancelled).time_s,
      })),
      unusable,
      leftOut: runs.length === 0 ? [] : [...leftOut, ...kissingerLeftOut],
    },
    context.checkCancelled,
  )
  step()
  return { ...result, findings }
}

/** Bump when `curveToDraw` gives other points: remembered ones of another version are not used. */
const drawVersion = 1

const methodsByDefault = Object.values(methods).filter(({ info }) => info.byDefault).length

function peakResultsOf(runs: readonly GroupedRun[], signal: SignalQuantity | null, checkCancelled: () => void): PeakResults {
  return applyPeakMethods(
    runs.map(({ info, signal: measured, converted: { converted, told, heatingStart_K, peak_K }, group }) => {
      checkCancelled()
      return {
        runId: info.id,
        label: info.label,
        programme: told.programme,
        programmeGroup: group,
        peak_K,
        conversionAtPeak: conversionAtTemperature(converted.curve, peak_K),
        halfHeights: halfHeights(converted.curve, peak_K),
        start: quantity(heatingStart_K, 'K'),
        heat: heatOf(info, measured, converted.area),
        points: pointsOfRun(converted.curve),
      }
    }),
    signal,
  )
}

/** Whether a heat flow is exothermic, where its file says which way that points. */
function heatOf(info: RunInfo, { quantity: measured }: SignalInfo, area: number): 'exothermic' | 'endothermic' | null {
  if (measured !== 'heat-flow' || info.exothermic === null) return null
  return area > 0 === (info.exothermic === 'up') ? 'exothermic' : 'endothermic'
}

function itemAt<Item>(items: readonly Item[], i: number): Item {
  const item = items[i]
  if (item === undefined) throw new RangeError(`no item ${i}`)
  return item
}

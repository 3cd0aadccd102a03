import { readAtLevels, type LevelsRead } from '../conversion/levels.ts'
import { noiseAtLevels } from '../conversion/noise-at-levels.ts'
import { KineticsError } from '../errors.ts'
import type { TaskContext } from '../isoconversional/result.ts'
import type { RunColumns } from '../series/run.ts'
import type { BaselineShift, MeasuredSources, NamedUncertainties, StatedUncertainties } from '../uncertainty/measured-sources.ts'
import { column } from '../units/quantity.ts'
import { convertRun, type ConvertedRun } from './convert-run.ts'
import type { GroupedRun } from './series-of-study.ts'
import type { AnalysisSettings, BaselineKind } from './study-input.ts'

/**
 * What the measured inputs of a series are uncertain by: what a person stated, the error of each heating rate (where it was measured, that of its line and what it wanders by), the noise found in
 * each signal, and for heat flow by how much the other baseline would move each point, in the window that belongs to it.
 *
 * @param runs - in the order of the series
 * @throws Cancelled
 */
export function measuredSourcesOf(
  runs: readonly GroupedRun[],
  settings: AnalysisSettings,
  stated: NamedUncertainties,
  columns: ReadonlyMap<string, RunColumns | undefined>,
  context: TaskContext,
): MeasuredSources {
  const levels = settings.levels.length
  const table = (): Float64Array => new Float64Array(levels * runs.length).fill(Number.NaN)
  const noise = {
    time_s: column(table(), 's'),
    lnReactionRate: table(),
    lnReactionRateSlope_per_s: table(),
    correlationWithBefore: table(),
  }
  runs.forEach((run, i) => {
    context.checkCancelled()
    const at = noiseAtLevels(run.converted.converted.curve, settings.levels, run.levels, 'sought', context.checkCancelled)
    for (let level = 0; level < levels; level++) {
      const k = level * runs.length + i
      noise.time_s[k] = at.time_s[level] ?? Number.NaN
      noise.lnReactionRate[k] = at.lnReactionRate[level] ?? Number.NaN
      noise.lnReactionRateSlope_per_s[k] = at.lnReactionRateSlope_per_s[level] ?? Number.NaN
      noise.correlationWithBefore[k] = at.correlationWithBefore[level] ?? Number.NaN
    }
  })
  const baseline = baselineShift(runs, settings, columns, context)
  return { stated, heatingRate_share: Float64Array.from(runs, (run) => heatingRateShare(run.converted, stated)), noise, baseline }
}

/**
 * By how much the other baseline moves each point. null where no run has a choice of one. Runs under which none can be drawn leave no number at any level: an effect of
 * 0 on them alone would turn every line.
 */
function baselineShift(
  runs: readonly GroupedRun[],
  settings: AnalysisSettings,
  columns: ReadonlyMap<string, RunColumns | undefined>,
  context: TaskContext,
): BaselineShift | null {
  if (runs.every((run) => otherKind(run) === null)) return null
  const levels = settings.levels.length
  const table = (): Float64Array => new Float64Array(levels * runs.length).fill(Number.NaN)
  const shift = { time_s: column(table(), 's'), lnReactionRate: table() }
  for (const [i, run] of runs.entries()) {
    context.checkCancelled()
    const other = withOtherBaseline(run, settings, columns.get(run.info.columnsKey), context.checkCancelled)
    if (typeof other === 'string') return { time_s: column(table(), 's'), lnReactionRate: table(), reason: other }
    for (let level = 0; level < levels; level++) {
      const k = level * runs.length + i
      shift.time_s[k] = (other.time_s[level] ?? Number.NaN) - (run.levels.time_s[level] ?? Number.NaN)
      const ratio = (other.reactionRate_per_s[level] ?? Number.NaN) / (run.levels.reactionRate_per_s[level] ?? Number.NaN)
      shift.lnReactionRate[k] = ratio > 0 ? Math.log(ratio) : Number.NaN
    }
  }
  return { ...shift, reason: null }
}

/**
 * Relative standard uncertainty of a heating rate as the one rate of its run. A measured one errs by no less than it wanders: taken as evenly spread over what some eighth
 * of the reaction is off, since rows that lie on a bent line tell its mean slope far better than any level sees it.
 */
function heatingRateShare({ told: { programme, heatingRateSpread } }: ConvertedRun, stated: StatedUncertainties): number {
  if (programme.kind !== 'constant-heating-rate') return 0
  if (programme.source !== 'measured') return stated.statedHeatingRate_share
  const ofLine = programme.standardError / programme.heatingRate
  return heatingRateSpread > 0 ? Math.max(ofLine, heatingRateSpread / Math.sqrt(3)) : ofLine
}

/** The other admissible baseline; null for signals without one, and for holds, which have one only. */
function otherKind({ converted: { converted } }: GroupedRun): BaselineKind | null {
  if (converted.baselineKind === 'straight') return 'area-proportional'
  return converted.baselineKind === 'area-proportional' ? 'straight' : null
}

/**
 * The levels as an evaluation with the other admissible baseline would read them: in the window that was set, and where none was, in the one that belongs to that baseline.
 *
 * @returns a sentence where there is none for this run
 */
function withOtherBaseline(
  run: GroupedRun,
  settings: AnalysisSettings,
  columns: RunColumns | undefined,
  checkCancelled: () => void,
): LevelsRead | string {
  const { info, signal } = run
  const baseline = otherKind(run)
  if (baseline === null || columns === undefined) {
    return `${info.label} has no other baseline to compare with, so that what the choice of baseline does cannot be told. Evaluate it apart from the runs that have a choice.`
  }
  try {
    const other = convertRun(
      info,
      columns,
      {
        quantity: signal.quantity,
        signalIndex: info.signals.indexOf(signal),
        window: info.window ?? settings.window,
        baseline,
      },
      checkCancelled,
    )
    return readAtLevels(other.converted.curve, settings.levels, checkCancelled)
  } catch (error) {
    if (!(error instanceof KineticsError)) throw error
    return `The ${baseline} baseline cannot be drawn under ${info.label}, so that what the choice of baseline does cannot be told. ${error.message}`
  }
}

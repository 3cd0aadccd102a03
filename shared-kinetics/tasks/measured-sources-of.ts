import { readAtLevels, type LevelsRead } from '../conversion/levels.ts'
import { noiseAtLevels } from '../conversion/noise-at-levels.ts'
import { KineticsError } from '../errors.ts'
import type { TaskContext } from '../isoconversional/result.ts'
import type { RunColumns } from '../series/run.ts'
import type { MeasuredSources, StatedUncertainties } from '../uncertainty/measured-sources.ts'
import { column } from '../units/quantity.ts'
import { convertRun, type ConvertedRun } from './convert-run.ts'
import type { GroupedRun } from './series-of-study.ts'
import type { AnalysisSettings, BaselineKind } from './study-input.ts'

/**
 * What the measured inputs of a series are uncertain by: what a person stated, the error of each heating rate (its own where it was measured), the noise found in
 * each signal, and for heat flow by how much the other baseline would move each point.
 *
 * @param runs - in the order of the series
 * @throws Cancelled
 */
export function measuredSourcesOf(
  runs: readonly GroupedRun[],
  settings: AnalysisSettings,
  stated: StatedUncertainties,
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
  const others = runs.map((run) => {
    context.checkCancelled()
    return withOtherBaseline(run, settings, columns.get(run.info.columnsKey))
  })
  const baseline = others.some((other) => other !== null)
    ? { time_s: column(new Float64Array(levels * runs.length), 's'), lnReactionRate: new Float64Array(levels * runs.length) }
    : null
  runs.forEach((run, i) => {
    const at = noiseAtLevels(run.converted.converted.curve, settings.levels, run.levels)
    const other = others[i] ?? null
    for (let level = 0; level < levels; level++) {
      const k = level * runs.length + i
      noise.time_s[k] = at.time_s[level] ?? Number.NaN
      noise.lnReactionRate[k] = at.lnReactionRate[level] ?? Number.NaN
      noise.lnReactionRateSlope_per_s[k] = at.lnReactionRateSlope_per_s[level] ?? Number.NaN
      noise.correlationWithBefore[k] = at.correlationWithBefore[level] ?? Number.NaN
      if (baseline === null || other === null) continue
      baseline.time_s[k] = (other.time_s[level] ?? Number.NaN) - (run.levels.time_s[level] ?? Number.NaN)
      baseline.lnReactionRate[k] = Math.log(
        (other.reactionRate_per_s[level] ?? Number.NaN) / (run.levels.reactionRate_per_s[level] ?? Number.NaN),
      )
    }
  })
  return { stated, heatingRate_share: Float64Array.from(runs, (run) => heatingRateShare(run.converted, stated)), noise, baseline }
}

function heatingRateShare({ told: { programme } }: ConvertedRun, stated: StatedUncertainties): number {
  if (programme.kind !== 'constant-heating-rate') return 0
  return programme.source === 'measured' ? programme.standardError / programme.heatingRate : stated.statedHeatingRate_share
}

/** The levels as they are read with the other admissible baseline; null for signals without one, for holds, and where the other one cannot be drawn. */
function withOtherBaseline(run: GroupedRun, settings: AnalysisSettings, columns: RunColumns | undefined): LevelsRead | null {
  const { info, signal, converted } = run
  const drawn = converted.converted.baselineKind
  if (columns === undefined || (drawn !== 'area-proportional' && drawn !== 'straight')) return null
  const baseline: BaselineKind = drawn === 'straight' ? 'area-proportional' : 'straight'
  try {
    const other = convertRun(info, columns, {
      quantity: signal.quantity,
      signalIndex: info.signals.indexOf(signal),
      window: converted.window,
      baseline,
    })
    return readAtLevels(other.converted.curve, settings.levels)
  } catch (error) {
    if (error instanceof KineticsError) return null
    throw error
  }
}

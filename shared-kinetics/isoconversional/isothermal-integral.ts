import { timeOfHold } from '../series/hold.ts'
import type { RunAtLevels } from '../series/series-at-levels.ts'
import { lineMethod } from './line-method.ts'
import type { IsoconversionalMethod, MethodInfo } from './result.ts'

export const isothermalIntegralInfo: MethodInfo = {
  id: 'isothermal-integral',
  label: 'Isothermal integral',
  sources: ['ictac-2011'],
  appliesTo: ['isothermal'],
  evidence: 'line',
  byDefault: true,
}

/**
 * Integral isoconversional method for holds: at each level the line
 *
 *   ln t = ln[g(alpha)/A] + Ea/(R T)
 *
 * through the runs, t the time in s from the start of the hold to the level, T the temperature of the hold in K. Slope +Ea/R. The hold starts where the
 * temperature enters the band of 3 K around T and stays in it, between rows by the straight line.
 *
 * Assumes that each run stands at one temperature from alpha = 0 on, and Ea constant from alpha = 0 to the level. Exact then, for any g(alpha). Not to be used
 * where a share of the reaction took place while the sample was heated up to the hold, or while it settled: Vyazovkin integrates over the measured T(t) instead.
 *
 * Statuses: `level-not-reached`, `too-few-programmes`, `line-not-determined` (also where a level is reached at the start of the hold or before, so that ln t does not exist).
 *
 * @source ictac-2011
 */
export const isothermalIntegral: IsoconversionalMethod = (series, context) => {
  const starts = new Map(series.runs.map((run) => [run, startOfHold_s(run)]))
  return lineMethod({
    info: isothermalIntegralInfo,
    temperature: (run, level) =>
      run.programme.kind === 'isothermal' && Number.isFinite(run.time_s[level]) ? run.programme.temperature : Number.NaN,
    ordinate: (run, level) => Math.log((run.time_s[level] ?? Number.NaN) - (starts.get(run) ?? Number.NaN)),
    withoutOrdinate: 'line-not-determined',
    slopeFactor: 1,
    interceptIsLnAf: false,
    integral: null,
  })(series, context)
}

/** From the start of the history; 0 for a run without one. */
function startOfHold_s({ programme, history: { time_s, temperature_K } }: RunAtLevels): number {
  if (programme.kind !== 'isothermal' || time_s.length === 0) return 0
  return timeOfHold(time_s, temperature_K, programme.temperature) - (time_s[0] ?? 0)
}

import { followsRamp } from '../isoconversional/time-integral.ts'
import { lineFit } from '../numerics/line-fit.ts'
import type { RunAtLevels } from '../series/series-at-levels.ts'
import { lowerBound } from '../signal/lower-bound.ts'

/** A heating rate that was not measured is one that time was rebuilt from. */
export const hasRebuiltTime = ({ programme }: RunAtLevels): boolean =>
  programme.kind === 'constant-heating-rate' && programme.source !== 'measured'

/** Part of a history on either side over which its slope is read, and the fewest samples: narrow enough not to round off the corners of a programme. */
const reach = 0.0025
const fewestSamples = 2

/** dT/dt where a run passes a level, in K/s: the heating rate of a straight ramp, 0 for a hold, and for any other programme the slope of the history around the level. */
export function localHeatingRate(run: RunAtLevels, level: number): number {
  const { programme, history, time_s } = run
  if (programme.kind === 'constant-heating-rate' && followsRamp(run)) return programme.heatingRate
  if (programme.kind === 'isothermal') return 0
  const last = history.time_s.length - 1
  const start = history.time_s[0] ?? Number.NaN
  const width = reach * ((history.time_s[last] ?? Number.NaN) - start)
  const at = start + (time_s[level] ?? Number.NaN)
  if (Number.isNaN(at)) return Number.NaN
  const next = lowerBound(history.time_s, at)
  const from = Math.max(0, Math.min(lowerBound(history.time_s, at - width), next - fewestSamples))
  const to = Math.min(last + 1, Math.max(lowerBound(history.time_s, at + width), next + fewestSamples))
  return lineFit(history.time_s.subarray(from, to), history.temperature_K.subarray(from, to)).slope
}

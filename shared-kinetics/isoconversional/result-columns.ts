import { studentTQuantile } from '../numerics/student-t.ts'
import type { SeriesAtLevels } from '../series/series-at-levels.ts'
import { column } from '../units/quantity.ts'
import type { IsoconversionalResult, LevelLine, LevelPhi, LevelPoints, LevelStatus, MethodInfo } from './result.ts'
import { countProgrammes } from './series-check.ts'

/** A result being filled level by level. Numbers are NaN and statuses `statusAtStart` until set. */
export interface ResultColumns {
  readonly result: IsoconversionalResult
  /** Quantile of Student's t for the 95 % interval; NaN with fewer than three distinct programmes. */
  readonly t: number
  setStatus(level: number, status: LevelStatus): void
  /** Sets Ea in J/mol with its standard error and interval, and status `ok`. */
  setEnergy(level: number, Ea: number, standardError: number, r2: number): void
  /** Sets the regression that the level's Ea rests on. */
  setPoints(level: number, points: LevelPoints): void
}

/**
 * Columns of a result for n runs. With three or more distinct programmes the interval is Ea ± t(0.975; n - 2)·(standard error), n counting every run:
 * replicates are points of their own. With two, Ea is given alone: standard error, interval and r2 stay NaN, since two programmes leave nothing to judge by.
 */
export function resultColumns(
  info: MethodInfo,
  series: SeriesAtLevels,
  lines: readonly LevelLine[],
  phi: readonly LevelPhi[],
): ResultColumns {
  const levels = series.levels.length
  const empty = (): Float64Array => new Float64Array(levels).fill(Number.NaN)
  const dof = countProgrammes(series) >= 3 ? series.runs.length - 2 : 0
  const t = dof > 0 ? studentTQuantile(0.975, dof) : Number.NaN
  const status = Array.from<LevelStatus>({ length: levels }).fill('too-few-programmes')
  const Ea = column(empty(), 'J/mol')
  const standardError = column(empty(), 'J/mol')
  const lower95 = column(empty(), 'J/mol')
  const upper95 = column(empty(), 'J/mol')
  const r2 = empty()
  const runs = series.runs.length
  const points = Array.from({ length: levels }, () => noPoints(runs))
  return {
    result: {
      method: info.id,
      interval: { kind: 'student-t', level: 0.95, dof, pointwise: true },
      Ea,
      standardError,
      lower95,
      upper95,
      lnAf: empty(),
      lnAfStandardError: empty(),
      r2,
      status,
      points,
      covarianceEaLnAf: column(empty(), 'J/mol'),
      lnA: empty(),
      otherIntervals: [],
      systematicError: empty(),
      lines,
      phi,
    },
    t,
    setStatus(level, value) {
      status[level] = value
    },
    setEnergy(level, energy, error, share) {
      status[level] = 'ok'
      Ea[level] = energy
      if (Number.isNaN(t)) return
      standardError[level] = error
      lower95[level] = energy - t * error
      upper95[level] = energy + t * error
      r2[level] = share
    },
    setPoints(level, value) {
      points[level] = value
    },
  }
}

function noPoints(runs: number): LevelPoints {
  const none = new Float64Array(runs).fill(Number.NaN)
  return { x_per_K: column(none, '1/K'), residual: none.slice(), energyPerSlope: Number.NaN }
}

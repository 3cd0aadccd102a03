import { leaveOneOut } from '../numerics/leave-one-out.ts'
import { lineFit } from '../numerics/line-fit.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { joulesToKilojoules } from '../units/convert.ts'
import type { ReviewedRun, ReviewInput } from './review-input.ts'

/** A run that lies off the lines through the others, at most levels and to one side. */
export interface RunAtOdds {
  readonly run: ReviewedRun
  /** Levels at which it does, and levels that could be judged. */
  readonly levels: number
  readonly judged: number
  /** What a studentised residual must exceed. */
  readonly limit: number
  /** The middle one of these levels. */
  readonly example: {
    readonly level: number
    readonly studentised: number
    readonly EaWith_kJ_per_mol: number
    readonly EaWithout_kJ_per_mol: number
  }
}

/** With fewer runs the residual of one is judged by one degree of freedom. */
const fewestRuns = 5
/** Probability of naming a run at a level although none is at odds; shared among the runs (Bonferroni). */
const error = 0.05
/** Beyond this the lines for one heating rate a run carry its wandering, and those of the reaction rate are taken. */
const straightWithin = 0.05

/**
 * Runs whose externally studentised residual from the line through the other runs exceeds the Bonferroni limit t(1 - 0.05/(2n); n - 3), with one sign, at more than
 * half of the levels, and without which Ea there is different by more than `leastChange` of it. Needs five runs.
 *
 * The lines are ln(beta/T²) against 1/T where all heating rates are constant within 5 %, else ln(dalpha/dt) against 1/T.
 *
 * @throws Cancelled, by `checkCancelled`
 * @source cook-weisberg-1982
 */
export function runsAtOdds({ result, runs }: ReviewInput, leastChange: number, checkCancelled: () => void): RunAtOdds[] {
  const n = runs.length
  if (n < fewestRuns) return []
  const limit = studentTQuantile(1 - error / (2 * n), n - 3)
  const lines = result.levels.flatMap((level, at) => {
    checkCancelled()
    return linesWithout(runs, level, at)
  })
  return runs.flatMap((run, i): RunAtOdds[] => {
    const off = lines.filter(({ points, Ea_kJ_per_mol: Ea }) => {
      const point = points[i]
      if (point === undefined || !(Math.abs(point.studentised) > limit)) return false
      return point.Ea_kJ_per_mol > 0 && Math.abs(Ea / point.Ea_kJ_per_mol - 1) > leastChange
    })
    const example = off[off.length >> 1]
    const studentised = example?.points[i]?.studentised ?? 0
    const oneSign = off.every(({ points }) => Math.sign(points[i]?.studentised ?? 0) === Math.sign(studentised))
    if (example === undefined || !oneSign || 2 * off.length <= lines.length) return []
    return [
      {
        run,
        levels: off.length,
        judged: lines.length,
        limit,
        example: {
          level: example.level,
          studentised,
          EaWith_kJ_per_mol: example.Ea_kJ_per_mol,
          EaWithout_kJ_per_mol: example.points[i]?.Ea_kJ_per_mol ?? Number.NaN,
        },
      },
    ]
  })
}

interface LevelWithout {
  readonly level: number
  readonly Ea_kJ_per_mol: number
  /** By run: its residual from the line through the others, and the Ea of that line. */
  readonly points: readonly { readonly studentised: number; readonly Ea_kJ_per_mol: number }[]
}

/** None where some run has no point at the level. */
function linesWithout(runs: readonly ReviewedRun[], level: number, at: number): LevelWithout[] {
  const straight = runs.every(
    ({ result, heatingRateSpread }) => result.heatingRate_K_per_min !== null && !(heatingRateSpread > straightWithin),
  )
  const T = runs.map(({ result }) => result.temperatureAtLevel_K[at] ?? Number.NaN)
  const x = T.map((temperature) => 1 / temperature)
  const y = runs.map(({ result }, i) =>
    straight
      ? Math.log(result.heatingRate_K_per_min ?? Number.NaN) - 2 * Math.log(T[i] ?? Number.NaN)
      : Math.log(result.reactionRateAtLevel_per_s[at] ?? Number.NaN),
  )
  if (![...x, ...y].every(Number.isFinite)) return []
  const points = leaveOneOut(x, y).map(({ studentised, slope }) => ({ studentised, Ea_kJ_per_mol: energyOf(slope) }))
  return [{ level, Ea_kJ_per_mol: energyOf(lineFit(x, y).slope), points }]
}

/** Ea in kJ/mol of a line of slope -Ea/R. */
const energyOf = (slope_K: number): number => -joulesToKilojoules(gasConstant_J_per_mol_K * slope_K)

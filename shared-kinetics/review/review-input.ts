import type { HeatFlowBaseline } from '../conversion/converted.ts'
import type { RateAtEnds } from '../conversion/cut-ends.ts'
import type { Sampling } from '../conversion/sampling.ts'
import type { KineticsError } from '../errors.ts'
import type { MethodId } from '../isoconversional/result.ts'
import type { RunInfo } from '../series/run.ts'
import type { Steadiness } from '../series/steadiness.ts'
import type { StudyInput } from '../tasks/study-input.ts'
import type { StudyResult, RunResult } from '../tasks/study-result.ts'

/** A run as the rules look at it. */
export interface ReviewedRun {
  readonly info: RunInfo
  readonly result: RunResult
  /** Largest distance of the local heating rate from the fitted one, as a share; NaN where there is none. */
  readonly heatingRateSpread: number
  readonly steadiness: Steadiness
  readonly rateAtEnds: RateAtEnds | null
  /** The baseline that was drawn under a heat flow; null for other signals. */
  readonly baselineKind: HeatFlowBaseline | null
  readonly sampling: Sampling
  /** Standard error of the time at which each level is passed, as the noise of the signal leaves it; NaN where the level is not reached. */
  readonly timeNoiseAtLevel_s: ArrayLike<number>
}

/** A method that was left out, and what for. */
export interface LeftOut {
  readonly method: MethodId | 'kissinger'
  readonly label: string
  readonly reason: string
}

/** Everything a rule may look at. */
export interface ReviewInput {
  readonly study: StudyInput
  readonly result: Omit<StudyResult, 'findings'>
  /** In the order of `result.runs`. */
  readonly runs: readonly ReviewedRun[]
  readonly unusable: readonly { readonly info: RunInfo; readonly error: KineticsError }[]
  readonly leftOut: readonly LeftOut[]
}

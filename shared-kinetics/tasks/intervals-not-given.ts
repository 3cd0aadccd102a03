import type { IntervalKind } from '../isoconversional/result.ts'
import { deleteOne, fewestRuns } from '../uncertainty/jackknife.ts'
import { fewestProgrammes, fewestProgrammesToResample } from '../uncertainty/resamples.ts'
import { labelOfInterval } from './interval-result.ts'

export interface IntervalNotGiven {
  readonly kind: IntervalKind
  readonly label: string
  /** A clause: what it needs, and what is here. */
  readonly reason: string
}

/**
 * Kinds of interval that no method has of a series, for want of runs or programmes, each with its reason; those that are asked for apart from the evaluation.
 *
 * @param programmeGroup - one a run; replicates share a number
 */
export function intervalsNotGiven(programmeGroup: readonly number[]): IntervalNotGiven[] {
  const distinct = new Set(programmeGroup).size
  const reasons: readonly (readonly [IntervalKind, string | null])[] = [
    ['jackknife', reasonOfJackknife(programmeGroup)],
    ['bootstrap', distinct < fewestProgrammesToResample ? programmesNeeded(fewestProgrammesToResample, distinct) : null],
    ['combined', distinct < fewestProgrammes ? programmesNeeded(fewestProgrammes, distinct) : null],
  ]
  return reasons.flatMap(([kind, reason]) => (reason === null ? [] : [{ kind, label: labelOfInterval(kind), reason }]))
}

const programmesNeeded = (needed: number, here: number): string => `needs ${needed} distinct programmes, here ${here}`

function reasonOfJackknife(programmeGroup: readonly number[]): string | null {
  if (programmeGroup.length < fewestRuns) return `needs ${fewestRuns} runs, here ${programmeGroup.length}`
  return deleteOne(programmeGroup) === null ? `leaving out a run would leave fewer than ${fewestProgrammes} distinct programmes` : null
}

import type { IntervalKind } from '../isoconversional/result.ts'
import { labelOfInterval } from '../tasks/interval-result.ts'
import { deleteOne, fewestRuns } from '../uncertainty/jackknife.ts'
import { fewestProgrammes, fewestProgrammesToResample } from '../uncertainty/resamples.ts'

export interface IntervalNotGiven {
  readonly kind: IntervalKind
  readonly label: string
  /** A clause: what it needs, and what is here. */
  readonly reason: string
}

/** Kinds that are asked for apart from the evaluation, and ask for runs. */
const apart = ['jackknife', 'bootstrap', 'combined'] as const satisfies readonly IntervalKind[]

/**
 * Kinds of interval that no method has of a series, for want of runs or programmes, each with its reason; those that are asked for apart from the evaluation.
 *
 * @param programmeGroup - one a run; replicates share a number
 */
export const intervalsNotGiven = (programmeGroup: readonly number[]): IntervalNotGiven[] =>
  apart.flatMap((kind) => {
    const reason = tooFewForInterval(kind, programmeGroup)
    return reason === null ? [] : [{ kind, label: labelOfInterval(kind), reason }]
  })

/**
 * Why a series has too few runs or programmes for a kind of interval, as a clause: what it needs, and what is here; null where it has enough.
 *
 * @param programmeGroup - one a run; replicates share a number
 */
export function tooFewForInterval(kind: 'student-t' | IntervalKind, programmeGroup: readonly number[]): string | null {
  const distinct = new Set(programmeGroup).size
  switch (kind) {
    case 'measured-sources':
      return null
    case 'jackknife':
      return reasonOfJackknife(programmeGroup)
    case 'bootstrap':
      return programmesNeeded(fewestProgrammesToResample, distinct)
    case 'student-t':
    case 'vyazovkin-wight-f':
    case 'combined':
      return programmesNeeded(fewestProgrammes, distinct)
  }
}

const programmesNeeded = (needed: number, here: number): string | null =>
  here < needed ? `needs ${needed} distinct programmes, here ${here}` : null

function reasonOfJackknife(programmeGroup: readonly number[]): string | null {
  if (programmeGroup.length < fewestRuns) return `needs ${fewestRuns} runs, here ${programmeGroup.length}`
  return deleteOne(programmeGroup) === null ? `leaving out a run would leave fewer than ${fewestProgrammes} distinct programmes` : null
}

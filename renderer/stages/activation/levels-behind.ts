import type { MethodId } from '../../../shared-kinetics/contract/study-result.ts'
import { isStale, isUncertaintyBehind, type StudyState } from '../../state/study-state.ts'
import type { IntervalOf } from './level-rows.ts'
import { isOfEvaluation } from './shown-interval.ts'

/** Whether the table of levels, with these methods and intervals, holds a number of another state of the study than the document's. */
export function areLevelsBehind(state: StudyState, methods: readonly MethodId[], intervalOf: IntervalOf): boolean {
  if (isStale(state)) return true
  if (!isUncertaintyBehind(state)) return false
  return (state.evaluated?.result.profiles ?? []).some((profile) => {
    const interval = methods.includes(profile.method) ? intervalOf(profile) : null
    return interval !== null && !isOfEvaluation(interval.kind)
  })
}

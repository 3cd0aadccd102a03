import { useMemo } from 'react'
import type { MethodId, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { useStudy, useView } from '../../state/services.ts'
import type { IntervalOf } from './level-rows.ts'
import { intervalsOf, shownOf, type ShownOfMethod } from './shown-interval.ts'

/** What the sheet shows of the chosen method's intervals; null where no method gave a profile. */
export function useShown(result: StudyResult | null, chosen: MethodId | null): ShownOfMethod | null {
  const uncertain = useStudy((state) => state.uncertain)
  const wanted = useView((state) => state.interval)
  return useMemo(() => (result === null ? null : shownOf(result, chosen, uncertain, wanted)), [result, chosen, uncertain, wanted])
}

/** The interval of any method, of the kind that is wanted or, where it has none of it, its own. */
export function useIntervalOf(result: StudyResult): IntervalOf {
  const uncertain = useStudy((state) => state.uncertain)
  const wanted = useView((state) => state.interval)
  return useMemo(() => intervalsOf(result, uncertain, wanted), [result, uncertain, wanted])
}

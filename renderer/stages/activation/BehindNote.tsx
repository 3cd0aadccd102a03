import { useStudy } from '../../state/services.ts'
import { isStale } from '../../state/study-state.ts'

/** Why numbers on show are not given out: they were worked out for other settings than those of now. */
export function BehindNote() {
  const isOnItsWay = useStudy(
    (state) =>
      state.uncertaintyWork.kind === 'running' ||
      state.evaluation.kind === 'running' ||
      (isStale(state) && state.evaluation.kind === 'settled'),
  )
  return (
    <span className="behind-note">
      u(Ea) and intervals on show are for the settings before: {isOnItsWay ? 'being worked out again.' : 'not worked out again.'}
    </span>
  )
}

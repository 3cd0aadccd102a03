import { useEffect } from 'react'
import { Button } from 'react-aria-components'
import type { MethodId, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { Half } from '../../sheet/Half.tsx'
import { useServices, useView } from '../../state/services.ts'
import { chosenAmong, comparedAmong } from '../../state/view-store.ts'
import type { StageProps } from '../stage-props.ts'
import { EnergyProfile } from './EnergyProfile.tsx'
import { LevelEvidence } from './LevelEvidence.tsx'
import { Peaks } from './Peaks.tsx'
import type { ShownOfMethod } from './shown-interval.ts'
import { useShown } from './use-shown.ts'

export interface ActivationProps extends StageProps {
  readonly result: StudyResult
  readonly level: number
  readonly chosen: MethodId
  readonly compared: readonly MethodId[]
  /** The intervals of the chosen method. */
  readonly shown: ShownOfMethod
}

/** Evidence: what Ea is read from at each level. Result: Ea against conversion, and the table. */
export function ActivationStage(props: StageProps) {
  const wanted = useView((state) => state.chosenMethod)
  const wantedCompared = useView((state) => state.comparedMethods)
  const { session } = useServices()
  const { result, level } = props
  // What takes longer than an evaluation is worked out while it can be looked at.
  useEffect(() => {
    session.uncertainty.want(true)
    return () => session.uncertainty.want(false)
  }, [session])
  const available = result?.profiles.map((profile) => profile.method) ?? []
  const chosen = chosenAmong(available, wanted)
  const shown = useShown(result, chosen)
  if (result === null || level === null || chosen === null || shown === null) return <NoProfile {...props} />
  const compared = comparedAmong(available, wantedCompared, chosen)
  const full: ActivationProps = { ...props, result, level, chosen, compared, shown }
  return (
    <>
      <LevelEvidence {...full} />
      <EnergyProfile {...full} />
    </>
  )
}

/** What is missing, and the step that settles it. */
function NoProfile({ result, document, actions }: StageProps) {
  const { view } = useServices()
  const used = document.runs.filter((run) => run.use).length
  return (
    <>
      <Half side="evidence" title="Straight lines at each conversion" note="">
        <p className="missing">{missingText(result, used)}</p>
        <div className="missing-steps">
          <Button className="button" onPress={actions.openFiles}>
            Open files…
          </Button>
          <Button className="button" onPress={() => view.setState({ stage: 'runs' })}>
            Go to the runs
          </Button>
        </div>
      </Half>
      <Half side="result" title="Activation energy against conversion" note="">
        <p className="missing">
          Ea, its interval and the table stand here as soon as two distinct programmes can be compared; an interval needs three.
        </p>
        {result !== null && result.peakMethods.length > 0 && (
          <Peaks methods={result.peakMethods} signal={result.signal} hasRemarksBeside={false} />
        )}
      </Half>
    </>
  )
}

function missingText(result: StudyResult | null, used: number): string {
  if (used === 0) return 'No run is in use. Add runs, or tick “Use” in the table of runs.'
  if (result === null) return 'The runs are being evaluated.'
  return 'No method could be applied to the runs in use. The findings at the right say why; most often runs at further heating rates are missing.'
}

import type { ReactNode } from 'react'
import type { RunResult, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { runNames, runTones } from '../../../shared-kinetics/figure/run-place.ts'
import { RunMarker } from '../../charts/RunMarker.tsx'
import { useColours } from '../../state/services.ts'

/** Each run by colour and marker with the numbers behind its point. */
export function RunLegend({ result, children }: { readonly result: StudyResult; readonly children: (run: RunResult) => ReactNode }) {
  const colours = useColours()
  const names = runNames(result.runs)
  const tones = runTones(result)
  return (
    <ul className="run-legend" aria-label="Runs">
      {result.runs.map((run, i) => (
        <li key={run.runId}>
          <RunMarker index={i} colour={colours.run(tones[i]?.place ?? 0)} />
          <span>
            {names[i]} {children(run)}
          </span>
        </li>
      ))}
    </ul>
  )
}

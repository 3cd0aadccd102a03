import { useCallback, useEffect, useMemo, useRef } from 'react'
import { TabPanel, Tabs } from 'react-aria-components'
import type { Finding, Severity } from '../../shared-kinetics/contract/study-result.ts'
import type { Paper } from '../../shared-kinetics/figure/run-scale.ts'
import { ActivationStage } from '../stages/activation/ActivationStage.tsx'
import { RunsStage } from '../stages/runs/RunsStage.tsx'
import type { SheetActions, StageProps } from '../stages/stage-props.ts'
import { MarginNotes, findingElementId } from '../sheet/MarginNotes.tsx'
import { nearestLevel } from '../sheet/nearest-level.ts'
import { ProgramMark } from '../sheet/ProgramMark.tsx'
import { StudyMenu, ThemeMenu } from '../sheet/StudyMenu.tsx'
import { TopLine } from '../sheet/TopLine.tsx'
import type { Replica } from '../state/replica.ts'
import { useServices, useStudy, useView } from '../state/services.ts'
import { isStale } from '../state/study-state.ts'
import { EmptySheet } from './EmptySheet.tsx'
import { DoneNotice, Messages } from './Messages.tsx'
import { Rail } from './Rail.tsx'
import { Safety } from './Safety.tsx'

const noFindings: readonly Finding[] = []

/** The sheet: top line, two halves of the stage, margin, level rail. */
export function Sheet({ replica, actions, paper }: { readonly replica: Replica; readonly actions: SheetActions; readonly paper: Paper }) {
  const { session, view } = useServices()
  const stage = useView((state) => state.stage)
  const conversion = useView((state) => state.conversion)
  const theme = useView((state) => state.theme)
  const evaluated = useStudy((state) => state.evaluated)
  const recent = useStudy((state) => state.recent)
  const stale = useStudy(isStale)
  const jump = useJump()
  const { document } = replica
  const result = evaluated?.result ?? null
  const hasRuns = document.runs.length > 0
  const levelIndex = nearestLevel(result?.levels ?? [], conversion)
  const level = result?.levels[levelIndex] ?? null
  const findings = (hasRuns ? result?.findings : undefined) ?? noFindings
  const props = useMemo<StageProps>(
    () => ({ document, result, levelIndex, level, actions }),
    [document, result, levelIndex, level, actions],
  )

  useEffect(() => {
    window.document.title = `${document.name} – Rampfold`
  }, [document.name])

  return (
    <Tabs
      className="sheet"
      selectedKey={stage}
      onSelectionChange={(key) => view.setState({ stage: key === 'activation' ? 'activation' : 'runs' })}
    >
      <TopLine
        document={document}
        snapshot={replica.confirmed}
        findings={findings}
        hasRuns={hasRuns}
        actions={actions}
        onFinding={(severity) => jump.toNext(severity, findings)}
        notice={<DoneNotice />}
        mark={<ProgramMark paper={paper} />}
        menus={
          <>
            <StudyMenu
              recent={recent}
              currentStudyId={document.id}
              hasResults={result !== null && result.profiles.length > 0}
              hasRuns={hasRuns}
              actions={actions}
              onOpen={() => void session.readRecent()}
            />
            <ThemeMenu theme={theme} onChange={(next) => view.setState({ theme: next })} />
          </>
        }
      />
      <Messages stale={stale} />
      {hasRuns ? (
        <>
          <main className={stale ? 'stage is-stale' : 'stage'} aria-busy={stale}>
            <TabPanel id="runs" className="halves halves-runs">
              <RunsStage {...props} />
            </TabPanel>
            <TabPanel id="activation" className="halves">
              <ActivationStage {...props} />
            </TabPanel>
            <MarginNotes
              findings={findings.filter((finding) => finding.stage === stage)}
              all={findings}
              settled={result !== null}
              onShow={jump.toPlace}
            />
            {stage === 'activation' && <Safety />}
          </main>
          {result !== null && result.runs.length > 0 && level !== null && (
            <Rail result={result} levelIndex={levelIndex} level={level} actions={actions} />
          )}
        </>
      ) : (
        <main className="stage stage-empty">
          <div className="halves">
            <EmptySheet actions={actions} recent={recent.filter((study) => study.studyId !== document.id && study.runs > 0)} />
          </div>
        </main>
      )}
    </Tabs>
  )
}

/** Ways from a count or a note to the stage, run and level that a finding speaks of. */
function useJump() {
  const { view } = useServices()
  const lastRef = useRef<Finding | null>(null)

  const toPlace = useCallback(
    (finding: Finding): void => {
      view.setState({
        stage: finding.stage,
        pointedRun: finding.run,
        ...(finding.level === null ? {} : { conversion: finding.level }),
      })
    },
    [view],
  )

  const toNext = useCallback(
    (severity: Severity, findings: readonly Finding[]): void => {
      const same = findings.filter((finding) => finding.severity === severity)
      const next = same[(same.findIndex((finding) => finding === lastRef.current) + 1) % same.length]
      if (next === undefined) return
      lastRef.current = next
      toPlace(next)
      // The note may stand on a stage that is only now being laid out.
      requestAnimationFrame(() => {
        const note = window.document.getElementById(findingElementId(next, findings))
        note?.scrollIntoView({ block: 'nearest' })
        note?.focus()
      })
    },
    [toPlace],
  )

  return { toPlace, toNext }
}

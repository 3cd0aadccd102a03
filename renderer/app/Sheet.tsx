import { useCallback, useEffect, useMemo, useRef } from 'react'
import { TabPanel, Tabs } from 'react-aria-components'
import type { RecentStudy } from '../../shared-kinetics/contract/host-api.ts'
import type { Finding, Severity } from '../../shared-kinetics/contract/study-result.ts'
import type { Paper } from '../../shared-kinetics/figure/run-scale.ts'
import { ActivationStage } from '../stages/activation/ActivationStage.tsx'
import { RateConstantsActivation } from '../stages/activation/RateConstantsActivation.tsx'
import { RateConstantOffer } from '../stages/runs/RateConstantOffer.tsx'
import { RateConstantsStage } from '../stages/runs/RateConstantsStage.tsx'
import { RunsStage } from '../stages/runs/RunsStage.tsx'
import type { SheetActions, StageProps } from '../stages/stage-props.ts'
import { MarginNotes, findingElementId } from '../sheet/MarginNotes.tsx'
import { nearestLevel } from '../sheet/nearest-level.ts'
import { nextFinding } from '../sheet/next-finding.ts'
import { ProgramMark } from '../sheet/ProgramMark.tsx'
import { StudyMenu, ThemeMenu } from '../sheet/StudyMenu.tsx'
import { TopLine } from '../sheet/TopLine.tsx'
import type { Replica } from '../state/replica.ts'
import { useServices, useStudy, useView } from '../state/services.ts'
import { isStale } from '../state/study-state.ts'
import { EmptySheet } from './EmptySheet.tsx'
import { DoneNotice, Messages } from './Messages.tsx'
import { Rail } from './Rail.tsx'
import { RateConstantRail } from './RateConstantRail.tsx'
import { showsRateConstants } from './rate-constant-study.ts'
import { Safety } from './Safety.tsx'

const noFindings: readonly Finding[] = []

/** The sheet: top line, two halves of the stage, margin, level rail. */
export function Sheet({ replica, actions, paper }: { readonly replica: Replica; readonly actions: SheetActions; readonly paper: Paper }) {
  const { session, view } = useServices()
  const stage = useView((state) => state.stage)
  const conversion = useView((state) => state.conversion)
  const theme = useView((state) => state.theme)
  const evaluated = useStudy((state) => state.evaluated)
  const rated = useStudy((state) => state.rated)?.result ?? null
  const offer = useStudy((state) => state.offer)
  const basis = useView((state) => state.basis)
  const place = useView((state) => state.rateConstant)
  const recent = useStudy((state) => state.recent)
  const continued = useStudy((state) => state.continued)
  const stale = useStudy(isStale)
  const jump = useJump()
  const { document } = replica
  const table = document.rateConstants
  const isOfTable = showsRateConstants(replica, { stage, basis })
  const result = evaluated?.result ?? null
  const hasRuns = document.runs.length > 0
  const levelIndex = nearestLevel(result?.levels ?? [], conversion)
  const level = result?.levels[levelIndex] ?? null
  const runFindings = (hasRuns ? result?.findings : undefined) ?? noFindings
  const tableFindings = (table === null || table.rows.length === 0 ? undefined : rated?.findings) ?? noFindings
  const findings = useMemo(() => [...runFindings, ...tableFindings], [runFindings, tableFindings])
  const props = useMemo<StageProps>(
    () => ({ document, result, levelIndex, level, actions }),
    [document, result, levelIndex, level, actions],
  )
  const here = isOfTable ? tableFindings : runFindings
  const isHere = (finding: Finding): boolean => finding.stage === stage && here.includes(finding)
  // The rail of a table stands on both stages, and reads out what is predicted.
  const hasSafety = stage === 'activation' || (isOfTable && (table?.predictAt_K.length ?? 0) > 0)

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
        rateConstants={table?.rows.length ?? null}
        actions={actions}
        onFinding={(severity) => jump.toNext(severity, findings, tableFindings, isHere)}
        continuedFrom={continued?.studyId === document.id ? continued.changedAt : null}
        mark={<ProgramMark paper={paper} />}
        menus={
          <>
            <StudyMenu
              recent={recent}
              currentStudyId={document.id}
              continuedFrom={continued?.studyId === document.id ? continued.changedAt : null}
              hasResults={(result !== null && result.profiles.length > 0) || (table?.rows.length ?? 0) > 0}
              hasRuns={hasRuns || table !== null}
              actions={actions}
              onOpen={() => void session.readRecent()}
            />
            <ThemeMenu theme={theme} onChange={(next) => view.setState({ theme: next })} />
          </>
        }
      />
      <Messages stale={stale} />
      <DoneNotice />
      {hasRuns || table !== null ? (
        <>
          <main className={stale ? 'stage is-stale' : 'stage'} aria-busy={stale}>
            <TabPanel id="runs" className={hasRuns ? 'halves halves-runs' : 'halves'}>
              {hasRuns || table === null ? (
                <RunsStage {...props} />
              ) : (
                <RateConstantsStage table={table} rated={rated} place={place} actions={actions} />
              )}
            </TabPanel>
            <TabPanel id="activation" className="halves">
              {isOfTable && table !== null ? (
                <RateConstantsActivation table={table} rated={rated} place={place} actions={actions} hasRuns={hasRuns} />
              ) : (
                <ActivationStage {...props} />
              )}
            </TabPanel>
            <MarginNotes
              findings={here.filter(isHere)}
              all={findings}
              settled={isOfTable ? rated !== null : result !== null}
              onShow={jump.toPlace}
            />
          </main>
          {hasSafety && <Safety />}
          {isOfTable && table !== null && rated !== null && offer === null && <RateConstantRail table={table} rated={rated} />}
          {!isOfTable && result !== null && result.runs.length > 0 && level !== null && (
            <Rail result={result} levelIndex={levelIndex} level={level} actions={actions} />
          )}
        </>
      ) : (
        <main className="stage stage-empty">
          <div className="halves">
            {offer === null ? (
              <EmptySheet actions={actions} recent={recent.filter((study) => study.studyId !== document.id && holdsSomething(study))} />
            ) : (
              <RateConstantOffer offer={offer} table={null} actions={actions} />
            )}
          </div>
        </main>
      )}
    </Tabs>
  )
}

const holdsSomething = (study: RecentStudy): boolean => study.runs > 0 || study.rateConstants > 0

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
    (severity: Severity, findings: readonly Finding[], ofTable: readonly Finding[], isHere: (finding: Finding) => boolean): void => {
      const next = nextFinding(findings, severity, lastRef.current, isHere)
      if (next === null) return
      lastRef.current = next
      toPlace(next)
      view.setState({ basis: ofTable.includes(next) ? 'rate-constants' : 'runs' })
      // The note may stand on a stage that is only now being laid out.
      requestAnimationFrame(() => {
        const note = window.document.getElementById(findingElementId(next, findings))
        note?.scrollIntoView({ block: 'nearest' })
        note?.focus()
      })
    },
    [toPlace, view],
  )

  return { toPlace, toNext }
}

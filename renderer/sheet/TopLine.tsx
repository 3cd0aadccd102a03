import { Button, Input, Tab, TabList, TextField } from 'react-aria-components'
import { useState, type ReactNode } from 'react'
import type { StudySnapshot } from '../../shared-kinetics/contract/host-api.ts'
import type { StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import type { Finding, Severity } from '../../shared-kinetics/contract/study-result.ts'
import type { SheetActions } from '../stages/stage-props.ts'
import { count, formatMoment } from './format.ts'

export interface TopLineProps {
  readonly document: StudyDocument
  readonly snapshot: StudySnapshot
  readonly findings: readonly Finding[]
  readonly hasRuns: boolean
  /** Rows of the table of rate constants; null where the study holds none. */
  readonly rateConstants: number | null
  readonly actions: SheetActions
  readonly onFinding: (severity: Severity) => void
  readonly mark: ReactNode
  readonly menus: ReactNode
  /** When the study was last changed before this window opened on it; null for one that was begun or opened here. */
  readonly continuedFrom: string | null
}

const severities = [
  { severity: 'stop', one: 'stop', several: 'stops' },
  { severity: 'caution', one: 'caution', several: 'cautions' },
  { severity: 'note', one: 'note', several: 'notes' },
] as const

/** The top line: what this is, where one is, what was noticed, what can be undone. */
export function TopLine({
  document,
  snapshot,
  findings,
  hasRuns,
  rateConstants,
  actions,
  onFinding,
  mark,
  menus,
  continuedFrom,
}: TopLineProps) {
  return (
    <header className="top-line">
      <div className="top-study">
        <h1 className="brand">
          {mark}
          Rampfold
        </h1>
        <div className="study-and-when">
          <StudyName name={document.name} onRename={(name) => actions.change({ kind: 'rename-study', name })} />
          {continuedFrom !== null && (
            <span className="continued" title="This study was stored, and goes on where it was left. “New study” stands in the Study menu.">
              continued from {formatMoment(continuedFrom)}
            </span>
          )}
        </div>
        {hasRuns && <span className="run-count">{count(document.runs.length, 'run')}</span>}
        {!hasRuns && rateConstants !== null && <span className="run-count">{count(rateConstants, 'rate constant')}</span>}
      </div>
      {(hasRuns || rateConstants !== null) && (
        <TabList className="stages" aria-label="Stages">
          <Tab id="runs" className="stage-tab">
            {hasRuns ? 'Runs' : 'Rate constants'}
          </Tab>
          <Tab id="activation" className="stage-tab">
            Activation energy
          </Tab>
        </TabList>
      )}
      <div className="top-end">
        {severities.map(({ severity, one, several }) => {
          const n = findings.filter((finding) => finding.severity === severity).length
          if (n === 0) return null
          return (
            <Button key={severity} className={`count count-${severity}`} onPress={() => onFinding(severity)}>
              <strong>{n}</strong> {n === 1 ? one : several}
            </Button>
          )
        })}
        <StepButton word="Undo" label={snapshot.undo} onPress={actions.undo} />
        <StepButton word="Redo" label={snapshot.redo} onPress={actions.redo} />
        {menus}
      </div>
    </header>
  )
}

/** Undo or redo, with what it concerns; where the line is short the label is left to the title and to the spoken name. */
function StepButton({ word, label, onPress }: { readonly word: string; readonly label: string | null; readonly onPress: () => void }) {
  const whole = label === null ? word : `${word}: ${label}`
  return (
    <span className="undo" title={whole}>
      <Button className="text-button" aria-label={whole} isDisabled={label === null} onPress={onPress}>
        {word}
        {label !== null && <span className="undo-label">: {label}</span>}
      </Button>
    </span>
  )
}

/** The study's name, changed where it stands. */
function StudyName({ name, onRename }: { readonly name: string; readonly onRename: (name: string) => void }) {
  const [draft, setDraft] = useState<string | null>(null)
  const commit = (): void => {
    const next = draft?.trim() ?? ''
    if (next !== '' && next !== name) onRename(next)
    setDraft(null)
  }
  const text = draft ?? name
  return (
    <TextField
      className="study-name"
      aria-label="Name of the study"
      value={text}
      onChange={setDraft}
      onBlur={commit}
      onKeyDown={(event) => {
        if (event.key === 'Enter') commit()
        else if (event.key === 'Escape') setDraft(null)
        else event.continuePropagation()
      }}
    >
      {/* The hidden copy gives the field the width of its text. */}
      <span className="study-name-size" aria-hidden="true">
        {text}
      </span>
      <Input maxLength={200} />
    </TextField>
  )
}

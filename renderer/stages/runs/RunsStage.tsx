import { useMemo } from 'react'
import { Button } from 'react-aria-components'
import type { StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { signalsAtLevel, signalsFigure } from '../../../shared-kinetics/figure/signals-figure.ts'
import { FigureChart } from '../../charts/FigureChart.tsx'
import { levelQuantity } from '../../sheet/at-level.ts'
import { Choice } from '../../sheet/Choice.tsx'
import { count, formatLevel, signalWords } from '../../sheet/format.ts'
import { Half } from '../../sheet/Half.tsx'
import { useColours, useServices, useView } from '../../state/services.ts'
import type { StageProps } from '../stage-props.ts'
import { HoldsToRateConstants } from './HoldsToRateConstants.tsx'
import { MixedSignals } from './MixedSignals.tsx'
import { RunQuestions } from './RunQuestions.tsx'
import { runColumns, runRows } from './run-rows.ts'
import { RunsTable } from './RunsTable.tsx'
import { WindowField } from './WindowField.tsx'

/** Evidence: the signals as measured. Result: the table of runs. */
export function RunsStage(props: StageProps) {
  return (
    <>
      <Signals {...props} />
      <Runs {...props} />
    </>
  )
}

function Signals({ result, levelIndex, level, actions, document }: StageProps) {
  const { view } = useServices()
  const colours = useColours()
  const wantedAgainst = useView((state) => state.against)
  const against = wantedAgainst ?? levelQuantity(result).kind
  const pointedRun = useView((state) => state.pointedRun)
  const figure = useMemo(() => (result === null ? null : signalsFigure(result, { against })), [result, against])
  const overlay = useMemo(() => (result === null ? [] : signalsAtLevel(result, { against }, levelIndex)), [result, against, levelIndex])
  const pointedIndex = result?.runs.findIndex((run) => run.runId === pointedRun) ?? -1
  const note =
    level === null
      ? 'As measured, window or not.'
      : `As measured, window or not. Markers stand where each run reaches α ${formatLevel(level)}.`
  return (
    <Half
      side="evidence"
      title={result === null || result.signal === null ? 'Signals' : `Signals: ${signalWords[result.signal].toLowerCase()}`}
      note={note}
    >
      <div className="controls">
        <Choice
          label="Against"
          options={[
            { id: 'temperature', text: 'Temperature' },
            { id: 'time', text: 'Time' },
          ]}
          value={against}
          onChange={(id) => view.setState({ against: id })}
        />
        {result !== null && result.signalsToChooseFrom.length > 1 && (
          <Choice
            label="Signal"
            options={result.signalsToChooseFrom.map((id) => ({ id, text: signalWords[id] }))}
            value={result.signal}
            onChange={(signal) => actions.change({ kind: 'set-signal', signal })}
          />
        )}
        {result?.signal === 'heat-flow' && (
          <Choice
            label="Baseline"
            options={[
              { id: 'area-proportional', text: 'Area-proportional' },
              { id: 'straight', text: 'Straight' },
            ]}
            value={document.settings.baseline}
            onChange={(baseline) => actions.change({ kind: 'set-baseline', baseline })}
          />
        )}
      </div>
      {figure !== null && figure.marks.length > 0 ? (
        <FigureChart
          figure={figure}
          overlay={overlay}
          colours={colours}
          emphasis={pointedIndex < 0 ? null : pointedIndex}
          onCopied={actions.pictureCopied}
        />
      ) : (
        <p className="missing">
          {result === null
            ? 'The signals appear here as soon as the runs have been read through.'
            : 'No run in use could be evaluated. The findings at the right say why.'}
        </p>
      )}
    </Half>
  )
}

function Runs({ result, levelIndex, level, actions, document }: StageProps) {
  const { view } = useServices()
  const colours = useColours()
  const pointedRun = useView((state) => state.pointedRun)
  const rows = useMemo(() => runRows(document, result), [document, result])
  const quantity = levelQuantity(result)
  const columns = useMemo(() => runColumns(level, levelIndex, quantity), [level, levelIndex, quantity])
  return (
    <Half side="result" title="Runs" note={seriesNote(rows.length, result)}>
      <div className="controls">
        <WindowField window={document.settings.window} onSet={(window) => actions.change({ kind: 'set-window', window })} />
        <div className="controls-end">
          <Button className="text-button" onPress={actions.openFiles}>
            Open files…
          </Button>
          <Button className="text-button" onPress={actions.copyTable}>
            Copy table
          </Button>
        </div>
      </div>
      <HoldsToRateConstants result={result} table={document.rateConstants} actions={actions} />
      <MixedSignals document={document} onChange={actions.change} />
      <RunQuestions document={document} result={result} onChange={actions.change} />
      <RunsTable
        rows={rows}
        columns={columns}
        level={level}
        levelIndex={levelIndex}
        quantity={quantity}
        pointedRun={pointedRun}
        colours={colours}
        onPoint={(run) => view.setState({ pointedRun: run })}
        onChange={actions.change}
      />
    </Half>
  )
}

function seriesNote(runs: number, result: StudyResult | null): string {
  if (result === null) return count(runs, 'run')
  const programmes = new Set(result.runs.map((run) => run.programmeGroup)).size
  const measured = result.runs.some((run) => run.heatingRateSource === 'measured')
  const how = measured
    ? ' Heating rates are measured: a line through T against t, from α 0.02 to 0.98; ± SE is one standard error of its slope.'
    : ''
  return `${count(runs, 'run')}, ${count(programmes, 'distinct programme')} in use.${how}`
}

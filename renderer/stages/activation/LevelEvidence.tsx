import { useMemo } from 'react'
import { methodsOnRequest } from '../../../shared-kinetics/contract/methods-on-request.ts'
import type { RunResult } from '../../../shared-kinetics/contract/study-result.ts'
import { runNames, runTones } from '../../../shared-kinetics/figure/run-place.ts'
import { phiFigure } from '../../../shared-kinetics/figure/phi-figure.ts'
import { straightLinesAtLevel, straightLinesFigure } from '../../../shared-kinetics/figure/straight-lines-figure.ts'
import { FigureChart } from '../../charts/FigureChart.tsx'
import { RunMarker } from '../../charts/RunMarker.tsx'
import { formatAtLevel, levelQuantity, type LevelQuantity } from '../../sheet/at-level.ts'
import { Choice, Choices } from '../../sheet/Choice.tsx'
import { count, decimals, formatLevel, shortMethodNames, wholeMethodName } from '../../sheet/format.ts'
import { Half } from '../../sheet/Half.tsx'
import { useColours, useServices } from '../../state/services.ts'
import type { ActivationProps } from './ActivationStage.tsx'
import { readingOf } from './method-words.tsx'
import { methodsWith } from './methods-with.ts'

/** The left half: the straight lines of the chosen method, or Phi(Ea) at the level for a minimising one. */
export function LevelEvidence(props: ActivationProps) {
  const { result, chosen, level } = props
  const { view } = useServices()
  const profile = result.profiles.find((one) => one.method === chosen)
  const minimising = profile?.evidence === 'minimum'
  return (
    <Half
      side="evidence"
      title={minimising ? `Φ(Ea) at α ${formatLevel(level)}` : 'Straight lines at each conversion'}
      note={
        <>
          {profile?.label}: {readingOf(chosen)}. {count(result.runs.length, 'run')}, {count(result.levels.length, 'level')}.
        </>
      }
    >
      <div className="controls">
        <Choice
          label="Method"
          options={result.profiles.map((one) => ({ id: one.method, text: shortMethodNames[one.method], name: wholeMethodName(one) }))}
          value={chosen}
          onChange={(chosenMethod) => view.setState({ chosenMethod })}
        />
        <MethodsOnRequest {...props} />
      </div>
      {minimising ? <Phi {...props} /> : <Lines {...props} />}
      <RunLegend {...props} />
      {profile !== undefined && profile.sources.length > 0 && <p className="source">{profile.sources.join('; ')}</p>}
    </Half>
  )
}

/** Other forms and standards that a report may have to follow: worked out once they are asked for. */
function MethodsOnRequest({ result, actions }: ActivationProps) {
  if (result.runs.some((run) => run.programme !== 'constant-heating-rate')) return null
  const worked = result.profiles.map((one) => one.method)
  return (
    <Choices
      label="On request"
      options={methodsOnRequest.map((id) => ({ id, text: shortMethodNames[id] }))}
      values={methodsOnRequest.filter((id) => worked.includes(id))}
      onChange={(ids) => actions.change({ kind: 'set-methods', methods: methodsWith(worked, ids) })}
    />
  )
}

function Lines({ result, chosen, levelIndex, actions }: ActivationProps) {
  const colours = useColours()
  const figure = useMemo(() => straightLinesFigure(result, chosen), [result, chosen])
  const overlay = useMemo(() => straightLinesAtLevel(result, chosen, levelIndex), [result, chosen, levelIndex])
  return <FigureChart figure={figure} overlay={overlay} colours={colours} onCopied={actions.pictureCopied} />
}

const noMarks = [] as const

function Phi({ result, chosen, levelIndex, actions }: ActivationProps) {
  const colours = useColours()
  const figure = useMemo(() => phiFigure(result, chosen, levelIndex), [result, chosen, levelIndex])
  return <FigureChart figure={figure} overlay={noMarks} colours={colours} onCopied={actions.pictureCopied} />
}

/** Each run with the temperature at which it reaches the level: the numbers behind the points. */
function RunLegend({ result, levelIndex, chosen }: ActivationProps) {
  const colours = useColours()
  const names = runNames(result.runs)
  const tones = runTones(result)
  const quantity = levelQuantity(result)
  return (
    <ul className="run-legend" aria-label="Runs">
      {result.runs.map((run, i) => (
        <li key={run.runId}>
          <RunMarker index={i} colour={colours.run(tones[i]?.place ?? 0)} />
          <span>
            {names[i]} <span className="run-legend-stand">{standText(formatAtLevel(run, levelIndex, quantity), quantity)}</span>
            {chosen === 'isothermal-integral' && <span className="run-legend-stand">{holdText(run)}</span>}
          </span>
        </li>
      ))}
    </ul>
  )
}

/** Where the time of a hold is counted from, and what was lost by then: what the isothermal integral rests on. */
function holdText({ holdStart_s, conversionBeforeHold }: RunResult): string {
  if (holdStart_s === null) return ''
  const lost = conversionBeforeHold === null ? '' : `, ${decimals(100 * conversionBeforeHold, 2)} % lost to the heating before`
  return ` (time from ${decimals(holdStart_s / 60, 2)} min${lost})`
}

const standText = (text: string, { unit }: LevelQuantity): string => (text === '' ? 'not reached' : `${text} ${unit}`)

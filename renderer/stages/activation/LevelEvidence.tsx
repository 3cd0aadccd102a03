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
import { useColours, useServices, useView } from '../../state/services.ts'
import type { ActivationProps } from './ActivationStage.tsx'
import { BasisChoice } from './BasisChoice.tsx'
import { Budget } from './Budget.tsx'
import { isReportBasis, readingOf, scopeWords } from './method-words.tsx'
import { methodsWith } from './methods-with.ts'
import { drawnInterval } from './shown-interval.ts'

/** The left half: what the chosen method's Ea is read from (its straight lines, or Phi(Ea) at the level), or where the uncertainty of it comes from. */
export function LevelEvidence(props: ActivationProps) {
  const { result, chosen, level, shown } = props
  const { view } = useServices()
  const evidence = useView((state) => state.evidence)
  const { profile, interval } = shown
  const minimising = profile.evidence === 'minimum'
  const fit = minimising ? `Φ(Ea) at α ${formatLevel(level)}` : 'Straight lines at each conversion'
  const sources = [...profile.sources, ...(interval?.sources ?? [])]
  return (
    <Half
      side="evidence"
      title={evidence === 'budget' ? `Where the uncertainty comes from at α\u00a0${formatLevel(level)}` : fit}
      note={
        evidence === 'budget' ? (
          <>{profile.label}: the standard uncertainty of Ea that each source brings alone; bars as long as its square.</>
        ) : (
          <>
            {profile.label}: {readingOf(chosen)}. {count(result.runs.length, 'run')}, {count(result.levels.length, 'level')}.
          </>
        )
      }
    >
      <div className="controls">
        {props.document.rateConstants !== null && <BasisChoice />}
        <Choice
          label="Method"
          options={result.profiles.map((one) => ({ id: one.method, text: shortMethodNames[one.method], name: wholeMethodName(one) }))}
          value={chosen}
          onChange={(chosenMethod) => view.setState({ chosenMethod })}
        />
        <MethodsOnRequest {...props} />
        <Choice
          label="Evidence"
          options={[
            { id: 'fit', text: minimising ? 'Φ(Ea)' : 'Straight lines' },
            { id: 'budget', text: 'Where the uncertainty comes from' },
          ]}
          value={evidence}
          onChange={(next) => view.setState({ evidence: next })}
        />
      </div>
      <Scope {...props} />
      {evidence === 'budget' ? (
        <Budget {...props} />
      ) : (
        <>
          {minimising ? <Phi {...props} /> : <Lines {...props} />}
          <RunLegend {...props} />
        </>
      )}
      {sources.length > 0 && <p className="source">{sources.join('; ')}</p>}
    </Half>
  )
}

/** Other forms of a method, and the standards that a report may have to follow: worked out, and shown, once they are asked for. */
function MethodsOnRequest({ result, actions }: ActivationProps) {
  const { view } = useServices()
  if (result.runs.some((run) => run.programme !== 'constant-heating-rate')) return null
  const worked = result.profiles.map((one) => one.method)
  const wanted = methodsOnRequest.filter((id) => worked.includes(id))
  const offer = (label: string, offered: readonly (typeof methodsOnRequest)[number][]) => (
    <Choices
      label={label}
      options={offered.map((id) => ({ id, text: shortMethodNames[id] }))}
      values={offered.filter((id) => wanted.includes(id))}
      onChange={(ids) => {
        const added = ids.find((id) => !wanted.includes(id))
        if (added !== undefined) view.setState({ chosenMethod: added })
        actions.change({
          kind: 'set-methods',
          methods: methodsWith(worked, [...wanted.filter((id) => !offered.includes(id)), ...ids]),
        })
      }}
    />
  )
  return (
    <>
      {offer('Report basis', methodsOnRequest.filter(isReportBasis))}
      {offer(
        'Further forms',
        methodsOnRequest.filter((id) => !isReportBasis(id)),
      )}
    </>
  )
}

/** What a standard is made for, and whether the runs are of that kind as far as the program can see. */
function Scope({ result, chosen }: ActivationProps) {
  if (!isReportBasis(chosen)) return null
  const outside = result.findings.find((finding) => finding.code === 'outside-scope-of-standard' && finding.evidence['method'] === chosen)
  return (
    <p className={outside === undefined ? 'scope' : 'scope is-outside'}>
      {outside === undefined
        ? `${shortMethodNames[chosen]} is made for ${scopeWords[chosen]}. The runs are of that kind as far as signal, temperatures, heating rates and the maxima of the rate tell.`
        : outside.message}
    </p>
  )
}

function Lines({ result, chosen, levelIndex, actions }: ActivationProps) {
  const colours = useColours()
  const figure = useMemo(() => straightLinesFigure(result, chosen), [result, chosen])
  const overlay = useMemo(() => straightLinesAtLevel(result, chosen, levelIndex), [result, chosen, levelIndex])
  return <FigureChart figure={figure} overlay={overlay} colours={colours} onCopied={actions.pictureCopied} />
}

const noMarks = [] as const

/** Student's t with the threshold that cuts it out of Phi; any other interval by its ends. */
function Phi({ result, chosen, shown, levelIndex, actions }: ActivationProps) {
  const colours = useColours()
  const { kind, interval } = shown
  const figure = useMemo(
    () => phiFigure(result, chosen, levelIndex, ...(kind === 'student-t' ? [] : [drawnInterval(interval)])),
    [result, chosen, levelIndex, kind, interval],
  )
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

import { useMemo, type ReactNode } from 'react'
import { methodsOnRequest } from '../../../shared-kinetics/contract/methods-on-request.ts'
import type { MethodId, PeakMethodResult, RunResult } from '../../../shared-kinetics/contract/study-result.ts'
import { phiFigure } from '../../../shared-kinetics/figure/phi-figure.ts'
import { straightLinesAtLevel, straightLinesFigure } from '../../../shared-kinetics/figure/straight-lines-figure.ts'
import { FigureChart } from '../../charts/FigureChart.tsx'
import { formatAtLevel, levelQuantity, type LevelQuantity } from '../../sheet/at-level.ts'
import { Choice, Choices, type ChoiceOption } from '../../sheet/Choice.tsx'
import { count, decimals, formatLevel, shortMethodNames, wholeMethodName } from '../../sheet/format.ts'
import { Half } from '../../sheet/Half.tsx'
import { useColours, useServices, useView } from '../../state/services.ts'
import type { Evidence } from '../../state/view-store.ts'
import type { ActivationProps } from './ActivationStage.tsx'
import { BasisChoice } from './BasisChoice.tsx'
import { Budget } from './Budget.tsx'
import { isReportBasis, peakReadings, readingOf, scopeWords, shortPeakNames } from './method-words.tsx'
import { methodsWith } from './methods-with.ts'
import { PeakEvidence } from './PeakEvidence.tsx'
import { peakKey, peakName, pickedPeaks } from './peak-rows.ts'
import { RunLegend } from './RunLegend.tsx'
import { drawnInterval } from './shown-interval.ts'

/** The left half: what the chosen method's Ea is read from (its straight lines, or Phi(Ea) at the level), where the uncertainty of it comes from, or the line through the peaks. */
export function LevelEvidence(props: ActivationProps) {
  const { result, actions } = props
  const wanted = useView((state) => state.evidence)
  const peaks = pickedPeaks(
    result.peakMethods,
    useView((state) => state.peakRow),
  )
  const evidence = peaks === null && wanted === 'peaks' ? 'fit' : wanted
  const head = headOf(props, evidence, peaks)
  return (
    <Half side="evidence" title={head.title} note={head.note}>
      <div className="controls">
        {props.document.rateConstants !== null && <BasisChoice />}
        {evidence === 'peaks' ? <PeakChoice {...props} peaks={peaks} /> : <MethodChoice {...props} />}
        <EvidenceChoice {...props} evidence={evidence} />
      </div>
      {evidence !== 'peaks' && <Scope {...props} />}
      {evidence === 'budget' && <Budget {...props} />}
      {evidence === 'fit' && <Fit {...props} />}
      {evidence === 'peaks' && peaks !== null && <PeakEvidence result={result} peaks={peaks} actions={actions} />}
      {head.sources.length > 0 && <p className="source">{head.sources.join('; ')}</p>}
    </Half>
  )
}

/** What stands above the evidence, and where it is published. */
interface Head {
  readonly title: string
  readonly note: ReactNode
  readonly sources: readonly string[]
}

function headOf({ result, chosen, level, shown }: ActivationProps, evidence: Evidence, peaks: PeakMethodResult | null): Head {
  const { profile, interval } = shown
  const sources = [...profile.sources, ...(interval?.sources ?? [])]
  if (evidence === 'peaks' && peaks !== null) {
    const note = (
      <>
        {peakName(peaks)}: {peakReadings[peaks.method]}.
      </>
    )
    return { title: peaks.runId === null ? 'Straight line through the peaks' : 'A single run', note, sources: [] }
  }
  if (evidence === 'budget') {
    const note = <>{profile.label}: the standard uncertainty of Ea that each source brings alone; bars as long as its square.</>
    return { title: `Where the uncertainty comes from at α\u00a0${formatLevel(level)}`, note, sources }
  }
  const note = (
    <>
      {profile.label}: {readingOf(chosen)}. {count(result.runs.length, 'run')}, {count(result.levels.length, 'level')}.
    </>
  )
  return { title: isMinimising(shown) ? `Φ(Ea) at α ${formatLevel(level)}` : 'Straight lines at each conversion', note, sources }
}

const isMinimising = ({ profile }: ActivationProps['shown']): boolean => profile.evidence === 'minimum'

function MethodChoice(props: ActivationProps) {
  const { view } = useServices()
  return (
    <>
      <Choice
        label="Method"
        options={props.result.profiles
          .filter((one) => !isOnRequest(one.method))
          .map((one) => ({ id: one.method, text: shortMethodNames[one.method], name: wholeMethodName(one) }))}
        value={isOnRequest(props.chosen) ? null : props.chosen}
        onChange={(chosenMethod) => view.setState({ chosenMethod })}
      />
      <MethodsOnRequest {...props} />
    </>
  )
}

/** Methods that have a line through the peaks; single-run methods are picked in the table. */
function PeakChoice({ result, peaks }: ActivationProps & { readonly peaks: PeakMethodResult | null }) {
  const { view } = useServices()
  const lined = result.peakMethods.filter((one) => one.line !== null)
  const isLined = peaks !== null && lined.includes(peaks)
  return (
    <Choice
      label="Method"
      options={lined.map((one) => ({ id: peakKey(one), text: shortPeakNames[one.method], name: one.label }))}
      value={isLined ? peakKey(peaks) : null}
      onChange={(peakRow) => view.setState({ peakRow })}
    />
  )
}

/** With the line through the peaks goes their table at the right. */
function EvidenceChoice({ result, shown, evidence }: ActivationProps & { readonly evidence: Evidence }) {
  const { view } = useServices()
  const options: readonly ChoiceOption<Evidence>[] = [
    { id: 'fit', text: isMinimising(shown) ? 'Φ(Ea)' : 'Straight lines' },
    { id: 'budget', text: 'Where the uncertainty comes from' },
    ...(result.peakMethods.length === 0 ? [] : [{ id: 'peaks', text: 'Peaks' } as const]),
  ]
  return (
    <Choice
      label="Evidence"
      options={options}
      value={evidence}
      onChange={(next) => view.setState(({ beneath }) => ({ evidence: next, beneath: next === 'peaks' ? 'peaks' : beneath }))}
    />
  )
}

function Fit(props: ActivationProps) {
  const { result, chosen, levelIndex, shown } = props
  const quantity = levelQuantity(result)
  return (
    <>
      {isMinimising(shown) ? <Phi {...props} /> : <Lines {...props} />}
      <RunLegend result={result}>
        {(run) => (
          <>
            <span className="run-legend-stand">{standText(formatAtLevel(run, levelIndex, quantity), quantity)}</span>
            {chosen === 'isothermal-integral' && <span className="run-legend-stand">{holdText(run)}</span>}
          </>
        )}
      </RunLegend>
    </>
  )
}

const isOnRequest = (method: MethodId): boolean => methodsOnRequest.some((id) => id === method)

/**
 * Other forms of a method, and the standards that a report may have to follow. They have rows of their own, and stand in no other: the first press works one out and shows
 * it, one on what was worked out shows it again, one on what is shown leaves it.
 */
function MethodsOnRequest({ result, chosen, actions }: ActivationProps) {
  const { view } = useServices()
  if (result.runs.some((run) => run.programme !== 'constant-heating-rate')) return null
  const worked = result.profiles.map((one) => one.method)
  const wanted = methodsOnRequest.filter((id) => worked.includes(id))
  const offer = (label: string, offered: readonly (typeof methodsOnRequest)[number][]) => (
    <Choices
      label={label}
      options={offered.map((id) => ({ id, text: shortMethodNames[id] }))}
      values={offered.filter((id) => id === chosen)}
      onChange={(ids) => {
        const shown = ids.find((id) => id !== chosen)
        if (shown !== undefined) view.setState({ chosenMethod: shown })
        if (shown !== undefined && wanted.includes(shown)) return
        const kept = shown === undefined ? wanted.filter((id) => id !== chosen) : [...wanted, shown]
        actions.change({ kind: 'set-methods', methods: methodsWith(worked, kept) })
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
        : `The runs are not all that ${shortMethodNames[chosen]} is made for; what lies outside stands among the findings.`}
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

/** Where the time of a hold is counted from, and what was lost by then: what the isothermal integral rests on. */
function holdText({ holdStart_s, conversionBeforeHold }: RunResult): string {
  if (holdStart_s === null) return ''
  const lost = conversionBeforeHold === null ? '' : `, ${decimals(100 * conversionBeforeHold, 2)} % lost to the heating before`
  return ` (time from ${decimals(holdStart_s / 60, 2)} min${lost})`
}

const standText = (text: string, { unit }: LevelQuantity): string => (text === '' ? 'not reached' : `${text} ${unit}`)

import { useMemo } from 'react'
import { Button } from 'react-aria-components'
import { activationAtLevel, activationFigure } from '../../../shared-kinetics/figure/activation-figure.ts'
import { studentWords } from '../../../shared-kinetics/figure/interval-status.ts'
import { FigureChart } from '../../charts/FigureChart.tsx'
import { MethodSample } from '../../charts/MethodSample.tsx'
import { Choice, Choices, type ChoiceOption } from '../../sheet/Choice.tsx'
import { decimals, formatWithInterval, shortMethodNames, wholeMethodName } from '../../sheet/format.ts'
import { Half } from '../../sheet/Half.tsx'
import { nearestLevel } from '../../sheet/nearest-level.ts'
import { Remarked } from '../../sheet/Remarked.tsx'
import { useColours, useServices, useStudy, useView } from '../../state/services.ts'
import { isStale } from '../../state/study-state.ts'
import type { Beneath } from '../../state/view-store.ts'
import type { ActivationProps } from './ActivationStage.tsx'
import { IntervalChoice, IntervalMaking, IntervalName, IntervalRemarks, UncertaintyWork } from './IntervalChoice.tsx'
import { LevelTable } from './LevelTable.tsx'
import { MeanLine } from './MeanLine.tsx'
import { Peaks } from './Peaks.tsx'
import { BehindNote } from './BehindNote.tsx'
import { areLevelsBehind } from './levels-behind.ts'
import { drawnInterval } from './shown-interval.ts'
import { useIntervalOf } from './use-shown.ts'

/** The right half: Ea against conversion with its interval, the mean over a range, and beneath it the table, the budget or what the peaks say. */
export function EnergyProfile(props: ActivationProps) {
  const { result, chosen, compared, shown, levelIndex, actions } = props
  const { view } = useServices()
  const beneath = useView((state) => state.beneath)
  const evidence = useView((state) => state.evidence)
  const colours = useColours()
  const { profile, interval } = shown
  const intervalOf = useIntervalOf(result)
  const methods = useMemo(() => [chosen, ...compared], [chosen, compared])
  const drawn = useMemo(() => drawnInterval(interval), [interval])
  const figure = useMemo(
    () => activationFigure(result, methods, chosen, drawn, (profile) => drawnInterval(intervalOf(profile))),
    [result, methods, chosen, drawn, intervalOf],
  )
  const overlay = useMemo(() => activationAtLevel(result, methods, chosen, levelIndex, drawn), [result, methods, chosen, levelIndex, drawn])
  const others = result.profiles.filter((one) => one.method !== chosen)
  return (
    <Half
      side="result"
      title="Activation energy against conversion"
      note={<IntervalName shown={shown} />}
      aside={<Levels document={props.document} actions={actions} />}
    >
      <div className="controls">
        <span className="chosen-method">
          <MethodSample index={0} /> {profile.label}
        </span>
        <Choices
          label="Beside it"
          options={others.map((one) => ({
            id: one.method,
            name: wholeMethodName(one),
            text: (
              <>
                {compared.includes(one.method) && <MethodSample index={compared.indexOf(one.method) + 1} />} {shortMethodNames[one.method]}
              </>
            ),
          }))}
          values={compared}
          onChange={(comparedMethods) => view.setState({ comparedMethods })}
        />
        <IntervalChoice shown={shown} />
      </div>
      <FigureChart
        figure={figure}
        overlay={overlay}
        colours={colours}
        onPick={(x) => actions.moveLevel(nearestLevel(result.levels, x))}
        onCopied={actions.pictureCopied}
      />
      {figure.note !== undefined && <p className="chart-note">{figure.note}</p>}
      {beneath === 'levels' && (
        <>
          <IntervalMaking shown={shown} />
          <IntervalRemarks shown={shown} levels={result.levels} levelIndex={levelIndex} />
        </>
      )}
      <UncertaintyWork />
      <div className="beneath">
        <Choice
          label="Table"
          options={beneathOptions}
          value={beneath}
          onChange={(next) =>
            // What the numbers are read from stands at the left.
            view.setState(({ evidence }) => ({
              beneath: next,
              evidence: next === 'peaks' ? 'peaks' : evidence === 'peaks' ? 'fit' : evidence,
            }))
          }
        />
      </div>
      {beneath === 'levels' ? (
        <>
          <MeanLine {...props} />
          <LevelTable {...props} />
        </>
      ) : (
        <Peaks methods={result.peakMethods} signal={result.signal} hasRemarksBeside={evidence === 'peaks'} />
      )}
      <Foot {...props} beneath={beneath} />
    </Half>
  )
}

const beneathOptions: readonly ChoiceOption<Beneath>[] = [
  { id: 'levels', text: 'Every level' },
  { id: 'peaks', text: 'Peaks and single runs' },
]

const steps = [0.1, 0.05, 0.02, 0.01] as const

function Levels({ document, actions }: Pick<ActivationProps, 'document' | 'actions'>) {
  const { levels } = document.settings
  const current = steps.find(
    (step) =>
      levels.length === levelsEvery(step).length && levels.every((level, i) => Math.abs(level - (levelsEvery(step)[i] ?? 0)) < 1e-9),
  )
  return (
    <Choice
      label="Levels every"
      options={steps.map((step) => ({ id: String(step), text: decimals(step, 2) }))}
      value={current === undefined ? null : String(current)}
      onChange={(id) => actions.change({ kind: 'set-levels', levels: [...levelsEvery(Number(id))] })}
    />
  )
}

/** Levels at whole multiples of a step inside (0, 1); divided, not added up, so that 0.15 is 0.15. */
function levelsEvery(step: number): readonly number[] {
  const parts = Math.round(1 / step)
  return Array.from({ length: parts - 1 }, (_, i) => (i + 1) / parts)
}

function Foot({ result, chosen, compared, actions, beneath }: ActivationProps & { readonly beneath: Beneath }) {
  const { kissinger } = result
  const kissingerWords = kissinger === null ? null : studentWords(kissinger)
  const intervalOf = useIntervalOf(result)
  const isBehind = useStudy((state) => (beneath === 'levels' ? areLevelsBehind(state, [chosen, ...compared], intervalOf) : isStale(state)))
  return (
    <div className="half-foot">
      {beneath === 'levels' && kissinger !== null && (
        <p>
          Kissinger (peaks): Ea{' '}
          <strong>
            <Remarked remark={kissingerWords === null ? null : `interval: ${kissingerWords}`}>
              {formatWithInterval(kissinger.Ea_kJ_per_mol, kissinger.lower95_kJ_per_mol, kissinger.upper95_kJ_per_mol)}
            </Remarked>
          </strong>{' '}
          kJ/mol, ln A <strong>{decimals(kissinger.lnA_per_s, 2)}</strong> (A in 1/s).
        </p>
      )}
      <div className="controls-end">
        {isBehind && <BehindNote />}
        <Button className="text-button" isDisabled={isBehind} onPress={actions.copyTable}>
          Copy table
        </Button>
        <Button className="text-button" onPress={actions.exportTable}>
          Export table (CSV)
        </Button>
      </div>
    </div>
  )
}

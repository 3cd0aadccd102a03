import { useMemo } from 'react'
import { Button } from 'react-aria-components'
import type { ProfileResult } from '../../../shared-kinetics/contract/study-result.ts'
import { activationAtLevel, activationFigure } from '../../../shared-kinetics/figure/activation-figure.ts'
import { levelsOfMean } from '../../../shared-kinetics/figure/levels-of-mean.ts'
import { FigureChart } from '../../charts/FigureChart.tsx'
import { MethodSample } from '../../charts/MethodSample.tsx'
import { Choice, Choices } from '../../sheet/Choice.tsx'
import { decimals, formatInterval, shortMethodNames, wholeMethodName } from '../../sheet/format.ts'
import { Half } from '../../sheet/Half.tsx'
import { nearestLevel } from '../../sheet/nearest-level.ts'
import { parseConversion } from '../../sheet/parse-conversion.ts'
import { TypedField } from '../../sheet/TypedField.tsx'
import { useColours, useServices } from '../../state/services.ts'
import type { ActivationProps } from './ActivationStage.tsx'
import { LevelTable } from './LevelTable.tsx'

/** The right half: Ea against conversion with its interval, the mean over a range, and the table. */
export function EnergyProfile(props: ActivationProps) {
  const { result, chosen, compared, levelIndex, actions } = props
  const { view } = useServices()
  const colours = useColours()
  const shown = useMemo(() => [chosen, ...compared], [chosen, compared])
  const figure = useMemo(() => activationFigure(result, shown, chosen), [result, shown, chosen])
  const overlay = useMemo(() => activationAtLevel(result, shown, chosen, levelIndex), [result, shown, chosen, levelIndex])
  const profile = result.profiles.find((one) => one.method === chosen)
  const others = result.profiles.filter((one) => one.method !== chosen)
  return (
    <Half
      side="result"
      title="Activation energy against conversion"
      note={profile === undefined ? '' : <IntervalNote profile={profile} />}
      aside={<Levels document={props.document} actions={actions} />}
    >
      <div className="controls">
        <span className="chosen-method">
          <MethodSample index={0} /> {profile?.label}
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
      </div>
      <FigureChart
        figure={figure}
        overlay={overlay}
        colours={colours}
        onPick={(x) => actions.moveLevel(nearestLevel(result.levels, x))}
        onCopied={actions.pictureCopied}
      />
      {figure.note !== undefined && <p className="chart-note">{figure.note}</p>}
      {profile !== undefined && <MeanLine profile={profile} {...props} />}
      <LevelTable {...props} />
      <Foot {...props} />
    </Half>
  )
}

/** Names the interval for what it is. */
function IntervalNote({ profile }: { readonly profile: ProfileResult }) {
  if (profile.interval.dof < 1 || profile.upper95_kJ_per_mol.every((end) => end === null)) {
    return <>No interval: it needs runs at three distinct programmes or more.</>
  }
  return <>95 % Student-t, n − 2 degrees of freedom ({profile.interval.dof} here), pointwise.</>
}

function MeanLine({ profile, result, document, actions }: ActivationProps & { readonly profile: ProfileResult }) {
  const [from, to] = document.settings.meanRange
  const { Ea_kJ_per_mol: mean } = profile.mean
  const ends = endsOfMean(profile, result.levels)
  // A mean that should not be quoted alone must not stand out.
  const isDoubtful = result.findings.some(({ code, severity }) => code === 'energy-varies' && severity !== 'note')
  const set = (meanRange: [number, number]): void => {
    if (meanRange[0] < meanRange[1]) actions.change({ kind: 'set-mean-range', meanRange })
  }
  return (
    <div className="mean-line">
      <span>Mean over α</span>
      <TypedField
        label="Mean from conversion"
        hideLabel
        text={decimals(from, 2)}
        parse={parseConversion}
        onCommit={(value) => set([value, to])}
      />
      <span>to</span>
      <TypedField
        label="Mean to conversion"
        hideLabel
        text={decimals(to, 2)}
        parse={parseConversion}
        onCommit={(value) => set([from, value])}
      />
      {mean === null ? (
        <span>not to be had: no level there has a number.</span>
      ) : (
        <output>
          {isDoubtful ? decimals(mean, 1) : <strong>{decimals(mean, 1)}</strong>}
          {ends !== null && `, lowest to highest: ${decimals(ends[0], 1)} to ${decimals(ends[1], 1)}`} kJ/mol ({levelsOfMean(profile.mean)})
        </output>
      )}
    </div>
  )
}

const rounding = 1e-9

/** The least and the greatest Ea among the levels that the mean rests on; null where there are fewer than two. */
function endsOfMean({ mean, Ea_kJ_per_mol: Ea }: ProfileResult, levels: readonly number[]): readonly [number, number] | null {
  const used = levels.flatMap((level, i) => {
    const value = Ea[i] ?? null
    return value !== null && value > 0 && level >= mean.from - rounding && level <= mean.to + rounding ? [value] : []
  })
  return used.length < 2 ? null : [Math.min(...used), Math.max(...used)]
}

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

function Foot({ result, actions }: ActivationProps) {
  const { kissinger } = result
  return (
    <div className="half-foot">
      <p>
        {kissinger === null ? (
          'Kissinger does not apply to these runs; the findings say why.'
        ) : (
          <>
            Kissinger (peaks): Ea <strong>{decimals(kissinger.Ea_kJ_per_mol, 1)}</strong>
            {kissinger.lower95_kJ_per_mol !== null && (
              <> ± {formatInterval(kissinger.Ea_kJ_per_mol, kissinger.lower95_kJ_per_mol, kissinger.upper95_kJ_per_mol)}</>
            )}{' '}
            kJ/mol, ln A <strong>{decimals(kissinger.lnA_per_s, 2)}</strong> (A in 1/s).
          </>
        )}
      </p>
      <div className="controls-end">
        <Button className="text-button" onPress={actions.copyTable}>
          Copy table
        </Button>
        <Button className="text-button" onPress={actions.exportTable}>
          Export table (CSV)
        </Button>
      </div>
    </div>
  )
}

import { useMemo } from 'react'
import { Button } from 'react-aria-components'
import type { RateConstantsResult, RateConstantTable } from '../../../shared-kinetics/contract/study-result.ts'
import { arrheniusAtRow, arrheniusFigure } from '../../../shared-kinetics/figure/arrhenius-figure.ts'
import type { Mark } from '../../../shared-kinetics/figure/figure.ts'
import { FigureChart } from '../../charts/FigureChart.tsx'
import { Choice } from '../../sheet/Choice.tsx'
import { count } from '../../sheet/format.ts'
import { Half } from '../../sheet/Half.tsx'
import { useColours, useServices, useView } from '../../state/services.ts'
import type { RateConstantPlace } from '../../state/view-store.ts'
import type { RateConstantsProps } from '../runs/RateConstantsStage.tsx'
import { sourceWords } from '../runs/RateConstantReading.tsx'
import { BasisChoice } from './BasisChoice.tsx'
import { HoldFits } from './HoldFits.tsx'
import { holdNote } from './hold-fit-rows.ts'
import { RateConstantResults } from './RateConstantResults.tsx'
import { RateConstantRows } from './RateConstantRows.tsx'
import { nearestStop, rateConstantStops } from './rate-constant-stops.ts'
import { temperatureIn } from './rate-constant-rows.ts'

export interface RatedProps extends RateConstantsProps {
  readonly rated: RateConstantsResult
  /** The study holds runs as well: the table was made from them. */
  readonly hasRuns: boolean
}

/** Evidence: the Arrhenius line through the rate constants. Result: Ea, A and what follows from them. */
export function RateConstantsActivation(props: RateConstantsProps & { readonly hasRuns: boolean }) {
  const { rated, table } = props
  if (rated === null || table.rows.length === 0) return <NoLine table={table} />
  const full: RatedProps = { ...props, rated }
  return (
    <>
      <Evidence {...full} />
      <RateConstantResults {...full} />
    </>
  )
}

function Evidence(props: RatedProps) {
  const { table, rated, place, hasRuns, actions } = props
  const { view } = useServices()
  const beneath = useView((state) => state.beneathLine)
  const fits = rated.holdFits
  const colours = useColours()
  const figure = useMemo(() => arrheniusFigure(rated), [rated])
  const overlay = useMemo(() => marksAt(rated, place), [rated, place])
  const stops = useMemo(() => rateConstantStops(table), [table])
  const onPick = (x: number): void => {
    const stop = stops[nearestStop(stops, x)]
    if (stop !== undefined) view.setState({ rateConstant: stop.place })
  }
  return (
    <Half side="evidence" title="Arrhenius line" note={<LineNote table={table} rated={rated} />}>
      {(hasRuns || fits !== null) && (
        <div className="controls">
          {hasRuns && <BasisChoice />}
          {fits !== null && (
            <Choice
              label="Beneath"
              options={[
                { id: 'rows', text: 'Rate constants and line', name: 'Rate constants and their line' },
                { id: 'holds', text: 'Fits of the holds' },
              ]}
              value={beneath}
              onChange={(beneathLine) => view.setState({ beneathLine })}
            />
          )}
        </div>
      )}
      <FigureChart figure={figure} overlay={overlay} colours={colours} onPick={onPick} onCopied={actions.pictureCopied} />
      {rated.band.lnLineLower95.some((end) => end !== null) && (
        <p className="chart-note">Shaded: 95 % band of the line and, wider, of one new k; pointwise in temperature.</p>
      )}
      {fits !== null && beneath === 'holds' ? (
        <>
          <p className="chart-note">{holdNote(fits)}</p>
          <HoldFits {...props} fits={fits} />
        </>
      ) : (
        <RateConstantRows {...props} />
      )}
    </Half>
  )
}

function LineNote({ table, rated }: { readonly table: RateConstantTable; readonly rated: RateConstantsResult }) {
  const { span, line, temperatureUnitShown: shown } = rated
  const range = span === null ? '' : `, ${temperatureIn(span.coldest_K, shown)} to ${temperatureIn(span.hottest_K, shown)}`
  return (
    <>
      ln k against 1000/T: {line.points} of {count(table.rows.length, 'rate constant')}
      {range}; {sourceWords(table)}.
    </>
  )
}

/** The place the rail stands at: the row itself, or the prediction, with a hairline down to its temperature. */
function marksAt(rated: RateConstantsResult, { kind, index }: RateConstantPlace): readonly Mark[] {
  const at = (kind === 'row' ? rated.rows[index] : rated.predictions[index])?.temperature_K
  if (at === undefined) return []
  const rule: Mark = {
    kind: 'rule',
    name: temperatureIn(at, rated.temperatureUnitShown),
    tone: { kind: 'faint' },
    along: 'y',
    at: 1000 / at,
  }
  if (kind === 'row') return [rule, ...arrheniusAtRow(rated, index)]
  const k = rated.predictions[index]?.rateConstant ?? null
  if (k === null) return [rule]
  const name = `Predicted at ${rule.name}`
  return [rule, { kind: 'points', name, tone: { kind: 'accent' }, x: [1000 / at], y: [Math.log(k)], joined: false }]
}

/** What is missing, and the step that settles it. */
function NoLine({ table }: { readonly table: RateConstantTable }) {
  const { view } = useServices()
  return (
    <>
      <Half side="evidence" title="Arrhenius line" note="">
        <p className="missing">
          {table.rows.length === 0 ? 'There are no rate constants yet.' : 'The rate constants are being evaluated.'} The line of ln k
          against 1/T stands here.
        </p>
        <div className="missing-steps">
          <Button className="button" onPress={() => view.setState({ stage: 'runs' })}>
            Go to the rate constants
          </Button>
        </div>
      </Half>
      <Half side="result" title="Activation energy from rate constants" note="">
        <p className="missing">Two temperatures give Ea and A; their intervals need three.</p>
      </Half>
    </>
  )
}

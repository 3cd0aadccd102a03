import type { Maybe, RateConstantPrediction } from '../../../shared-kinetics/contract/study-result.ts'
import { rateConstantLimits } from '../../../shared-kinetics/contract/rate-constant-schema.ts'
import type { Parsed } from '../../../shared-kinetics/units/parse-quantity.ts'
import { NumberHeading } from '../../sheet/DataTable.tsx'
import { decimals } from '../../sheet/format.ts'
import { PowerOfTen } from '../../sheet/PowerOfTen.tsx'
import { Remarked } from '../../sheet/Remarked.tsx'
import { mantissaAndPower, scientific } from '../../sheet/scientific.ts'
import { TableView } from '../../sheet/TableView.tsx'
import { TypedField } from '../../sheet/TypedField.tsx'
import { useServices, useView } from '../../state/services.ts'
import type { TypedPredictions } from '../../state/view-store.ts'
import { parseTemperatures, predictionsText } from '../runs/rate-constant-cells.ts'
import type { RatedProps } from './RateConstantsActivation.tsx'
import { copiedPredictions, modelNotFollowed, notWithinData, placeWords, reasonWords, temperatureIn } from './rate-constant-rows.ts'

/** k at temperatures that were not measured, or that were: with the band of the line and that of one more measurement. */
export function RateConstantPredictions({ table, rated, place, actions }: RatedProps) {
  const { view } = useServices()
  const { temperatureUnitShown: shown, rateUnit } = table
  const typed = useView((state) => state.typedPredictions)
  const { predictions } = rated
  const hasBands = predictions.some((row) => row.lineLower95 !== null)
  const model = modelNotFollowed(rated)
  const current = place.kind === 'prediction' ? place.index : null
  return (
    <>
      <div className="predict-at">
        <TypedField
          label="Predict k at"
          text={predictionsText(table.predictAt_K, shown, typed)}
          placeholder="e.g. 25 C, 310 K"
          parse={(text) => typedAs(text, atMost(parseTemperatures(text, shown)))}
          onCommit={(typedPredictions) => {
            view.setState({ typedPredictions })
            actions.change({ kind: 'set-rate-constants', table: { ...table, predictAt_K: [...typedPredictions.temperatures_K] } })
          }}
        />
      </div>
      {predictions.length > 0 && (
        <div className="prediction-space">
          <TableView label="Table of predictions" copied={() => copiedPredictions(rated)} currentRow={current}>
            <table className="data-table level-table prediction-table">
              <caption className="visually-hidden">Predicted rate constants</caption>
              <thead>
                <tr>
                  <NumberHeading text="T" />
                  <NumberHeading text="k" unit={rateUnit} />
                  {hasBands && <NumberHeading text="95 %, line" unit={rateUnit} />}
                  {hasBands && <NumberHeading text="95 %, new k" unit={rateUnit} />}
                  {!hasBands && (
                    <th scope="col">
                      <span>95 %</span>
                    </th>
                  )}
                  <NumberHeading text="exp(−Ea/RT)" />
                  <NumberHeading text="Factor" unit="per 10 K" />
                </tr>
              </thead>
              <tbody>
                {predictions.map((row, i) => (
                  // oxlint-disable-next-line react/no-array-index-key, jsx-a11y/click-events-have-key-events, jsx-a11y/no-noninteractive-element-interactions -- predictions have no other name; the rail's keys do the same
                  <tr
                    key={i}
                    aria-current={i === current ? 'true' : undefined}
                    onClick={() => view.setState({ rateConstant: { kind: 'prediction', index: i } })}
                  >
                    <th scope="row" className="is-number">
                      {temperatureIn(row.temperature_K, shown)}
                      {row.extrapolation.side !== 'inside' && <span className="is-beyond">{placeWords(row)}</span>}
                    </th>
                    <td className="is-number">
                      {row.rateConstant === null && row.lnK !== null ? (
                        <span className="soft">ln k {decimals(row.lnK, 1)}</span>
                      ) : (
                        <PowerOfTen text={scientific(row.rateConstant, 3)} />
                      )}
                    </td>
                    {hasBands && <Ends of={row} lower={row.lineLower95} upper={row.lineUpper95} />}
                    {hasBands && <Ends of={row} lower={row.newLower95} upper={row.newUpper95} />}
                    {!hasBands && <NoInterval of={row} model={model} />}
                    <td className="is-number">
                      <PowerOfTen text={scientific(row.exponentialFactor, 3)} />
                    </td>
                    <td className="is-number">
                      <Remarked remark={row.factorPer10K.isWithinData ? null : notWithinData}>
                        {scientific(row.factorPer10K.factor, 3)}
                      </Remarked>
                    </td>
                  </tr>
                ))}
              </tbody>
            </table>
          </TableView>
        </div>
      )}
      {predictions.some((row) => row.extrapolation.side !== 'inside') && (
        <p className="chart-note">Beyond the measured temperatures the bands hold only as far as the same reaction goes on there.</p>
      )}
    </>
  )
}

/** Why no interval stands beside k, and with it the mark of a k that is as wrong as its model. */
function NoInterval({ of, model }: { readonly of: RateConstantPrediction; readonly model: string | null }) {
  if (of.lnK === null) return <td className="no-interval">not to be had</td>
  const words = reasonWords(of.intervalStatus, model)
  return (
    <td className={model === null ? 'no-interval' : 'no-interval is-off'}>
      {words ?? 'no interval: its ends cannot be written as numbers'}
    </td>
  )
}

/** Both ends in the power of ten of k itself, so that they can be held against it at a glance. */
function Ends({ of, lower, upper }: { readonly of: RateConstantPrediction; readonly lower: Maybe; readonly upper: Maybe }) {
  if (lower === null || upper === null || of.rateConstant === null) return <NoInterval of={of} model={null} />
  const [, power] = mantissaAndPower(scientific(of.rateConstant, 3))
  const scale = power === '' ? 1 : 10 ** Number(power.replace('−', '-'))
  const end = (value: number): string => decimals(value / scale, placesAt(value / scale))
  return (
    <td className="is-number prediction-ends">
      <span className="prediction-range">
        {end(lower)} … {end(upper)}
      </span>
      {power !== '' && (
        <>
          {' '}
          <span className="prediction-range">
            ×{'\u00a0'}10<sup>{power}</sup>
          </span>
        </>
      )}
    </td>
  )
}

/** Three digits. */
const placesAt = (value: number): number => Math.max(0, 2 - Math.floor(Math.log10(Math.abs(value) || 1)))

const typedAs = (text: string, parsed: Parsed<readonly number[]>): Parsed<TypedPredictions> =>
  parsed.ok ? { ok: true, value: { text: text.trim(), temperatures_K: parsed.value } } : parsed

const atMost = (parsed: Parsed<readonly number[]>): Parsed<readonly number[]> =>
  parsed.ok && parsed.value.length > rateConstantLimits.predictions
    ? { ok: false, reason: `At most ${rateConstantLimits.predictions} temperatures are possible.` }
    : parsed

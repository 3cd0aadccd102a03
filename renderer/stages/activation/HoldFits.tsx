import type { FitOfHold, FitsOfHolds } from '../../../shared-kinetics/contract/study-result.ts'
import { copyText } from '../../sheet/data-table.ts'
import { NumberHeading } from '../../sheet/DataTable.tsx'
import { decimals } from '../../sheet/format.ts'
import { PowerOfTen } from '../../sheet/PowerOfTen.tsx'
import { Remarked } from '../../sheet/Remarked.tsx'
import { rowKeys } from '../../sheet/row-keys.ts'
import { scientific } from '../../sheet/scientific.ts'
import { TableView } from '../../sheet/TableView.tsx'
import { useServices } from '../../state/services.ts'
import { temperatureText } from '../runs/rate-constant-cells.ts'
import { temperatureUnitWords } from '../runs/rate-constant-edits.ts'
import { rowOfHold } from '../runs/row-of-hold.ts'
import { holdCopyColumns, linearisedWords, residualWords } from './hold-fit-rows.ts'
import type { RatedProps } from './RateConstantsActivation.tsx'
import { placesOf } from './rate-constant-rows.ts'

/** How the chosen model follows each hold that a rate constant was made from. The row of the rail's temperature is the current one. */
export function HoldFits({ table, place, fits }: RatedProps & { readonly fits: FitsOfHolds }) {
  const { view } = useServices()
  const { temperatureUnitShown: shown } = table
  const rows = fits.holds.map((hold) => rowOfHold(table.rows, hold, fits.holds))
  const current = place.kind === 'row' ? rows.indexOf(place.index) : -1
  const go = (hold: number): void => {
    const index = rows[hold] ?? -1
    if (index >= 0) view.setState({ rateConstant: { kind: 'row', index } })
  }
  const hasZero = fits.zeroInTime === 'free'
  return (
    <TableView
      label="Table of fits of the holds"
      copied={() => copyText(holdCopyColumns(fits, shown), fits.holds)}
      currentRow={current < 0 ? null : current}
      onKeyDown={rowKeys(current < 0 ? null : current, fits.holds.length, go)}
    >
      <table className="data-table level-table hold-table">
        <caption className="visually-hidden">How {fits.model} follows the holds</caption>
        <thead>
          <tr>
            <th scope="col">
              <span>Hold</span>
              <span className="unit">{temperatureUnitWords[shown]}</span>
            </th>
            <NumberHeading text="k" unit="1/s" />
            {hasZero && <NumberHeading text="Zero in time" unit="s" />}
            <NumberHeading text="s.d. of α" />
            <NumberHeading text="At most" unit="off" />
            <th scope="col">
              <span>Residuals</span>
              <span className="unit">runs of signs, chance</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {fits.holds.map((hold, i) => (
            // oxlint-disable-next-line react/no-array-index-key, jsx-a11y/click-events-have-key-events, jsx-a11y/no-noninteractive-element-interactions -- replicates may share a name; the table's own keys do the same
            <tr key={i} aria-current={i === current ? 'true' : undefined} onClick={() => go(i)}>
              <th scope="row">
                {temperatureText(Number(hold.temperature_K.toFixed(3)), shown)}
                <span className="beneath-value">{hold.label}</span>
              </th>
              <td className="is-number">
                <Remarked remark={linearisedWords(hold)}>
                  <PowerOfTen text={scientific(hold.rateConstant_per_s, 3)} />
                </Remarked>
                {hold.standardError_per_s !== null && (
                  <span className="beneath-value">
                    ± <PowerOfTen text={scientific(hold.standardError_per_s, 2)} />
                  </span>
                )}
              </td>
              {hasZero && <Zero hold={hold} />}
              <td className="is-number">
                <PowerOfTen text={scientific(hold.residualStandardDeviation, 3)} />
              </td>
              <td className="is-number">
                <PowerOfTen text={scientific(hold.greatestResidual, 3)} />
              </td>
              <td className="hold-residuals">
                <span className={hold.isSystematic ? 'is-off' : undefined}>{residualWords(hold)}</span>
                {hold.signRunsProbability !== null && (
                  <span className="beneath-value">
                    {hold.signRuns} runs,{' '}
                    <span className="hold-chance">
                      <PowerOfTen text={scientific(hold.signRunsProbability, 2)} />
                    </span>
                  </span>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </TableView>
  )
}

function Zero({ hold: { zero_s, zeroStandardError_s: error } }: { readonly hold: FitOfHold }) {
  const places = error === null ? 1 : placesOf(error)
  return (
    <td className="is-number">
      {decimals(zero_s, places)}
      {error !== null && (
        <span className="beneath-value">
          ± {error < 0.5 * 10 ** -places ? <PowerOfTen text={scientific(error, 2)} /> : decimals(error, places)}
        </span>
      )}
    </td>
  )
}

import { copyText } from '../../sheet/data-table.ts'
import { NumberHeading, UseBox } from '../../sheet/DataTable.tsx'
import { PowerOfTen } from '../../sheet/PowerOfTen.tsx'
import { rowKeys } from '../../sheet/row-keys.ts'
import { scientific } from '../../sheet/scientific.ts'
import { TableView } from '../../sheet/TableView.tsx'
import { useServices } from '../../state/services.ts'
import { temperatureText } from '../runs/rate-constant-cells.ts'
import { temperatureUnitWords, withUse } from '../runs/rate-constant-edits.ts'
import type { RatedProps } from './RateConstantsActivation.tsx'
import { residualText, rowCopyColumns } from './rate-constant-rows.ts'

/** What the line was drawn through, and how far each k lies from it. */
export function RateConstantRows({ table, rated, place, actions }: RatedProps) {
  const { view } = useServices()
  const { temperatureUnitShown: shown, rateUnit } = table
  const current = place.kind === 'row' ? place.index : null
  const hasLabel = table.rows.some((row) => row.label !== null)
  const go = (index: number): void => view.setState({ rateConstant: { kind: 'row', index } })

  return (
    <TableView
      label="Table of rate constants and their line"
      copied={() => copyText(rowCopyColumns(rated), rated.rows)}
      currentRow={current}
      onKeyDown={rowKeys(current, table.rows.length, go)}
    >
      <table className="data-table level-table rate-rows">
        <caption className="visually-hidden">Rate constants, the line, and how far they lie from it</caption>
        <thead>
          <tr>
            <th scope="col">
              <span>Use</span>
            </th>
            <NumberHeading text="T" unit={temperatureUnitWords[shown]} />
            <NumberHeading text="k" unit={rateUnit} />
            <NumberHeading text="k of the line" unit={rateUnit} />
            <NumberHeading text="ln k − line" />
            <NumberHeading text="exp(−Ea/RT)" />
            {hasLabel && (
              <th scope="col">
                <span>Label</span>
              </th>
            )}
          </tr>
        </thead>
        <tbody>
          {table.rows.map((row, i) => {
            const known = rated.rows[i]
            // Results of the table as it was before a change may be about another row.
            const result = known?.temperature_K === row.temperature_K && known.rateConstant === row.rateConstant ? known : null
            return (
              // oxlint-disable-next-line react/no-array-index-key, jsx-a11y/click-events-have-key-events, jsx-a11y/no-noninteractive-element-interactions -- rows have no other name; the table's own keys do the same
              <tr
                key={i}
                aria-current={i === current ? 'true' : undefined}
                className={row.use ? undefined : 'is-unused'}
                onClick={() => go(i)}
              >
                <td>
                  <UseBox
                    row={i}
                    isUsed={row.use}
                    onUse={(use) => actions.change({ kind: 'set-rate-constants', table: withUse(table, i, use) })}
                  />
                </td>
                <th scope="row" className="is-number">
                  {temperatureText(Number(row.temperature_K.toFixed(3)), shown)}
                </th>
                <PowerCell text={scientific(row.rateConstant, 3)} />
                <PowerCell text={scientific(result?.fittedRateConstant, 3)} />
                <td className="is-number">{residualText(result?.residual ?? null)}</td>
                <PowerCell text={scientific(result?.exponentialFactor, 3)} />
                {hasLabel && <td>{row.label}</td>}
              </tr>
            )
          })}
        </tbody>
      </table>
    </TableView>
  )
}

function PowerCell({ text }: { readonly text: string }) {
  return (
    <td className="is-number">
      <PowerOfTen text={text} />
    </td>
  )
}

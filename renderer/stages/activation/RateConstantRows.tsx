import type { KeyboardEvent } from 'react'
import { copyText } from '../../sheet/data-table.ts'
import { levelAfterKey } from '../../sheet/level-rail-keys.ts'
import { PowerOfTen } from '../../sheet/PowerOfTen.tsx'
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

  const onKeyDown = (event: KeyboardEvent): void => {
    const key = { ArrowDown: 'ArrowRight', ArrowUp: 'ArrowLeft', PageDown: 'PageUp', PageUp: 'PageDown', Home: 'Home', End: 'End' }[
      event.key
    ]
    const target = key === undefined || event.ctrlKey || event.metaKey ? null : levelAfterKey(key, current ?? -1, table.rows.length)
    if (target === null) return
    event.preventDefault()
    go(target)
  }

  return (
    <TableView
      label="Table of rate constants and their line"
      copied={() => copyText(rowCopyColumns(rated), rated.rows)}
      currentRow={current}
      onKeyDown={onKeyDown}
    >
      <table className="data-table level-table rate-rows">
        <caption className="visually-hidden">Rate constants, the line, and how far they lie from it</caption>
        <thead>
          <tr>
            <th scope="col">
              <span>Use</span>
            </th>
            <Heading text="T" unit={temperatureUnitWords[shown]} />
            <Heading text="k" unit={rateUnit} />
            <Heading text="k of the line" unit={rateUnit} />
            <Heading text="ln k − line" unit="" />
            <Heading text="exp(−Ea/RT)" unit="" />
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
                  <input
                    type="checkbox"
                    className="use-box"
                    aria-label={`Use row ${i + 1}`}
                    checked={row.use}
                    onChange={(event) => actions.change({ kind: 'set-rate-constants', table: withUse(table, i, event.target.checked) })}
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

function Heading({ text, unit }: { readonly text: string; readonly unit: string }) {
  return (
    <th scope="col" className="is-number">
      <span>{text}</span>
      <span className="unit">{unit}</span>
    </th>
  )
}

function PowerCell({ text }: { readonly text: string }) {
  return (
    <td className="is-number">
      <PowerOfTen text={text} />
    </td>
  )
}

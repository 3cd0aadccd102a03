import { memo, useMemo } from 'react'
import { copyText, type DataColumn } from '../../sheet/data-table.ts'
import { NumberCell, TableHead } from '../../sheet/DataTable.tsx'
import { rowKeys } from '../../sheet/row-keys.ts'
import { TableView } from '../../sheet/TableView.tsx'
import { useStudy } from '../../state/services.ts'
import type { ActivationProps } from './ActivationStage.tsx'
import { areLevelsBehind } from './levels-behind.ts'
import { useIntervalOf } from './use-shown.ts'
import { levelColumns, levelCopyColumns, levelRows, type LevelRow } from './level-rows.ts'

/** With more columns than these the headings take a line more, so that all are in sight. */
const mostInOneLine = 8

/** Ea at every level. Up and down move the level here as on the rail; a click on a row goes there. */
export function LevelTable({ result, chosen, compared, shown, levelIndex, actions }: ActivationProps) {
  const rows = useMemo(() => levelRows(result), [result])
  const columns = useMemo(() => levelColumns(result, chosen, compared, () => shown.interval), [result, chosen, compared, shown])

  const intervalOf = useIntervalOf(result)
  const methods = [chosen, ...compared]
  const isBehind = useStudy((state) => areLevelsBehind(state, methods, intervalOf))
  const className = ['data-table level-table', columns.length > mostInOneLine ? ' has-many' : '', isBehind ? ' is-behind' : ''].join('')

  return (
    <TableView
      label="Table of activation energies"
      copied={() => (isBehind ? null : copyText(levelCopyColumns(result, chosen, compared, intervalOf), rows))}
      currentRow={levelIndex}
      onKeyDown={rowKeys(levelIndex, rows.length, actions.moveLevel)}
    >
      <table className={className}>
        <caption className="visually-hidden">Activation energy at every level of conversion</caption>
        <TableHead columns={columns} />
        <tbody>
          {rows.map((row) => (
            <Row key={row.index} row={row} columns={columns} current={row.index === levelIndex} onPick={actions.moveLevel} />
          ))}
        </tbody>
      </table>
    </TableView>
  )
}

interface RowProps {
  readonly row: LevelRow
  readonly columns: readonly DataColumn<LevelRow>[]
  readonly current: boolean
  readonly onPick: (index: number) => void
}

const Row = memo(function Row({ row, columns, current, onPick }: RowProps) {
  const [first, ...rest] = columns
  return (
    // oxlint-disable-next-line jsx-a11y/click-events-have-key-events, jsx-a11y/no-noninteractive-element-interactions -- the table's own keys do the same
    <tr aria-current={current ? 'true' : undefined} onClick={() => onPick(row.index)}>
      <th scope="row" className="is-number">
        {first?.text(row)}
      </th>
      {rest.map((column) => (
        <NumberCell key={column.id} text={column.text(row)} remark={column.remark?.(row) ?? null} />
      ))}
    </tr>
  )
})

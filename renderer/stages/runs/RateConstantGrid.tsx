import { memo, useEffect, useId, useRef, useState, type ClipboardEvent, type FocusEvent, type KeyboardEvent } from 'react'
import { Button } from 'react-aria-components'
import type { RateConstantRow, RateConstantTable } from '../../../shared-kinetics/contract/study-result.ts'
import { copyText } from '../../sheet/data-table.ts'
import { NumberHeading, UseBox } from '../../sheet/DataTable.tsx'
import { PowerOfTen } from '../../sheet/PowerOfTen.tsx'
import { TableView } from '../../sheet/TableView.tsx'
import { rateConstantText, temperatureText } from './rate-constant-cells.ts'
import { gridCopyColumns } from './rate-constant-copy.ts'
import { cellTexts, enterCell, enterRow, gridColumns, type GridColumn, type RowTexts } from './rate-constant-entry.ts'
import { hasOwnNumbers, temperatureUnitWords, withoutRow, withUse } from './rate-constant-edits.ts'

export interface RateConstantGridProps {
  readonly table: RateConstantTable
  /** Index of the row that the rail stands at; null for none. */
  readonly current: number | null
  readonly onTable: (table: RateConstantTable) => void
  readonly onPoint: (index: number) => void
  /** Several cells at once were pasted into one. */
  readonly onPasteTable: (text: string) => void
}

const columnWords: Readonly<Record<GridColumn, string>> = {
  temperature: 'Temperature',
  rateConstant: 'k',
  standardUncertainty: 'u(k)',
  label: 'Label',
}

/** The table of rate constants as it can be typed: a row for each temperature, and one more that waits. Enter and the arrows go from row to row. */
export function RateConstantGrid(props: RateConstantGridProps) {
  const { table, current } = props
  const kUnit = table.rateUnit === '' ? 'unit not stated' : table.rateUnit
  return (
    <TableView label="Table of rate constants" copied={() => copyText(gridCopyColumns(table), table.rows)} currentRow={current}>
      <table className="data-table grid-table">
        <caption className="visually-hidden">Rate constants against temperature</caption>
        <thead>
          <tr>
            <th scope="col">
              <span>Use</span>
            </th>
            <NumberHeading text="Temperature" unit={temperatureUnitWords[table.temperatureUnitShown]} />
            <NumberHeading text="k" unit={kUnit} />
            <NumberHeading text="u(k)" unit="or %" />
            <th scope="col">
              <span>Label</span>
            </th>
            <th scope="col">
              <span className="visually-hidden">Remove</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {table.rows.map((row, i) => (
            // oxlint-disable-next-line react/no-array-index-key -- a row has no other name, and its draft belongs to its place
            <Row key={i} {...props} row={row} index={i} isCurrent={i === current} />
          ))}
          {hasOwnNumbers(table) && <NewRow {...props} />}
        </tbody>
      </table>
    </TableView>
  )
}

interface RowProps extends RateConstantGridProps {
  readonly row: RateConstantRow
  readonly index: number
  readonly isCurrent: boolean
}

const Row = memo(function Row({ table, row, index, isCurrent, onTable, onPoint, onPasteTable }: RowProps) {
  const typing = useTyping()
  const texts = cellTexts(row, table)
  const editable = hasOwnNumbers(table)

  const commit = (column: GridColumn): void => {
    const draft = typing.drafts[column]
    if (draft === undefined || draft.trim() === texts[column]) {
      typing.settle(column)
      return
    }
    const entered = enterCell(table, index, column, draft)
    if (!entered.ok) {
      typing.refuseCell(column, entered.reason)
      return
    }
    typing.settle(column)
    onTable(entered.value)
  }

  return (
    <>
      <tr aria-current={isCurrent ? 'true' : undefined} className={row.use ? undefined : 'is-unused'} onFocus={() => onPoint(index)}>
        <td>
          <UseBox row={index} isUsed={row.use} onUse={(use) => onTable(withUse(table, index, use))} />
        </td>
        {gridColumns.map((column) =>
          editable || column === 'label' ? (
            <Cell
              key={column}
              column={column}
              rowIndex={index}
              where={`row ${index + 1}`}
              text={texts[column]}
              typing={typing}
              onCommit={() => commit(column)}
              onRevert={() => typing.settle(column)}
              onPasteTable={onPasteTable}
            />
          ) : (
            <td key={column} className="is-number">
              <FixedCell row={row} column={column} table={table} />
            </td>
          ),
        )}
        <td>
          {editable && (
            <Button className="link-button" aria-label={`Remove row ${index + 1}`} onPress={() => onTable(withoutRow(table, index))}>
              Remove
            </Button>
          )}
        </td>
      </tr>
      <Reasons typing={typing} />
    </>
  )
})

function FixedCell({
  row,
  column,
  table,
}: {
  readonly row: RateConstantRow
  readonly column: GridColumn
  readonly table: RateConstantTable
}) {
  if (column === 'temperature') return <>{temperatureText(row.temperature_K, table.temperatureUnitShown)}</>
  return <PowerOfTen text={rateConstantText(column === 'rateConstant' ? row.rateConstant : row.standardUncertainty)} />
}

/** The row that waits at the end: it counts as soon as temperature and k can be read. */
function NewRow({ table, onTable, onPasteTable }: RateConstantGridProps) {
  const typing = useTyping()
  const rowRef = useRef<HTMLTableRowElement>(null)
  const isFirst = table.rows.length === 0
  useEffect(() => {
    if (isFirst) rowRef.current?.querySelector<HTMLElement>('input')?.focus()
  }, [isFirst])
  const isBlank = gridColumns.every((column) => (typing.drafts[column] ?? '').trim() === '')

  const enter = (): boolean => {
    if (isBlank) {
      typing.clear()
      return false
    }
    const entered = enterRow(table, typing.drafts)
    if (!entered.ok) {
      typing.refuseRow(entered.reasons)
      return false
    }
    typing.clear()
    onTable(entered.table)
    return true
  }
  const onBlur = (event: FocusEvent): void => {
    if (!event.currentTarget.contains(event.relatedTarget)) enter()
  }

  return (
    <>
      <tr ref={rowRef} className="grid-new" onBlur={onBlur}>
        <td>{''}</td>
        {gridColumns.map((column) => (
          <Cell
            key={column}
            column={column}
            rowIndex={table.rows.length}
            where="new row"
            text=""
            typing={typing}
            placeholder={table.rows.length === 0 ? placeholders[column] : column === 'temperature' ? 'add a row' : ''}
            onEnter={() => {
              if (enter()) rowRef.current?.querySelector<HTMLElement>('input[data-column="temperature"]')?.focus()
            }}
            onRevert={typing.clear}
            onPasteTable={onPasteTable}
          />
        ))}
        <td>{''}</td>
      </tr>
      <Reasons typing={typing} />
    </>
  )
}

const placeholders: Readonly<Record<GridColumn, string>> = {
  temperature: 'e.g. 25',
  rateConstant: 'e.g. 3.46e-5',
  standardUncertainty: 'optional',
  label: 'optional',
}

interface CellProps {
  readonly column: GridColumn
  readonly rowIndex: number
  /** The row, in words. */
  readonly where: string
  /** What stands there as long as nobody types. */
  readonly text: string
  readonly typing: Typing
  readonly placeholder?: string
  readonly onCommit?: () => void
  readonly onEnter?: () => void
  readonly onRevert: () => void
  readonly onPasteTable: (text: string) => void
}

function Cell({ column, rowIndex, where, text, typing, placeholder = '', onCommit, onEnter, onRevert, onPasteTable }: CellProps) {
  const onKeyDown = (event: KeyboardEvent<HTMLInputElement>): void => {
    if (event.ctrlKey || event.metaKey || event.altKey) return
    if (event.key === 'Escape') onRevert()
    else if (event.key === 'Enter' && onEnter !== undefined) onEnter()
    else if (event.key === 'Enter' || event.key === 'ArrowDown') focusCell(event.currentTarget, rowIndex + 1, column)
    else if (event.key === 'ArrowUp') focusCell(event.currentTarget, rowIndex - 1, column)
    else return
    event.preventDefault()
    event.stopPropagation()
  }
  const onPaste = (event: ClipboardEvent): void => {
    const pasted = event.clipboardData.getData('text/plain')
    if (!/[\t\r\n]/.test(pasted.trim())) return
    event.preventDefault()
    onPasteTable(pasted)
  }
  return (
    <td className={column === 'label' ? undefined : 'is-number'}>
      <input
        className="grid-cell"
        aria-label={`${columnWords[column]}, ${where}`}
        data-row={rowIndex}
        data-column={column}
        value={typing.drafts[column] ?? text}
        placeholder={placeholder}
        autoComplete="off"
        spellCheck={false}
        {...(typing.reasons[column] === undefined ? {} : { 'aria-invalid': true, 'aria-describedby': typing.errorId })}
        onChange={(event) => typing.type(column, event.target.value)}
        onBlur={onCommit}
        onKeyDown={onKeyDown}
        onPaste={onPaste}
      />
    </td>
  )
}

function focusCell(from: HTMLElement, row: number, column: GridColumn): void {
  const cell = from.closest('table')?.querySelector<HTMLInputElement>(`input[data-row="${row}"][data-column="${column}"]`)
  cell?.focus()
  cell?.select()
}

function Reasons({ typing: { errorId, reasons } }: { readonly typing: Typing }) {
  const said = gridColumns.flatMap((column) => (reasons[column] === undefined ? [] : `${columnWords[column]}: ${reasons[column]}`))
  if (said.length === 0) return null
  return (
    <tr className="grid-reasons">
      <td colSpan={6}>
        <p id={errorId} role="alert" className="field-error">
          {said.join(' ')}
        </p>
      </td>
    </tr>
  )
}

/** What is being typed into the cells of a row. */
interface Typing {
  readonly drafts: RowTexts
  /** By column, why it cannot be meant. */
  readonly reasons: RowTexts
  /** Where the reasons stand. */
  readonly errorId: string
  readonly type: (column: GridColumn, text: string) => void
  readonly refuseCell: (column: GridColumn, reason: string) => void
  readonly refuseRow: (reasons: RowTexts) => void
  /** Takes back what is typed in a cell, or in all. */
  readonly settle: (column: GridColumn) => void
  readonly clear: () => void
}

const none: RowTexts = {}

function useTyping(): Typing {
  const [drafts, setDrafts] = useState(none)
  const [reasons, setReasons] = useState(none)
  return {
    drafts,
    reasons,
    errorId: useId(),
    type: (column, text) => {
      setDrafts((all) => ({ ...all, [column]: text }))
      setReasons((all) => without(all, column))
    },
    refuseCell: (column, reason) => setReasons((all) => ({ ...all, [column]: reason })),
    refuseRow: setReasons,
    settle: (column) => {
      setDrafts((all) => without(all, column))
      setReasons((all) => without(all, column))
    },
    clear: () => {
      setDrafts(none)
      setReasons(none)
    },
  }
}

function without(texts: RowTexts, column: GridColumn): RowTexts {
  const { [column]: _, ...others } = texts
  return others
}

import { memo, useEffect, useId, useRef, useState, type ClipboardEvent, type FocusEvent, type KeyboardEvent } from 'react'
import { Button } from 'react-aria-components'
import type { RateConstantRow, RateConstantTable } from '../../../shared-kinetics/contract/study-result.ts'
import { copyText } from '../../sheet/data-table.ts'
import { PowerOfTen } from '../../sheet/PowerOfTen.tsx'
import { TableView } from '../../sheet/TableView.tsx'
import { rateConstantText, temperatureText } from './rate-constant-cells.ts'
import { gridCopyColumns } from './rate-constant-copy.ts'
import { cellTexts, enterCell, enterRow, gridColumns, type GridColumn } from './rate-constant-entry.ts'
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
            <Heading text="Temperature" unit={temperatureUnitWords[table.temperatureUnitShown]} />
            <Heading text="k" unit={kUnit} />
            <Heading text="u(k)" unit="or %" />
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

function Heading({ text, unit }: { readonly text: string; readonly unit: string }) {
  return (
    <th scope="col" className="is-number">
      <span>{text}</span>
      <span className="unit">{unit}</span>
    </th>
  )
}

interface RowProps extends RateConstantGridProps {
  readonly row: RateConstantRow
  readonly index: number
  readonly isCurrent: boolean
}

const Row = memo(function Row({ table, row, index, isCurrent, onTable, onPoint, onPasteTable }: RowProps) {
  const [drafts, setDrafts] = useState<Drafts>(none)
  const [reasons, setReasons] = useState<Drafts>(none)
  const errorId = useId()
  const texts = cellTexts(row, table)
  const editable = hasOwnNumbers(table)

  const settle = (column: GridColumn): void => {
    setDrafts((all) => without(all, column))
    setReasons((all) => without(all, column))
  }
  const commit = (column: GridColumn): void => {
    const draft = drafts[column]
    if (draft === undefined || draft.trim() === texts[column]) {
      settle(column)
      return
    }
    const entered = enterCell(table, index, column, draft)
    if (!entered.ok) {
      setReasons((all) => ({ ...all, [column]: entered.reason }))
      return
    }
    settle(column)
    onTable(entered.value)
  }

  return (
    <>
      <tr aria-current={isCurrent ? 'true' : undefined} className={row.use ? undefined : 'is-unused'} onFocus={() => onPoint(index)}>
        <td>
          <input
            type="checkbox"
            className="use-box"
            aria-label={`Use row ${index + 1}`}
            checked={row.use}
            onChange={(event) => onTable(withUse(table, index, event.target.checked))}
          />
        </td>
        {gridColumns.map((column) =>
          editable || column === 'label' ? (
            <Cell
              key={column}
              column={column}
              rowIndex={index}
              name={`${columnWords[column]}, row ${index + 1}`}
              text={drafts[column] ?? texts[column]}
              errorId={reasons[column] === undefined ? null : errorId}
              onType={(text) => setDrafts((all) => ({ ...all, [column]: text }))}
              onCommit={() => commit(column)}
              onRevert={() => settle(column)}
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
      <Reasons id={errorId} reasons={reasons} />
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
  const [drafts, setDrafts] = useState<Drafts>(none)
  const [reasons, setReasons] = useState<Drafts>(none)
  const errorId = useId()
  const rowRef = useRef<HTMLTableRowElement>(null)
  const isFirst = table.rows.length === 0
  useEffect(() => {
    if (isFirst) rowRef.current?.querySelector<HTMLElement>('input')?.focus()
  }, [isFirst])
  const isBlank = gridColumns.every((column) => (drafts[column] ?? '').trim() === '')

  const clear = (): void => {
    setDrafts(none)
    setReasons(none)
  }
  const enter = (): boolean => {
    if (isBlank) {
      clear()
      return false
    }
    const entered = enterRow(table, drafts)
    if (!entered.ok) {
      setReasons(entered.reasons)
      return false
    }
    clear()
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
            name={`${columnWords[column]}, new row`}
            placeholder={table.rows.length === 0 ? placeholders[column] : column === 'temperature' ? 'add a row' : ''}
            text={drafts[column] ?? ''}
            errorId={reasons[column] === undefined ? null : errorId}
            onType={(text) => {
              setDrafts((all) => ({ ...all, [column]: text }))
              setReasons((all) => without(all, column))
            }}
            onCommit={() => undefined}
            onEnter={() => {
              if (enter()) rowRef.current?.querySelector<HTMLElement>('input[data-column="temperature"]')?.focus()
            }}
            onRevert={clear}
            onPasteTable={onPasteTable}
          />
        ))}
        <td>{''}</td>
      </tr>
      <Reasons id={errorId} reasons={reasons} />
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
  readonly name: string
  readonly text: string
  readonly placeholder?: string
  /** Where the reason stands why the text cannot be meant; null where it can. */
  readonly errorId: string | null
  readonly onType: (text: string) => void
  readonly onCommit: () => void
  readonly onEnter?: () => void
  readonly onRevert: () => void
  readonly onPasteTable: (text: string) => void
}

function Cell({ column, rowIndex, name, text, placeholder = '', errorId, onType, onCommit, onEnter, onRevert, onPasteTable }: CellProps) {
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
        aria-label={name}
        data-row={rowIndex}
        data-column={column}
        value={text}
        placeholder={placeholder}
        autoComplete="off"
        spellCheck={false}
        {...(errorId === null ? {} : { 'aria-invalid': true, 'aria-describedby': errorId })}
        onChange={(event) => onType(event.target.value)}
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

function Reasons({ id, reasons }: { readonly id: string; readonly reasons: Drafts }) {
  const said = gridColumns.flatMap((column) => (reasons[column] === undefined ? [] : `${columnWords[column]}: ${reasons[column]}`))
  if (said.length === 0) return null
  return (
    <tr className="grid-reasons">
      <td colSpan={6}>
        <p id={id} role="alert" className="field-error">
          {said.join(' ')}
        </p>
      </td>
    </tr>
  )
}

type Drafts = Readonly<Partial<Record<GridColumn, string>>>
const none: Drafts = {}

function without(drafts: Drafts, column: GridColumn): Drafts {
  const { [column]: _, ...others } = drafts
  return others
}

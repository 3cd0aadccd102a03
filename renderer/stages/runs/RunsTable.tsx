import { Button } from 'react-aria-components'
import type { StudyChange } from '../../../shared-kinetics/contract/study-change.ts'
import type { Parsed } from '../../../shared-kinetics/units/parse-quantity.ts'
import type { ChartColours } from '../../charts/chart-colours.ts'
import { RunMarker } from '../../charts/RunMarker.tsx'
import { runMarker } from '../../charts/markers.ts'
import type { LevelQuantity } from '../../sheet/at-level.ts'
import { copyText, type DataColumn } from '../../sheet/data-table.ts'
import { NumberCell, TableHead } from '../../sheet/DataTable.tsx'
import { TableView } from '../../sheet/TableView.tsx'
import { TypedField } from '../../sheet/TypedField.tsx'
import { nominalSource, runCopyColumns, runFacts, type RunRow } from './run-rows.ts'

export interface RunsTableProps {
  readonly rows: readonly RunRow[]
  readonly columns: readonly DataColumn<RunRow>[]
  readonly level: number | null
  readonly levelIndex: number
  readonly quantity: LevelQuantity
  readonly pointedRun: string | null
  readonly colours: ChartColours
  readonly onPoint: (runId: string | null) => void
  readonly onChange: (change: StudyChange) => void
}

/** Every run of the study; also the legend of the charts. */
export function RunsTable({ rows, columns, level, levelIndex, quantity, pointedRun, colours, onPoint, onChange }: RunsTableProps) {
  // A mass or a peak that no run has needs no column here; the copied table keeps it.
  const inTable = columns.filter(({ id, text }) => {
    if (['mass', 'peak'].includes(id)) return rows.some((row) => text(row) !== '')
    return !['label', 'measured-error', 'programme', 'rows'].includes(id)
  })
  return (
    <TableView
      label="Runs of the study"
      copied={() => copyText(runCopyColumns(level, levelIndex, quantity), rows)}
      currentRow={rows.findIndex((row) => row.run.id === pointedRun)}
    >
      <table className="data-table runs-table">
        <caption className="visually-hidden">Runs of the study, slowest programme first</caption>
        <RunsHead columns={inTable} />
        <tbody>
          {rows.map((row) => (
            <tr
              key={row.run.id}
              aria-current={row.run.id === pointedRun ? 'true' : undefined}
              className={row.run.use ? undefined : 'is-unused'}
              onMouseEnter={() => onPoint(row.run.id)}
              onMouseLeave={() => onPoint(null)}
            >
              <td>
                <input
                  type="checkbox"
                  className="use-box"
                  aria-label={`Use ${row.run.label}`}
                  checked={row.run.use}
                  onChange={(event) => onChange({ kind: 'use-run', runId: row.run.id, use: event.target.checked })}
                />
              </td>
              <th scope="row">
                <RunName row={row} colours={colours} onChange={onChange} />
              </th>
              {inTable.map((column) => (
                <RunCell key={column.id} row={row} column={column} columns={columns} />
              ))}
              <td>
                <Button
                  className="link-button"
                  aria-label={`Remove ${row.run.label}`}
                  onPress={() => onChange({ kind: 'remove-run', runId: row.run.id })}
                >
                  Remove
                </Button>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </TableView>
  )
}

function RunsHead({ columns }: { readonly columns: readonly DataColumn<RunRow>[] }) {
  const use = { id: 'use', heading: 'Use', unit: '', numeric: false, text: () => '', value: () => null }
  const run = { ...use, id: 'run', heading: 'Run' }
  // Everywhere else ± is the 95 % interval; here it is one standard error, and the head says so.
  const shown = columns.map((column) => (column.id === 'measured' ? { ...column, unit: 'K/min ± SE' } : column))
  return <TableHead columns={[use, run, ...shown]} end="Remove" />
}

function RunName({ row, colours, onChange }: Pick<RunsTableProps, 'colours' | 'onChange'> & { readonly row: RunRow }) {
  const { run, tone, unusable } = row
  return (
    <div className="run-name">
      {tone === null ? (
        <span className="marker-none" aria-hidden="true" />
      ) : (
        <span title={`drawn as ${runMarker(tone.index).word}`}>
          <RunMarker index={tone.index} colour={colours.run(tone.place)} />
        </span>
      )}
      <div className="run-name-text" title={run.label}>
        <TypedField
          wraps
          label={`Label of ${run.label}`}
          hideLabel
          text={run.label}
          parse={parseLabel}
          onCommit={(label) => onChange({ kind: 'relabel-run', runId: run.id, label })}
        />
        <span className="run-facts">{runFacts(row)}</span>
        {unusable !== null && <span className="run-unusable">Not evaluated. {unusable}</span>}
      </div>
    </div>
  )
}

/** A label is one line, however it was pasted. */
function parseLabel(typed: string): Parsed<string> {
  const label = typed.replace(/\s+/g, ' ').trim()
  return label === '' ? { ok: false, reason: 'A run needs a label.' } : { ok: true, value: label }
}

function RunCell({
  row,
  column,
  columns,
}: {
  readonly row: RunRow
  readonly column: DataColumn<RunRow>
  readonly columns: RunsTableProps['columns']
}) {
  const text = column.text(row)
  if (!column.numeric) return <td>{text}</td>
  if (column.id === 'nominal')
    return (
      <td className="is-number" title={nominalSource(row)}>
        {text}
      </td>
    )
  const error = column.id === 'measured' ? columns.find((one) => one.id === 'measured-error')?.text(row) : ''
  return <NumberCell text={text}>{error !== undefined && error !== '' && <span className="plus-minus"> ± {error}</span>}</NumberCell>
}

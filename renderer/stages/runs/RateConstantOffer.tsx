import { useEffect, useRef, useState } from 'react'
import { Button, TextArea, TextField, Label } from 'react-aria-components'
import type { RateConstantReadOptions } from '../../../shared-kinetics/contract/rate-constant-schema.ts'
import type { RateConstantsRead } from '../../../shared-kinetics/contract/host-api.ts'
import type { RateConstantTable } from '../../../shared-kinetics/contract/study-result.ts'
import { parseRateUnit } from '../../../shared-kinetics/units/rate-unit.ts'
import { count } from '../../sheet/format.ts'
import { Half } from '../../sheet/Half.tsx'
import { PowerOfTen } from '../../sheet/PowerOfTen.tsx'
import { TypedField } from '../../sheet/TypedField.tsx'
import { useServices } from '../../state/services.ts'
import type { TableOffer, TableOrigin } from '../../state/table-offer.ts'
import type { SheetActions } from '../stage-props.ts'
import { rateConstantText, temperatureText } from './rate-constant-cells.ts'
import { joined, temperatureUnitWords } from './rate-constant-edits.ts'

interface OfferProps {
  readonly offer: TableOffer
  /** The table of the study; null where it has none yet. */
  readonly table: RateConstantTable | null
  readonly actions: SheetActions
}

/** A table that was pasted or dropped: its text at the left, to be mended; what is read from it at the right, to be taken or left. */
export function RateConstantOffer(props: OfferProps) {
  return (
    <>
      <Source {...props} />
      <Reading {...props} />
    </>
  )
}

/** Typing is read again once it pauses. */
const pause_ms = 300

function Source({ offer }: OfferProps) {
  const { session } = useServices()
  const { origin } = offer
  // What is being typed belongs to the offer it is typed over; another paste gives another one.
  const [draft, setDraft] = useState<{ readonly text: string; readonly over: TableOrigin } | null>(null)
  const fieldRef = useRef<HTMLTextAreaElement>(null)
  const timerRef = useRef<ReturnType<typeof setTimeout> | undefined>(undefined)

  useEffect(() => {
    fieldRef.current?.focus()
  }, [])

  const type = (text: string): void => {
    setDraft({ text, over: origin })
    clearTimeout(timerRef.current)
    timerRef.current = setTimeout(() => {
      const { offer: current } = session.store.getState()
      if (current !== null) void session.offerTable({ kind: 'text', text }, current.options)
    }, pause_ms)
  }

  if (origin.kind === 'file') {
    return (
      <Half
        side="evidence"
        title={`Rate constants in ${origin.file.name}`}
        note="The file holds no run, but reads as a table of rate constants."
      >
        <p className="missing">{origin.file.name}</p>
      </Half>
    )
  }
  return (
    <Half
      side="evidence"
      title="Rate constants as pasted"
      note="A temperature and a rate constant on each line, with headings or without; from a spreadsheet, a paper or a file."
    >
      <TextField className="paste-field" value={draft?.over === origin ? draft.text : origin.text} onChange={type}>
        <Label>Text of the table</Label>
        <TextArea ref={fieldRef} spellCheck={false} placeholder={'T (°C)\tk (1/s)\n25\t3.46e-5\n35\t1.35e-4'} />
      </TextField>
    </Half>
  )
}

function Reading({ offer, table, actions }: OfferProps) {
  const { session } = useServices()
  const { read, origin, options } = offer
  const readAgain = (stated: RateConstantReadOptions): void => void session.offerTable(origin, { ...options, ...stated })
  return (
    <Half side="result" title="How it is read" note="Nothing of it is in the study until you take it.">
      {read?.kind === 'refused' && <Refusal read={read} onState={readAgain} />}
      {read?.kind === 'table' && <Read table={read.table} onState={readAgain} />}
      {read === null && origin.kind === 'text' && origin.text.trim() === '' && (
        <p className="missing">Paste with Ctrl+V, or type. What is read from it appears here at once.</p>
      )}
      <Steps offer={offer} table={table} actions={actions} />
    </Half>
  )
}

function Refusal({
  read: { refused, ask },
  onState,
}: {
  readonly read: Extract<RateConstantsRead, { kind: 'refused' }>
  readonly onState: (stated: RateConstantReadOptions) => void
}) {
  return (
    <section className="questions" role="alert" aria-label={ask === null ? 'Not read' : 'Missing in the table'}>
      <p>
        {refused.line !== null && <strong>Line {refused.line}: </strong>}
        {refused.reason} {ask === null && refused.remedy}
      </p>
      {ask === 'temperature-unit' && (
        <div className="question">
          <p>In which unit are the temperatures?</p>
          {(['C', 'K', 'F'] as const).map((unit) => (
            <Button
              key={unit}
              className="button"
              aria-label={`Temperatures are in ${temperatureUnitWords[unit]}`}
              onPress={() => onState({ temperatureUnit: unit })}
            >
              {temperatureUnitWords[unit]}
            </Button>
          ))}
        </div>
      )}
      {ask === 'decimal-sign' && (
        <div className="question">
          <p>Which is the decimal sign?</p>
          {(['point', 'comma'] as const).map((decimalSign) => (
            <Button key={decimalSign} className="button" onPress={() => onState({ decimalSign })}>
              {decimalSign === 'point' ? 'Point: 1.5' : 'Comma: 1,5'}
            </Button>
          ))}
        </div>
      )}
    </section>
  )
}

/** Rows shown of a long table; all are taken. */
const shown = 12

function Read({ table, onState }: { readonly table: RateConstantTable; readonly onState: (stated: RateConstantReadOptions) => void }) {
  const { rows, rateUnit, temperatureUnitShown: unit } = table
  const hasUncertainty = rows.some((row) => row.standardUncertainty !== null)
  const hasLabel = rows.some((row) => row.label !== null)
  return (
    <>
      <p className="reading-head">
        {count(rows.length, 'row')}, temperature in {temperatureUnitWords[unit]}, k {rateUnit === '' ? 'without a unit' : `in ${rateUnit}`}.
      </p>
      {rateUnit === '' && (
        <div className="quiet-question reading-unit">
          <TypedField
            label="Unit of k, if you know it"
            text=""
            placeholder="e.g. 1/s"
            parse={(text) => {
              const parsed = parseRateUnit(text)
              return parsed.ok ? { ok: true, value: parsed.value.text } : parsed
            }}
            onCommit={(stated) => onState({ rateUnit: stated })}
          />
        </div>
      )}
      <table className="data-table reading-table">
        <caption className="visually-hidden">The table as read</caption>
        <thead>
          <tr>
            <th scope="col" className="is-number">
              <span>Temperature</span>
              <span className="unit">{temperatureUnitWords[unit]}</span>
            </th>
            <th scope="col" className="is-number">
              <span>k</span>
              <span className="unit">{rateUnit}</span>
            </th>
            {hasUncertainty && (
              <th scope="col" className="is-number">
                <span>u(k)</span>
                <span className="unit">{rateUnit}</span>
              </th>
            )}
            {hasLabel && (
              <th scope="col">
                <span>Label</span>
              </th>
            )}
          </tr>
        </thead>
        <tbody>
          {rows.slice(0, shown).map((row, i) => (
            // oxlint-disable-next-line react/no-array-index-key -- a row has no other name, and the list never changes in place
            <tr key={i}>
              <td className="is-number">{temperatureText(row.temperature_K, unit)}</td>
              <td className="is-number">
                <PowerOfTen text={rateConstantText(row.rateConstant)} />
              </td>
              {hasUncertainty && (
                <td className="is-number">
                  <PowerOfTen text={rateConstantText(row.standardUncertainty)} />
                </td>
              )}
              {hasLabel && <td>{row.label}</td>}
            </tr>
          ))}
        </tbody>
      </table>
      {rows.length > shown && <p className="chart-note">and {rows.length - shown} more</p>}
      {table.notes.length > 0 && (
        <ul className="reading-notes" aria-label="Notes on reading">
          {table.notes.map((note, i) => (
            // oxlint-disable-next-line react/no-array-index-key -- the same note may stand twice, and the list never changes in place
            <li key={i} className={`reading-${note.severity}`}>
              {note.message}
            </li>
          ))}
        </ul>
      )}
    </>
  )
}

function Steps({ offer: { read }, table, actions }: OfferProps) {
  const { session, view } = useServices()
  const take = (next: RateConstantTable): void => {
    actions.change({ kind: 'set-rate-constants', table: next })
    session.withdrawOffer()
    view.setState({ stage: 'runs', rateConstant: { kind: 'row', index: 0 } })
  }
  const whole = read?.kind === 'table' ? read.table : null
  const isBeside = table !== null && table.rows.length > 0
  const both = whole === null || !isBeside ? null : joined(table, whole)
  return (
    <>
      {whole !== null && isBeside && both === null && (
        <p className="field-error" role="alert">
          The rows cannot be added: their k is {unitWords(whole.rateUnit)}, that of the table {unitWords(table.rateUnit)}.
        </p>
      )}
      <div className="missing-steps">
        {whole !== null && both !== null && (
          <Button className="button button-main" onPress={() => take(both)}>
            Add {count(whole.rows.length, 'row')}
          </Button>
        )}
        {whole !== null && (
          <Button
            className={both === null ? 'button button-main' : 'button'}
            onPress={() => take({ ...whole, predictAt_K: table?.predictAt_K ?? [] })}
          >
            {isBeside ? 'Replace the table' : 'Use this table'}
          </Button>
        )}
        <Button className="button" onPress={session.withdrawOffer}>
          {isBeside ? 'Leave the table as it is' : 'Not now'}
        </Button>
      </div>
    </>
  )
}

const unitWords = (rateUnit: string): string => (rateUnit === '' ? 'without a unit' : `in ${rateUnit}`)

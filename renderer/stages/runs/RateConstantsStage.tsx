import { Button } from 'react-aria-components'
import type { RateConstantsResult, RateConstantTable } from '../../../shared-kinetics/contract/study-result.ts'
import { parseRateUnit } from '../../../shared-kinetics/units/rate-unit.ts'
import { Choice } from '../../sheet/Choice.tsx'
import { Half } from '../../sheet/Half.tsx'
import { TypedField } from '../../sheet/TypedField.tsx'
import { useServices, useStudy } from '../../state/services.ts'
import type { RateConstantPlace } from '../../state/view-store.ts'
import type { SheetActions } from '../stage-props.ts'
import { RateConstantGrid } from './RateConstantGrid.tsx'
import { RateConstantOffer } from './RateConstantOffer.tsx'
import { RateConstantReading } from './RateConstantReading.tsx'
import { hasOwnNumbers, temperatureUnitWords } from './rate-constant-edits.ts'

export interface RateConstantsProps {
  readonly table: RateConstantTable
  /** null until the first results are there; may be of the table as it was before. */
  readonly rated: RateConstantsResult | null
  readonly place: RateConstantPlace
  readonly actions: SheetActions
}

/** Evidence: the table as typed or read. Result: how it was understood. */
export function RateConstantsStage(props: RateConstantsProps) {
  const offer = useStudy((state) => state.offer)
  if (offer !== null) return <RateConstantOffer offer={offer} table={props.table} actions={props.actions} />
  return (
    <>
      <TableHalf {...props} />
      <RateConstantReading {...props} />
    </>
  )
}

function TableHalf({ table, place, actions }: RateConstantsProps) {
  const { session, view } = useServices()
  const setTable = (next: RateConstantTable): void => actions.change({ kind: 'set-rate-constants', table: next })
  const offer = (text: string): void => void session.offerTable({ kind: 'text', text })
  return (
    <Half
      side="evidence"
      title="Rate constants against temperature"
      note="A row for each measured k. Cells take a unit (298 K, 2.1e-3 1/min, 5 %) and a decimal comma; Enter goes to the next row."
    >
      <div className="controls">
        <Choice
          label="Temperature in"
          options={(['K', 'C', 'F'] as const).map((id) => ({ id, text: temperatureUnitWords[id] }))}
          value={table.temperatureUnitShown}
          onChange={(temperatureUnitShown) => setTable({ ...table, temperatureUnitShown })}
        />
        <div className="rate-unit">
          <TypedField
            label="Unit of k"
            text={table.rateUnit}
            placeholder="e.g. 1/s"
            parse={(text) => (text.trim() === '' ? { ok: true, value: '' } : unitOf(text))}
            onCommit={(rateUnit) => setTable({ ...table, rateUnit })}
          />
        </div>
        <div className="controls-end">
          {hasOwnNumbers(table) && (
            <Button className="text-button" onPress={() => offer('')}>
              Paste rows…
            </Button>
          )}
          <Button className="text-button" onPress={actions.copyTable}>
            Copy table
          </Button>
        </div>
      </div>
      <RateConstantGrid
        table={table}
        current={place.kind === 'row' ? place.index : null}
        onTable={setTable}
        onPoint={(index) => view.setState({ rateConstant: { kind: 'row', index } })}
        onPasteTable={offer}
      />
    </Half>
  )
}

function unitOf(text: string) {
  const parsed = parseRateUnit(text)
  return parsed.ok ? { ok: true as const, value: parsed.value.text } : parsed
}

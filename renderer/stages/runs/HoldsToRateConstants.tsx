import { useState } from 'react'
import { Button } from 'react-aria-components'
import type { RequestInput } from '../../../shared-kinetics/contract/host-api.ts'
import type { RateConstantTable, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { Choice } from '../../sheet/Choice.tsx'
import { count, decimals } from '../../sheet/format.ts'
import { parseConversion } from '../../sheet/parse-conversion.ts'
import { TypedField } from '../../sheet/TypedField.tsx'
import { useServices } from '../../state/services.ts'
import type { SheetActions } from '../stage-props.ts'

type FromHolds = RequestInput<'rate-constants.from-holds'>
type Model = FromHolds['model']

/** Models in the order of the common list, with their whole names. */
const modelWords: Readonly<Record<Model, string>> = {
  F1: 'F1, first order',
  'F3/2': 'F3/2, order 3/2',
  F2: 'F2, second order',
  F3: 'F3, third order',
  F0: 'F0, zero order',
  'A3/2': 'A3/2, Avrami–Erofeev, n = 3/2',
  A2: 'A2, Avrami–Erofeev, n = 2',
  A3: 'A3, Avrami–Erofeev, n = 3',
  A4: 'A4, Avrami–Erofeev, n = 4',
  R2: 'R2, contracting area',
  R3: 'R3, contracting volume',
  D1: 'D1, one-dimensional diffusion',
  D2: 'D2, two-dimensional diffusion',
  D3: 'D3, Jander',
  D4: 'D4, Ginstling–Brounshtein',
  'P2/3': 'P2/3, power law, n = 2/3',
  P2: 'P2, power law, n = 2',
  P3: 'P3, power law, n = 3',
  P4: 'P4, power law, n = 4',
  B1: 'B1, Prout–Tompkins',
  L2: 'L2, random scission',
}
const models = Object.keys(modelWords) as readonly Model[]

/** The way from isothermal runs to a table of rate constants; nothing is shown for a series without holds. */
export function HoldsToRateConstants({
  result,
  table,
  actions,
}: {
  readonly result: StudyResult | null
  readonly table: RateConstantTable | null
  readonly actions: SheetActions
}) {
  const { view } = useServices()
  const [open, setOpen] = useState(false)
  const holds = result?.runs.filter((run) => run.holdTemperature_K !== null).length ?? 0
  if (holds < 2 && table === null) return null
  return (
    <div className="holds">
      <div className="controls">
        <span className="choice-label">
          {table === null ? count(holds, 'isothermal run') : `Rate constants of ${count(table.rows.length, 'hold')} stand in this study`}
        </span>
        {table !== null && (
          <Button className="link-button" onPress={() => view.setState({ stage: 'activation', basis: 'rate-constants' })}>
            Show their line
          </Button>
        )}
        {holds >= 2 && (
          <Button className="link-button" aria-expanded={open} onPress={() => setOpen(!open)}>
            {table === null ? 'Rate constants of these holds, with a model…' : 'Make them again…'}
          </Button>
        )}
        {table !== null && (
          <Button className="link-button" onPress={() => actions.change({ kind: 'set-rate-constants', table: null })}>
            Remove them
          </Button>
        )}
      </div>
      {open && <HoldsForm table={table} actions={actions} onDone={() => setOpen(false)} />}
    </div>
  )
}

function HoldsForm({
  table,
  actions,
  onDone,
}: {
  readonly table: RateConstantTable | null
  readonly actions: SheetActions
  readonly onDone: () => void
}) {
  const { session, view } = useServices()
  const [model, setModel] = useState<Model>('F1')
  const [zeroInTime, setZeroInTime] = useState<'free' | 'fixed'>('free')
  const [[from, to], setRange] = useState<readonly [number, number]>([0.1, 0.9])
  const make = async (): Promise<void> => {
    const answer = await session.ask('rate-constants.from-holds', { model, zeroInTime, range: [from, to] })
    if (answer === null) return
    actions.change({ kind: 'set-rate-constants', table: { ...answer.table, predictAt_K: [...(table?.predictAt_K ?? [])] } })
    view.setState({ stage: 'activation', basis: 'rate-constants', rateConstant: { kind: 'row', index: 0 } })
    onDone()
  }
  return (
    <form
      className="holds-form"
      onSubmit={(event) => {
        event.preventDefault()
        void make()
      }}
    >
      <label>
        Kinetic model{' '}
        <select value={model} onChange={(event) => setModel(models.find((one) => one === event.target.value) ?? 'F1')}>
          {models.map((one) => (
            <option key={one} value={one}>
              {modelWords[one]}
            </option>
          ))}
        </select>
      </label>
      <Choice
        label="Zero in time"
        options={[
          { id: 'free', text: 'fitted' },
          { id: 'fixed', text: 'start of the hold' },
        ]}
        value={zeroInTime}
        onChange={setZeroInTime}
      />
      <div className="choice">
        <TypedField label="α from" text={decimals(from, 2)} parse={below(to)} onCommit={(value) => setRange([value, to])} />
        <TypedField label="to" text={decimals(to, 2)} parse={above(from)} onCommit={(value) => setRange([from, value])} />
      </div>
      <Button className="button" type="submit">
        Make the table
      </Button>
    </form>
  )
}

const below = (end: number) => (text: string) => {
  const parsed = parseConversion(text)
  return parsed.ok && parsed.value >= end ? ({ ok: false, reason: `a range begins below its end, ${decimals(end, 2)}` } as const) : parsed
}
const above = (start: number) => (text: string) => {
  const parsed = parseConversion(text)
  return parsed.ok && parsed.value <= start
    ? ({ ok: false, reason: `a range ends above its start, ${decimals(start, 2)}` } as const)
    : parsed
}

import { useState } from 'react'
import { Button } from 'react-aria-components'
import type { RateConstantTable, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { Choice } from '../../sheet/Choice.tsx'
import { count, decimals } from '../../sheet/format.ts'
import { parseConversion } from '../../sheet/parse-conversion.ts'
import { TypedField } from '../../sheet/TypedField.tsx'
import { useServices } from '../../state/services.ts'
import type { SheetActions } from '../stage-props.ts'
import { modelOf, type ModelCode } from './hold-models.ts'
import { modelOptions, rankingWords } from './hold-ranking.ts'
import { useRateConstantsOfHolds } from './use-rate-constants-of-holds.ts'

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
  const { view } = useServices()
  const make = useRateConstantsOfHolds(table, actions)
  // What was chosen before is where one goes on.
  const before = table?.holdFits
  const [model, setModel] = useState<ModelCode>(modelOf(before?.model ?? '') ?? 'F1')
  const [zeroInTime, setZeroInTime] = useState<'free' | 'fixed'>(before?.zeroInTime ?? 'free')
  const [[from, to], setRange] = useState<readonly [number, number]>(before?.range ?? [0.1, 0.9])
  const ranked = before?.zeroInTime === zeroInTime && before.range[0] === from && before.range[1] === to ? before : null
  const submit = async (): Promise<void> => {
    if (!(await make({ model, zeroInTime, range: [from, to] }))) return
    view.setState({ stage: 'activation', basis: 'rate-constants', rateConstant: { kind: 'row', index: 0 } })
    onDone()
  }
  return (
    <form
      className="holds-form"
      onSubmit={(event) => {
        event.preventDefault()
        void submit()
      }}
    >
      <label>
        Reaction model{' '}
        <select value={model} onChange={(event) => setModel(modelOf(event.target.value) ?? 'F1')}>
          {modelOptions(ranked).map(({ code, text }) => (
            <option key={code} value={code}>
              {text}
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
      <p className="holds-ranking">
        {ranked === null
          ? 'Whichever model is chosen, all of the list are fitted to the holds and ranked.'
          : `${rankingWords(ranked)} A fit does not show that a model is right.`}
      </p>
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

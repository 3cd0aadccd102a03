import { useMemo, type ReactNode } from 'react'
import { Button } from 'react-aria-components'
import type { RateConstantTable } from '../../../shared-kinetics/contract/study-result.ts'
import { arrheniusAtRow, arrheniusFigure } from '../../../shared-kinetics/figure/arrhenius-figure.ts'
import { FigureChart } from '../../charts/FigureChart.tsx'
import { count, decimals, formatInterval } from '../../sheet/format.ts'
import { Half } from '../../sheet/Half.tsx'
import { useColours, useServices } from '../../state/services.ts'
import type { RateConstantsProps } from './RateConstantsStage.tsx'
import { temperatureText } from './rate-constant-cells.ts'
import { convertedTo, hasOwnNumbers, temperatureUnitWords, unitsOfSameKind, withTemperaturesMeantIn } from './rate-constant-edits.ts'

/** How the table is understood, with what to do where it was meant otherwise, and the line that follows. */
export function RateConstantReading({ table, rated, place, actions }: RateConstantsProps) {
  const colours = useColours()
  const figure = useMemo(() => (rated === null ? null : arrheniusFigure(rated)), [rated])
  const overlay = useMemo(() => (rated === null || place.kind !== 'row' ? [] : arrheniusAtRow(rated, place.index)), [rated, place])
  return (
    <Half side="result" title="How it is read" note="Everything here can be put right; undo takes it back.">
      <dl className="reading">
        <Facts table={table} onTable={(next) => actions.change({ kind: 'set-rate-constants', table: next })} />
      </dl>
      <Notes table={table} />
      {figure !== null && table.rows.length > 0 && (
        <FigureChart figure={figure} overlay={overlay} colours={colours} onCopied={actions.pictureCopied} />
      )}
      <Line rated={rated} rows={table.rows.length} />
    </Half>
  )
}

function Facts({ table, onTable }: { readonly table: RateConstantTable; readonly onTable: (table: RateConstantTable) => void }) {
  const { rows, rateUnit, temperatureUnitShown: shown } = table
  const used = rows.filter((row) => row.use)
  const temperatures = used.map((row) => row.temperature_K).toSorted((a, b) => a - b)
  const distinct = new Set(temperatures).size
  const withUncertainty = used.filter((row) => row.standardUncertainty !== null).length
  const [coldest, hottest] = [temperatures[0], temperatures.at(-1)]
  const unit = temperatureUnitWords[shown]
  return (
    <>
      <Fact name="Source">{sourceWords(table)}</Fact>
      <Fact name="Rows">
        {rows.length === 0 ? 'none yet' : `${used.length} of ${rows.length} in use, at ${count(distinct, 'distinct temperature')}`}
      </Fact>
      <Fact name="Temperature">
        {coldest === undefined || hottest === undefined ? (
          `in ${unit}`
        ) : (
          <>
            {range([coldest, hottest].map((T) => temperatureText(T, shown)))} {unit}
            {shown !== 'K' && ` (${range([coldest, hottest].map((T) => decimals(T, 2)))} K)`}
            {hasOwnNumbers(table) && <MeantOtherwise table={table} onTable={onTable} />}
          </>
        )}
      </Fact>
      <Fact name="k">
        {rateUnit === '' ? 'unit not stated: Ea does not depend on it; A and the entropy of activation do' : `in ${rateUnit}`}
        <Conversions table={table} onTable={onTable} />
      </Fact>
      <Fact name="u(k)">{uncertaintyWords(withUncertainty, used.length)}</Fact>
    </>
  )
}

const range = ([from = '', to = '']: readonly string[]): string => (from === to ? from : `${from} to ${to}`)

const Fact = ({ name, children }: { readonly name: string; readonly children: ReactNode }) => (
  <div>
    <dt>{name}</dt>
    <dd>{children}</dd>
  </div>
)

interface EditProps {
  readonly table: RateConstantTable
  readonly onTable: (table: RateConstantTable) => void
}

/** The numbers stay, their unit is another one. */
function MeantOtherwise({ table, onTable }: EditProps) {
  const ways = (['K', 'C', 'F'] as const).flatMap((unit) => {
    const meant = unit === table.temperatureUnitShown ? null : withTemperaturesMeantIn(table, unit)
    return meant === null ? [] : [{ unit, meant }]
  })
  if (ways.length === 0) return null
  return (
    <span className="reading-step">
      numbers meant in{' '}
      {ways.map(({ unit, meant }) => (
        <Button
          key={unit}
          className="link-button"
          aria-label={`The numbers are meant in ${temperatureUnitWords[unit]}`}
          onPress={() => onTable(meant)}
        >
          {temperatureUnitWords[unit]}
        </Button>
      ))}
      ?
    </span>
  )
}

/** The unit is another one, and the numbers with it. */
function Conversions({ table, onTable }: EditProps) {
  const others = unitsOfSameKind(table.rateUnit).filter((unit) => unit !== table.rateUnit)
  if (others.length === 0 || table.rows.length === 0) return null
  return (
    <span className="reading-step">
      convert to{' '}
      {others.map((unit) => (
        <Button
          key={unit}
          className="link-button"
          aria-label={`Convert k to ${unit}`}
          onPress={() => {
            const next = convertedTo(table, unit)
            if (next !== null) onTable(next)
          }}
        >
          {unit}
        </Button>
      ))}
    </span>
  )
}

function Notes({ table }: { readonly table: RateConstantTable }) {
  if (table.notes.length === 0) return null
  return (
    <ul className="reading-notes" aria-label="Notes on reading">
      {table.notes.map((note, i) => (
        // oxlint-disable-next-line react/no-array-index-key -- the same note may stand twice, and the list never changes in place
        <li key={i} className={`reading-${note.severity}`}>
          {note.message}
        </li>
      ))}
    </ul>
  )
}

function Line({ rated, rows }: { readonly rated: RateConstantsProps['rated']; readonly rows: number }) {
  const { view } = useServices()
  if (rows === 0) {
    return (
      <p className="missing">
        Type the first temperature and rate constant at the left, or paste a table with Ctrl+V. Two temperatures give Ea; three give its
        interval.
      </p>
    )
  }
  if (rated === null) return null
  const { line } = rated
  const interval = formatInterval(line.Ea_kJ_per_mol, line.lower95_kJ_per_mol, line.upper95_kJ_per_mol)
  return (
    <div className="half-foot">
      {line.Ea_kJ_per_mol === null ? (
        <p>Ea follows as soon as rows at two temperatures are in use; its interval needs three.</p>
      ) : (
        <p>
          Ea <strong>{decimals(line.Ea_kJ_per_mol, 1)}</strong>
          {interval !== '' && ` ± ${interval}`} kJ/mol
          {interval === '' ? ', without an interval: that needs three temperatures.' : ' (95 %).'}
        </p>
      )}
      <div className="controls-end">
        <Button className="text-button" onPress={() => view.setState({ stage: 'activation', basis: 'rate-constants' })}>
          Go to the activation energy
        </Button>
      </div>
    </div>
  )
}

export function sourceWords({ source }: RateConstantTable): string {
  switch (source.kind) {
    case 'typed':
      return source.name === null ? 'typed' : `typed: ${source.name}`
    case 'pasted':
      return 'pasted'
    case 'file':
      return source.name ?? 'a file'
    case 'isothermal-runs':
      return `made from isothermal runs${source.name === null ? '' : `, ${source.name}`}`
  }
}

function uncertaintyWords(known: number, used: number): string {
  if (known === 0) return 'not stated; all rows count alike'
  if (known < used) return `stated in ${known} of ${used} rows; a weighted line needs all`
  return 'stated in every row: a weighted line stands beside the other'
}

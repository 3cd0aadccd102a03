import { useMemo } from 'react'
import { niceTicks } from '../../shared-kinetics/figure/nice-axis.ts'
import type { RateConstantsResult, RateConstantTable, TemperatureUnit } from '../../shared-kinetics/contract/study-result.ts'
import { PowerOfTen } from '../sheet/PowerOfTen.tsx'
import { rateBars, rateCaption } from '../sheet/rail-bars.ts'
import { RailStrip, type RailMark } from '../sheet/RailStrip.tsx'
import { mantissaAndPower, scientific } from '../sheet/scientific.ts'
import { bandHalfWidth, rateConstantStops, stopAt, type RateConstantStop } from '../stages/activation/rate-constant-stops.ts'
import { modelRemark, placeWords, residualText, temperatureIn } from '../stages/activation/rate-constant-rows.ts'
import { inUnit, toKelvin } from '../stages/runs/rate-constant-edits.ts'
import { useServices, useView } from '../state/services.ts'

/**
 * The rail of a table of rate constants: there is no conversion, so the handle goes from one temperature of the table to the next, predictions among them, and
 * chart, tables and read-out go with it.
 */
export function RateConstantRail({ table, rated }: { readonly table: RateConstantTable; readonly rated: RateConstantsResult }) {
  const { view } = useServices()
  const place = useView((state) => state.rateConstant)
  const stops = useMemo(() => rateConstantStops(table), [table])
  const widths = useMemo(() => stops.map((stop) => bandHalfWidth(rated, stop.temperature_K)), [stops, rated])
  const bars = useMemo(() => rateBars(widths), [widths])
  const index = stopAt(stops, place)
  const current = stops[index]
  const { temperatureUnitShown: shown } = table
  const axis = useMemo(() => axisOf(stops, shown), [stops, shown])
  if (current === undefined) return null

  const move = (next: number): void => {
    const stop = stops[next]
    if (stop !== undefined && next !== index) view.setState({ rateConstant: stop.place })
  }
  const readOut = readOutOf(current, table, rated)
  return (
    <RailStrip
      name="Temperature rail"
      label="Temperature"
      number={temperatureIn(current.temperature_K, shown, 1)}
      caption={rateCaption(widths)}
      slider={{ name: 'Temperature of the table', least: 1, greatest: stops.length, now: index + 1, spoken: readOut.spoken }}
      stops={stops.map((stop, i) => ({
        key: `${stop.place.kind}-${stop.place.index}`,
        share: axis.shareOf(stop.temperature_K),
        bar: bars[i],
      }))}
      index={index}
      marks={axis.ticks}
      fewestBars={19}
      onMove={move}
    >
      <p className="readout-energy">
        {readOut.name}{' '}
        <strong>
          <PowerOfTen text={readOut.k} />
        </strong>{' '}
        {table.rateUnit}
      </p>
      <p>{readOut.further}</p>
    </RailStrip>
  )
}

interface RailAxis {
  readonly shareOf: (temperature_K: number) => number
  readonly ticks: readonly RailMark[]
}

/** Temperature along the rail, from the coldest stop to the hottest with a little room at both ends; round numbers of the unit shown stand below it. */
function axisOf(stops: readonly RateConstantStop[], unit: TemperatureUnit): RailAxis {
  const [coldest, hottest] = [stops[0]?.temperature_K ?? 0, stops.at(-1)?.temperature_K ?? 1]
  const room = Math.max((hottest - coldest) * 0.04, hottest === coldest ? 5 : 0)
  const [from, to] = [coldest - room, hottest + room]
  const shareOf = (temperature_K: number): number => (temperature_K - from) / (to - from)
  const ticks = niceTicks(inUnit(from, unit), inUnit(to, unit), 9).map((value) => ({
    share: shareOf(toKelvin(value, unit)),
    text: String(Number(value.toPrecision(6))).replace('-', '−'),
  }))
  return { shareOf, ticks: ticks.filter(({ share }) => share >= 0 && share <= 1) }
}

interface ReadOut {
  readonly name: string
  readonly k: string
  readonly further: string
  readonly spoken: string
}

function readOutOf({ place, temperature_K }: RateConstantStop, table: RateConstantTable, rated: RateConstantsResult): ReadOut {
  const at = temperatureIn(temperature_K, table.temperatureUnitShown)
  const prediction = place.kind === 'prediction' ? rated.predictions[place.index] : undefined
  const row = place.kind === 'row' ? table.rows[place.index] : undefined
  const result = place.kind === 'row' ? rated.rows[place.index] : undefined
  const name = row === undefined ? 'k predicted' : (row.label ?? (row.use ? 'k' : 'k, not used'))
  const remark = prediction === undefined ? null : modelRemark(rated)
  const k = scientific(row?.rateConstant ?? prediction?.rateConstant, 3)
  const residual = residualText(result?.residual ?? null)
  const further =
    prediction !== undefined
      ? `${remark === null ? '' : `${remark}; `}${placeWords(prediction)}${prediction.extrapolation.side === 'inside' ? '' : ' the data'}; × ${scientific(prediction.factorPer10K.factor, 3)} per 10 K`
      : residual === ''
        ? ''
        : `ln k − line ${residual}`
  const [mantissa, power] = mantissaAndPower(k)
  const number = power === '' ? mantissa : `${mantissa} times ten to the ${power}`
  return {
    name,
    k,
    further,
    spoken: [at, k === '' ? '' : `${name} ${number} ${table.rateUnit}`, further].filter((part) => part !== '').join(', '),
  }
}

import { useMemo, useRef, type CSSProperties, type KeyboardEvent, type PointerEvent } from 'react'
import { niceTicks } from '../../shared-kinetics/figure/nice-axis.ts'
import type { Maybe, RateConstantsResult, RateConstantTable, TemperatureUnit } from '../../shared-kinetics/contract/study-result.ts'
import { levelAfterKey } from '../sheet/level-rail-keys.ts'
import { PowerOfTen } from '../sheet/PowerOfTen.tsx'
import { railBars } from '../sheet/rail-bars.ts'
import { mantissaAndPower, scientific } from '../sheet/scientific.ts'
import { bandHalfWidth, rateConstantStops, stopAt, type RateConstantStop } from '../stages/activation/rate-constant-stops.ts'
import { errorText, placeWords, residualText, temperatureIn } from '../stages/activation/rate-constant-rows.ts'
import { inUnit, toKelvin } from '../stages/runs/rate-constant-edits.ts'
import { useServices, useView } from '../state/services.ts'

const percent = (value: number): string => `${(value * 100).toFixed(3)}%`

/**
 * The rail of a table of rate constants: there is no conversion, so the handle goes from one temperature of the table to the next, predictions among them, and
 * chart, tables and read-out go with it.
 */
export function RateConstantRail({ table, rated }: { readonly table: RateConstantTable; readonly rated: RateConstantsResult }) {
  const { view } = useServices()
  const place = useView((state) => state.rateConstant)
  const trackRef = useRef<HTMLDivElement>(null)
  const stops = useMemo(() => rateConstantStops(table), [table])
  const widths = useMemo(() => stops.map((stop) => bandHalfWidth(rated, stop.temperature_K)), [stops, rated])
  const bars = useMemo(() => railBars(widths), [widths])
  const index = stopAt(stops, place)
  const current = stops[index]
  const { temperatureUnitShown: shown } = table
  const axis = useMemo(() => axisOf(stops, shown), [stops, shown])
  if (current === undefined) return null

  const move = (next: number): void => {
    const stop = stops[next]
    if (stop !== undefined && next !== index) view.setState({ rateConstant: stop.place })
  }
  const onKeyDown = (event: KeyboardEvent): void => {
    if (event.ctrlKey || event.metaKey || event.altKey) return
    const target = levelAfterKey(event.key, index, stops.length)
    if (target === null) return
    event.preventDefault()
    move(target)
  }
  const moveTo = (event: PointerEvent): void => {
    const { current: track } = trackRef
    if (track === null) return
    const { left, width } = track.getBoundingClientRect()
    const share = (event.clientX - left) / width
    const distance = (i: number): number => Math.abs(axis.shareOf(stops[i]?.temperature_K ?? Number.NaN) - share)
    move(stops.reduce((best, _, i) => (distance(i) < distance(best) ? i : best), index))
  }
  const readOut = readOutOf(current, table, rated)
  return (
    <footer className="rail" aria-label="Temperature rail">
      <div className="rail-level">
        <span className="rail-label">Temperature</span>
        <output className="rail-number">{temperatureIn(current.temperature_K, shown, 1)}</output>
      </div>
      <p className="rail-caption">
        {captionOf(widths).map((line) => (
          <span key={line}>{line} </span>
        ))}
      </p>
      <div
        className="rail-grip"
        // oxlint-disable-next-line jsx-a11y/prefer-tag-over-role -- a range input has no uneven stops and no bars
        role="slider"
        tabIndex={0}
        aria-label="Temperature of the table"
        aria-orientation="horizontal"
        aria-valuemin={1}
        aria-valuemax={stops.length}
        aria-valuenow={index + 1}
        aria-valuetext={readOut.spoken}
        onKeyDown={onKeyDown}
        onPointerDown={(event) => {
          if (event.button !== 0) return
          event.currentTarget.setPointerCapture(event.pointerId)
          moveTo(event)
        }}
        onPointerMove={(event) => {
          if (event.currentTarget.hasPointerCapture(event.pointerId)) moveTo(event)
        }}
      >
        <div className="rail-track" ref={trackRef} style={{ '--levels': Math.max(19, stops.length) } as CSSProperties}>
          {axis.ticks.map((tick) => (
            <span key={tick.text} className="rail-mark" style={{ left: percent(tick.share) }}>
              <span>{tick.text}</span>
            </span>
          ))}
          {stops.map((stop, i) => (
            <StopBar
              key={`${stop.place.kind}-${stop.place.index}`}
              height={bars[i]?.height ?? null}
              isCut={bars[i]?.cut === true}
              isCurrent={i === index}
              left={percent(axis.shareOf(stop.temperature_K))}
            />
          ))}
          <span className="rail-handle" style={{ left: percent(axis.shareOf(current.temperature_K)) }} />
        </div>
      </div>
      <div className="rail-readout">
        <p className="readout-energy">
          {readOut.name}{' '}
          <strong>
            <PowerOfTen text={readOut.k} />
          </strong>{' '}
          {table.rateUnit}
        </p>
        <p>{readOut.further}</p>
      </div>
    </footer>
  )
}

interface StopBarProps {
  readonly height: number | null
  readonly isCut: boolean
  readonly isCurrent: boolean
  readonly left: string
}

function StopBar({ height, isCut, isCurrent, left }: StopBarProps) {
  const state = `${isCurrent ? ' is-current' : ''}${isCut ? ' is-cut' : ''}${height === null ? ' is-empty' : ''}`
  return <span className={`rail-bar${state}`} style={{ left, height: height === null ? undefined : `${4 + height * 22}px` }} />
}

interface RailAxis {
  readonly shareOf: (temperature_K: number) => number
  readonly ticks: readonly { readonly share: number; readonly text: string }[]
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

function captionOf(widths: readonly Maybe[]): readonly string[] {
  const known = widths.filter((width) => width !== null)
  if (known.length === 0) return []
  const widest = Math.max(...known)
  const words = widest < 0.7 ? `${errorText(100 * Math.expm1(widest), 1)} % of k` : `factor ${scientific(Math.exp(widest), 3)}`
  return ['bars: ± 95 % of the line', `widest ${words}`]
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
  const k = scientific(row?.rateConstant ?? prediction?.rateConstant, 3)
  const residual = residualText(result?.residual ?? null)
  const further =
    prediction !== undefined
      ? `${placeWords(prediction)}${prediction.extrapolation.side === 'inside' ? '' : ' the data'}; × ${scientific(prediction.factorPer10K.factor, 3)} per 10 K`
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

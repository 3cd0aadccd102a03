import type { TaskContext } from '../isoconversional/result.ts'
import type { Programme } from '../series/programme.ts'
import type { RunAtLevels, SeriesAtLevels } from '../series/series-at-levels.ts'
import { perMinuteToPerSecond } from '../units/convert.ts'
import { column, quantity } from '../units/quantity.ts'

/** A context that neither cancels nor reports. */
export const quiet: TaskContext = { checkCancelled: () => {}, progress: () => {} }

/** One run as plain numbers; what is left out is NaN. */
export interface RunValues {
  readonly programme: Programme
  readonly programmeGroup: number
  readonly heatingRateSpread?: number
  readonly temperature_K: readonly number[]
  readonly time_s?: readonly number[]
  readonly reactionRate_per_s?: readonly number[]
  readonly history?: { readonly time_s: ArrayLike<number>; readonly temperature_K: ArrayLike<number> }
}

export const constantHeatingRate = (heatingRate_K_per_min: number): Programme => ({
  kind: 'constant-heating-rate',
  heatingRate: perMinuteToPerSecond(heatingRate_K_per_min),
  standardError: quantity(Number.NaN, 'K/s'),
  source: 'measured',
})

export const hold = (temperature_K: number): Programme => ({ kind: 'isothermal', temperature: quantity(temperature_K, 'K') })

/** A series in the form the methods take, from plain numbers. */
export function seriesOf(levels: readonly number[], runs: readonly RunValues[]): SeriesAtLevels {
  const numbers = (values: ArrayLike<number> | undefined): Float64Array =>
    values === undefined ? new Float64Array(levels.length).fill(Number.NaN) : Float64Array.from(values)
  return {
    levels: column(Float64Array.from(levels), '1'),
    runs: runs.map(
      (run): RunAtLevels => ({
        programme: run.programme,
        programmeGroup: run.programmeGroup,
        heatingRateSpread: run.heatingRateSpread ?? Number.NaN,
        history: {
          time_s: column(Float64Array.from(run.history?.time_s ?? []), 's'),
          temperature_K: column(Float64Array.from(run.history?.temperature_K ?? []), 'K'),
        },
        time_s: column(numbers(run.time_s), 's'),
        temperature_K: column(numbers(run.temperature_K), 'K'),
        reactionRate_per_s: column(numbers(run.reactionRate_per_s), '1/s'),
      }),
    ),
  }
}

/** Runs at constant heating rates, one programme each, from the temperatures at which they reach each level: `temperature_K[level][run]`. */
export function constantRateSeries(
  levels: readonly number[],
  heatingRate_K_per_min: readonly number[],
  temperature_K: readonly (readonly (string | number)[])[],
  rate?: (level: number, temperature_K: number) => number,
): SeriesAtLevels {
  return seriesOf(
    levels,
    heatingRate_K_per_min.map((beta, i) => {
      const T = temperature_K.map((row) => Number(row[i]))
      return {
        programme: constantHeatingRate(beta),
        programmeGroup: i,
        temperature_K: T,
        ...(rate === undefined ? {} : { reactionRate_per_s: T.map((value, k) => rate(levels[k] as number, value)) }),
      }
    }),
  )
}

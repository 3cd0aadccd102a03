import type { Converted } from '../conversion/converted.ts'
import type { RunColumns } from '../series/run.ts'
import { usableRows, type UsableRows } from '../series/usable-rows.ts'
import { valueAt } from '../series/value-at.ts'
import { decimate } from '../signal/decimate.ts'
import { lowerBound } from '../signal/lower-bound.ts'
import type { ConversionOrder } from './conversion-order.ts'
import type { ConvertedRun } from './convert-run.ts'
import type { RunResult } from './study-result.ts'

const nothing = new Float64Array(0)

/** Of a run that nobody will look at. */
export const noCurve: RunResult['curve'] = {
  time_s: nothing,
  temperature_K: nothing,
  signal: nothing,
  conversion: nothing,
  reactionRate_per_s: nothing,
  baseline: nothing,
}

/** The run as it was measured, thinned, with its conversion where it has one. */
export function curveToDraw({ info, settings }: ConversionOrder, columns: RunColumns, run: ConvertedRun): RunResult['curve'] {
  const {
    rows,
    range: { first, last },
    converted: { curve, baseline },
  } = run
  const isPooled = run.measuredRows !== rows.time_s.length
  const usable = isPooled ? usableRows(columns, settings.signalIndex, info.nominalHeatingRate, info.label) : rows
  const withBaseline = settings.quantity === 'heat-flow'
  const kept = isPooled ? rowsOfPools(usable, rows, first, curve) : decimate([rows.signal, spread(curve.reactionRate_per_s, rows, first)])
  const inWindow = rows.time_s.subarray(first, last + 1)
  const measured = (values: Float64Array): Float64Array => {
    const thinned = new Float64Array(kept.length)
    for (let k = 0; k < kept.length; k++) thinned[k] = values[kept[k] as number] as number
    return thinned
  }
  const followed = (values: Float64Array): Float64Array => {
    if (!isPooled) return measured(spread(values, rows, first))
    const thinned = new Float64Array(kept.length)
    for (let k = 0; k < kept.length; k++) thinned[k] = valueAt(inWindow, values, usable.time_s[kept[k] as number] as number)
    return thinned
  }
  return {
    time_s: measured(usable.time_s),
    temperature_K: measured(usable.temperature_K),
    signal: measured(usable.signal),
    conversion: followed(curve.conversion),
    reactionRate_per_s: followed(curve.reactionRate_per_s),
    baseline: withBaseline && baseline !== null ? followed(baseline) : new Float64Array(0),
  }
}

/** Values of the window as a column of the whole run, NaN outside. */
function spread(values: Float64Array, { signal }: UsableRows, first: number): Float64Array {
  if (values.length === signal.length) return values
  const whole = new Float64Array(signal.length).fill(Number.NaN)
  whole.set(values, first)
  return whole
}

/** Rows to draw of a run that was pooled: the extremes of its signal, and the rows nearest to those of its reaction rate. */
function rowsOfPools(usable: UsableRows, rows: UsableRows, first: number, curve: Converted['curve']): Uint32Array {
  const kept = new Set(decimate([usable.signal], 500))
  for (const pool of decimate([curve.reactionRate_per_s], 500)) {
    kept.add(Math.min(usable.time_s.length - 1, lowerBound(usable.time_s, rows.time_s[first + pool] ?? 0)))
  }
  return Uint32Array.from(kept).sort()
}

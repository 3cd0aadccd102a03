import type { RunColumns } from '../../shared-kinetics/series/run.ts'
import { column } from '../../shared-kinetics/units/quantity.ts'

/** The same columns on SharedArrayBuffers; those that are there already are taken as they are. */
export function shareColumns(columns: RunColumns): RunColumns {
  return {
    time_s: columns.time_s === null ? null : column(share(columns.time_s), 's'),
    temperature_K: column(share(columns.temperature_K), 'K'),
    signals: columns.signals.map(share),
  }
}

function share(values: Float64Array): Float64Array {
  if (values.buffer instanceof SharedArrayBuffer) return values
  const shared = new Float64Array(new SharedArrayBuffer(values.byteLength))
  shared.set(values)
  return shared
}

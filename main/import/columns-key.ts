import { createHash } from 'node:crypto'
import type { RunColumns } from '../../shared-kinetics/series/run.ts'

/** SHA-256 (hex) over the bytes of the columns: time where there is one, temperature, then the signals in their order. */
export function columnsKey(columns: RunColumns): string {
  const hash = createHash('sha256')
  for (const column of [...(columns.time_s === null ? [] : [columns.time_s]), columns.temperature_K, ...columns.signals]) {
    hash.update(Buffer.from(column.buffer, column.byteOffset, column.byteLength))
  }
  return hash.digest('hex')
}

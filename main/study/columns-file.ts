import { createHash } from 'node:crypto'
import { KineticsError } from '../../shared-kinetics/errors.ts'
import type { RunColumns, RunInfo } from '../../shared-kinetics/series/run.ts'
import { column } from '../../shared-kinetics/units/quantity.ts'

/*
 * One run's columns as a file, little-endian: 8 bytes of name, format, 1 if there is a time column, number of rows, number of
 * signals (4 x Uint32), 8 bytes of nothing, SHA-256 of the numbers (32 bytes), then time, temperature and signals as Float64.
 */
const name = 'RFCOLUMN'
const format = 1
const headerBytes = 64

/** @returns the file's bytes; `decodeColumns` gives the same numbers back, bit by bit */
export function encodeColumns(columns: RunColumns): Uint8Array {
  const all = [...(columns.time_s === null ? [] : [columns.time_s]), columns.temperature_K, ...columns.signals]
  const rows = columns.temperature_K.length
  const bytes = new Uint8Array(headerBytes + all.length * rows * 8)
  const numbers = new Float64Array(bytes.buffer, headerBytes)
  all.forEach((values, i) => {
    numbers.set(values, i * rows)
  })
  const header = new DataView(bytes.buffer, 0, headerBytes)
  bytes.set(new TextEncoder().encode(name))
  header.setUint32(8, format, true)
  header.setUint32(12, columns.time_s === null ? 0 : 1, true)
  header.setUint32(16, rows, true)
  header.setUint32(20, columns.signals.length, true)
  bytes.set(sumOf(bytes.subarray(headerBytes)), 32)
  return bytes
}

/**
 * The columns of a file, on shared memory.
 * @throws KineticsError `bad-study` for a file that is cut short, damaged, of a later format or of another shape
 */
export function decodeColumns(bytes: Uint8Array): RunColumns {
  if (bytes.byteLength < headerBytes || new TextDecoder().decode(bytes.slice(0, 8)) !== name) throw damaged('it is not a file of columns')
  const header = new DataView(bytes.buffer, bytes.byteOffset, headerBytes)
  if (header.getUint32(8, true) > format) throw damaged('a later version of the program wrote it; open it with that version')
  const hasTime = header.getUint32(12, true) === 1
  const rows = header.getUint32(16, true)
  const signalCount = header.getUint32(20, true)
  const count = 1 + signalCount + (hasTime ? 1 : 0)
  if (bytes.byteLength !== headerBytes + count * rows * 8) throw damaged('it is not as long as its header says')
  const body = bytes.subarray(headerBytes)
  if (!Buffer.from(sumOf(body)).equals(bytes.slice(32, 64))) throw damaged('its checksum does not match')
  const take = (index: number): Float64Array => {
    const values = new Float64Array(new SharedArrayBuffer(rows * 8))
    new Uint8Array(values.buffer).set(body.subarray(index * rows * 8, (index + 1) * rows * 8))
    return values
  }
  const first = hasTime ? 1 : 0
  return {
    time_s: hasTime ? column(take(0), 's') : null,
    temperature_K: column(take(first), 'K'),
    signals: Array.from({ length: signalCount }, (_, i) => take(first + 1 + i)),
  }
}

/** Whether columns are those that a run's description speaks of. */
export const columnsFit = (run: RunInfo, columns: RunColumns): boolean =>
  columns.temperature_K.length === run.rows && columns.signals.length === run.signals.length && (columns.time_s !== null) === run.hasTime

const sumOf = (bytes: Uint8Array): Uint8Array => createHash('sha256').update(bytes).digest()
const damaged = (why: string): KineticsError =>
  new KineticsError('bad-study', `The measured columns of a run cannot be read: ${why}. Add the run's original file again.`)

import { describe, expect, it } from 'vitest'
import { runOf } from '../check-values/simulated-run.ts'
import { KineticsError } from '../errors.ts'
import type { NominalHeatingRate } from './run.ts'
import { usableRows, type UsableRows } from './usable-rows.ts'

const n = 100
const even = (from: number, step: number, length = n): Float64Array => Float64Array.from({ length }, (_, i) => from + step * i)
const rows = (
  time: Float64Array | null,
  T: Float64Array,
  signal = even(1, -0.01, T.length),
  nominal: NominalHeatingRate | null = null,
): UsableRows =>
  usableRows(
    runOf('a', { time_s: time, temperature_K: T, signals: [{ quantity: 'mass', unit: '1', values: signal }] }).columns,
    0,
    nominal,
    'Run a',
  )
const codeOf = (call: () => unknown): string => {
  try {
    call()
  } catch (error) {
    if (error instanceof KineticsError) return `${error.code}: ${error.message}`
    throw error
  }
  return 'no error'
}

describe('usable rows', () => {
  it('counts time from the first row and leaves out rows without numbers or with a time that does not go on', () => {
    const time = even(30, 2)
    time[10] = time[9] as number
    const T = even(300, 1)
    T[20] = Number.NaN
    const used = rows(time, T)
    expect(used.time_s).toHaveLength(n - 2)
    expect(used.time_s[0]).toBe(0)
    expect(used.temperature_K.includes(Number.NaN)).toBe(false)
    expect([...used.time_s]).toEqual([...used.time_s].sort((a, b) => a - b))
    expect(used.rebuiltFrom).toBeNull()
  })

  it('refuses a time that starts again, naming the row', () => {
    const time = Float64Array.from({ length: n }, (_, i) => (i < 50 ? i : i - 50))
    expect(codeOf(() => rows(time, even(300, 1)))).toMatch(/^time-not-ascending: Run a: time goes back at data row 51/)
  })

  it('rebuilds time from a stated heating rate over the rows in which the temperature rises', () => {
    const T = even(300, 0.5)
    T[40] = T[39] as number
    const nominal = { heatingRate_K_per_s: 0.25, source: 'option', text: '15' } as const
    const used = rows(null, T, undefined, nominal)
    expect(used.time_s).toHaveLength(n - 1)
    expect(used.time_s[1]).toBeCloseTo(2, 12)
    expect(used.time_s.at(-1)).toBeCloseTo((0.5 * (n - 1)) / 0.25, 9)
    expect(used.rebuiltFrom).toBe(nominal)
  })

  it('without time and rate says which run and what to do', () => {
    expect(codeOf(() => rows(null, even(300, 1)))).toMatch(/^no-heating-rate: Run a has no time column.*Give its heating rate/)
  })

  it('needs 20 rows', () => {
    expect(rows(even(0, 1, 20), even(300, 1, 20)).time_s).toHaveLength(20)
    expect(codeOf(() => rows(even(0, 1, 19), even(300, 1, 19)))).toMatch(/^empty-window: Run a has 19 usable rows/)
  })

  it('names a signal that is not there', () => {
    const { columns } = runOf('a', { time_s: even(0, 1), temperature_K: even(300, 1), signals: [] })
    expect(codeOf(() => usableRows(columns, 0, null, 'Run a'))).toMatch(/^no-signal/)
  })
})

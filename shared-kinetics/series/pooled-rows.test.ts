import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { randomStream } from '../numerics/random.ts'
import { column } from '../units/quantity.ts'
import { pooledRows } from './pooled-rows.ts'
import type { UsableRows } from './usable-rows.ts'

function rowsOf(n: number, temperature: (t: number) => number, signal: (t: number, i: number) => number, step_s = 1): UsableRows {
  const time = Float64Array.from({ length: n }, (_, i) => i * step_s)
  return {
    time_s: column(time, 's'),
    temperature_K: column(
      time.map((t) => temperature(t)),
      'K',
    ),
    signal: time.map(signal),
    rebuiltFrom: null,
    setAside: { withoutNumber: 0, sameTime: 0, behind: [{ after: 700, rows: 3 }] },
  }
}

const onRamp = (t: number): number => 300 + 0.02 * t

describe('pooled rows', () => {
  it('are the rows themselves where there are fewer than 8,000', () => {
    const rows = rowsOf(7999, onRamp, Math.sin)
    expect(pooledRows(rows)).toBe(rows)
  })

  it('of a long ramp are about 4,000, begin and end where the run does, and lie on the ramp and on a straight signal', () => {
    fc.assert(
      fc.property(fc.integer({ min: 8000, max: 60_000 }), fc.double({ min: -5, max: 5, noNaN: true }), (n, slope) => {
        const rows = rowsOf(
          n,
          (t) => 300 + (500 * t) / n,
          (t) => 7 + slope * t,
        )
        const pooled = pooledRows(rows)
        expect(pooled.time_s.length).toBeGreaterThanOrEqual(4000)
        expect(pooled.time_s.length).toBeLessThan(8003)
        expect([pooled.time_s[0], pooled.time_s.at(-1)]).toEqual([0, n - 1])
        const off = (values: Float64Array, at: (t: number) => number): number =>
          values.reduce((most, value, i) => Math.max(most, Math.abs(value - at(pooled.time_s[i] ?? Number.NaN))), 0)
        expect(off(pooled.temperature_K, (t) => 300 + (500 * t) / n)).toBeLessThan(1e-9)
        expect(off(pooled.signal, (t) => 7 + slope * t)).toBeLessThan(1e-6)
      }),
      { numRuns: 20 },
    )
  })

  it('average the noise', () => {
    const random = randomStream(2)
    const pooled = pooledRows(rowsOf(40_000, onRamp, () => random.normal()))
    const inner = pooled.signal.subarray(1, -1)
    const sd = Math.sqrt(inner.reduce((sum, value) => sum + value * value, 0) / inner.length)
    // Ten rows in each mean; 4,000 means know a standard deviation to 1 %.
    expect(Math.abs(sd * Math.sqrt(10) - 1)).toBeLessThan(0.05)
  })

  it('never span a gap, and keep the corner of a fast way up to a hold', () => {
    const gap = { from: 12_000, length: 500 }
    const time = Float64Array.from({ length: 20_000 }, (_, i) => i + (i >= gap.from ? gap.length : 0))
    const corner = 200
    const T = time.map((t) => 300 + Math.min(t, corner))
    const pooled = pooledRows({
      time_s: column(time, 's'),
      temperature_K: column(T, 'K'),
      signal: T,
      rebuiltFrom: null,
      setAside: { withoutNumber: 0, sameTime: 0, behind: [] },
    })
    const inGap = pooled.time_s.filter((t) => t > gap.from - 1 && t < gap.from + gap.length)
    expect([...inGap]).toEqual([])
    // Every row of the way up by itself, and the corner too.
    expect([...pooled.time_s.subarray(0, corner + 1)]).toEqual([...time.subarray(0, corner + 1)])
  })

  it('know after which of them a block of earlier rows stood', () => {
    const pooled = pooledRows(rowsOf(20_000, onRamp, Math.sin))
    const after = pooled.setAside.behind[0]?.after ?? -1
    expect(pooled.time_s[after]).toBeGreaterThan(695)
    expect(pooled.time_s[after]).toBeLessThan(706)
  })
})

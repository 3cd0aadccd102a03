import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { normOf, qrInPlace, solveUpper, solveUpperTransposed } from './qr.ts'

const m = 5
const n = 3
const entry = fc.double({ min: -10, max: 10, noNaN: true })
const matrix = fc.array(entry, { minLength: m * n, maxLength: m * n })
const vector = fc.array(entry, { minLength: m, maxLength: m })
const cell = (a: ArrayLike<number>, i: number, j: number, rows = m): number => a[j * rows + i] ?? Number.NaN
const dot = (a: readonly number[], j: number, b: readonly number[]): number => b.reduce((sum, value, i) => sum + cell(a, i, j) * value, 0)
const upper = (a: Float64Array, i: number, j: number): number => (i <= j ? cell(a, i, j) : 0)

describe('QR with column pivoting', () => {
  it('keeps RᵀR = AᵀA and RᵀQᵀb = Aᵀb in the order it gives, its diagonal falling', () => {
    fc.assert(
      fc.property(matrix, vector, (a, b) => {
        const r = Float64Array.from(a)
        const z = Float64Array.from(b)
        const order = qrInPlace(r, z, m, n, true)
        expect([...order].toSorted((a, b) => a - b)).toEqual([0, 1, 2])
        for (let k = 0; k < n; k++) {
          const j = order[k] ?? 0
          const rb = [0, 1, 2].reduce((sum, i) => sum + upper(r, i, k) * (z[i] ?? 0), 0)
          expect(Math.abs(rb - dot(a, j, b))).toBeLessThan(1e-11)
          for (let l = 0; l < n; l++) {
            const other = a.slice((order[l] ?? 0) * m, ((order[l] ?? 0) + 1) * m)
            const rr = [0, 1, 2].reduce((sum, i) => sum + upper(r, i, k) * upper(r, i, l), 0)
            expect(Math.abs(rr - dot(a, j, other))).toBeLessThan(1e-11)
          }
          const before = k === 0 ? Number.POSITIVE_INFINITY : Math.abs(cell(r, k - 1, k - 1))
          expect(Math.abs(cell(r, k, k))).toBeLessThanOrEqual(before * (1 + 1e-14))
        }
        expect(Math.abs(normOf(z) - normOf(b))).toBeLessThan(1e-12)
      }),
    )
  })

  it('keeps a right-hand side its length where a column holds nothing but the smallest of numbers', () => {
    const tiny = Number.MIN_VALUE
    const a = Float64Array.from([0, 0, 0, tiny, tiny])
    const b = Float64Array.from([0, 0, 0, 0, 2])
    qrInPlace(a, b, m, 1, true)
    expect(normOf(b)).toBeCloseTo(2, 14)
  })

  it('shows dependent columns as a vanishing diagonal', () => {
    const a = Float64Array.from([1, 2, 3, 4, 5, 2, 0, 1, 0, 1, 3, 2, 4, 4, 6])
    qrInPlace(a, new Float64Array(m), m, n, true)
    expect(Math.abs(cell(a, 2, 2) / cell(a, 0, 0))).toBeLessThan(1e-15)
  })

  it('solves with the triangle and with its transpose', () => {
    const r = Float64Array.from([2, 9, 9, 1, 4, 9, -3, 5, 10])
    const x = [1, -2, 0.5]
    const rx = [0, 1, 2].map((i) => x.reduce((sum, value, j) => sum + (i <= j ? cell(r, i, j, 3) * value : 0), 0))
    const rtx = [0, 1, 2].map((i) => x.reduce((sum, value, j) => sum + (j <= i ? cell(r, j, i, 3) * value : 0), 0))
    for (const [i, value] of solveUpper(r, 3, 3, rx).entries()) expect(value).toBeCloseTo(x[i] ?? Number.NaN, 14)
    for (const [i, value] of solveUpperTransposed(r, 3, 3, rtx).entries()) expect(value).toBeCloseTo(x[i] ?? Number.NaN, 14)
  })
})

describe('a norm', () => {
  it('neither overflows nor underflows', () => {
    expect(normOf([3e200, 4e200])).toBeCloseTo(5e200, -190)
    expect(normOf([3e-200, 4e-200]) / 5e-200).toBeCloseTo(1, 14)
    expect(normOf([])).toBe(0)
    expect(normOf([1, 3, 4, 1], 1, 2)).toBe(5)
    expect(normOf([1, Number.POSITIVE_INFINITY])).toBe(Number.POSITIVE_INFINITY)
  })
})

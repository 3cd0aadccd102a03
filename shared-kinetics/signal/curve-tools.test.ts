import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { cellMeans } from './cell-means.ts'
import { cumulativeIntegral } from './cumulative-integral.ts'
import { decimate } from './decimate.ts'
import { hermiteValue, monotoneEnds } from './hermite.ts'
import { isotonic } from './isotonic.ts'
import { lowerBound } from './lower-bound.ts'
import { median } from './median.ts'

const numbers = fc.array(fc.double({ min: -100, max: 100, noNaN: true }), { minLength: 1, maxLength: 60 })

const sum = (values: ArrayLike<number>): number => Array.from(values).reduce((a, b) => a + b, 0)

describe('isotonic', () => {
  it('never falls, keeps the mean, leaves a rising sequence alone, and no step of it can be improved', () => {
    fc.assert(
      fc.property(numbers, (y) => {
        const fit = isotonic(y)
        for (let i = 1; i < fit.length; i++) expect(fit[i] as number).toBeGreaterThanOrEqual(fit[i - 1] as number)
        expect(sum(fit)).toBeCloseTo(sum(y), 6)
        expect([...isotonic(y.toSorted((a, b) => a - b))]).toEqual(y.toSorted((a, b) => a - b))
        // Optimality of the projection on a cone: the residual is orthogonal to the fit.
        expect(sum(y.map((value, i) => (value - (fit[i] as number)) * (fit[i] as number)))).toBeCloseTo(0, 4)
      }),
    )
  })

  it('pools neighbours that fall into their mean', () => {
    expect([...isotonic([1, 3, 2, 4, 3.5, 3.6, 9])]).toEqual(
      [1, 2.5, 2.5, 3.7, 3.7, 3.7, 9].map((value) => expect.closeTo(value, 12) as number),
    )
  })
})

const cubic = (x: number): number => 2 - x + 0.5 * x ** 2 - 0.3 * x ** 3
const slopeOfCubic = (x: number): number => -1 + x - 0.9 * x ** 2

describe('hermite', () => {
  it('is exact for a cubic', () => {
    const ends = { x0: -1, x1: 2, y0: cubic(-1), y1: cubic(2), slope0: slopeOfCubic(-1), slope1: slopeOfCubic(2) }
    for (const x of [-1, -0.2, 0.7, 1.9, 2]) expect(hermiteValue(ends, x)).toBeCloseTo(cubic(x), 12)
  })

  it('rises only from one end to the other once the slopes are limited', () => {
    const slope = fc.double({ min: -20, max: 20, noNaN: true })
    fc.assert(
      fc.property(slope, slope, fc.double({ min: 0.01, max: 5, noNaN: true }), (slope0, slope1, rise) => {
        const ends = monotoneEnds({ x0: 0, x1: 1, y0: 0, y1: rise, slope0, slope1 })
        let before = 0
        for (let i = 1; i <= 50; i++) {
          const y = hermiteValue(ends, i / 50)
          expect(y).toBeGreaterThanOrEqual(before - 1e-12)
          before = y
        }
      }),
    )
  })

  it('keeps slopes that are no steeper than three chords', () => {
    const ends = { x0: 0, x1: 1, y0: 0, y1: 1, slope0: 3, slope1: 0.2 }
    expect(monotoneEnds(ends)).toEqual(ends)
    expect(monotoneEnds({ ...ends, slope0: 3.1 }).slope0).toBe(3)
  })
})

describe('decimate', () => {
  it('keeps both ends and every highest and lowest sample, in order, and no more rows than asked for', () => {
    fc.assert(
      fc.property(fc.integer({ min: 2, max: 5000 }), fc.integer({ min: 20, max: 1000 }), fc.integer(), (n, most, seed) => {
        const one = Float64Array.from({ length: n }, (_, i) => Math.sin(i * (1 + (seed % 7))) * i)
        const other = one.map((value, i) => (i % 3 === 0 ? Number.NaN : -value))
        const rows = [...decimate([one, other], most)]
        expect(rows.length).toBeLessThanOrEqual(Math.max(most, Math.min(n, most)))
        expect(rows[0]).toBe(0)
        expect(rows.at(-1)).toBe(n - 1)
        expect(rows).toEqual([...new Set(rows)].sort((a, b) => a - b))
        expect(rows).toContain(one.indexOf(Math.max(...one)))
        expect(rows).toContain(one.indexOf(Math.min(...one)))
      }),
      { numRuns: 50 },
    )
  })

  it('keeps a spike of one sample in 20,000', () => {
    const flat = new Float64Array(20_000)
    flat[12_345] = 1
    const rows = decimate([flat])
    expect(rows).toContain(12_345)
    expect(rows.length).toBeLessThanOrEqual(1000)
  })

  it('takes short curves whole', () => {
    expect([...decimate([Float64Array.from([3, 1, 2])])]).toEqual([0, 1, 2])
  })
})

describe('small tools', () => {
  it('integrates a straight line exactly on uneven x', () => {
    const x = Float64Array.from([0, 0.1, 0.5, 2, 2.2])
    const area = cumulativeIntegral(
      x,
      x.map((t) => 3 * t + 1),
    )
    x.forEach((t, i) => expect(area[i]).toBeCloseTo(1.5 * t * t + t, 12))
  })

  it('finds the first value that is not below', () => {
    expect([0, 1, 1.5, 9, 10].map((target) => lowerBound([1, 2, 2, 9], target))).toEqual([0, 0, 1, 3, 4])
  })

  it('takes the median of the finite values', () => {
    expect(median([5, Number.NaN, 1, 3])).toBe(3)
    expect(median([4, 1, 3, 2])).toBe(2.5)
    expect(median([])).toBeNaN()
  })

  it('means over cells lie on a straight line, empty cells included', () => {
    const x = Float64Array.from([0, 0.1, 0.2, 0.3, 2.4, 2.5, 3, 3.9, 4])
    const cells = cellMeans(
      x,
      x.map((t) => 7 - 2 * t),
      0,
      8,
      8,
    )
    expect(cells.x).toHaveLength(8)
    cells.x.forEach((t, i) => expect(cells.y[i]).toBeCloseTo(7 - 2 * t, 10))
  })
})

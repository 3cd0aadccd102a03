import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { twoPointRule } from './two-point-rule.ts'

const moment = (x: readonly number[], weight: readonly number[], power: number): number =>
  x.reduce((sum, value, i) => sum + (weight[i] ?? Number.NaN) * value ** power, 0)

describe('the two-point rule of a discrete measure', () => {
  it('of an even distribution is the two-point Gauss–Legendre rule', () => {
    const n = 20_000
    const x = Array.from({ length: n }, (_, i) => (2 * i + 1) / n - 1)
    const rule = twoPointRule(
      x,
      x.map(() => 2 / n),
    )
    const sorted = [...rule.x].sort((a, b) => a - b)
    expect(sorted[0]).toBeCloseTo(-1 / Math.sqrt(3), 7)
    expect(sorted[1]).toBeCloseTo(1 / Math.sqrt(3), 7)
    expect(rule.weight[0]).toBeCloseTo(1, 7)
  })

  it('keeps weight, mean, variance and third moment, with positive weights inside the points', () => {
    const point = fc.tuple(fc.double({ min: -1, max: 1, noNaN: true }), fc.double({ min: 0.01, max: 2, noNaN: true }))
    fc.assert(
      fc.property(fc.array(point, { minLength: 3, maxLength: 30 }), (points) => {
        const x = points.map(([value]) => value)
        const weight = points.map(([, value]) => value)
        fc.pre(Math.max(...x) - Math.min(...x) > 0.01)
        const rule = twoPointRule(x, weight)
        for (const power of [0, 1, 2, 3])
          expect(Math.abs(moment(rule.x, rule.weight, power) - moment(x, weight, power))).toBeLessThan(1e-10)
        for (const value of rule.weight) expect(value).toBeGreaterThan(0)
        for (const value of rule.x) {
          expect(value).toBeGreaterThan(Math.min(...x) - 1e-9)
          expect(value).toBeLessThan(Math.max(...x) + 1e-9)
        }
      }),
    )
  })

  it('of points that coincide is that point', () => {
    expect(twoPointRule([3, 3, 3], [1, 2, 3])).toEqual({ x: [3, 3], weight: [3, 3] })
  })
})

import { describe, expect, it } from 'vitest'
import { assert, double, property } from 'fast-check'
import { guardedNewton } from './guarded-newton.ts'

const range = { lower: 0, upper: 100, relativeTolerance: 1e-13 }

describe('Newton kept in a bracket', () => {
  it('finds the root of a cubic from any start, with a slope that is right or half as large', () => {
    assert(
      property(double({ min: 1, max: 99, noNaN: true }), double({ min: 0, max: 100, noNaN: true }), (root, start) => {
        for (const share of [1, 0.5]) {
          const { status, x } = guardedNewton(
            (at) => ({ value: at ** 3 - root ** 3, slope: share * 3 * at * at }),
            start === 0 ? 0.1 : start,
            range,
          )
          expect(status).toBe('converged')
          expect(Math.abs(x / root - 1)).toBeLessThan(1e-10)
        }
      }),
    )
  })

  it('falls back on bisection where Newton runs away', () => {
    // Newton on atan leaves for good from |x - 50| > 1.39.
    const { x, evaluations } = guardedNewton((at) => ({ value: Math.atan(at - 50), slope: 1 / (1 + (at - 50) ** 2) }), 70, range)
    expect(x).toBeCloseTo(50, 10)
    expect(evaluations).toBeLessThan(30)
  })

  it('goes on where the value leaves double precision', () => {
    const { x } = guardedNewton((at) => ({ value: Math.exp(at * at) - 2, slope: 2 * at * Math.exp(at * at) }), 60, range)
    expect(x).toBeCloseTo(Math.sqrt(Math.LN2), 12)
  })

  it('says so where there is no root in the range, and where it runs out of evaluations', () => {
    expect(guardedNewton((at) => ({ value: at + 1, slope: 1 }), 50, range)).toMatchObject({ status: 'outside', x: Number.NaN })
    expect(guardedNewton((at) => ({ value: at - 200, slope: 1 }), 50, range).status).toBe('outside')
    expect(guardedNewton((at) => ({ value: at ** 9 - 1, slope: 9 * at ** 8 }), 90, { ...range, mostEvaluations: 3 }).status).toBe(
      'iteration-limit',
    )
  })
})

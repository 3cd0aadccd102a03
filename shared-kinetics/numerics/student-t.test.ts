import { compiled, stdtri } from 'cephes'
import * as fc from 'fast-check'
import { beforeAll, describe, expect, it } from 'vitest'
import exact from '../check-values/computed/student-t.json'
import { gammaRatio } from './gamma-ratio.ts'
import { studentTQuantile } from './student-t.ts'

beforeAll(async () => {
  await compiled
})

describe('the quantile of Student t', () => {
  // Two-sided 95 %, to the four decimals of any printed table.
  it.each([
    [1, '12.7062'],
    [2, '4.3027'],
    [3, '3.1824'],
    [4, '2.7764'],
    [5, '2.5706'],
    [6, '2.4469'],
    [8, '2.3060'],
  ])('for %i degrees of freedom at 0.975 prints as %s', (dof, printed) => {
    expect(studentTQuantile(0.975, dof).toFixed(4)).toBe(printed)
  })

  it('agrees with 40-digit values, also next to the quartiles, where the method changes', () => {
    for (const { probability, dof, t } of exact.rows) {
      const relative = Math.abs(studentTQuantile(probability, dof) / Number(t) - 1)
      expect(relative, `p ${probability}, dof ${dof}`).toBeLessThan(
        2e-14 + (4 * Number.EPSILON) / Math.min(probability - 0.5, 1 - probability),
      )
    }
  })

  // Within 60 degrees of freedom and 1e-4: outside these the other library itself is off by up to 1e-9 (found against 40-digit values).
  it('agrees with another library at random probabilities and degrees of freedom', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 60 }), fc.double({ min: 1e-4, max: 1 - 1e-4, noNaN: true }), (dof, probability) => {
        fc.pre(Math.abs(probability - 0.5) > 1e-3)
        expect(Math.abs(studentTQuantile(probability, dof) / stdtri(dof, probability) - 1)).toBeLessThan(2e-13)
      }),
      { numRuns: 2000 },
    )
  })

  it('is odd about the median', () => {
    expect(studentTQuantile(0.5, 3)).toBe(0)
    for (const dof of [1, 2, 3, 7.5, 40]) expect(studentTQuantile(0.125, dof)).toBe(-studentTQuantile(0.875, dof))
  })

  it('rejects what is no probability or no number of degrees of freedom', () => {
    for (const probability of [0, 1, -0.1, Number.NaN]) expect(() => studentTQuantile(probability, 3)).toThrow(/probability/)
    for (const dof of [0, -1, Number.NaN, Number.POSITIVE_INFINITY]) expect(() => studentTQuantile(0.9, dof)).toThrow(/degree/)
  })
})

describe('the ratio of gamma functions', () => {
  it('matches the recurrence and the values at 1/2 and 1', () => {
    expect(gammaRatio(0.5) * Math.sqrt(Math.PI)).toBeCloseTo(1, 14)
    expect((gammaRatio(1) * 2) / Math.sqrt(Math.PI)).toBeCloseTo(1, 14)
    // Γ(z + 1/2)/Γ(z) · Γ(z + 1)/Γ(z + 1/2) = z, just below, at and above the switch to the series.
    for (const z of [29.4, 29.5, 29.9, 30, 30.1, 1000]) expect((gammaRatio(z) * gammaRatio(z + 0.5)) / z).toBeCloseTo(1, 14)
  })
})

import { compiled, ndtr, ndtri } from 'cephes'
import * as fc from 'fast-check'
import { beforeAll, describe, expect, it } from 'vitest'
import { normalProbability, normalQuantile } from './normal.ts'

beforeAll(async () => {
  await compiled
})

describe('the normal distribution', () => {
  it.each([
    [0.975, '1.959964'],
    [0.95, '1.644854'],
    [0.995, '2.575829'],
    [0.5, '0.000000'],
  ])('has the printed quantile at %f', (probability, printed) => {
    expect(normalQuantile(probability).toFixed(6)).toBe(printed)
  })

  it('has the quantiles and probabilities of another library', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-12, max: 1 - 1e-12, noNaN: true }), (probability) => {
        expect(Math.abs(normalQuantile(probability) - ndtri(probability))).toBeLessThan(
          1e-14 * (8 + 1 / Math.min(probability, 1 - probability) / 1e4),
        )
      }),
      { numRuns: 1000 },
    )
    // Further out the other library itself is off (found against 40-digit values).
    fc.assert(
      fc.property(fc.double({ min: -12, max: 8, noNaN: true }), (z) => {
        expect(Math.abs(normalProbability(z) / ndtr(z) - 1)).toBeLessThan(1e-13)
      }),
      { numRuns: 1000 },
    )
  })

  it('has far quantiles that its probability undoes', () => {
    for (const probability of [1e-300, 1e-100, 1e-20, 1e-5, 0.2499, 0.2501, 0.49]) {
      const z = normalQuantile(probability)
      expect(z).toBeLessThan(0)
      expect(Math.abs(Math.log(normalProbability(z)) / Math.log(probability) - 1)).toBeLessThan(1e-14)
    }
    expect(normalQuantile(0.5)).toBe(0)
    expect(normalProbability(Number.NEGATIVE_INFINITY)).toBe(0)
    expect(normalProbability(Number.POSITIVE_INFINITY)).toBe(1)
    expect(normalProbability(Number.NaN)).toBeNaN()
  })

  it('rejects what is no probability', () => {
    for (const bad of [0, 1, -1, Number.NaN]) expect(() => normalQuantile(bad)).toThrow(/probability/)
  })
})

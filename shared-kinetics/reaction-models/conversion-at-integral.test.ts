import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { conversionAtIntegral } from './conversion-at-integral.ts'
import { reactionModelCodes, reactionModels } from './registry.ts'

describe('the conversion at a value of g', () => {
  it.each(reactionModelCodes)('%s: g and back is the conversion that was put in, wherever the search starts', (code) => {
    const model = reactionModels[code]
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 1 - 1e-9, noNaN: true }), fc.double({ min: 0, max: 1, noNaN: true }), (alpha, near) => {
        expect(Math.abs(conversionAtIntegral(model, model.g(alpha), near) - alpha)).toBeLessThan(1e-13)
      }),
      { numRuns: 200 },
    )
  })

  it('is that of the closed forms', () => {
    for (const u of [1e-9, 0.01, 0.3, 0.9, 3, 40]) {
      expect(conversionAtIntegral(reactionModels.F1, u)).toBeCloseTo(-Math.expm1(-u), 14)
      expect(conversionAtIntegral(reactionModels.A3, u)).toBeCloseTo(-Math.expm1(-(u ** 3)), 14)
      expect(conversionAtIntegral(reactionModels.F2, u)).toBeCloseTo(u / (1 + u), 14)
      expect(conversionAtIntegral(reactionModels.B1, u)).toBeCloseTo(1 / (1 + Math.exp(-u)), 14)
      expect(conversionAtIntegral(reactionModels.B1, -u)).toBeCloseTo(1 / (1 + Math.exp(u)), 14)
      expect(conversionAtIntegral(reactionModels.R3, u)).toBeCloseTo(u > 1 ? 1 : 1 - (1 - u) ** 3, 14)
    }
  })

  it('before the start is 0 and behind the end 1', () => {
    for (const code of reactionModelCodes.filter((other) => other !== 'B1')) {
      expect(conversionAtIntegral(reactionModels[code], -0.1)).toBe(0)
      expect(conversionAtIntegral(reactionModels[code], 0)).toBe(0)
      expect(conversionAtIntegral(reactionModels[code], Number.POSITIVE_INFINITY)).toBe(1)
    }
    expect(conversionAtIntegral(reactionModels.D1, 1)).toBe(1)
    expect(conversionAtIntegral(reactionModels.F1, Number.NaN)).toBeNaN()
  })
})

import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { inHalfUnits } from '../check-values/as-printed.ts'
import { avramiErofeev } from './avrami-erofeev.ts'
import { reactionOrder } from './reaction-order.ts'
import { reactionModelCodes, reactionModels } from './registry.ts'
import { sestakBerggren } from './sestak-berggren.ts'
import { conversionAtHighestY, conversionAtHighestZ } from './shape-markers.ts'

/** The highest point of a function on a fine grid. */
function highestOnGrid(function_: (alpha: number) => number): number {
  let best = { alpha: 0, value: Number.NEGATIVE_INFINITY }
  for (let i = 1; i < 20_000; i++) {
    const alpha = i / 20_000
    const value = function_(alpha)
    if (value > best.value) best = { alpha, value }
  }
  return best.alpha
}

describe('where z(alpha) is highest', () => {
  // J. Málek, Thermochim. Acta 200 (1992) 257, values from memory, recomputed from f'(alpha) g(alpha) = -1.
  it.each([
    ['F1', '0.63212'],
    ['A3/2', '0.63212'],
    ['A2', '0.63212'],
    ['A3', '0.63212'],
    ['A4', '0.63212'],
    ['D2', '0.83359'],
    ['D3', '0.70370'],
    ['R3', '0.70370'],
    ['D4', '0.77566'],
    ['R2', '0.75'],
    ['F2', '0.5'],
    ['F3', '0.42265'],
    ['L2', '0.58429'],
  ] as const)('%s: %s', (code, printed) => {
    expect(inHalfUnits(conversionAtHighestZ(reactionModels[code]), printed)).toBeLessThanOrEqual(1)
  })

  it('is 1 - 1/e for every Avrami–Erofeev model, 19/27 for R3 and D3, 1 - n^(1/(1 - n)) for an order n', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.3, max: 5, noNaN: true }), (n) => {
        expect(conversionAtHighestZ(avramiErofeev(n))).toBeCloseTo(-Math.expm1(-1), 12)
        fc.pre(Math.abs(n - 1) > 1e-3)
        expect(conversionAtHighestZ(reactionOrder(n))).toBeCloseTo(1 - n ** (1 / (1 - n)), 10)
      }),
    )
    expect(conversionAtHighestZ(reactionModels.R3)).toBeCloseTo(19 / 27, 13)
    expect(conversionAtHighestZ(reactionModels.D3)).toBeCloseTo(19 / 27, 13)
  })

  it('is where f g is highest', () => {
    for (const code of ['F3/2', 'D2', 'D4', 'A3', 'R2', 'L2'] as const) {
      const { f, g } = reactionModels[code]
      expect(Math.abs(conversionAtHighestZ(reactionModels[code]) - highestOnGrid((alpha) => f(alpha) * g(alpha)))).toBeLessThan(1e-4)
    }
    const sb = sestakBerggren(0.6, 1.4)
    expect(Math.abs(conversionAtHighestZ(sb) - highestOnGrid((alpha) => sb.f(alpha) * sb.g(alpha)))).toBeLessThan(1e-4)
  })

  it('is not to be had without a peak, or where g has no zero at the start', () => {
    for (const code of ['F0', 'P2', 'P3', 'P4', 'P2/3', 'D1', 'B1'] as const) expect(conversionAtHighestZ(reactionModels[code])).toBeNaN()
  })
})

describe('where y(alpha) is highest', () => {
  it.each([
    ['F1', '0'],
    ['D2', '0'],
    ['D3', '0'],
    ['D4', '0'],
    ['R2', '0'],
    ['R3', '0'],
    ['F2', '0'],
    ['A2', '0.39347'],
    ['A3', '0.48658'],
    ['A4', '0.52763'],
    ['L2', '0.25'],
  ] as const)('%s: %s', (code, printed) => {
    expect(inHalfUnits(conversionAtHighestY(reactionModels[code]), printed)).toBeLessThanOrEqual(1)
  })

  it('is 1 - e^(1/n - 1) for an Avrami–Erofeev model, m/(m + n) for SB(m, n)', () => {
    const exponent = fc.double({ min: 0.1, max: 4, noNaN: true })
    fc.assert(
      fc.property(exponent, exponent, (m, n) => {
        expect(conversionAtHighestY(sestakBerggren(m, n))).toBeCloseTo(m / (m + n), 10)
        expect(conversionAtHighestY(avramiErofeev(1.01 + m))).toBeCloseTo(-Math.expm1(1 / (1.01 + m) - 1), 10)
      }),
    )
  })

  it('is at an end for a rate that only falls or only rises, and nowhere for a constant one', () => {
    expect(conversionAtHighestY(reactionModels.P3)).toBe(1)
    expect(conversionAtHighestY(reactionModels.D1)).toBe(0)
    expect(conversionAtHighestY(reactionModels.F0)).toBeNaN()
    for (const code of reactionModelCodes.filter((code) => code !== 'F0')) {
      const { f } = reactionModels[code]
      expect(Math.abs(conversionAtHighestY(reactionModels[code]) - highestOnGrid(f)), `model ${code}`).toBeLessThan(1.1e-4)
    }
  })
})

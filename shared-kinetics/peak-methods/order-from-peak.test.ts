import { describe, expect, it } from 'vitest'
import { peaksOf } from '../check-values/peaks-of-values.ts'
import { bracketedRoot } from '../numerics/root.ts'
import { lnPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity } from '../units/quantity.ts'
import { astmE2890 } from './astm-e2890.ts'
import { avramiExponent } from './augis-bennett.ts'
import { orderFromPeak } from './order-from-peak.ts'

const R = gasConstant_J_per_mol_K

interface Model {
  readonly f: (alpha: number) => number
  readonly alphaOf: (g: number) => number
}
const nthOrder = (n: number): Model => ({
  f: (alpha) => (1 - alpha) ** n,
  alphaOf: (g) => (n === 1 ? -Math.expm1(-g) : 1 - Math.max(0, 1 + (n - 1) * g) ** (-1 / (n - 1))),
})
const accelerating = (p: number): Model => ({
  f: (alpha) => p * (1 - alpha) * (-Math.log1p(-alpha)) ** (1 - 1 / p),
  alphaOf: (g) => -Math.expm1(-(g ** p)),
})

/** Peak and half heights of an exact run, on a scale of x = Ea/(R T) with g = 1 at x0: alpha = F(p(x)/p(x0)), rate = const·exp(-x) f(alpha). */
function shapeOf({ f, alphaOf }: Model, x0: number, Ea: number): { peak: number; lower: number; upper: number } {
  const lnRate = (x: number): number => Math.log(f(alphaOf(Math.exp(lnPOfX(x) - lnPOfX(x0))))) - x
  // Golden section on x; the rate has one maximum.
  let [a, b] = [x0 - 6, x0 + 6]
  const ratio = (Math.sqrt(5) - 1) / 2
  const value = (x: number): number => {
    const rate = lnRate(x)
    return Number.isFinite(rate) ? rate : -1e9
  }
  for (let i = 0; i < 200; i++) {
    const [c, d] = [b - ratio * (b - a), a + ratio * (b - a)]
    if (value(c) > value(d)) b = d
    else a = c
  }
  const top = 0.5 * (a + b)
  const half = value(top) - Math.LN2
  const lower = bracketedRoot((x) => value(x) - half, top, top + 12).x
  const upper = bracketedRoot((x) => value(x) - half, top - 8, top).x
  return { peak: Ea / (R * top), lower: Ea / (R * lower), upper: Ea / (R * upper) }
}

const Ea = quantity(200e3, 'J/mol')
const halves = (shape: { peak: number; lower: number; upper: number }) => ({
  peak: quantity(shape.peak, 'K'),
  lower: quantity(shape.lower, 'K'),
  upper: quantity(shape.upper, 'K'),
})

describe('the order from the shape of a peak', () => {
  it.each([0.6, 1.5, 2, 3])('of an exact reaction of nth order, n = %d, is n', (n) => {
    for (const x of [15, 30, 300]) {
      const found = orderFromPeak(Ea, halves(shapeOf(nthOrder(n), x, Ea)))
      expect(found?.family).toBe('nth-order')
      expect(found?.order).toBeCloseTo(n, 5)
    }
  })

  it.each([1.5, 2, 3, 4])('of an exact accelerating reaction, p = %d, is p', (p) => {
    for (const x of [15, 30, 300]) {
      const found = orderFromPeak(Ea, halves(shapeOf(accelerating(p), x, Ea)))
      expect(found?.family).toBe('accelerating')
      expect(found?.order).toBeCloseTo(p, 5)
    }
  })

  it('of first order, where the families meet, is 1 by either', () => {
    expect(orderFromPeak(Ea, halves(shapeOf(nthOrder(1), 30, Ea)))?.order).toBeCloseTo(1, 5)
  })

  it('is not to be had without both half heights, without Ea, or for a width that no order has', () => {
    const shape = halves(shapeOf(nthOrder(1), 30, Ea))
    expect(orderFromPeak(Ea, { ...shape, upper: quantity(Number.NaN, 'K') })).toBeNull()
    expect(orderFromPeak(quantity(Number.NaN, 'J/mol'), shape)).toBeNull()
    expect(orderFromPeak(Ea, { ...shape, lower: quantity(100, 'K'), upper: quantity(2000, 'K') })).toBeNull()
  })
})

describe('the Avrami exponent from the width of a peak', () => {
  it.each([1, 2, 3, 4])("of an Avrami reaction, n = %d, is the method's 2.5 in place of 2.446", (n) => {
    // The exact full width of u exp(-u) at half height on a scale of ln u is 2.4464.
    const { peak, lower, upper } = shapeOf(accelerating(n), 3000, Ea)
    const found = avramiExponent(Ea, quantity(peak, 'K'), quantity(upper - lower, 'K'))
    expect(found / n).toBeCloseTo(2.5 / 2.4464, 2)
  })
})

const series = (model: Model, x: number, change: (i: number) => object = () => ({})) => {
  // Peaks of one reaction at three heating rates; how far they are apart does not matter to their shapes.
  const shapes = [x + 1, x, x - 1].map((at) => shapeOf(model, at, Ea))
  return peaksOf(
    [5, 10, 20].map(
      (_, i) =>
        5 *
        Math.exp(Ea / (R * (shapes[0]?.peak ?? 1)) - Ea / (R * (shapes[i]?.peak ?? 1))) *
        ((shapes[i]?.peak ?? 1) / (shapes[0]?.peak ?? 1)) ** 2,
    ),
    shapes.map((shape) => shape.peak),
    (i) => ({ lowerHalf: quantity(shapes[i]?.lower ?? 0, 'K'), upperHalf: quantity(shapes[i]?.upper ?? 0, 'K'), ...change(i) }),
  )
}

describe('ASTM E2890', () => {
  it('gives the order of the family that most peaks have, inside its scope', () => {
    const second = astmE2890(series(nthOrder(2), 40))
    expect(second).toMatchObject({ status: 'ok', outOfScope: null, peaksOfFamily: 3, order: { family: 'nth-order' } })
    expect(second.Ea / Ea).toBeCloseTo(1, 8)
    expect(Math.abs((second.order?.order ?? 0) - 2)).toBeLessThan(0.1)
    expect(astmE2890(series(accelerating(3), 40))).toMatchObject({ outOfScope: null, order: { family: 'accelerating' } })
  })

  it('says what lies outside the scope of the standard', () => {
    expect(astmE2890(series(nthOrder(5), 40)).outOfScope).toBe('order')
    expect(astmE2890(series(nthOrder(0.3), 40)).outOfScope).toBe('order')
    expect(astmE2890(series(accelerating(5), 40)).outOfScope).toBe('order')
    expect(astmE2890(series(nthOrder(1), 25)).outOfScope).toBe('temperature')
    expect(astmE2890(series(nthOrder(1), 90)).outOfScope).toBe('temperature')
  })

  it('has no order where no peak has its half heights', () => {
    const without = astmE2890(series(nthOrder(2), 40, () => ({ upperHalf: quantity(Number.NaN, 'K') })))
    expect(without).toMatchObject({ status: 'ok', order: null, peaksOfFamily: 0, outOfScope: null })
  })
})

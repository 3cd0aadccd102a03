import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import norris from '../check-values/certified/nist-norris.json'
import { KineticsError } from '../errors.ts'
import { lineFit } from './line-fit.ts'

/** Decimal digits on which a result agrees with a certified value (the log relative error of the NIST data sets). */
const digits = (value: number, certified: string): number => -Math.log10(Math.abs(value / Number(certified) - 1) || 1e-16)

describe('a line fit', () => {
  it('matches the certified values of NIST Norris, standard errors included', () => {
    const fit = lineFit(norris.x, norris.y)
    const { certified } = norris
    expect(fit.dof).toBe(certified.dof)
    expect(digits(fit.slope, certified.slope)).toBeGreaterThan(13)
    // The intercept is a difference of numbers 2,000 times as large.
    expect(digits(fit.intercept, certified.intercept)).toBeGreaterThan(11)
    expect(digits(fit.slopeStandardError, certified.slopeStandardError)).toBeGreaterThan(12)
    expect(digits(fit.interceptStandardError, certified.interceptStandardError)).toBeGreaterThan(12)
    expect(digits(fit.residualSumOfSquares, certified.residualSumOfSquares)).toBeGreaterThan(12)
    expect(digits(fit.residualStandardDeviation, certified.residualStandardDeviation)).toBeGreaterThan(12)
    expect(digits(fit.r2, certified.r2)).toBeGreaterThan(13)
  })

  it('gives standard error and covariance that belong together at any x', () => {
    const fit = lineFit(norris.x, norris.y)
    const variance = (x: number): number => fit.interceptStandardError ** 2 + 2 * x * fit.covariance + (x * fit.slopeStandardError) ** 2
    expect(variance(fit.xMean) / fit.valueAtMeanStandardError ** 2).toBeCloseTo(1, 10)
    expect(fit.intercept + fit.slope * fit.xMean).toBeCloseTo(fit.valueAtMean, 10)
  })

  // Four runs near 600 K: sums that are not centred give slope errors of 1e-12, 2e-11 and 2e-8 here.
  it.each([20, 2, 0.2])('recovers an exact line in 1/T from temperatures %f K apart in all', (spread) => {
    const x = [0, 1, 2, 3].map((i) => 1 / (600 + (spread * i) / 3))
    const y = x.map((value) => 30 - 24000 * value)
    expect(Math.abs(lineFit(x, y).slope / -24000 - 1)).toBeLessThan(5e-15 * (1 + 20 / spread))
  })

  it('through two points has a slope but no standard error', () => {
    const fit = lineFit([1, 2], [3, 5])
    expect(fit).toMatchObject({ status: 'ok', slope: 2, intercept: 1, dof: 0 })
    expect(fit.slopeStandardError).toBeNaN()
    expect(fit.covariance).toBeNaN()
  })

  it('says so where there is no line', () => {
    expect(lineFit([], []).status).toBe('too-few-points')
    expect(lineFit([1], [1]).status).toBe('too-few-points')
    const same = lineFit([1 / 600, 1 / 600, 1 / 600], [1, 2, 3])
    expect(same.status).toBe('x-not-distinct')
    expect(same.slope).toBeNaN()
    const rounding = 1 / 600 + Number.EPSILON / 600
    expect(lineFit([1 / 600, rounding, 1 / 600], [1, 2, 3]).status).toBe('x-not-distinct')
  })

  it('rejects columns of unlike length and values that are not finite', () => {
    expect(() => lineFit([1, 2, 3], [1, 2])).toThrow(KineticsError)
    expect(() => lineFit([1, Number.NaN], [1, 2])).toThrow(/finite/)
    expect(() => lineFit([1, 2], [1, Number.POSITIVE_INFINITY])).toThrow(/finite/)
  })

  it('keeps its slope when x and y are shifted', () => {
    const number = fc.double({ min: -10, max: 10, noNaN: true })
    fc.assert(
      fc.property(fc.array(fc.tuple(number, number), { minLength: 3, maxLength: 12 }), number, number, (points, a, b) => {
        const plain = lineFit(
          points.map(([x]) => x),
          points.map(([, y]) => y),
        )
        const spread = Math.max(...points.map(([x]) => x)) - Math.min(...points.map(([x]) => x))
        fc.pre(spread > 0.1)
        const shifted = lineFit(
          points.map(([x]) => x + a),
          points.map(([, y]) => y + b),
        )
        // Shifted values are rounded by up to h = 2^-49 (half a unit in the last place of 16 to 32): xy changes by h(Σ|dx| + Σ|dy|), xx by 2hΣ|dx|.
        const h = 2 ** -49
        const dx = points.reduce((sum, [x]) => sum + Math.abs(x - plain.xMean), 0)
        const dy = points.reduce((sum, [, y]) => sum + Math.abs(y - plain.valueAtMean), 0)
        const xx = points.reduce((sum, [x]) => sum + (x - plain.xMean) ** 2, 0)
        const rounding = (h * (dy + (1 + 2 * Math.abs(plain.slope)) * dx)) / xx
        expect(Math.abs(shifted.slope - plain.slope)).toBeLessThan(2 * rounding)
        // Each residual changes by no more than h, h times the slope and what the slope itself changes by.
        const ofResiduals = Math.sqrt(points.length) * h * (1 + Math.abs(plain.slope)) + 2 * rounding * Math.sqrt(xx)
        expect(Math.abs(shifted.slopeStandardError - plain.slopeStandardError)).toBeLessThan((2 * ofResiduals) / Math.sqrt(xx))
      }),
    )
  })
})

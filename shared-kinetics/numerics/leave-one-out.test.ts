import { array, assert, double, property } from 'fast-check'
import { describe, expect, it } from 'vitest'
import { leaveOneOut } from './leave-one-out.ts'
import { lineFit } from './line-fit.ts'

/** Forbes (1857): boiling point of water in °F and pressure in inches of mercury; ordinate 100 lg(pressure) to two decimals (Weisberg, Applied Linear Regression, table 1.1). */
const boiling = [194.5, 194.3, 197.9, 198.4, 199.4, 199.9, 200.9, 201.1, 201.4, 201.3, 203.6, 204.6, 209.5, 208.6, 210.7, 211.9, 212.2]
const pressure = [20.79, 20.79, 22.4, 22.67, 23.15, 23.35, 23.89, 23.99, 24.02, 24.01, 25.14, 26.57, 28.49, 27.76, 29.04, 29.88, 30.06]

describe('leave-one-out residuals', () => {
  it("find the twelfth of Forbes's points: t = 12.4 with 14 degrees of freedom (Weisberg, section 5.2), no other beyond 2", () => {
    const lg = pressure.map((value) => Math.round(1e4 * Math.log10(value)) / 100)
    const t = leaveOneOut(boiling, lg).map((point) => point.studentised)
    expect(t[11]).toBeCloseTo(12.4, 1)
    expect(Math.max(...t.filter((_, i) => i !== 11).map(Math.abs))).toBeLessThan(2)
  })

  it('follow from the line through all points: t = r √((n - 3)/(n - 2 - r²)), r the residual over s √(1 - leverage)', () => {
    const number = double({ min: -10, max: 10, noNaN: true })
    assert(
      property(array(number, { minLength: 5, maxLength: 12 }), (noise) => {
        const n = noise.length
        const x = noise.map((_, i) => i + 0.3 * Math.sin(i))
        const y = noise.map((value, i) => 2 * i + value + 0.1 * Math.cos(9 * i))
        const fit = lineFit(x, y)
        const spread = x.reduce((sum, value) => sum + (value - fit.xMean) ** 2, 0)
        leaveOneOut(x, y).forEach(({ studentised }, i) => {
          const leverage = 1 / n + ((x[i] ?? 0) - fit.xMean) ** 2 / spread
          const residual = (y[i] ?? 0) - fit.valueAtMean - fit.slope * ((x[i] ?? 0) - fit.xMean)
          const r = residual / (fit.residualStandardDeviation * Math.sqrt(1 - leverage))
          // Where the other points lie on a line, n - 2 - r² is the rounding of r.
          if (n - 2 - r * r < 1e-6) return
          // A point on the line of the others has a residual of rounding alone, so that no ratio can be asked for.
          const expected = r * Math.sqrt((n - 3) / (n - 2 - r * r))
          expect(Math.abs(studentised - expected)).toBeLessThan(1e-6 * (1 + Math.abs(expected)))
        })
      }),
    )
  })

  it('are not to be had from three points, and give the slope without each', () => {
    expect(leaveOneOut([0, 1, 3], [0, 1, 9]).map((point) => [point.studentised, point.slope])).toEqual([
      [Number.NaN, 4],
      [Number.NaN, 3],
      [Number.NaN, 1],
    ])
  })
})

import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import norris from '../check-values/certified/nist-norris.json'
import { linearLeastSquares } from './linear-least-squares.ts'

/** Decimal digits on which a result agrees with a certified value (the log relative error of the NIST data sets). */
const digits = (value: number | undefined, certified: number): number =>
  -Math.log10(Math.abs((value ?? Number.NaN) / certified - 1) || 1e-16)

describe('linear least squares', () => {
  it('matches NIST Norris', () => {
    const fit = linearLeastSquares([norris.x.map(() => 1), norris.x], norris.y)
    const { certified } = norris
    expect(fit.dof).toBe(certified.dof)
    expect(digits(fit.coefficients[1], Number(certified.slope))).toBeGreaterThan(13)
    expect(digits(fit.coefficients[0], Number(certified.intercept))).toBeGreaterThan(11)
    expect(digits(fit.standardErrors[1], Number(certified.slopeStandardError))).toBeGreaterThan(12)
    expect(digits(fit.standardErrors[0], Number(certified.interceptStandardError))).toBeGreaterThan(12)
    expect(digits(fit.residualStandardDeviation, Number(certified.residualStandardDeviation))).toBeGreaterThan(12)
  })

  it.each([
    // NIST Statistical Reference Datasets, NoInt1 and NoInt2: lines through the origin, certified slope and its standard deviation.
    {
      name: 'NoInt1',
      x: [60, 61, 62, 63, 64, 65, 66, 67, 68, 69, 70],
      y: [130, 131, 132, 133, 134, 135, 136, 137, 138, 139, 140],
      slope: 2.07438016528926,
      se: 0.0165289256198347,
    },
    { name: 'NoInt2', x: [4, 5, 6], y: [3, 4, 4], slope: 0.727272727272727, se: 0.0420827318078432 },
  ])('matches NIST $name, a line through the origin', ({ x, y, slope, se }) => {
    const fit = linearLeastSquares([x], y)
    expect(digits(fit.coefficients[0], slope)).toBeGreaterThan(14)
    expect(digits(fit.standardErrors[0], se)).toBeGreaterThan(13)
  })

  it('finds the polynomial that integers were made of', () => {
    // y = 1 + x + … + x⁵ at x = 0 … 20 is exact in double precision; its columns are nearly dependent.
    const x = Array.from({ length: 21 }, (_, i) => i)
    const columns = Array.from({ length: 6 }, (_, power) => x.map((value) => value ** power))
    const y = x.map((_, i) => columns.reduce((sum, values) => sum + (values[i] ?? 0), 0))
    for (const c of linearLeastSquares(columns, y).coefficients) expect(Math.abs(c - 1)).toBeLessThan(1e-8)
  })

  it('leaves residuals at right angles to every column, in any unit of the columns', () => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.integer({ min: 1000, max: 3000 }), fc.integer({ min: -3000, max: 0 }), fc.integer({ min: -2000, max: 0 })), {
          minLength: 8,
          maxLength: 30,
        }),
        fc.double({ min: 1e-3, max: 1e3, noNaN: true }),
        (points, unit) => {
          const columns = [points.map(() => 1), points.map(([x]) => x / 1e6), points.map(([, z]) => z / 1000)]
          const y = points.map(([, , value]) => value / 100)
          const fit = linearLeastSquares(columns, y)
          fc.pre(fit.status === 'ok')
          const residual = y.map(
            (value, i) => value - columns.reduce((sum, values, j) => sum + (fit.coefficients[j] ?? 0) * (values[i] ?? 0), 0),
          )
          // Nearly dependent columns have large coefficients that cancel: residuals are as exact as the terms they are the difference of.
          const terms = Math.hypot(...y, ...columns.flatMap((values, j) => values.map((value) => value * (fit.coefficients[j] ?? 0))))
          for (const values of columns) {
            const product = values.reduce((sum, value, i) => sum + value * (residual[i] ?? 0), 0)
            expect(Math.abs(product)).toBeLessThanOrEqual(1e-14 * Math.hypot(...values) * terms)
          }
          const scaled = linearLeastSquares([columns[0] ?? [], (columns[1] ?? []).map((value) => value * unit), columns[2] ?? []], y)
          // What of the column stands at right angles to the others is s/se long. Rounding of terms and column, over that, is rounding of the coefficient; residuals add to it
          // by the tilt of the column (Golub & Van Loan 5.3.7).
          const s = fit.residualStandardDeviation
          fc.pre(s > 1e-9 * terms)
          const error = fit.standardErrors[1] ?? Number.NaN
          const across = s / error
          const tilt = Math.hypot(...(columns[1] ?? [])) / across
          const change = (scaled.coefficients[1] ?? Number.NaN) * unit - (fit.coefficients[1] ?? Number.NaN)
          expect(Math.abs(change)).toBeLessThan((1e-14 * (terms + Math.sqrt(y.length) * s * tilt)) / across)
          expect(Math.abs(((scaled.standardErrors[1] ?? Number.NaN) * unit) / error - 1)).toBeLessThan(1e-14 * (terms / s + tilt))
        },
      ),
    )
  })

  it('says where the coefficients cannot be had, and has no standard error where no point is left over', () => {
    expect(
      linearLeastSquares(
        [
          [1, 1, 1],
          [2, 2, 2],
        ],
        [1, 2, 3],
      ).status,
    ).toBe('columns-not-independent')
    expect(
      linearLeastSquares(
        [
          [1, 2, 3],
          [2, 4, 6],
          [1, 1, 1],
        ],
        [1, 2, 4],
      ).status,
    ).toBe('columns-not-independent')
    expect(linearLeastSquares([[0, 0, 0]], [1, 2, 3]).status).toBe('columns-not-independent')
    expect(linearLeastSquares([[1], [2]], [1])).toMatchObject({ status: 'too-few-points', residualSumOfSquares: Number.NaN })
    const exact = linearLeastSquares(
      [
        [1, 1],
        [1, 2],
      ],
      [3, 5],
    )
    expect(exact.coefficients[0]).toBeCloseTo(1, 12)
    expect(exact.coefficients[1]).toBeCloseTo(2, 12)
    expect(exact.standardErrors[0]).toBeNaN()
  })

  it('refuses columns that do not fit y', () => {
    expect(() => linearLeastSquares([[1, 2]], [1])).toThrow(/Column 1 .* 2 values for 1/)
    expect(() => linearLeastSquares([[1, Number.NaN]], [1, 2])).toThrow(/Column 1/)
    expect(() => linearLeastSquares([[1, 2]], [1, Infinity])).toThrow(/finite y/)
  })
})

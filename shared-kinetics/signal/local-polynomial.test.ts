import * as fc from 'fast-check'
import { lusolve, multiply, transpose } from 'mathjs'
import { describe, expect, it } from 'vitest'
import { localPolynomial, localPolynomialAt } from './local-polynomial.ts'

/** Ascending x whose steps differ by up to a factor of ten. */
const unevenX = (steps: readonly number[]): Float64Array => {
  let at = -3
  return Float64Array.from(steps, (step) => (at += step))
}
const steps = fc.array(fc.double({ min: 0.02, max: 0.2, noNaN: true }), { minLength: 12, maxLength: 60 })
const coefficient = fc.double({ min: -2, max: 2, noNaN: true })

/** Steps that change tenfold in the middle, with or without a gap there. */
const changingSteps = (rows: number, gap: number): Float64Array => {
  let at = -4
  return Float64Array.from({ length: rows }, (_, i) => (at += i === rows >> 1 && gap > 0 ? gap : (i < rows >> 1 ? 14 : 1.4) / rows))
}

const truth = (t: number): number => 3 + Math.exp(-(t * t)) + 0.5 * Math.exp(-(((t - 2.5) / 0.8) ** 2))

/** Away from the ends, where a few noisy fits would outweigh all others. */
const rms = (values: readonly number[]): number => Math.sqrt(values.slice(65, -65).reduce((sum, v) => sum + v * v, 0) / values.length)

describe('local polynomial', () => {
  it('is exact for polynomials of its degree on uneven x, ends included', () => {
    fc.assert(
      fc.property(
        steps,
        coefficient,
        coefficient,
        coefficient,
        coefficient,
        fc.double({ min: 0.05, max: 1, noNaN: true }),
        (gaps, a, b, c, d, halfWidth) => {
          const x = unevenX(gaps)
          const { value, slope } = localPolynomial(
            x,
            x.map((t) => a + b * t + c * t ** 2 + d * t ** 3),
            { halfWidth, degree: 3 },
          )
          x.forEach((t, i) => {
            expect(value[i]).toBeCloseTo(a + b * t + c * t ** 2 + d * t ** 3, 7)
            expect(slope[i]).toBeCloseTo(b + 2 * c * t + 3 * d * t ** 2, 5)
          })
        },
      ),
      { numRuns: 60 },
    )
  })

  it('is the weighted regression that a linear-algebra library solves', () => {
    const x = unevenX([0.1, 0.05, 0.2, 0.1, 0.03, 0.12, 0.2, 0.15, 0.07, 0.11, 0.2, 0.1])
    const y = x.map((t) => Math.sin(5 * t))
    const at = (x[5] as number) + 0.01
    const halfWidth = 0.5
    for (const degree of [1, 2, 3] as const) {
      const inside = [...x].flatMap((t, i) => (Math.abs(t - at) < halfWidth ? [{ u: t - at, y: y[i] as number }] : []))
      const design = inside.map(({ u }) => Array.from({ length: degree + 1 }, (_, power) => u ** power))
      const weighted = inside.map(({ u }, i) => (design[i] as number[]).map((value) => value * (1 - Math.abs(u / halfWidth) ** 3) ** 3))
      const normal = multiply(transpose(design), weighted)
      const right = multiply(
        transpose(weighted),
        inside.map((point) => [point.y]),
      )
      const solution = lusolve(normal, right) as number[][]
      const fit = localPolynomialAt(x, y, at, { halfWidth, degree, minimumPoints: 2 })
      expect(fit.value).toBeCloseTo(solution[0]?.[0] ?? Number.NaN, 10)
      expect(fit.slope).toBeCloseTo(solution[1]?.[0] ?? Number.NaN, 9)
    }
  })

  it('widens until there are enough points, and takes a lower degree where there are not', () => {
    const x = Float64Array.from([0, 1, 2, 3, 4, 5, 6, 7, 8, 9])
    const cubic = localPolynomialAt(
      x,
      x.map((t) => t ** 3),
      4.5,
      { halfWidth: 0.001, degree: 3 },
    )
    expect(cubic.value).toBeCloseTo(91.125, 9)
    expect(cubic.slope).toBeCloseTo(60.75, 8)
    const two = localPolynomialAt(Float64Array.from([0, 2]), Float64Array.from([1, 5]), 1, { halfWidth: 1, degree: 3 })
    expect(two.value).toBeCloseTo(3, 12)
    expect(two.slope).toBeCloseTo(2, 12)
  })

  it('of many rows is that of few', () => {
    // Steps that differ by a factor of ten, and a gap.
    let at = -4
    const x = Float64Array.from({ length: 400_000 }, (_, i) => (at += i === 250_000 ? 0.2 : i % 10 === 0 ? 1e-4 : 1e-5))
    const y = x.map((t) => 3 + Math.exp(-(t * t)))
    const options = { halfWidth: 0.4, degree: 3 } as const
    // Some 15,000 rows lie within each half-width.
    const { value, slope } = localPolynomial(x, y, options)
    for (let i = 0; i < x.length; i += 4999) {
      const fit = localPolynomialAt(x, y, x[i] as number, options)
      expect(Math.abs((value[i] as number) - fit.value)).toBeLessThan(2e-5)
      expect(Math.abs((slope[i] as number) - fit.slope)).toBeLessThan(5e-5)
    }
  })

  it('over cells is exact for cubics, however unevenly the rows lie', () => {
    for (const gap of [0, 0.3]) {
      const x = changingSteps(2000, gap).map((t, i) => t + 0.0005 * Math.sin(7 * i))
      const { value, slope } = localPolynomial(
        x,
        x.map((t) => 2 - t + 0.5 * t ** 2 + 0.1 * t ** 3),
        { halfWidth: 0.5, degree: 3 },
      )
      x.forEach((t, i) => {
        expect(value[i]).toBeCloseTo(2 - t + 0.5 * t ** 2 + 0.1 * t ** 3, 10)
        expect(slope[i]).toBeCloseTo(-1 + t + 0.3 * t ** 2, 9)
      })
    }
  })

  it('at nodes is that at the rows but for an eighth of what either is off, also where rows lie farther apart than nodes', () => {
    for (const rows of [400, 900, 2000]) {
      for (const gap of [0, 0.3]) {
        const x = changingSteps(rows, gap)
        const options = { halfWidth: 0.5, degree: 3, minimumPoints: 6 } as const
        const y = x.map(truth)
        const { value, slope } = localPolynomial(x, y, options)
        const [off, apart, apartInSlope] = [0, 0, 0].map(() => new Float64Array(rows)) as [Float64Array, Float64Array, Float64Array]
        x.forEach((t, i) => {
          const fit = localPolynomialAt(x, y, t, options)
          off[i] = Math.abs(fit.value - truth(t))
          apart[i] = Math.abs((value[i] as number) - fit.value)
          apartInSlope[i] = Math.abs((slope[i] as number) - fit.slope)
        })
        expect(Math.max(...apart)).toBeLessThan(0.125 * Math.max(...off))
        expect(Math.max(...apartInSlope)).toBeLessThan(3e-4)
      }
    }
  })

  it('where the curve is said to matter little is still exact for cubics, and elsewhere what it is without', () => {
    const x = changingSteps(4000, 0.3)
    const closely = { first: 700, last: 2900 }
    const cubic = x.map((t) => 2 - t + 0.5 * t ** 2 + 0.1 * t ** 3)
    const exact = localPolynomial(x, cubic, { halfWidth: 0.5, degree: 3, closely })
    exact.value.forEach((value, i) => expect(value).toBeCloseTo(cubic[i] as number, 10))
    const y = x.map((t) => 3 + Math.exp(-(t * t)))
    const options = { halfWidth: 0.5, degree: 3 } as const
    const [whole, part] = [localPolynomial(x, y, options), localPolynomial(x, y, { ...options, closely })]
    for (let i = 0; i < x.length; i++) {
      const inside = i >= closely.first && i <= closely.last
      expect(Math.abs((whole.value[i] as number) - (part.value[i] as number))).toBeLessThan(inside ? 2e-5 : 1e-3)
    }
  })

  it('over cells leaves as much noise as over the rows', () => {
    // Multiplicative congruence of Park and Miller; twelve uniform numbers make a nearly normal one.
    let state = 1
    const uniform = (): number => (state = (state * 16807) % 2147483647) / 2147483647
    const x = Float64Array.from({ length: 20_000 }, (_, i) => 0.01 * i)
    const y = x.map(() => Array.from({ length: 12 }, uniform).reduce((sum, u) => sum + u, -6))
    const options = { halfWidth: 0.65, degree: 3 } as const
    const { value, slope } = localPolynomial(x, y, options)
    const fits = [...x].map((t) => localPolynomialAt(x, y, t, options))
    expect(Math.abs(rms([...value]) / rms(fits.map((fit) => fit.value)) - 1)).toBeLessThan(0.01)
    expect(Math.abs(rms([...slope]) / rms(fits.map((fit) => fit.slope)) - 1)).toBeLessThan(0.01)
  })

  it('does not lose the digits of a small change on a large offset', () => {
    const x = Float64Array.from({ length: 50 }, (_, i) => i * 0.1)
    const { slope } = localPolynomial(
      x,
      x.map((t) => 1e6 + 1e-3 * t),
      { halfWidth: 0.5, degree: 3 },
    )
    slope.forEach((value) => expect(value).toBeCloseTo(1e-3, 8))
  })
})

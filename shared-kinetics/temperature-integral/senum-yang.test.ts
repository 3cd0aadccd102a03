import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { inHalfUnits, roundedTwice } from '../check-values/as-printed.ts'
import derived from '../check-values/computed/senum-yang.json'
import printed from '../check-values/computed/temperature-integral-forms.json'
import { lnPOfX, scaledPOfX } from './p-of-x.ts'
import {
  lnPBySenumYang,
  scaledPBySenumYang,
  senumYangCoefficients,
  senumYangDegrees,
  senumYangForms,
  type SenumYangDegree,
} from './senum-yang.ts'

interface Coefficients {
  readonly numerator: readonly number[]
  readonly denominator: readonly number[]
}

/** x N(x)/D(x) / π(x) - 1 in whole numbers of 35 digits, since most of these errors lie below what double precision can tell. */
function exactError({ numerator, denominator }: Coefficients, x: number, scaled: string): number {
  const at = (coefficients: readonly number[]): bigint => coefficients.reduce((sum, c) => sum * BigInt(x) + BigInt(c), 0n)
  const digits = scaled.slice(2)
  const unit = 10n ** BigInt(digits.length)
  const ratio = (BigInt(x) * at(numerator) * unit * unit) / (at(denominator) * BigInt(digits))
  return Number(ratio - unit) / Number(unit)
}

const scaledAt = (x: number): string => derived.scaled[derived.x.indexOf(x)] as string
const with88: Coefficients = { numerator: [1, 18, 88, 96], denominator: senumYangCoefficients[4].denominator }

describe('the rational forms of Senum and Yang', () => {
  it('have the coefficients that follow from the asymptotic series by exact fractions', () => {
    for (const { degree, numerator, denominator } of derived.degrees) {
      const form = senumYangCoefficients[degree as SenumYangDegree]
      expect(form.numerator, `N, degree ${degree}`).toEqual(numerator)
      expect(form.denominator, `D, degree ${degree}`).toEqual(denominator)
    }
    expect(senumYangDegrees).toEqual(derived.degrees.map((row) => row.degree))
  })

  // Table of relative errors by degree, 40-digit arithmetic.
  it.each(printed.senumYang.rows)('degree $degree has the printed error at every x', ({ degree, percent }) => {
    const coefficients = degree === '4 (88)' ? with88 : senumYangCoefficients[Number(degree.slice(0, 1)) as SenumYangDegree]
    printed.senumYang.x.forEach((x, k) => {
      const error = 100 * exactError(coefficients, x, scaledAt(x))
      expect(inHalfUnits(error, percent[k] as string), `x ${x}: ${error}`).toBeLessThanOrEqual(roundedTwice)
    })
  })

  it('give these errors in double precision too, as far as it can tell', () => {
    for (const { degree, relativeError } of derived.degrees) {
      derived.x.forEach((x, k) => {
        const error = scaledPBySenumYang(x, degree as SenumYangDegree) / Number(derived.scaled[k]) - 1
        expect(Math.abs(error - Number(relativeError[k])), `degree ${degree}, x ${x}`).toBeLessThan(1e-15 + 1e-7 * Math.abs(error))
      })
    }
  })

  it('take 86 in the 4th degree: with the misprinted 88 p is wrong by 0.9 % at x = 5, where 86 leaves 0.003 %', () => {
    expect(senumYangCoefficients[4].numerator[2]).toBe(86)
    expect(100 * exactError(senumYangCoefficients[4], 5, scaledAt(5))).toBeCloseTo(-0.0031, 4)
    expect(100 * exactError(with88, 5, scaledAt(5))).toBeCloseTo(0.905, 3)
    expect(100 * exactError(with88, 30, scaledAt(30))).toBeCloseTo(0.131, 3)
  })

  it('do not take the coefficients of the 7th and 8th degree that are passed on: these are wrong by 0.58 % and 2.8 % at x = 5', () => {
    // As remembered from secondary sources.
    const seventh = { ...senumYangCoefficients[7], numerator: [1, 54, 1070, 9720, 41112, 75912, 35280] }
    const eighth = { ...senumYangCoefficients[8], numerator: [1, 70, 1886, 24920, 170136, 577584, 844560, 357120] }
    expect(inHalfUnits(100 * exactError(seventh, 5, scaledAt(5)), '0.58')).toBeLessThanOrEqual(1)
    expect(inHalfUnits(100 * exactError(eighth, 5, scaledAt(5)), '2.8')).toBeLessThanOrEqual(1)
    expect(Math.abs(exactError(senumYangCoefficients[7], 5, scaledAt(5)))).toBeLessThan(2e-7)
    expect(Math.abs(exactError(senumYangCoefficients[8], 5, scaledAt(5)))).toBeLessThan(5e-8)
  })

  it('stay within their stated accuracy, gain with the degree, and always take p too low', () => {
    // Two polynomials of up to eight products each, a quotient, and p itself: some dozen roundings of 1.1e-16.
    const rounding = 2e-15
    const anyX = fc.double({ min: Math.log(5), max: Math.log(5000), noNaN: true }).map(Math.exp)
    fc.assert(
      fc.property(anyX, (x) => {
        const errors = senumYangDegrees.map((degree) => scaledPBySenumYang(x, degree) / scaledPOfX(x) - 1)
        errors.forEach((error, i) => {
          expect(error).toBeLessThan(rounding)
          expect(-error).toBeLessThanOrEqual((senumYangForms[i]?.accuracy[0]?.largestError ?? Number.NaN) + rounding)
          expect(error).toBeGreaterThan((errors[i - 1] ?? -1) - rounding)
        })
      }),
    )
    for (const [i, { accuracy }] of senumYangForms.entries()) {
      const stated = accuracy[0]?.largestError ?? Number.NaN
      expect(Math.abs(Number(derived.degrees[i]?.relativeError[0])) / stated, `degree ${i + 1} is stated too wide`).toBeGreaterThan(0.99)
    }
  })

  it('neither overflow nor underflow, and join smoothly where the order of summation changes', () => {
    for (const degree of senumYangDegrees) {
      expect(scaledPBySenumYang(1e300, degree)).toBe(1)
      expect(lnPBySenumYang(1e5, degree)).toBeCloseTo(lnPOfX(1e5), 6)
      expect(scaledPBySenumYang(1e-300, degree)).toBeGreaterThan(0)
      expect(scaledPBySenumYang(1 - 1e-15, degree) / scaledPBySenumYang(1, degree)).toBeCloseTo(1, 13)
    }
  })

  it('reject other degrees and an x that is not a positive number', () => {
    expect(() => scaledPBySenumYang(10, 9 as SenumYangDegree)).toThrow(/degree 1 to 8/)
    for (const x of [0, -1, Number.NaN, Number.POSITIVE_INFINITY]) expect(() => lnPBySenumYang(x, 4)).toThrow(/Ea\/\(RT\)/)
  })
})

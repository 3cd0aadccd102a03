import { compiled, expn } from 'cephes'
import * as fc from 'fast-check'
import { beforeAll, describe, expect, it } from 'vitest'
import { inHalfUnits, roundedTwice } from '../check-values/as-printed.ts'
import exact from '../check-values/computed/p-of-x.json'
import table from '../check-values/computed/p-of-x-table.json'
import handbook from '../check-values/published/abramowitz-stegun-1964.json'
import { lnPOfX, pOfX, scaledPOfX } from './p-of-x.ts'

beforeAll(async () => {
  await compiled
})

const relative = (value: number, expected: string | number): number => Math.abs(value / Number(expected) - 1)

/** Abramowitz & Stegun 5.1.51: x eˣ E₂(x) ~ Σ (-1)ᵏ (k + 1)!/xᵏ. Its smallest term at x = 60 is below 1e-22. */
const asymptotic = (x: number): number => {
  let sum = 1
  let term = 1
  for (let k = 1; k < 60 && Math.abs(term) > 1e-18; k++) {
    term *= -(k + 1) / x
    sum += term
  }
  return sum
}

/** Abramowitz & Stegun 5.1.22 for E₂: π(x) = x/(x + 2 - 1·2/(x + 4 - 2·3/(x + 6 - …))), begun so far out that the rest is below rounding. */
const fraction = (x: number): number => {
  let denominator = 1
  for (let k = 40 + Math.ceil(900 / x); k > 0; k--) denominator = x + 2 * k - (k * (k + 1)) / denominator
  return x / denominator
}

describe('the temperature integral', () => {
  it('matches the table of p(x) from x = 5 to 100', () => {
    for (const { x, p, scaled, minusLog10P, slope } of table.rows) {
      // 16 and 17 digits are printed: what is left is the rounding of double precision.
      expect(relative(pOfX(x), p), `p(${x})`).toBeLessThan(1e-15)
      expect(relative(scaledPOfX(x), scaled), `scaled, ${x}`).toBeLessThan(5e-16)
      expect(inHalfUnits(-lnPOfX(x) / Math.LN10, minusLog10P), `log, ${x}`).toBeLessThanOrEqual(1)
      expect(inHalfUnits(1 / scaledPOfX(x), slope), `slope, ${x}`).toBeLessThanOrEqual(roundedTwice)
    }
  })

  it('agrees with the tabulated exponential integral by E₁(x) = e⁻ˣ/x - p(x) and by π(x) = x(1 - x eˣ E₁(x))', () => {
    for (const { x, e1, x_exp_x_e1 } of handbook.rows) {
      // p(x) is the smaller part of the difference, so that E₁ keeps its digits.
      expect(relative(Math.exp(-x) / x - pOfX(x), e1), `E1(${x})`).toBeLessThan(1e-15)
      // The right side itself loses the digits that cancel, which is why the program does not use it above 1.
      const cancelled = (4 * Number.EPSILON * x) / scaledPOfX(x)
      expect(relative(scaledPOfX(x), x * (1 - Number(x_exp_x_e1))), `x ${x}`).toBeLessThan(cancelled + 1e-15)
    }
  })

  it('agrees with 40-digit values from 0.001 to 5000, and where p itself cannot be held', () => {
    for (const { x, scaled, ln_p } of exact.rows) {
      expect(relative(scaledPOfX(x), scaled), `scaled, ${x}`).toBeLessThan(1e-15)
      expect(Math.abs(lnPOfX(x) - Number(ln_p)), `ln p, ${x}`).toBeLessThan(4e-16 * Math.max(8, Math.abs(Number(ln_p))))
    }
  })

  it('agrees with E₂(x)/x of another library at random x', () => {
    fc.assert(
      fc.property(fc.double({ min: Math.log(0.01), max: Math.log(600), noNaN: true }), (lnX) => {
        const x = Math.exp(lnX)
        expect(relative(pOfX(x), expn(2, x) / x)).toBeLessThan(1e-14 + 3e-16 * x)
      }),
      { numRuns: 2000 },
    )
  })

  it('agrees with its continued fraction from 0.1 to 5000, on both sides of every switch between forms', () => {
    const switches = [0.1, 1, 4, 30].flatMap((x) => [x * (1 - 1e-15), x, x * (1 + 1e-15)])
    for (const x of switches) expect(relative(scaledPOfX(x), fraction(x)), `x ${x}`).toBeLessThan(2e-15)
    fc.assert(
      fc.property(fc.double({ min: Math.log(0.1), max: Math.log(5000), noNaN: true }), (lnX) => {
        const x = Math.exp(lnX)
        expect(relative(scaledPOfX(x), fraction(x)), `x ${x}`).toBeLessThan(2e-15)
      }),
      { numRuns: 2000 },
    )
  })

  it('agrees with E₁ of another library by π(x) = x(1 - x eˣ E₁(x)) where little cancels', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 3, noNaN: true }), (x) => {
        expect(relative(scaledPOfX(x), x * (1 - x * Math.exp(x) * expn(1, x)))).toBeLessThan(1e-14)
      }),
      { numRuns: 2000 },
    )
  })

  it('agrees with its asymptotic series from x = 60 to 5000, where p itself can no longer be held', () => {
    fc.assert(
      fc.property(fc.double({ min: Math.log(60), max: Math.log(5000), noNaN: true }), (lnX) => {
        const x = Math.exp(lnX)
        expect(relative(scaledPOfX(x), asymptotic(x))).toBeLessThan(2e-15)
        expect(Math.abs(lnPOfX(x) + x + 2 * Math.log(x) - Math.log(asymptotic(x)))).toBeLessThan(1e-15 * x + 1e-14)
      }),
    )
  })

  it('neither overflows nor underflows in its scaled forms', () => {
    expect(scaledPOfX(1e12)).toBeCloseTo(1, 11)
    expect(lnPOfX(1e6)).toBeCloseTo(-1e6 - 2 * Math.log(1e6), 4)
    expect(pOfX(800)).toBe(0)
    expect(scaledPOfX(1e-8) / 1e-8).toBeCloseTo(1, 6)
  })

  it('rejects an x that is not a positive number', () => {
    for (const x of [0, -1, Number.NaN, Number.POSITIVE_INFINITY]) expect(() => scaledPOfX(x)).toThrow(/Ea\/\(RT\)/)
  })
})

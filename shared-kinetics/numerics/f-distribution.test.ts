import { compiled, fdtr, fdtrc, fdtri } from 'cephes'
import * as fc from 'fast-check'
import { beforeAll, describe, expect, it } from 'vitest'
import { fProbability, fQuantile, fUpperTail } from './f-distribution.ts'
import { lnBeta } from './ln-beta.ts'
import { studentTQuantile } from './student-t.ts'

beforeAll(async () => {
  await compiled
})

const degrees = fc.integer({ min: 1, max: 60 })
const share = fc.double({ min: 1e-4, max: 1 - 1e-4, noNaN: true })

describe('the F distribution', () => {
  // F(0.95; n - 1, n - 1) as any printed table has it.
  it.each([
    [3, '19.000'],
    [4, '9.2766'],
    [5, '6.3882'],
    [6, '5.0503'],
    [7, '4.2839'],
    [8, '3.7870'],
    [10, '3.1789'],
  ])('for %i runs at 0.95 prints as %s', (runs, printed) => {
    expect(fQuantile(0.95, runs - 1, runs - 1).toFixed(printed.split('.')[1]?.length)).toBe(printed)
  })

  it('has the quantiles of another library at random probabilities and degrees of freedom', () => {
    fc.assert(
      fc.property(share, degrees, degrees, (probability, dof1, dof2) => {
        // The other library's function takes the probability above.
        expect(Math.abs(fQuantile(probability, dof1, dof2) / fdtri(dof1, dof2, 1 - probability) - 1)).toBeLessThan(1e-11)
      }),
      { numRuns: 2000 },
    )
  })

  it('has the probabilities of another library below and above a value', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 100, noNaN: true }), degrees, degrees, (f, dof1, dof2) => {
        expect(Math.abs(fProbability(f, dof1, dof2) / fdtr(dof1, dof2, f) - 1)).toBeLessThan(1e-11)
        expect(Math.abs(fUpperTail(f, dof1, dof2) / fdtrc(dof1, dof2, f) - 1)).toBeLessThan(1e-11)
      }),
      { numRuns: 2000 },
    )
  })

  it('is the square of Student t for one degree of freedom of the numerator', () => {
    for (const dof of [1, 2, 3, 5.5, 20, 1000]) {
      const t = studentTQuantile(0.975, dof)
      expect(Math.abs(fQuantile(0.95, 1, dof) / (t * t) - 1)).toBeLessThan(1e-13)
    }
  })

  it('follows the closed form for two degrees of freedom of the numerator, far into both tails', () => {
    // P(F > f) = (1 + 2f/d)^(-d/2).
    for (const dof of [1, 3, 50, 1e4]) {
      for (const f of [1e-8, 0.3, 4, 100]) {
        const exact = -(dof / 2) * Math.log1p((2 * f) / dof)
        expect(Math.abs(Math.log(fUpperTail(f, 2, dof)) / exact - 1), `${dof} ${f}`).toBeLessThan(f < 1e-3 ? 1e-7 : 1e-12)
      }
    }
    expect(Math.abs(fQuantile(0.999, 2, 2) / 999 - 1)).toBeLessThan(1e-12)
    expect(Math.abs(fQuantile(1e-12, 2, 2) / (1e-12 / (1 - 1e-12)) - 1)).toBeLessThan(1e-13)
  })

  it('has a quantile that its probability undoes, whole degrees or not', () => {
    const positive = fc.double({ min: 0.3, max: 2000, noNaN: true })
    fc.assert(
      fc.property(share, positive, positive, (probability, dof1, dof2) => {
        expect(Math.abs(fProbability(fQuantile(probability, dof1, dof2), dof1, dof2) / probability - 1)).toBeLessThan(1e-11)
      }),
    )
  })

  it('is empty below 0 and whole at infinity', () => {
    expect(fProbability(0, 3, 4)).toBe(0)
    expect(fUpperTail(0, 3, 4)).toBe(1)
    expect(fUpperTail(-1, 3, 4)).toBe(1)
    expect(fProbability(Number.POSITIVE_INFINITY, 3, 4)).toBe(1)
    expect(fUpperTail(Number.POSITIVE_INFINITY, 3, 4)).toBe(0)
    expect(fProbability(Number.NaN, 3, 4)).toBeNaN()
    expect(fUpperTail(Number.NaN, 3, 4)).toBeNaN()
  })

  it('rejects what is no probability and no number of degrees of freedom', () => {
    for (const bad of [0, 1, 1.2, Number.NaN]) expect(() => fQuantile(bad, 3, 3)).toThrow(/probability/)
    for (const bad of [0, -1, Number.NaN, Number.POSITIVE_INFINITY]) {
      expect(() => fQuantile(0.5, bad, 3)).toThrow(/degrees/)
      expect(() => fUpperTail(1, 3, bad)).toThrow(/degrees/)
    }
  })
})

describe('ln of the beta function', () => {
  it('matches closed values', () => {
    expect(lnBeta(0.5, 0.5)).toBeCloseTo(Math.log(Math.PI), 14)
    expect(lnBeta(1, 1)).toBeCloseTo(0, 14)
    expect(Math.abs(lnBeta(1, 1e9) / -Math.log(1e9) - 1)).toBeLessThan(1e-14)
    // B(m, n) = (m - 1)!(n - 1)!/(m + n - 1)!
    expect(Math.abs(lnBeta(5, 7) / Math.log((24 * 720) / 39916800) - 1)).toBeLessThan(1e-14)
    // B(20, 30) = 19!·29!/49! = 1/(20·C(49, 20)), C(49, 20) = 28277527346376.
    expect(Math.abs(lnBeta(20, 30) / -Math.log(20 * 28277527346376) - 1)).toBeLessThan(1e-14)
  })
})

import { describe, expect, it } from 'vitest'
import noIntercept1 from '../check-values/certified/nist-no-intercept-1.json'
import noIntercept2 from '../check-values/certified/nist-no-intercept-2.json'
import { lineThroughOrigin } from './line-through-origin.ts'

const digits = (value: number, certified: string): number => -Math.log10(Math.abs(value / Number(certified) - 1) || 1e-16)

describe('a line through the origin', () => {
  it('matches the certified values of NIST NoInt1', () => {
    const { certified } = noIntercept1
    const fit = lineThroughOrigin(noIntercept1.x, noIntercept1.y)
    expect(fit.status).toBe('ok')
    expect(fit.dof).toBe(certified.dof)
    expect(digits(fit.slope, certified.slope)).toBeGreaterThan(14)
    expect(digits(fit.slopeStandardError, certified.slopeStandardError)).toBeGreaterThan(13.5)
    expect(digits(fit.residualStandardDeviation, certified.residualStandardDeviation)).toBeGreaterThan(13.5)
    expect(digits(fit.r2, certified.r2)).toBeGreaterThan(14)
  })

  it('matches the certified values of NIST NoInt2', () => {
    const { certified } = noIntercept2
    const fit = lineThroughOrigin(noIntercept2.x, noIntercept2.y)
    expect(fit.dof).toBe(certified.dof)
    expect(digits(fit.slope, certified.slope)).toBeGreaterThan(14)
    expect(digits(fit.slopeStandardError, certified.slopeStandardError)).toBeGreaterThan(13.5)
    expect(digits(fit.residualSumOfSquares, certified.residualSumOfSquares)).toBeGreaterThan(13.5)
    expect(digits(fit.r2, certified.r2)).toBeGreaterThan(14)
  })

  it('says so where there is none, and has no standard error from one point', () => {
    expect(lineThroughOrigin([], []).status).toBe('too-few-points')
    expect(lineThroughOrigin([0, 0], [1, 2])).toMatchObject({ status: 'x-all-zero', slope: Number.NaN })
    const one = lineThroughOrigin([2], [3])
    expect(one).toMatchObject({ status: 'ok', slope: 1.5, dof: 0 })
    expect(one.slopeStandardError).toBeNaN()
  })

  it('rejects columns of unlike length and values that are not finite', () => {
    expect(() => lineThroughOrigin([1], [1, 2])).toThrow(/as many/)
    expect(() => lineThroughOrigin([1, Number.NaN], [1, 2])).toThrow(/finite/)
  })
})

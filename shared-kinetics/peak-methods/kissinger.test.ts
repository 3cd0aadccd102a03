import { describe, expect, it } from 'vitest'
import sets from '../check-values/computed/exact-single-step.json'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { perMinuteToPerSecond } from '../units/convert.ts'
import { quantity } from '../units/quantity.ts'
import { kissinger } from './kissinger.ts'
import type { RatePeak } from './peak-line.ts'

const peaks = (heatingRate_K_per_min: readonly number[], temperature_K: readonly (number | string)[]): RatePeak[] =>
  heatingRate_K_per_min.map((beta, i) => ({
    heatingRate: perMinuteToPerSecond(beta),
    temperature: quantity(Number(temperature_K[i]), 'K'),
    programmeGroup: i,
  }))

describe('Kissinger', () => {
  it.each(sets.sets.filter((set) => set.peak !== null))(
    'recovers Ea and ln A of $name, where its condition is exact',
    ({ peak, Ea_kJ_per_mol }) => {
      const result = kissinger(peaks(sets.heatingRate_K_per_min, peak?.temperature_K ?? []))
      expect(result.status).toBe('ok')
      expect((result.Ea / 1000).toFixed(4)).toBe(peak?.kissinger_Ea_kJ_per_mol)
      expect(Number(peak?.kissinger_Ea_kJ_per_mol)).toBe(Ea_kJ_per_mol)
      // Peak temperatures printed to 5e-8 K leave ln A open by some 1e-8.
      expect(Math.abs(result.lnA - (Number(peak?.lnA_per_min) - Math.log(60)))).toBeLessThan(1e-7)
      expect(result.standardError / result.Ea).toBeLessThan(1e-8)
    },
  )

  it('gives the standard error of the line and an interval of t(0.975; n - 2) of them', () => {
    // The disturbed line of the check values is ln(beta/T²) against 1/T as well.
    const T = [543.2734554 + 0.5, 551.5393729 - 0.5, 562.8516587 + 0.3, 571.7152822 - 0.3, 580.8561692]
    const result = kissinger(peaks([1, 2, 5, 10, 20], T))
    expect((result.Ea / 1000).toFixed(4)).toBe('201.3324')
    expect((result.standardError / 1000).toFixed(4)).toBe('3.3204')
    expect(((result.upper95 - result.lower95) / 2000).toFixed(4)).toBe('10.5669')
    expect(result.lnA).toBeCloseTo(31.965173 - Math.log(60) + Math.log(result.Ea / gasConstant_J_per_mol_K), 5)
  })

  it('gives the standard error of ln A that first-order propagation gives', () => {
    const T = [543.8, 551.0, 563.1, 571.4, 580.9]
    const result = kissinger(peaks([1, 2, 5, 10, 20], T))
    // var(ln A) = s²·Σ(∂ ln A/∂yᵢ)², the derivatives taken numerically: multiplying beta_i by e^d moves y_i alone by d.
    const d = 1e-5
    const slopes = T.map((_, i) => {
      const moved = (sign: number): number =>
        kissinger(
          peaks([1, 2, 5, 10, 20], T).map((peak, j) =>
            j === i ? { ...peak, heatingRate: quantity(peak.heatingRate * Math.exp(sign * d), 'K/s') } : peak,
          ),
        ).lnA
      return (moved(1) - moved(-1)) / (2 * d)
    })
    const { x_per_K, y, slope_K, intercept } = result.line
    const residual = y.reduce((sum, value, i) => sum + (value - intercept - slope_K * (x_per_K[i] ?? Number.NaN)) ** 2, 0)
    const expected = Math.sqrt((residual / result.dof) * slopes.reduce((sum, value) => sum + value * value, 0))
    expect(result.lnAStandardError / expected).toBeCloseTo(1, 5)
  })

  it('with two programmes gives Ea and no standard error, with fewer says so', () => {
    const two = kissinger(peaks([5, 10], [500, 508]))
    expect(two.status).toBe('ok')
    expect(two.Ea).toBeGreaterThan(0)
    for (const value of [two.standardError, two.lower95, two.upper95, two.lnAStandardError]) expect(value).toBeNaN()
    const replicates = peaks([5, 5.01], [500, 501]).map((peak) => ({ ...peak, programmeGroup: 0 }))
    for (const few of [kissinger([]), kissinger(replicates)]) {
      expect(few.status).toBe('too-few-programmes')
      expect([few.Ea, few.lnA]).toEqual([Number.NaN, Number.NaN])
    }
  })

  it('says where no energy follows', () => {
    expect(kissinger(peaks([5, 10, 20], [500, 500, 500])).status).toBe('line-not-determined')
    const backwards = kissinger(peaks([5, 10, 20], [520, 510, 500]))
    expect(backwards.status).toBe('energy-not-positive')
    expect(backwards.Ea).toBeNaN()
  })

  it('refuses a peak that is none', () => {
    expect(() => kissinger(peaks([5, 0, 20], [500, 510, 520]))).toThrow(/positive heating rate; peak 2/)
    expect(() => kissinger(peaks([5, 10, 20], [500, 510, Number.NaN]))).toThrow(/peak 3/)
  })
})

import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import peakSets from '../check-values/computed/rate-peaks.json'
import { peaksOf, propagatedError } from '../check-values/peaks-of-values.ts'
import { lineFit } from '../numerics/line-fit.ts'
import { quantity } from '../units/quantity.ts'
import { astmE2890 } from './astm-e2890.ts'
import { astmE698 } from './astm-e698.ts'
import { augisBennett, augisBennettWithoutStart } from './augis-bennett.ts'
import { kissinger } from './kissinger.ts'
import { ozawaPeak, ozawaPeakCorrected } from './ozawa-peak.ts'
import type { PeakEstimate } from './peak-line.ts'

const rates = peakSets.heatingRate_K_per_min
const methods = { kissinger, astmE698, astmE2890, ozawaPeak, ozawaPeakCorrected, augisBennett, augisBennettWithoutStart }
const everyMethod = Object.entries(methods).map(([name, method]) => ({ name, method }))
const measured = [543.8, 551.0, 563.1, 571.4, 580.9]

describe('exact peaks of one-step reactions', () => {
  describe.each(peakSets.sets)('$model $parameter, Ea $Ea_kJ_per_mol kJ/mol', (set) => {
    const peaks = peaksOf(rates, set.peak_K, (i) => ({ conversion: Number(set.conversionAtPeak[i]) }))
    const same = (estimate: PeakEstimate, Ea: string, lnA?: string): void => {
      expect(estimate.status).toBe('ok')
      expect(Math.abs(estimate.Ea / Number(Ea) - 1)).toBeLessThan(1e-12)
      if (lnA === undefined) expect(estimate.lnA).toBeNaN()
      else expect(Math.abs(estimate.lnA / Number(lnA) - 1)).toBeLessThan(1e-12)
    }

    it('Kissinger', () => same(kissinger(peaks), set.kissinger.Ea_J_per_mol, set.kissinger.lnA_per_s))
    it('ASTM E698', () => {
      const estimate = astmE698(peaks)
      same(estimate, set.e698.Ea_J_per_mol, set.e698.lnZ_per_s)
      expect(Math.abs(estimate.firstEstimate / Number(set.e698.firstEstimate_J_per_mol) - 1)).toBeLessThan(1e-12)
      expect(estimate.middlePeak).toBeCloseTo(Number(set.peak_K[2]), 10)
    })
    it('Ozawa, as published and corrected', () => {
      same(ozawaPeak(peaks), set.ozawa_Ea_J_per_mol)
      same(ozawaPeakCorrected(peaks), set.ozawaCorrected_Ea_J_per_mol)
    })
    it('Augis–Bennett, with and without T0', () => {
      same(augisBennett(peaks), set.augisBennett.Ea_J_per_mol, set.augisBennett.lnA_per_s)
      same(augisBennettWithoutStart(peaks), set.augisBennettWithoutStart.Ea_J_per_mol, set.augisBennettWithoutStart.lnA_per_s)
    })
  })
})

describe('every method on peaks', () => {
  it.each(everyMethod)('$name does not mind the order of the runs', ({ method }) => {
    fc.assert(
      fc.property(fc.shuffledSubarray([0, 1, 2, 3, 4], { minLength: 5 }), (order) => {
        const peaks = peaksOf(rates, measured)
        const shuffled = method(order.flatMap((i) => peaks[i] ?? []))
        const straight = method(peaks)
        for (const key of ['Ea', 'standardError', 'upper95', 'r2'] as const) expect(shuffled[key] / straight[key]).toBeCloseTo(1, 9)
        expect([shuffled.status, shuffled.dof]).toEqual([straight.status, straight.dof])
      }),
    )
  })

  it.each(everyMethod)('$name: Ea does not depend on the unit of the heating rate, ln A follows it', ({ method }) => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 100, noNaN: true }), (factor) => {
        const one = method(peaksOf(rates, measured))
        const other = method(
          peaksOf(
            rates.map((rate) => rate * factor),
            measured,
          ),
        )
        expect(other.Ea / one.Ea).toBeCloseTo(1, 10)
        expect(other.standardError / one.standardError).toBeCloseTo(1, 9)
        if (!Number.isNaN(one.lnA)) expect(other.lnA - one.lnA).toBeCloseTo(Math.log(factor), 9)
      }),
    )
  })

  it.each(everyMethod)('$name: standard errors and covariance are those of first-order propagation', ({ method }) => {
    const peaks = peaksOf(rates, measured)
    const estimate = method(peaks)
    const { x_per_K, y } = estimate.line
    // ASTM E698 shows log beta; errors are those of ln beta.
    const s = lineFit(x_per_K, y).residualStandardDeviation * (method === astmE698 ? Math.LN10 : 1)
    const error = (read: (estimate: PeakEstimate) => number): number => propagatedError(peaks, s, (moved) => read(method([...moved])))
    expect(estimate.standardError / error(({ Ea }) => Ea)).toBeCloseTo(1, 5)
    if (Number.isNaN(estimate.lnA)) return
    expect(estimate.lnAStandardError / error(({ lnA }) => lnA)).toBeCloseTo(1, 5)
    // var(Ea/1e5 + ln A) brings in the covariance alone besides the two variances.
    const both = error(({ Ea, lnA }) => Ea / 1e5 + lnA) ** 2
    const expected = (both - (estimate.standardError / 1e5) ** 2 - estimate.lnAStandardError ** 2) / 2
    expect(estimate.covarianceEaLnA / 1e5 / expected).toBeCloseTo(1, 4)
  })

  it.each(everyMethod)('$name counts distinct programmes, and replicates as points of their own', ({ method }) => {
    const two = method(peaksOf([5, 10], [500, 508]))
    expect(two.status).toBe('ok')
    expect(two.Ea).toBeGreaterThan(0)
    expect(two.dof).toBe(0)
    for (const value of [two.standardError, two.lower95, two.upper95, two.lnAStandardError, two.covarianceEaLnA, two.r2])
      expect(value).toBeNaN()

    const replicates = method(peaksOf([5, 5, 10, 10], [500, 500.6, 508, 508.4], (i) => ({ programmeGroup: i >> 1 })))
    expect(replicates.status).toBe('ok')
    expect(replicates.standardError).toBeNaN()

    const four = method(peaksOf([5, 10, 10, 20], [500, 508, 508.4, 516], (i) => ({ programmeGroup: [0, 1, 1, 2][i] ?? 0 })))
    expect(four.dof).toBe(2)
    expect(four.standardError).toBeGreaterThan(0)

    const one = method(peaksOf([5, 5], [500, 501], () => ({ programmeGroup: 0 })))
    expect(one.status).toBe('too-few-programmes')
    expect([one.Ea, one.lnA]).toEqual([Number.NaN, Number.NaN])
    expect(method([]).status).toBe('too-few-programmes')
  })

  it.each(everyMethod)('$name says where no energy follows, and refuses peaks that are none', ({ method }) => {
    expect(method(peaksOf([5, 10, 20], [500, 500, 500])).status).toBe('line-not-determined')
    const backwards = method(peaksOf([5, 10, 20], [520, 510, 500]))
    expect(backwards.status).toBe('energy-not-positive')
    expect([backwards.Ea, backwards.lnA, backwards.upper95]).toEqual([Number.NaN, Number.NaN, Number.NaN])
    expect(() => method(peaksOf([5, 0, 20], [500, 510, 520]))).toThrow(/positive heating rate; peak 2/)
    expect(() => method(peaksOf([5, 10, 20], [500, 510, Number.NaN], () => ({ start: quantity(0, 'K') })))).toThrow(/peak 3/)
  })
})

import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import peakSets from '../check-values/computed/rate-peaks.json'
import { peaksOf, propagatedError } from '../check-values/peaks-of-values.ts'
import { lineFit } from '../numerics/line-fit.ts'
import type { FullRatePeak } from '../tasks/peak-run.ts'
import { quantity } from '../units/quantity.ts'
import { astmE2890 } from './astm-e2890.ts'
import { astmE698 } from './astm-e698.ts'
import { augisBennett, augisBennettWithoutStart } from './augis-bennett.ts'
import { kissinger } from './kissinger.ts'
import { ozawaPeak, ozawaPeakCorrected } from './ozawa-peak.ts'
import type { PeakEstimate } from './peak-line.ts'

const rates = peakSets.heatingRate_K_per_min
type Method = (peaks: readonly FullRatePeak[]) => PeakEstimate
const methods: Readonly<Record<string, Method>> = {
  kissinger,
  astmE698,
  astmE2890,
  ozawaPeak,
  ozawaPeakCorrected,
  augisBennett,
  augisBennettWithoutStart,
}
const everyMethod = Object.entries(methods).map(([name, method]) => ({ name, method }))
const withoutA = new Set<Method>([ozawaPeak, ozawaPeakCorrected])

/** A method's estimate from five peaks that lie off a line, and the standard error that propagation gives any number read from it. */
function errorsOf(method: Method): { estimate: PeakEstimate; error: (read: (estimate: PeakEstimate) => number) => number } {
  const peaks = peaksOf(rates, measured)
  const estimate = method(peaks)
  const { x_per_K, y } = estimate.line
  // ASTM E698 shows log beta; errors are those of ln beta.
  const s = lineFit(x_per_K, y).residualStandardDeviation * (method === astmE698 ? Math.LN10 : 1)
  return { estimate, error: (read) => propagatedError(peaks, s, (moved) => read(method(moved))) }
}

const measured = [543.8, 551.0, 563.1, 571.4, 580.9]

const without = Number.NaN

describe.each(peakSets.sets)('exact peaks of a reaction $model $parameter, Ea $Ea_kJ_per_mol kJ/mol', (set) => {
  const peaks = peaksOf(rates, set.peak_K, (i) => ({ conversion: Number(set.conversionAtPeak[i]) }))

  it.each([
    { method: kissinger, Ea: set.kissinger.Ea_J_per_mol, lnA: Number(set.kissinger.lnA_per_s) },
    { method: astmE698, Ea: set.e698.Ea_J_per_mol, lnA: Number(set.e698.lnZ_per_s) },
    { method: ozawaPeak, Ea: set.ozawa_Ea_J_per_mol, lnA: without },
    { method: ozawaPeakCorrected, Ea: set.ozawaCorrected_Ea_J_per_mol, lnA: without },
    { method: augisBennett, Ea: set.augisBennett.Ea_J_per_mol, lnA: Number(set.augisBennett.lnA_per_s) },
    {
      method: augisBennettWithoutStart,
      Ea: set.augisBennettWithoutStart.Ea_J_per_mol,
      lnA: Number(set.augisBennettWithoutStart.lnA_per_s),
    },
  ])('$method.name gives what 40 digits give', ({ method, Ea, lnA }) => {
    const estimate = method(peaks)
    expect(estimate.status).toBe('ok')
    expect(estimate.Ea / Number(Ea)).toBeCloseTo(1, 12)
    expect(Number.isNaN(estimate.lnA)).toBe(Number.isNaN(lnA))
    expect(Math.abs(estimate.lnA / lnA - 1) > 1e-12).toBe(false)
  })

  it('ASTM E698 refines its first estimate at the middle heating rate', () => {
    const estimate = astmE698(peaks)
    expect(estimate.firstEstimate / Number(set.e698.firstEstimate_J_per_mol)).toBeCloseTo(1, 12)
    expect(estimate.middlePeak).toBeCloseTo(Number(set.peak_K[2]), 10)
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
        const shift = other.lnA - one.lnA
        expect(Number.isNaN(shift)).toBe(withoutA.has(method))
        expect(Math.abs(shift - Math.log(factor)) > 1e-9).toBe(false)
      }),
    )
  })

  it.each(everyMethod)('$name: the standard error of Ea is that of first-order propagation', ({ method }) => {
    const { estimate, error } = errorsOf(method)
    expect(estimate.standardError / error(({ Ea }) => Ea)).toBeCloseTo(1, 5)
  })

  it.each(everyMethod.filter(({ method }) => !withoutA.has(method)))('$name: so are those of ln A', ({ method }) => {
    const { estimate, error } = errorsOf(method)
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

import { describe, expect, it } from 'vitest'
import peakSets from '../check-values/computed/rate-peaks.json'
import { peaksOf } from '../check-values/peaks-of-values.ts'
import { kissingerForModel } from './kissinger-for-model.ts'
import { kissinger } from './kissinger.ts'

const rates = peakSets.heatingRate_K_per_min

/** f' written out for both families. */
function derivativeOf(model: string, k: number): (alpha: number) => number {
  if (model === 'nth-order') return (alpha) => -k * (1 - alpha) ** (k - 1)
  return (alpha) => {
    const L = -Math.log1p(-alpha)
    return k * ((1 - 1 / k) * L ** (-1 / k) - L ** (1 - 1 / k))
  }
}

describe("Kissinger's line for a given model", () => {
  it.each(peakSets.sets)('recovers Ea and ln A of $model $parameter exactly', (set) => {
    const peaks = peaksOf(rates, set.peak_K, (i) => ({ conversion: Number(set.conversionAtPeak[i]) }))
    const result = kissingerForModel(peaks, derivativeOf(set.model, set.parameter))
    expect(result.status).toBe('ok')
    expect(Math.abs(result.Ea / (1000 * set.Ea_kJ_per_mol) - 1)).toBeLessThan(1e-11)
    expect(Math.abs(result.lnA - Number(set.lnA_per_s))).toBeLessThan(1e-9)
    expect(result.standardError / result.Ea).toBeLessThan(1e-10)
  })

  it.each(peakSets.sets.filter((set) => set.model === 'nth-order' && set.parameter === 1))(
    "has one f' for first order, Ea $Ea_kJ_per_mol, where Kissinger's own Ea is exact",
    (set) => {
      const peaks = peaksOf(rates, set.peak_K, (i) => ({ conversion: Number(set.conversionAtPeak[i]) }))
      const { derivativeAtPeak, derivativeSpread } = kissingerForModel(peaks, derivativeOf(set.model, set.parameter))
      expect([...derivativeAtPeak]).toEqual(rates.map(() => -1))
      expect(derivativeSpread).toBe(0)
      expect(Math.abs(kissinger(peaks).Ea / (1000 * set.Ea_kJ_per_mol) - 1)).toBeLessThan(1e-12)
    },
  )

  it.each(peakSets.sets.filter((set) => set.model !== 'nth-order' || set.parameter !== 1))(
    "shows by the spread of f' how far Kissinger's own Ea of $model $parameter is off",
    (set) => {
      const peaks = peaksOf(rates, set.peak_K, (i) => ({ conversion: Number(set.conversionAtPeak[i]) }))
      const { derivativeSpread } = kissingerForModel(peaks, derivativeOf(set.model, set.parameter))
      const error = Math.abs(kissinger(peaks).Ea / (1000 * set.Ea_kJ_per_mol) - 1)
      // What ln(-f') changes by from end to end turns the line: by its share of the 3 that ln beta spans, and less for what is straight in it.
      expect(derivativeSpread).toBeGreaterThan(1e-4)
      expect(error).toBeGreaterThan(1e-5)
      expect(error).toBeLessThan(derivativeSpread)
    },
  )

  it("gives A as the condition of the peak has it, A = -beta Ea/(R Tp² f') exp(Ea/(R Tp)), where f' is one", () => {
    const peaks = peaksOf([2, 5, 10], [500, 512, 521])
    const one = kissinger(peaks)
    const other = kissingerForModel(peaks, () => -2)
    expect(other.Ea).toBeCloseTo(one.Ea, 6)
    expect(other.lnA).toBeCloseTo(one.lnA - Math.log(2), 10)
    expect(other.derivativeSpread).toBe(0)
  })

  it('refuses a model without a peak there, and a conversion that is none', () => {
    const peaks = peaksOf([2, 5, 10], [500, 512, 521])
    expect(() => kissingerForModel(peaks, (alpha) => 1 - alpha)).toThrow(/no rate peak at conversion 0\.6 \(peak 1\)/)
    expect(() =>
      kissingerForModel(
        peaksOf([2, 5], [500, 512], () => ({ conversion: Number.NaN })),
        () => -1,
      ),
    ).toThrow(/conversion at peak 1 is NaN/)
  })
})

import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import sets from '../check-values/computed/exact-single-step.json'
import peakSets from '../check-values/computed/rate-peaks.json'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { perMinuteToPerSecond } from '../units/convert.ts'
import { quantity } from '../units/quantity.ts'
import { firstOrderPeakConversion, firstOrderPeakTemperature } from './first-order-peak.ts'

describe('the rate peak of a first-order reaction', () => {
  it.each(sets.sets.filter((set) => set.peak !== null))(
    'stands for $name where it was computed to 20 digits',
    ({ peak, Ea_kJ_per_mol, A_per_min }) => {
      sets.heatingRate_K_per_min.forEach((beta, i) => {
        const T = firstOrderPeakTemperature(quantity(1000 * Ea_kJ_per_mol, 'J/mol'), Math.log(A_per_min / 60), perMinuteToPerSecond(beta))
        // The table has R rounded to 8.314462618, which moves a temperature by up to 1e-8 K, beside half its last digit.
        expect(Math.abs(T - Number(peak?.temperature_K[i]))).toBeLessThan(6e-8)
      })
    },
  )

  it.each(peakSets.firstOrderConversionAtPeak)('is at conversion $conversionAtPeak where Ea/(R Tp) = $x', ({ x, conversionAtPeak }) => {
    expect(firstOrderPeakConversion(x)).toBeCloseTo(Number(conversionAtPeak), 14)
  })

  it('rounds to the conversions tabulated for x = 10, 15, 20, 25, 30, 40, 60', () => {
    const tabulated = ['0.56987', '0.58850', '0.59851', '0.60478', '0.60907', '0.61458', '0.62025']
    expect([10, 15, 20, 25, 30, 40, 60].map((x) => firstOrderPeakConversion(x).toFixed(5))).toEqual(tabulated)
    expect(firstOrderPeakConversion(1e6)).toBeCloseTo(1 - Math.exp(-1), 5)
  })

  it('meets beta Ea/(R Tp²) = A exp(-Ea/(R Tp)) for any Ea, A and heating rate', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1e4, max: 1e6, noNaN: true }),
        fc.double({ min: -5, max: 500, noNaN: true }),
        fc.double({ min: 1e-4, max: 1e4, noNaN: true }),
        (Ea, lnA, beta) => {
          const T = firstOrderPeakTemperature(quantity(Ea, 'J/mol'), lnA, quantity(beta, 'K/s'))
          const x = Ea / (gasConstant_J_per_mol_K * T)
          const left = Math.log((beta * x) / T)
          expect(Math.abs(left - (lnA - x))).toBeLessThan(1e-12 * (1 + Math.abs(lnA) + x))
        },
      ),
    )
  })

  it('refuses a heating rate or an Ea that is not above 0', () => {
    expect(() => firstOrderPeakTemperature(quantity(0, 'J/mol'), 10, quantity(1, 'K/s'))).toThrow(/above 0/)
    expect(() => firstOrderPeakTemperature(quantity(1e5, 'J/mol'), 10, quantity(-1, 'K/s'))).toThrow(/above 0/)
  })
})

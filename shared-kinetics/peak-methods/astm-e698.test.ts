import { describe, expect, it } from 'vitest'
import sets from '../check-values/computed/exact-single-step.json'
import { peaksOf, propagatedError } from '../check-values/peaks-of-values.ts'
import { lineFit } from '../numerics/line-fit.ts'
import { lnPOfX, scaledPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { kelvinToCelsius } from '../units/convert.ts'
import { quantity } from '../units/quantity.ts'
import { astmE698 } from './astm-e698.ts'
import { energyFromSlope } from './energy-from-slope.ts'
import { halfLifeTemperature } from './half-life-temperature.ts'
import { middleProgramme } from './middle-programme.ts'

describe('the temperature of a half-life', () => {
  it.each([
    // T½ = E/(R ln(Z t½/ln 2)) for 60 min, computed to 40 digits; Z in 1/min.
    { Ea_kJ_per_mol: 140, Z_per_min: 1e16, celsius: '134.531' },
    { Ea_kJ_per_mol: 180, Z_per_min: 1e20, celsius: '155.437' },
  ])('for Ea $Ea_kJ_per_mol kJ/mol is $celsius °C', ({ Ea_kJ_per_mol, Z_per_min, celsius }) => {
    const Ea = quantity(1000 * Ea_kJ_per_mol, 'J/mol')
    const T = halfLifeTemperature(Ea, Math.log(Z_per_min / 60), 3600)
    expect(kelvinToCelsius(T).toFixed(3)).toBe(celsius)
    const k = Math.exp(Math.log(Z_per_min / 60) - Ea / (gasConstant_J_per_mol_K * T))
    expect(k * 3600).toBeCloseTo(Math.LN2, 12)
  })

  it('is not to be had where the reaction is too slow at any temperature', () => {
    expect(halfLifeTemperature(quantity(1e5, 'J/mol'), Math.log(1e-6), 3600)).toBeNaN()
  })
})

describe('ASTM E698', () => {
  it('refines Ea from temperatures at one conversion as the worked chain of the temperature integral does', () => {
    // First order, E = 200 kJ/mol, A = 1e18/min, alpha = 0.05, D exact at 5 K/min: d log beta/d(1/T) = -10895.0610 K, E = 199.9197 kJ/mol (computed to 40 digits).
    const T = [514.2797533, 521.6978516, 531.8319155, 539.7579332]
    const estimate = astmE698(peaksOf([1, 2, 5, 10], T))
    expect(estimate.line.slope_K.toFixed(3)).toBe('-10895.061')
    // 1, 2, 5, 10 K/min have no middle one: 2 and 5 are as near, and the slower is taken; the chain takes 5.
    expect(estimate.middlePeak).toBeCloseTo(521.6978516, 7)
    const at5 = energyFromSlope(10895.061 * Math.LN10, 531.8319155)
    expect(((at5?.Ea ?? 0) / 1000).toFixed(4)).toBe('199.9197')
    expect(estimate.firstEstimate).toBeCloseTo(2.19 * gasConstant_J_per_mol_K * 10895.061, 0)
  })

  it.each(sets.sets.flatMap((set) => set.levels.map((level) => ({ name: set.name, E: set.Ea_kJ_per_mol, ...level }))))(
    'recovers Ea of $name at conversion $level from close heating rates, where the conversion at the peaks is one',
    ({ E, temperature_K }) => {
      // Exact T(alpha) at three heating rates close to the printed one: the root of ln beta = const + ln p(x), found from d ln beta/d(1/T) = -(E/R)/π(x).
      const T0 = Number(temperature_K[2])
      const x0 = (1000 * E) / (gasConstant_J_per_mol_K * T0)
      const shifts = [-1e-3, 0, 1e-3]
      const T = shifts.map((shift) => (1000 * E) / (gasConstant_J_per_mol_K * (x0 * (1 - shift))))
      const rates = T.map((value) => 5 * Math.exp(lnPOfX((1000 * E) / (gasConstant_J_per_mol_K * value)) - lnPOfX(x0)))
      const estimate = astmE698(peaksOf(rates, T))
      expect(Math.abs(estimate.Ea / (1000 * E) - 1)).toBeLessThan(1e-6)
      expect(estimate.D).toBeCloseTo(1 / scaledPOfX(x0), 5)
    },
  )

  it('gives Z that puts the first-order peak at the middle heating rate where it was', () => {
    const estimate = astmE698(peaksOf([1, 2, 5, 10, 20], [543.8, 551.0, 563.1, 571.4, 580.9]))
    const R = gasConstant_J_per_mol_K
    const T = estimate.middlePeak
    expect(T).toBe(563.1)
    expect(((5 / 60) * estimate.Ea) / (R * T * T)).toBeCloseTo(Math.exp(estimate.lnA - estimate.Ea / (R * T)), 12)
  })

  it('gives the confirmation temperature the standard error of first-order propagation', () => {
    const peaks = peaksOf([1, 2, 5, 10, 20], [543.8, 551.0, 563.1, 571.4, 580.9])
    const estimate = astmE698(peaks)
    const s = Math.LN10 * lineFit(estimate.line.x_per_K, estimate.line.y).residualStandardDeviation
    const expected = propagatedError(peaks, s, (moved) => astmE698(moved).confirmationTemperature)
    expect(estimate.confirmationTemperatureStandardError / expected).toBeCloseTo(1, 5)
  })

  it('takes the heating rate nearest the geometric middle, replicates averaged', () => {
    const peaks = peaksOf([2, 10, 10, 40], [500, 520, 522, 540], (i) => ({ programmeGroup: [0, 1, 1, 2][i] ?? 0 }))
    expect(middleProgramme(peaks)).toMatchObject({ count: 2, lnHeatingRate: expect.closeTo(Math.log(10 / 60), 12) as unknown })
    expect(astmE698(peaks).middlePeak).toBeCloseTo(2 / (1 / 520 + 1 / 522), 10)
  })

  it('has no Ea for a slope less steep than that of x = 0', () => {
    // x/π(x) tends to 1 as x does to 0: a slope of ln beta below T means no positive Ea.
    expect(energyFromSlope(400, 500)).toBeNull()
    expect(astmE698(peaksOf([1, 1.02, 1.04], [500, 520, 540])).status).toBe('energy-not-positive')
  })
})

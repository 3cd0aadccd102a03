import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { inHalfUnits } from '../check-values/as-printed.ts'
import kinetic from '../check-values/computed/mean-kinetic-temperature.json'
import endurance from '../check-values/computed/thermal-endurance.json'
import { temperatureAtConversion } from '../check-values/exact-model-curve.ts'
import { reactionModels } from '../reaction-models/registry.ts'
import { doyleA } from '../temperature-integral/doyle-table.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { celsiusToKelvin, kelvinToCelsius, perMinuteToPerSecond } from '../units/convert.ts'
import { quantity } from '../units/quantity.ts'
import { isothermalTime, type KineticTriplet } from './isothermal-time.ts'
import { conventionalEnergy, meanKineticTemperature } from './mean-kinetic-temperature.ts'
import { failureTime, thermalIndex, type FailureDecomposition } from './thermal-endurance.ts'

const R = gasConstant_J_per_mol_K
const kelvin = (value: number) => quantity(value, 'K')
const energy = (value: number) => quantity(value, 'J/mol')

const decomposition = (Ea: number, T: number, beta_K_per_min: number, standardError = Number.NaN): FailureDecomposition => ({
  Ea: energy(Ea),
  standardError: energy(standardError),
  temperatureAtFailure: kelvin(T),
  heatingRate: perMinuteToPerSecond(beta_K_per_min),
})

describe('thermal endurance after ASTM E1877', () => {
  it.each(endurance.rows)('has the worked index for Ea $Ea_kJ_per_mol kJ/mol', (row) => {
    const failure = decomposition(1000 * row.Ea_kJ_per_mol, row.temperature_K, row.heatingRate_K_per_min)
    const x = failure.Ea / (R * row.temperature_K)
    expect(inHalfUnits(x, row.x)).toBeLessThanOrEqual(1)
    expect(inHalfUnits(doyleA(x), row.a)).toBeLessThanOrEqual(1)
    for (const { hours, celsius } of row.index) {
      const { temperature } = thermalIndex(failure, hours * 3600)
      expect(inHalfUnits(kelvinToCelsius(temperature), celsius), `${hours} h`).toBeLessThanOrEqual(1)
      expect(failureTime(failure, temperature).time / 3600 / hours).toBeCloseTo(1, 11)
    }
    // 60,000 h unless another time is asked for.
    expect(inHalfUnits(kelvinToCelsius(thermalIndex(failure).temperature), row.index[0]?.celsius ?? '')).toBeLessThanOrEqual(1)
  })

  it('is what the isothermal reaction takes, whatever its model', () => {
    for (const model of [reactionModels.F1, reactionModels.A3, reactionModels.D3]) {
      const triplet: KineticTriplet = { Ea: energy(180_000), lnA: 35, model }
      const T = temperatureAtConversion({ model, Ea_J_per_mol: 180_000, lnA: 35 }, 5 / 60, 0.05)
      const predicted = failureTime(decomposition(180_000, T, 5), kelvin(450)).time
      expect(predicted / isothermalTime(triplet, kelvin(450), 0.05)).toBeCloseTo(1, 11)
    }
  })

  it('carries the standard error of Ea over as a small change of Ea does', () => {
    const at = (Ea: number): FailureDecomposition => decomposition(Ea, 650, 10, 2000)
    const h = 10
    const slope = (f: (Ea: number) => number): number => (f(200_000 + h) - f(200_000 - h)) / (2 * h)
    const time = failureTime(at(200_000), kelvin(480))
    expect(time.lnStandardError / Math.abs(2000 * slope((Ea) => failureTime(at(Ea), kelvin(480)).lnTime))).toBeCloseTo(1, 6)
    const index = thermalIndex(at(200_000))
    expect(index.standardError / Math.abs(2000 * slope((Ea) => thermalIndex(at(Ea)).temperature))).toBeCloseTo(1, 6)
    expect(thermalIndex(decomposition(200_000, 650, 10)).standardError).toBeNaN()
  })

  it('has no index for a time shorter than any temperature allows, and rejects what is not positive', () => {
    expect(thermalIndex(decomposition(200_000, 650, 10), 1e-30).temperature).toBeNaN()
    for (const bad of [0, -1, Number.NaN, Number.POSITIVE_INFINITY]) {
      expect(() => failureTime(decomposition(bad, 650, 10), kelvin(450))).toThrow(/Ea in J\/mol/)
      expect(() => failureTime(decomposition(2e5, bad, 10), kelvin(450))).toThrow(/temperature at failure/)
      expect(() => failureTime(decomposition(2e5, 650, bad), kelvin(450))).toThrow(/heating rate/)
      expect(() => failureTime(decomposition(2e5, 650, 10), kelvin(bad))).toThrow(/temperature of use/)
      expect(() => thermalIndex(decomposition(2e5, 650, 10), bad)).toThrow(/failure time/)
    }
  })
})

describe('the mean kinetic temperature', () => {
  it.each(kinetic.rows)('of $celsius °C is $meanKinetic °C', ({ celsius, mean, meanKinetic }) => {
    const T = celsius.map(celsiusToKelvin)
    expect(inHalfUnits(kelvinToCelsius(meanKineticTemperature(T)), meanKinetic)).toBeLessThanOrEqual(1)
    expect(celsius.reduce((sum, value) => sum + value, 0) / celsius.length).toBeCloseTo(Number(mean), 12)
  })

  it('hardly depends on which gas constant the convention was made with', () => {
    // USP <1160>: 83.144 kJ/mol and 8.3144 J/(mol K), or 83.14472 and 8.314472, are both 10,000 K; with the gas constant of 2019, 9999.9247 K.
    expect(conventionalEnergy / R).toBe(10_000)
    expect(83_144 / 8.3144).toBeCloseTo(10_000, 10)
    expect(83_144.72 / 8.314472).toBeCloseTo(10_000, 10)
    expect(inHalfUnits(83_144 / R, '9999.9247')).toBeLessThanOrEqual(1)
    for (const { celsius } of kinetic.rows) {
      const T = celsius.map(celsiusToKelvin)
      expect(Math.abs(meanKineticTemperature(T) - meanKineticTemperature(T, energy(83_144)))).toBeLessThan(2e-5)
    }
  })

  it('does to a product what the temperatures did, lies between their mean and the hottest, and does not care for their order', () => {
    const temperatures = fc.array(fc.double({ min: 250, max: 350, noNaN: true }), { minLength: 1, maxLength: 30 })
    fc.assert(
      fc.property(temperatures, fc.double({ min: 20_000, max: 300_000, noNaN: true }), (T, Ea) => {
        const mean = T.reduce((sum, value) => sum + value, 0) / T.length
        const kineticMean = meanKineticTemperature(T, energy(Ea))
        const harm = T.reduce((sum, value) => sum + Math.exp(-Ea / (R * value)), 0) / T.length
        expect(Math.exp(-Ea / (R * kineticMean)) / harm).toBeCloseTo(1, 10)
        // Arrhenius is convex below Ea/(2R).
        expect(kineticMean).toBeGreaterThanOrEqual(mean - 1e-9)
        expect(kineticMean).toBeLessThanOrEqual(Math.max(...T) + 1e-9)
        expect(meanKineticTemperature(T.toReversed(), energy(Ea))).toBeCloseTo(kineticMean, 9)
      }),
    )
  })

  it('takes weights as so many equal readings, and does not underflow', () => {
    const T = [280, 300, 290].map(kelvin)
    expect(meanKineticTemperature(T, conventionalEnergy, [3, 1, 2])).toBeCloseTo(
      meanKineticTemperature([280, 280, 280, 300, 290, 290], conventionalEnergy),
      11,
    )
    expect(meanKineticTemperature([4, 4], conventionalEnergy)).toBeCloseTo(4, 12)
  })

  it.each([
    [[], undefined, undefined, 'bad-option'],
    [[300], -1, undefined, 'bad-option'],
    [[300, Number.NaN], undefined, undefined, 'not-finite'],
    [[300, 0], undefined, undefined, 'not-finite'],
    [[300, 310], undefined, [1], 'column-length'],
    [[300, 310], undefined, [1, -1], 'not-finite'],
    [[300, 310], undefined, [0, 0], 'bad-option'],
  ] as const)('rejects what has no mean (%#)', (T, Ea, weights, code) => {
    const Ea_or_default = Ea === undefined ? conventionalEnergy : energy(Ea)
    expect(() => meanKineticTemperature(T, Ea_or_default, weights)).toThrow(expect.objectContaining({ code }) as Error)
  })
})

describe('the time to a conversion at a constant temperature', () => {
  const { Ea_kJ_per_mol, A_per_min, rows } = endurance.isothermal
  const triplet: KineticTriplet = { Ea: energy(1000 * Ea_kJ_per_mol), lnA: Math.log(A_per_min / 60), model: reactionModels.F1 }

  it.each(rows)('has the printed values at $temperature_K K', ({ temperature_K, k_per_min, alpha, time_min }) => {
    alpha.forEach((level, i) => {
      const time = isothermalTime(triplet, kelvin(temperature_K), level) / 60
      // Eight significant digits, or as many as stand there.
      const digits = (time_min[i] as string).replace('.', '').length
      expect(Number(time.toPrecision(digits)), `alpha ${level}`).toBe(Number(time_min[i]))
    })
    const k = 60 / isothermalTime({ ...triplet, model: reactionModels.F0 }, kelvin(temperature_K), 1)
    expect(Number(k.toPrecision(8))).toBe(Number(k_per_min))
  })

  it('grows with alpha from 0, and falls with temperature', () => {
    const level = fc.double({ min: 0, max: 1, noNaN: true })
    fc.assert(
      fc.property(level, level, fc.constantFrom(...Object.values(reactionModels).filter((model) => model.gZeroAt === 0)), (a, b, model) => {
        const at = (alpha: number, T: number): number => isothermalTime({ ...triplet, model }, kelvin(T), alpha)
        expect(at(Math.max(a, b), 450)).toBeGreaterThanOrEqual(at(Math.min(a, b), 450))
        expect(at(a, 460)).toBeLessThanOrEqual(at(a, 450))
        expect(at(0, 450)).toBe(0)
      }),
    )
    expect(isothermalTime(triplet, kelvin(450), 1)).toBe(Number.POSITIVE_INFINITY)
  })

  it('is not to be had for a rate that starts from nothing, and rejects what cannot be meant', () => {
    expect(isothermalTime({ ...triplet, model: reactionModels.B1 }, kelvin(450), 0.5)).toBeNaN()
    expect(() => isothermalTime(triplet, kelvin(0), 0.5)).toThrow(/above 0 K/)
    expect(() => isothermalTime(triplet, kelvin(450), 1.01)).toThrow(/between 0 and 1/)
    expect(() => isothermalTime({ ...triplet, lnA: Number.NaN }, kelvin(450), 0.5)).toThrow(/finite Ea and ln A/)
  })
})

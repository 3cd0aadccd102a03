import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { inHalfUnits, roundedTwice } from '../check-values/as-printed.ts'
import exact from '../check-values/computed/exact-single-step.json'
import others from '../check-values/computed/systematic-error-other-forms.json'
import table from '../check-values/computed/systematic-error.json'
import { temperatureAt } from '../check-values/exact-simulation.ts'
import { lineFit } from '../numerics/line-fit.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { systematicErrorAtTrueX, systematicErrorOf, trueXOf, type ApproximateIntegral } from './systematic-error.ts'

const R = gasConstant_J_per_mol_K
const integrals: Readonly<Record<string, ApproximateIntegral>> = {
  ofw: { temperatureExponent: 0, divisor: 1.052 },
  kas: { temperatureExponent: 2, divisor: 1 },
  starink: { temperatureExponent: 1.92, divisor: 1.0008 },
}
const all: readonly ApproximateIntegral[] = [...Object.values(integrals), ...others.rows]
const anyIntegral = fc.constantFrom(...all)
const anyX = fc.double({ min: Math.log(0.1), max: Math.log(500), noNaN: true }).map(Math.exp)

/** Ea of the straight line through runs of one reaction, from the conditions (heating rate, temperature) at one level. */
function apparentEnergy(
  heatingRates: readonly number[],
  temperatures: readonly number[],
  { temperatureExponent, divisor }: ApproximateIntegral,
) {
  const x = temperatures.map((T) => 1 / T)
  const y = temperatures.map((T, i) => Math.log(heatingRates[i] as number) - temperatureExponent * Math.log(T))
  return (-R * lineFit(x, y).slope) / divisor
}

describe('the systematic error of the approximate integral methods', () => {
  const rows = [
    ...table.rows.map((row) => ({ ...row, ...(integrals[row.method] as ApproximateIntegral) })),
    ...others.rows.map(({ method, temperatureExponent, divisor, percent }) => ({ method, temperatureExponent, divisor, percent })),
  ]
  it.each(rows)('$method: has the printed value at every x', (row) => {
    table.x.forEach((x, k) => {
      const error = 100 * systematicErrorAtTrueX(x, row)
      expect(inHalfUnits(error, row.percent[k] as string), `x ${x}: ${error}`).toBeLessThanOrEqual(roundedTwice)
    })
  })

  it('is what straight lines through simulated runs at close heating rates show', () => {
    const step = { Ea_J_per_mol: 120_000, A_per_s: 1e10, share: 1 }
    const heatingRates = [0.0999, 0.1, 0.1001]
    for (const level of [0.05, 0.5, 0.95]) {
      const T = heatingRates.map((beta) => temperatureAt([step], beta, level))
      for (const integral of all) {
        const apparent = apparentEnergy(heatingRates, T, integral)
        const error = apparent / step.Ea_J_per_mol - 1
        const x = step.Ea_J_per_mol / (R * (T[1] as number))
        // Temperatures good to 1e-13 of 600 K, over 0.05 K, leave Ea open by about 1e-9; the spread of the heating rates adds its square, 1e-6, times the curvature.
        expect(Math.abs(error - systematicErrorAtTrueX(x, integral))).toBeLessThan(1e-8)
        expect(Math.abs(error - systematicErrorOf(apparent, T[1] as number, integral))).toBeLessThan(1e-8)
      }
    }
  })

  it('brings Ea of the exact sets, twentyfold apart in heating rate, back to the true one within 0.02 %', () => {
    for (const set of exact.sets) {
      for (const { level, temperature_K } of set.levels) {
        const T = temperature_K.map(Number)
        const harmonic = T.length / T.reduce((sum, value) => sum + 1 / value, 0)
        for (const integral of all) {
          const apparent = apparentEnergy(exact.heatingRate_K_per_min, T, integral)
          const corrected = apparent / (1 + systematicErrorOf(apparent, harmonic, integral))
          const off = corrected / (1000 * set.Ea_kJ_per_mol) - 1
          expect(Math.abs(off), `${set.name} at ${level}, s ${integral.temperatureExponent}`).toBeLessThan(2e-4)
        }
      }
    }
  })

  it('is found from the apparent Ea: the true x returns from its apparent one', () => {
    fc.assert(
      fc.property(anyX, anyIntegral, (x, integral) => {
        const apparentX = x * (1 + systematicErrorAtTrueX(x, integral))
        // Near x = 0 the apparent x hardly moves with the true one, so that its rounding is amplified.
        expect(Math.abs(trueXOf(apparentX, integral) / x - 1)).toBeLessThan(1e-13 + 1e-14 / x)
      }),
    )
  })

  it('has one answer: the apparent x rises with the true one', () => {
    fc.assert(
      fc.property(anyX, anyX, anyIntegral, (x1, x2, integral) => {
        fc.pre(Math.abs(x1 / x2 - 1) > 1e-9)
        const apparent = (x: number): number => x * (1 + systematicErrorAtTrueX(x, integral))
        expect(Math.sign(apparent(x1) - apparent(x2))).toBe(Math.sign(x1 - x2))
      }),
    )
  })

  it('has none where no positive Ea can show the apparent one', () => {
    // x h(x) is above 1 for every x > 0, so that the apparent x is above (1 - s)/B.
    for (const integral of all) {
      const limit = (1 - integral.temperatureExponent) / integral.divisor
      expect(trueXOf(limit - 1e-9, integral)).toBeNaN()
      expect(trueXOf(limit + 1e-3, integral)).toBeGreaterThan(0)
      expect(trueXOf(limit + 1e-3, integral)).toBeLessThan(1e-3)
      for (const value of [Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]) expect(trueXOf(value, integral)).toBeNaN()
    }
    expect(systematicErrorOf(Number.NaN, 500, integrals.kas as ApproximateIntegral)).toBeNaN()
    expect(systematicErrorOf(100_000, Number.NaN, integrals.kas as ApproximateIntegral)).toBeNaN()
    expect(systematicErrorOf(-20_000, 500, integrals.kas as ApproximateIntegral)).toBeNaN()
  })

  it('fades for large x by the method of Kissinger, Akahira and Sunose, whose integral is the limit of p(x)', () => {
    // h(x) = 1 + 2/x - 2/x² + …, so that the error is -2/x².
    expect(systematicErrorAtTrueX(1e4, integrals.kas as ApproximateIntegral) * 1e8).toBeCloseTo(-2, 2)
    expect(trueXOf(1e9, integrals.kas as ApproximateIntegral)).toBeCloseTo(1e9, 5)
  })

  it('rejects an x that is not a positive number', () => {
    expect(() => systematicErrorAtTrueX(0, integrals.kas as ApproximateIntegral)).toThrow(/Ea\/\(RT\)/)
  })
})

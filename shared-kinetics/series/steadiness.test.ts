import { describe, expect, it } from 'vitest'
import { fahrenheitToKelvin } from '../units/convert.ts'
import { quantity } from '../units/quantity.ts'
import type { Programme } from './programme.ts'
import { steadinessOf, type Steadiness } from './steadiness.ts'

const ramp: Programme = {
  kind: 'constant-heating-rate',
  heatingRate: quantity(1 / 6, 'K/s'),
  standardError: quantity(0, 'K/s'),
  source: 'measured',
}
const hold: Programme = { kind: 'isothermal', temperature: quantity(400, 'K') }
const rows = 200
const column = (of: (i: number) => number, n = rows): Float64Array => Float64Array.from({ length: n }, (_, i) => of(i))
const told = (time: Float64Array, T: Float64Array, programme: Programme = ramp): Steadiness =>
  steadinessOf(time, T, { first: 0, last: T.length - 1 }, programme)
const rounded = (value: number, decimals: number): number => Number(value.toFixed(decimals))

// A heating rate of many digits, a row every 1.7 s; times of 0.1 s.
const rate_K_per_s = Math.PI / 18
const time = column((i) => rounded(1.7 * i, 1))
const exact = column((i) => 400 + 1.7 * i * rate_K_per_s)

describe('steadiness of T(t)', () => {
  it.each([
    ['K, three decimals', (T: number) => rounded(T, 3), 0.001],
    ['°C, two decimals', (T: number) => 273.15 + rounded(T - 273.15, 2), 0.01],
    ['°F, two decimals', (T: number) => fahrenheitToKelvin(rounded((T - 273.15) * 1.8 + 32, 2)), 0.01 / 1.8],
  ])('of a programme in %s is what rounding leaves, below one unit of the last digits', (_, print, lastDigit_K) => {
    const { deviation_K, lastDigit_K: found } = told(time, exact.map(print))
    expect(found).toBeCloseTo(lastDigit_K + 0.1 * rate_K_per_s, 6)
    // The line lies among the rounded values, so that none is much farther off than half a unit.
    expect(deviation_K).toBeLessThan(0.6 * lastDigit_K)
    expect(deviation_K).toBeGreaterThan(0.3 * lastDigit_K)
  })

  it('knows times in minutes, and digits that do not end', () => {
    const minutes = column((i) => 60 * rounded((1.7 * i) / 60, 4))
    expect(
      told(
        minutes,
        exact.map((T) => rounded(T, 3)),
      ).lastDigit_K,
    ).toBeCloseTo(0.001 + 0.006 * rate_K_per_s, 6)
    expect(told(time, exact).lastDigit_K).toBeCloseTo(1e-6 + 0.1 * rate_K_per_s, 8)
    expect(told(time, exact).deviation_K).toBeLessThan(1e-10)
  })

  it.each([2050, 4100])('knows the last digit of times whatever the number of rows, here %d of them 0.1 s apart', (n) => {
    const evenTime = column((i) => rounded(0.1 * i, 1), n)
    const T = column((i) => rounded(400 + 0.1 * i * rate_K_per_s, 4), n)
    expect(told(evenTime, T).lastDigit_K).toBeCloseTo(1e-4 + 0.1 * rate_K_per_s, 6)
  })

  it('of a measured T(t) is its distance from the line', () => {
    // A sine of ten whole periods, orthogonal to a line but for the sine's moment; slow bending is seen as well.
    const wavy = told(
      time,
      exact.map((T, i) => T + 0.015 * Math.sin((20 * Math.PI * i) / rows)),
    )
    expect(wavy.deviation_K).toBeGreaterThan(0.0145)
    expect(wavy.deviation_K).toBeLessThan(0.0165)
    const bent = told(
      time,
      exact.map((T, i) => T + 1 * (i / (rows - 1) - 0.5) ** 2),
    )
    // A parabola c·u² on [-1/2, 1/2] is farthest from its line at the ends, c(1/4 - 1/12) = c/6.
    expect(bent.deviation_K).toBeCloseTo(1 / 6, 2)
    expect(bent.lastDigit_K).toBeNaN()
  })

  it('of a hold is half its range, but for one row in a hundred on either side', () => {
    expect(
      told(
        time,
        column(() => 393.15),
        hold,
      ).deviation_K,
    ).toBe(0)
    expect(
      told(
        time,
        column((i) => (i < 2 ? 392 : 393.15)),
        hold,
      ).deviation_K,
    ).toBe(0)
    expect(
      told(
        time,
        column((i) => (i % 2 === 0 ? 393.1 : 393.2)),
        hold,
      ).deviation_K,
    ).toBeCloseTo(0.05, 9)
  })

  it('is not to be had for other programmes and for few rows', () => {
    expect(told(time, exact, { kind: 'general' })).toEqual({ deviation_K: Number.NaN, lastDigit_K: Number.NaN })
    expect(told(time.subarray(0, 9), exact.subarray(0, 9)).deviation_K).toBeNaN()
    expect(told(time.subarray(0, 10), exact.subarray(0, 10)).deviation_K).toBeLessThan(1e-10)
  })
})

import { compiled, expn } from 'cephes'
import * as fc from 'fast-check'
import { beforeAll, describe, expect, it } from 'vitest'
import type { TemperatureHistory } from '../series/programme.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column } from '../units/quantity.ts'
import { constantRateIntegral } from './constant-rate-integral.ts'
import { historyIntegral } from './history-integral.ts'
import { linearSegments } from './linear-segments.ts'

const R = gasConstant_J_per_mol_K
const largestEa = 1e6

beforeAll(async () => {
  await compiled
})

const historyOf = (time: readonly number[], T: readonly number[]): TemperatureHistory => ({
  time_s: column(Float64Array.from(time), 's'),
  temperature_K: column(Float64Array.from(T), 'K'),
})
const seconds = (...values: number[]) => column(Float64Array.from(values), 's')

describe('the integral over a measured history', () => {
  it('of a ramp is the difference of two temperature integrals', () => {
    const beta = 0.1
    const time = Array.from({ length: 3001 }, (_, i) => 1000 + i)
    const history = historyOf(
      time,
      time.map((t) => 400 + beta * (t - 1000)),
    )
    const integral = historyIntegral(history, seconds(500, 1234.5, 3000), largestEa)
    for (const Ea of [5e3, 2e4, 1e5, 2e5, 3e5]) {
      for (const [level, T] of [450, 523.45, 700].entries()) {
        const primitive = (temperature: number): number => temperature * expn(2, Ea / (R * temperature))
        const expected = Math.log((primitive(T) - primitive(400)) / beta)
        // 2e-7·(Ea/1e6)⁴ for nodes that were joined, 1e-9 at most for the rules; the difference of primitives loses a digit or two itself.
        expect(Math.abs(integral.atLevel(Ea, level).lnJ - expected), `Ea ${Ea}, T ${T}`).toBeLessThan(3e-9)
      }
    }
  })

  it('of a hold is t exp(-Ea/RT), however many rows describe it', () => {
    for (const rows of [2, 20_000]) {
      const time = Array.from({ length: rows }, (_, i) => (7200 * i) / (rows - 1))
      const integral = historyIntegral(
        historyOf(
          time,
          time.map(() => 450),
        ),
        seconds(60, 3600, 7200),
        largestEa,
      )
      for (const Ea of [1e3, 1e5, 1e6]) {
        const { lnJ, inverseT } = integral.atLevel(Ea, 1)
        expect(Math.abs(lnJ - (Math.log(3600) - Ea / (R * 450)))).toBeLessThan(1e-12)
        expect(inverseT * 450).toBeCloseTo(1, 12)
      }
    }
  })

  it('of a noisy ramp agrees with a plain sum over its samples', () => {
    let seed = 7
    const noise = (): number => {
      seed = (seed * 16807) % 2147483647
      return seed / 2147483647 - 0.5
    }
    const time = Array.from({ length: 4001 }, (_, i) => i)
    const T = time.map((t) => 450 + 0.05 * t + 0.1 * noise())
    const integral = historyIntegral(historyOf(time, T), seconds(4000), largestEa)
    for (const Ea of [5e4, 2e5, 1e6]) {
      // Simpson on each interval, T linear inside it; intervals are short beside the curvature.
      const k = Ea / R
      const f = (temperature: number): number => Math.exp(-k * (1 / temperature - 1 / 650))
      let sum = 0
      for (let i = 1; i < T.length; i++) {
        const [a, b] = [T[i - 1] as number, T[i] as number]
        sum += (f(a) + 4 * f((a + b) / 2) + f(b)) / 6
      }
      expect(Math.abs(integral.atLevel(Ea, 0).lnJ - (Math.log(sum) - k / 650)), `Ea ${Ea}`).toBeLessThan(Ea < 5e5 ? 1e-9 : 3e-7)
    }
  })

  it('at all levels in one pass is the integral at each, whatever the order of the levels and however T goes', () => {
    const temperature = fc.double({ min: 300, max: 900, noNaN: true })
    fc.assert(
      fc.property(
        fc.array(temperature, { minLength: 2, maxLength: 12 }),
        fc.array(fc.double({ min: 1e-3, max: 1, noNaN: true }), { minLength: 1, maxLength: 6 }),
        fc.double({ min: 1e3, max: 1e6, noNaN: true }),
        (T, shares, Ea) => {
          const end = 100 * (T.length - 1)
          const history = historyOf(
            T.map((_, i) => 100 * i),
            T,
          )
          const integral = historyIntegral(history, seconds(...shares.map((share) => share * end)), largestEa)
          const lnJ = new Float64Array(shares.length)
          const inverseT = new Float64Array(shares.length)
          integral.atAllLevels(Ea, lnJ, inverseT)
          shares.forEach((_, level) => {
            const single = integral.atLevel(Ea, level)
            expect(Math.abs(lnJ[level]! - single.lnJ)).toBeLessThan(1e-12 * Math.max(1, Math.abs(single.lnJ)))
            expect(inverseT[level]! / single.inverseT).toBeCloseTo(1, 11)
          })
        },
      ),
    )
  })

  it('has the slope -(effective 1/T)/R', () => {
    const history = historyOf([0, 600, 1800, 2400], [400, 500, 500, 640])
    const integral = historyIntegral(history, seconds(2000), largestEa)
    for (const Ea of [2e4, 1.2e5, 5e5]) {
      const d = Ea * 1e-5
      const slope = (integral.atLevel(Ea + d, 0).lnJ - integral.atLevel(Ea - d, 0).lnJ) / (2 * d)
      expect((-R * slope) / integral.atLevel(Ea, 0).inverseT).toBeCloseTo(1, 8)
    }
  })

  it('reaches a level only inside the history', () => {
    const integral = historyIntegral(historyOf([50, 150], [400, 500]), seconds(Number.NaN, 0, 40, 100, 100.1, -5), largestEa)
    expect([0, 1, 2, 3, 4, 5].map(integral.reaches)).toEqual([false, false, true, true, false, false])
    expect(historyIntegral(historyOf([], []), seconds(10), largestEa).reaches(0)).toBe(false)
  })

  it('refuses a history that is none', () => {
    expect(() => historyIntegral(historyOf([0, 2, 1], [400, 401, 402]), seconds(1), largestEa)).toThrow(/goes back at row 3/)
    expect(() => historyIntegral(historyOf([0, 1], [400, Number.NaN]), seconds(1), largestEa)).toThrow(/Row 2/)
    expect(() => historyIntegral(historyOf([0, 1], [400, -3]), seconds(1), largestEa)).toThrow(/Row 2/)
    expect(() => historyIntegral(historyOf([0, 1], [400]), seconds(1), largestEa)).toThrow(/2 times and 1 temperatures/)
  })
})

describe('the integral under a constant heating rate', () => {
  it('is (Ea/(R beta)) p(Ea/RT), with its slope', () => {
    const integral = constantRateIntegral(0.1 as Parameters<typeof constantRateIntegral>[0], column(Float64Array.of(500, Number.NaN), 'K'))
    expect([integral.reaches(0), integral.reaches(1)]).toEqual([true, false])
    for (const Ea of [1e3, 3e4, 1.5e5, 1e6]) {
      const x = Ea / (R * 500)
      const { lnJ, inverseT } = integral.atLevel(Ea, 0)
      expect(Math.abs(lnJ - Math.log((500 / 0.1) * expn(2, x)))).toBeLessThan(1e-12)
      const d = Ea * 1e-4
      const slope = (integral.atLevel(Ea + d, 0).lnJ - integral.atLevel(Ea - d, 0).lnJ) / (2 * d)
      expect((-R * slope) / inverseT).toBeCloseTo(1, 7)
    }
  })
})

describe('straight segments through samples', () => {
  it('join a ramp, a hold and a ramp to three', () => {
    const time = Array.from({ length: 301 }, (_, i) => i)
    const T = time.map((t) => (t < 100 ? 300 + 0.37 * t : t < 200 ? 337 : 337 + 0.11 * (t - 200)))
    expect(linearSegments(time, T, 1e-9)).toEqual([0, 100, 200, 300])
  })

  it('pass within the tolerance of every sample', () => {
    const values = fc.array(fc.tuple(fc.double({ min: 1e-3, max: 2, noNaN: true }), fc.double({ min: -1, max: 1, noNaN: true })), {
      minLength: 2,
      maxLength: 40,
    })
    fc.assert(
      fc.property(values, fc.double({ min: 0.01, max: 0.5, noNaN: true }), (steps, tolerance) => {
        let t = 0
        const x = steps.map(([dt]) => (t += dt))
        const y = steps.map(([, value]) => value)
        const kept = linearSegments(x, y, tolerance)
        expect([kept[0], kept[kept.length - 1]]).toEqual([0, x.length - 1])
        for (let s = 1; s < kept.length; s++) {
          const [a, b] = [kept[s - 1]!, kept[s]!]
          for (let i = a + 1; i < b; i++) {
            const chord = y[a]! + ((y[b]! - y[a]!) * (x[i]! - x[a]!)) / (x[b]! - x[a]!)
            expect(Math.abs(chord - y[i]!)).toBeLessThan(tolerance * (1 + 1e-9) + 1e-12)
          }
        }
      }),
    )
  })

  it('keep a step in y at one x', () => {
    expect(linearSegments([0, 1, 2, 2, 3, 4], [0, 0, 0, 5, 5, 5], 1e-9)).toEqual([0, 2, 3, 5])
  })
})

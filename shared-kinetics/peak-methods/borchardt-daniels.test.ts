import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { normalNumbers } from '../check-values/simulated-run.ts'
import { bracketedRoot } from '../numerics/root.ts'
import { lnPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column } from '../units/quantity.ts'
import { borchardtDaniels, type RunPoints } from './borchardt-daniels.ts'

const R = gasConstant_J_per_mol_K
const levels = Array.from({ length: 17 }, (_, i) => (i + 2) / 20)

/** An nth-order reaction under a constant heating rate from T = 0, at the levels: exact T from g(alpha) = (A E/(R beta)) p(x), exact rate from the rate law. */
function exactRun(Ea: number, lnA: number, n: number, beta: number): RunPoints {
  const g = (alpha: number): number => (n === 1 ? -Math.log1p(-alpha) : ((1 - alpha) ** (1 - n) - 1) / (n - 1))
  const T = levels.map((alpha) => {
    const off = (x: number): number => lnA + Math.log(Ea / (R * beta)) + lnPOfX(x) - Math.log(g(alpha))
    return Ea / (R * bracketedRoot(off, 0.01, 1000).x)
  })
  return {
    temperature_K: column(Float64Array.from(T), 'K'),
    conversion: column(Float64Array.from(levels), '1'),
    reactionRate_per_s: column(
      Float64Array.from(T, (value, i) => Math.exp(lnA - Ea / (R * value) + n * Math.log1p(-(levels[i] ?? 0)))),
      '1/s',
    ),
  }
}

const withNoise = (points: RunPoints, noise: () => number): RunPoints => ({
  ...points,
  reactionRate_per_s: column(
    points.reactionRate_per_s.map((rate) => rate * Math.exp(noise())),
    '1/s',
  ),
})

const points = (T: number[], alpha: number[], rate: number[]): RunPoints => ({
  temperature_K: column(Float64Array.from(T), 'K'),
  conversion: column(Float64Array.from(alpha), '1'),
  reactionRate_per_s: column(Float64Array.from(rate), '1/s'),
})

describe('Borchardt–Daniels', () => {
  it.each([
    { Ea: 100e3, lnA: Math.log(1e10 / 60), n: 1, beta: 10 / 60 },
    { Ea: 200e3, lnA: Math.log(1e18 / 60), n: 2, beta: 5 / 60 },
    { Ea: 60e3, lnA: Math.log(1e7 / 60), n: 0.5, beta: 20 / 60 },
    { Ea: 300e3, lnA: Math.log(1e25), n: 3, beta: 2 / 60 },
    { Ea: 150e3, lnA: Math.log(1e12), n: 0, beta: 10 / 60 },
  ])('recovers Ea $Ea, n $n of an exact reaction to 1e-8', ({ Ea, lnA, n, beta }) => {
    const result = borchardtDaniels(exactRun(Ea, lnA, n, beta))
    expect(result.status).toBe('ok')
    expect(result.dof).toBe(14)
    expect(Math.abs(result.Ea / Ea - 1)).toBeLessThan(1e-8)
    expect(Math.abs(result.lnZ / lnA - 1)).toBeLessThan(1e-8)
    expect(Math.abs(result.order - n)).toBeLessThan(1e-8)
    expect(result.standardError / result.Ea).toBeLessThan(1e-8)
  })

  it('gives standard errors and covariances that repeated noise bears out', () => {
    // 3,000 runs with a noise of 2 % of the rate: standard deviations among them are the standard errors within their own 1.3 % (one part in √(2·3000)).
    const normal = normalNumbers(7)
    const exact = exactRun(150e3, 26, 1.5, 0.1)
    const results = Array.from({ length: 3000 }, () => borchardtDaniels(withNoise(exact, () => 0.02 * normal())))
    const spread = (a: (typeof results)[number][], key: 'Ea' | 'lnZ' | 'order', other: typeof key = key): number => {
      const mean = (of: typeof key): number => a.reduce((sum, result) => sum + result[of], 0) / a.length
      const [m, o] = [mean(key), mean(other)]
      return a.reduce((sum, result) => sum + (result[key] - m) * (result[other] - o), 0) / (a.length - 1)
    }
    const usual = (key: 'standardError' | 'lnZStandardError' | 'orderStandardError'): number =>
      results.reduce((sum, result) => sum + result[key] ** 2, 0) / results.length
    expect(spread(results, 'Ea') / usual('standardError')).toBeCloseTo(1, 0)
    expect(Math.abs(Math.log(spread(results, 'Ea') / usual('standardError')))).toBeLessThan(0.1)
    expect(Math.abs(Math.log(spread(results, 'lnZ') / usual('lnZStandardError')))).toBeLessThan(0.1)
    expect(Math.abs(Math.log(spread(results, 'order') / usual('orderStandardError')))).toBeLessThan(0.1)
    const covariance = (key: 'covarianceEaLnZ' | 'covarianceEaOrder' | 'covarianceLnZOrder'): number =>
      results.reduce((sum, result) => sum + result[key], 0) / results.length
    expect(spread(results, 'Ea', 'lnZ') / covariance('covarianceEaLnZ')).toBeCloseTo(1, 0)
    expect(spread(results, 'Ea', 'order') / covariance('covarianceEaOrder')).toBeCloseTo(1, 0)
    expect(spread(results, 'lnZ', 'order') / covariance('covarianceLnZOrder')).toBeCloseTo(1, 0)
    const covered = results.filter((result) => result.lower95 <= 150e3 && result.upper95 >= 150e3).length / results.length
    // Four standard deviations of a share of 0.95 of 3,000.
    expect(Math.abs(covered - 0.95)).toBeLessThan(4 * Math.sqrt((0.95 * 0.05) / 3000))
  })

  it('does not mind the order of the points, and ln Z alone follows the unit of time', () => {
    const normal = normalNumbers(11)
    const points = withNoise(exactRun(150e3, 26, 1.5, 0.1), () => 0.02 * normal())
    const straight = borchardtDaniels(points)
    fc.assert(
      fc.property(
        fc.shuffledSubarray(Array.from(levels.keys()), { minLength: levels.length }),
        fc.double({ min: 0.01, max: 100, noNaN: true }),
        (order, factor) => {
          const pick = (values: Float64Array, by = 1): Float64Array => Float64Array.from(order, (i) => by * (values[i] ?? Number.NaN))
          const other = borchardtDaniels({
            temperature_K: column(pick(points.temperature_K), 'K'),
            conversion: column(pick(points.conversion), '1'),
            reactionRate_per_s: column(pick(points.reactionRate_per_s, factor), '1/s'),
          })
          for (const key of ['Ea', 'standardError', 'order', 'orderStandardError', 'r2'] as const)
            expect(other[key] / straight[key]).toBeCloseTo(1, 9)
          expect(other.lnZ - straight.lnZ).toBeCloseTo(Math.log(factor), 8)
        },
      ),
    )
  })

  it('says where a run does not tell', () => {
    expect(borchardtDaniels(points([500, 510, 520], [0.2, 0.4, 0.6], [1, 2, 3])).status).toBe('too-few-points')
    expect(borchardtDaniels(points([500, 510, 520, 530], [0.2, 0.4, 0.6, 0.8], [1, 2, 0, 1])).status).toBe('rate-not-positive')
    expect(borchardtDaniels(points([500, 500, 500, 500], [0.2, 0.4, 0.6, 0.8], [4, 3, 2, 1])).status).toBe('terms-not-independent')
    // A rate that falls with temperature as exp(+1000 K/T), first order.
    const alpha = [0.2, 0.4, 0.6, 0.7, 0.8]
    const T = [500, 510, 522, 530, 541]
    const falling = borchardtDaniels(
      points(
        T,
        alpha,
        T.map((value, i) => Math.exp(1000 / value) * (1 - (alpha[i] ?? 0))),
      ),
    )
    expect(falling.status).toBe('energy-not-positive')
    expect([falling.Ea, falling.order, falling.lnZStandardError]).toEqual([Number.NaN, Number.NaN, Number.NaN])
    expect(() => borchardtDaniels(points([500, 510], [0.2, 0.4], [1]))).toThrow(/same points/)
    expect(() => borchardtDaniels(points([500, 510], [0.2, 1], [1, 1]))).toThrow(/between 0 and 1/)
  })
})

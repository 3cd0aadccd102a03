import { describe, expect, it } from 'vitest'
import { constantRateSeries, quiet } from '../check-values/series-of-values.ts'
import { randomStream } from '../numerics/random.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { friedman } from './friedman.ts'
import { vyazovkin } from './vyazovkin.ts'

const R = gasConstant_J_per_mol_K
const T = [540, 548, 559, 568, 577]
const Ea = 160_000
const lnAf = 30
const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0)

describe('ln[A f(alpha)] of Friedman', () => {
  const random = randomStream(9)
  const series = constantRateSeries([0.5], [1, 2, 5, 10, 20], [T], (_, temperature) =>
    Math.exp(lnAf - Ea / (R * temperature) + 0.05 * random.normal()),
  )
  const result = friedman(series, quiet)
  const y = series.runs.map((run) => Math.log(run.reactionRate_per_s[0] as number))

  it('has the standard error, and the covariance with Ea, of the normal equations in ln[A f] and Ea themselves', () => {
    // Columns 1 and -1/(RT): the covariance matrix is s² (XᵀX)⁻¹, by the two-by-two inverse.
    const u = T.map((temperature) => -1 / (R * temperature))
    const [n, su, suu, sy, suy] = [T.length, sum(u), sum(u.map((v) => v * v)), sum(y), sum(u.map((v, i) => v * (y[i] as number)))]
    const determinant = n * suu - su * su
    const intercept = (suu * sy - su * suy) / determinant
    const energy = (n * suy - su * sy) / determinant
    const s2 = sum(y.map((value, i) => (value - intercept - energy * (u[i] as number)) ** 2)) / (n - 2)
    expect((result.lnAf[0] as number) / intercept).toBeCloseTo(1, 8)
    expect((result.Ea[0] as number) / energy).toBeCloseTo(1, 8)
    expect((result.lnAfStandardError[0] as number) / Math.sqrt((s2 * suu) / determinant)).toBeCloseTo(1, 7)
    expect((result.standardError[0] as number) / Math.sqrt((s2 * n) / determinant)).toBeCloseTo(1, 7)
    expect((result.covarianceEaLnAf[0] as number) / ((-s2 * su) / determinant)).toBeCloseTo(1, 7)
  })

  it('has the standard error of ln k at a temperature amid the runs far below what Ea and ln[A f] apart would give', () => {
    const x = 1 / (R * 558)
    const [variance, covariance] = [(result.standardError[0] as number) ** 2, result.covarianceEaLnAf[0] as number]
    const lnK = (result.lnAfStandardError[0] as number) ** 2 + x * x * variance - 2 * x * covariance
    expect(lnK).toBeGreaterThan(0)
    expect(Math.sqrt(lnK)).toBeLessThan(0.05 * (result.lnAfStandardError[0] as number))
  })

  it('is not given by a method that has no reaction rate, nor an error with two programmes', () => {
    expect(vyazovkin(series, quiet).lnAf[0]).toBeNaN()
    const two = friedman({ ...series, runs: series.runs.slice(0, 2) }, quiet)
    expect(two.lnAf[0]).not.toBeNaN()
    expect([two.lnAfStandardError[0], two.covarianceEaLnAf[0]]).toEqual([Number.NaN, Number.NaN])
  })
})

import { describe, expect, it } from 'vitest'
import { inHalfUnits } from '../check-values/as-printed.ts'
import chain from '../check-values/computed/astm-e1641-chain.json'
import { constantRateSeries, quiet } from '../check-values/series-of-values.ts'
import { doyleA, doyleSlope } from '../temperature-integral/doyle-table.ts'
import { lnPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { astmE1641 } from './astm-e1641.ts'
import { iso11358Part2 } from './iso-11358-2.ts'
import { ozawaFlynnWall } from './ozawa-flynn-wall.ts'

const R = gasConstant_J_per_mol_K
const asPrinted = (value: number, printed: string): string => value.toFixed((printed.split('.')[1] ?? '').length)

/** Runs at close rates around 10 K/min that hold a reaction of true Ea/(RT) = x at 600 K. */
function closeRates(x: number) {
  const T = [599.99, 600, 600.01]
  const Ea = x * R * 600
  const beta = T.map((value) => 10 * Math.exp(lnPOfX(Ea / (R * value)) - lnPOfX(x)))
  return { Ea, series: constantRateSeries([0.5], beta, [T]) }
}

describe('ASTM E1641', () => {
  const series = constantRateSeries([chain.level], chain.heatingRate_K_per_min, [chain.temperature_K])
  const result = astmE1641(series, quiet)
  const Ea = result.Ea[0]!
  const atMiddle = R * Number(chain.temperature_K[2])

  it('matches the worked chain: slope, first Ea, refined Ea, a and A', () => {
    const slope = result.lines[0]!.slope_K
    expect(asPrinted(slope, chain.slope_K)).toBe(chain.slope_K)
    expect(asPrinted((-slope * R) / 0.457 / 1000, chain.firstEa_kJ_per_mol)).toBe(chain.firstEa_kJ_per_mol)
    // The chain takes a(x) - a(x - 1) at x itself, the table between whole x a straight line: 4e-6 of Ea at x = 45. That moves a by 7e-5, A by 0.02 %.
    expect(Math.abs(Ea / 1000 / Number(chain.byTable.Ea_kJ_per_mol) - 1)).toBeLessThan(5e-6)
    expect(Math.abs(doyleA(Ea / atMiddle) - Number(chain.byTable.a))).toBeLessThan(1e-4)
    const A_per_min = 60 * Math.exp(result.lnA[0]!)
    expect(Math.abs(A_per_min / Number(chain.byTable.A_per_min) - 1)).toBeLessThan(3e-4)
    expect(result.status).toEqual(['ok'])
  })

  // Both columns of the chain, Ea refined until it stays: b as the difference of a at x itself, and as its derivative.
  it.each([
    ['the difference of a', (x: number) => doyleA(x) - doyleA(x - 1), chain.byTable],
    ['the derivative of a', doyleSlope, chain.byDerivative],
  ] as const)('the worked chain with %s: every printed digit of Ea, a and A', (_, b, printed) => {
    const steepness = -result.lines[0]!.slope_K * R
    let refined = steepness / 0.457
    for (let i = 0; i < 50; i++) refined = steepness / b(refined / atMiddle)
    expect(asPrinted(refined / 1000, printed.Ea_kJ_per_mol)).toBe(printed.Ea_kJ_per_mol)
    const a = doyleA(refined / atMiddle)
    // Temperatures of seven decimals leave Ea open by 4e-9 of itself, a by 8e-8.
    expect(inHalfUnits(a, printed.a)).toBeLessThanOrEqual(1.2)
    // A = -(β'/Ea) R ln(1 - alpha) 10^a, β' in K/min.
    const A_per_min = ((-5 * R) / refined) * Math.log1p(-chain.level) * 10 ** a
    expect(inHalfUnits(A_per_min, printed.A_per_min)).toBeLessThanOrEqual(1)
  })

  it('takes b of the table and not the derivative, which would give another Ea', () => {
    expect((1000 * Number(chain.byDerivative.Ea_kJ_per_mol)) / Ea - 1).toBeGreaterThan(4e-4)
  })

  it.each(chain.differencePercentOfTable)('falls short of the true Ea by $percent % at Ea/RT $x, and says so', ({ x, percent }) => {
    const close = closeRates(x)
    const one = astmE1641(close.series, quiet)
    const error = one.Ea[0]! / close.Ea - 1
    // The printed difference is of b at one x; b is read at the x of the Ea it lowers, which adds a quarter of it at x = 10 and less than 0.01 % from 20 on.
    expect(-100 * error).toBeGreaterThan(Number(percent) - 0.005)
    expect(-100 * error).toBeLessThan(Number(percent) * (x < 20 ? 1.25 : 1) + 0.01)
    // 0.01 K apart, the level's T is its mean within 2e-5 of itself.
    expect(Math.abs(one.systematicError[0]! / error - 1)).toBeLessThan(2e-3)
  })

  // The method itself says how Ea follows the slope: run anew with the T of one run moved, which is not the one that x is read at.
  it.each([9.6, 15.5, 20.5, 30.5, 60.5])('takes into the standard error that b follows Ea, at Ea/RT %f', (x) => {
    const Ea_true = x * R * 600
    const T = [585, 600, 612, 630]
    const beta = T.map((value) => 10 * Math.exp(lnPOfX(Ea_true / (R * value)) - lnPOfX(x)))
    const scattered = T.map((value, i) => value + [0.3, 0, -0.4, 0.2][i]!)
    const at = (shift: number) =>
      astmE1641(constantRateSeries([0.5], beta, [scattered.map((value, i) => (i === 3 ? value + shift : value))]), quiet)
    const [below, here, above] = [at(-0.02), at(0), at(0.02)]
    const perSlope = (above.Ea[0]! - below.Ea[0]!) / (above.lines[0]!.slope_K - below.lines[0]!.slope_K)
    expect(Math.abs(here.points[0]!.energyPerSlope / perSlope - 1)).toBeLessThan(2e-3)
    // Residuals and 1/T give the standard error of the slope by the formula of least squares.
    const inverse = scattered.map((value) => 1 / value)
    const mean = inverse.reduce((sum, value) => sum + value / 4, 0)
    const spread = inverse.reduce((sum, value) => sum + (value - mean) ** 2, 0)
    const squares = here.points[0]!.residual.reduce((sum, value) => sum + value * value, 0)
    expect(here.standardError[0]! / (-perSlope * Math.sqrt(squares / 2 / spread))).toBeCloseTo(1, 2)
  })

  it('leaves the error that the docstring states', () => {
    // y b(y) = x b_exact(x) solved for y with 30 digits (mpmath), as (y/x - 1) in percent.
    const stated: readonly (readonly [number, number])[] = [
      [10, -0.947],
      [20, -0.2391],
      [30, -0.1074],
      [60, -0.02724],
    ]
    for (const [x, percent] of stated) {
      const close = closeRates(x)
      expect(100 * (astmE1641(close.series, quiet).Ea[0]! / close.Ea - 1)).toBeCloseTo(percent, 3)
    }
  })

  it('gives ln A in 1/s of a first-order reaction, whatever the conversion', () => {
    // Sources of A: the table's Ea is 0.1 % low, and A follows it by x times as much.
    expect(Math.abs(result.lnA[0]! - Math.log(1e18 / 60))).toBeLessThan(0.05)
  })

  it('reads x at the heating rate nearest the middle, however the runs are ordered', () => {
    const order = [3, 1, 0, 2]
    const shuffled = astmE1641({ ...series, runs: order.map((i) => series.runs[i]!) }, quiet)
    expect(Math.abs(shuffled.Ea[0]! / Ea - 1)).toBeLessThan(1e-12)
    expect(Math.abs(shuffled.lnA[0]! - result.lnA[0]!)).toBeLessThan(1e-10)
  })

  it('has no Ea where the line gives none, or where the table ends', () => {
    expect(astmE1641(constantRateSeries([0.5], [1, 2, 5], [[520, 510, 500]]), quiet).status).toEqual(['line-not-determined'])
    // Ea/(RT) about 1.
    const faint = astmE1641(constantRateSeries([0.5], [1, 2, 4], [[500, 800, 1800]]), quiet)
    expect(faint.status).toEqual(['line-not-determined'])
    expect([faint.Ea[0], faint.lnA[0], faint.systematicError[0]]).toEqual([Number.NaN, Number.NaN, Number.NaN])
  })
})

describe('ISO 11358-2', () => {
  it('is OFW with 0.4567 in place of 1.052, 0.04 % apart', () => {
    const series = constantRateSeries([0.05], chain.heatingRate_K_per_min, [chain.temperature_K])
    const [iso, ofw] = [iso11358Part2(series, quiet), ozawaFlynnWall(series, quiet)]
    expect((100 * (iso.Ea[0]! / ofw.Ea[0]! - 1)).toFixed(2)).toBe('0.04')
    expect(iso.Ea[0]! / ofw.Ea[0]!).toBeCloseTo(1.052 / (0.4567 * Math.LN10), 12)
    // The standard error scales with it, r2 is the same line's.
    expect(iso.standardError[0]! / ofw.standardError[0]!).toBeCloseTo(1.052 / (0.4567 * Math.LN10), 9)
    expect(iso.r2[0]).toBeCloseTo(ofw.r2[0]!, 12)
    expect(iso.lnA[0]).toBeNaN()
  })

  it('differs from ASTM E1641, which refines its constant', () => {
    const { series, Ea } = closeRates(15)
    expect(iso11358Part2(series, quiet).Ea[0]! / Ea - 1).toBeGreaterThan(0.07)
    expect(Math.abs(astmE1641(series, quiet).Ea[0]! / Ea - 1)).toBeLessThan(0.005)
  })
})

import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { inHalfUnits } from '../check-values/as-printed.ts'
import table from '../check-values/computed/wrong-model-one-curve.json'
import { temperatureAtConversion } from '../check-values/exact-model-curve.ts'
import { reactionModelCodes, reactionModels, type ReactionModelCode } from '../reaction-models/registry.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity } from '../units/quantity.ts'
import { singleCurveFit, type ConversionCurve } from './single-curve-fit.ts'

const alphas = Array.from({ length: 17 }, (_, i) => (10 + 5 * i) / 100)

function curveOf(code: ReactionModelCode, Ea_J_per_mol: number, lnA: number, heatingRate_K_per_s: number): ConversionCurve {
  const step = { model: reactionModels[code], Ea_J_per_mol, lnA }
  return {
    heatingRate: quantity(heatingRate_K_per_s, 'K/s'),
    temperature_K: alphas.map((alpha) => temperatureAtConversion(step, heatingRate_K_per_s, alpha)),
    conversion: alphas,
  }
}

const firstOrder = curveOf('F1', 1000 * table.Ea_kJ_per_mol, Math.log(table.A_per_min / 60), table.heatingRate_K_per_min / 60)
const fitOf = (code: ReactionModelCode) => singleCurveFit(firstOrder, reactionModels[code])
const run = (temperature_K: number[], conversion: number[], code: ReactionModelCode = 'F1', integral?: 'exact') =>
  singleCurveFit({ heatingRate: quantity(0.1, 'K/s'), temperature_K, conversion }, reactionModels[code], integral)
const anyCode = fc.constantFrom(...reactionModelCodes.filter((code) => code !== 'B1'))
/** Ea and ln A such that the reaction runs around 300 to 1000 K. */
const anyStep = fc.record({
  code: anyCode,
  Ea_J_per_mol: fc.double({ min: 50_000, max: 350_000, noNaN: true }),
  temperature_K: fc.double({ min: 300, max: 1000, noNaN: true }),
  heatingRate_K_per_min: fc.double({ min: 0.5, max: 50, noNaN: true }),
})

describe('the straight line of one curve', () => {
  // Exact first-order data, Ea 200 kJ/mol: every wrong model fits, each with an Ea of its own.
  it.each(table.rows)('of $code through first-order data has the printed Ea and r²', ({ code, Ea_kJ_per_mol, r2 }) => {
    const fit = fitOf(code as ReactionModelCode)
    expect(fit.status).toBe('ok')
    expect(inHalfUnits(fit.Ea / 1000, Ea_kJ_per_mol)).toBeLessThanOrEqual(1)
    expect(inHalfUnits(fit.r2, r2)).toBeLessThanOrEqual(1)
  })

  it('cannot tell A2, A3 and A4 from first order: r² of 0.999997 and more at a half, a third and a fifth of the true Ea', () => {
    expect(Math.min(fitOf('A2').r2, fitOf('A3').r2, fitOf('A4').r2)).toBeGreaterThan(0.999997)
    expect([fitOf('A2'), fitOf('A3'), fitOf('A4')].map((fit) => Math.round(fit.Ea / 1000))).toEqual([95, 60, 43])
  })

  it('gives ln A of the right model as far as its integral goes', () => {
    const fit = fitOf('F1')
    // Of Ea -0.0010, times Ea/(RT) of 43, is -0.043 in ln A.
    expect(fit.lnA).toBeCloseTo(Math.log(table.A_per_min / 60), 1)
    expect(fit.line.slope_K * -gasConstant_J_per_mol_K).toBeCloseTo(fit.Ea, 6)
    expect(fit.dof).toBe(15)
  })

  it('with the exact integral gives Ea and ln A of the right model exactly, first order first', () => {
    const first = singleCurveFit(firstOrder, reactionModels.F1, 'exact')
    expect(Math.abs(first.Ea / 200_000 - 1)).toBeLessThan(1e-12)
    expect(Math.abs(first.lnA - Math.log(table.A_per_min / 60))).toBeLessThan(1e-11)
    fc.assert(
      fc.property(anyStep, ({ code, Ea_J_per_mol, temperature_K, heatingRate_K_per_min }) => {
        const lnA = Ea_J_per_mol / (gasConstant_J_per_mol_K * temperature_K) + Math.log(heatingRate_K_per_min / 60 / 20)
        const fit = singleCurveFit(curveOf(code, Ea_J_per_mol, lnA, heatingRate_K_per_min / 60), reactionModels[code], 'exact')
        expect(fit.status).toBe('ok')
        expect(Math.abs(fit.Ea / Ea_J_per_mol - 1)).toBeLessThan(1e-11)
        expect(Math.abs(fit.lnA - lnA)).toBeLessThan(1e-9)
        expect(fit.standardError / fit.Ea).toBeLessThan(1e-10)
        expect(fit.r2).toBeCloseTo(1, 12)
      }),
      { numRuns: 200 },
    )
  })

  it('has the standard error of a line whose ordinates scatter by 0.01', () => {
    // ln g moved up and down in turn, by 0.01.
    const T = firstOrder.temperature_K
    const disturbed = alphas.map((alpha, i) => -Math.expm1(Math.log1p(-alpha) * Math.exp(i % 2 === 0 ? 0.01 : -0.01)))
    const fit = singleCurveFit({ ...firstOrder, conversion: disturbed }, reactionModels.F1, 'exact')
    const x = Array.from(T, (value) => 1 / value)
    const mean = x.reduce((sum, value) => sum + value, 0) / x.length
    const spread = x.reduce((sum, value) => sum + (value - mean) ** 2, 0)
    // s = 0.01·√(17/15); through π(x), Ea moves by 2/x² of itself less.
    const expected = (gasConstant_J_per_mol_K * 0.01 * Math.sqrt(17 / 15)) / Math.sqrt(spread)
    expect(fit.standardError / expected).toBeGreaterThan(0.99)
    expect(fit.standardError / expected).toBeLessThan(1.01)
  })

  it('does not care for the order of the rows, and uses those inside 0 to 1 only', () => {
    const reversed = { ...firstOrder, temperature_K: Array.from(firstOrder.temperature_K).toReversed(), conversion: alphas.toReversed() }
    expect(singleCurveFit(reversed, reactionModels.R3).Ea / fitOf('R3').Ea).toBeCloseTo(1, 13)
    const longer = {
      ...firstOrder,
      temperature_K: [Number.NaN, ...Array.from(firstOrder.temperature_K), 900, 950],
      conversion: [0, ...alphas, 1, Number.NaN],
    }
    expect(singleCurveFit(longer, reactionModels.R3)).toEqual(fitOf('R3'))
  })

  it('says why it has no numbers', () => {
    expect(fitOf('B1')).toMatchObject({ status: 'model-does-not-apply', Ea: Number.NaN, lnA: Number.NaN })
    expect(run([500], [0.5]).status).toBe('too-few-points')
    expect(run([500, 500], [0.4, 0.5]).status).toBe('line-not-determined')
    expect(run([500, 510], [0.5, 0.4]).status).toBe('energy-not-positive')
    const slight = run([500, 600], [0.2, 0.305])
    expect(slight).toMatchObject({ status: 'energy-too-small', Ea: Number.NaN })
  })

  it.each([
    [{ heatingRate: quantity(0, 'K/s'), temperature_K: [500, 510], conversion: [0.1, 0.2] }, 'no-heating-rate'],
    [{ heatingRate: quantity(0.1, 'K/s'), temperature_K: [500], conversion: [0.1, 0.2] }, 'column-length'],
    [{ heatingRate: quantity(0.1, 'K/s'), temperature_K: [500, Number.NaN], conversion: [0.1, 0.2] }, 'not-finite'],
  ] as const)('rejects what is no curve (%#)', (curve, code) => {
    expect(() => singleCurveFit(curve, reactionModels.F1)).toThrow(expect.objectContaining({ code }) as Error)
  })
})

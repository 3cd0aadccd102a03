import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { temperatureAtConversion } from '../check-values/exact-model-curve.ts'
import { randomStream } from '../numerics/random.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import { reactionModelCodes, reactionModels, type ReactionModelCode } from '../reaction-models/registry.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity } from '../units/quantity.ts'
import { fittedConversionCurve } from './fitted-conversion-curve.ts'
import type { ConversionCurve } from './single-curve-fit.ts'

const alphas = Array.from({ length: 19 }, (_, i) => (i + 1) / 20)

/** A curve at levels, exact but for an error of conversion at each: T(alpha + error). */
function curveOf(code: ReactionModelCode, Ea_J_per_mol: number, lnA: number, rate: number, error: () => number = () => 0): ConversionCurve {
  const step = { model: reactionModels[code], Ea_J_per_mol, lnA }
  return {
    heatingRate: quantity(rate, 'K/s'),
    temperature_K: alphas.map((alpha) => temperatureAtConversion(step, rate, alpha + error())),
    conversion: alphas,
  }
}

const [Ea, lnA, rate] = [150e3, 28, 10 / 60]
const curve = (temperature_K: number[], conversion: number[]): ConversionCurve => ({
  heatingRate: quantity(0.1, 'K/s'),
  temperature_K,
  conversion,
})
const of = (T: number[], alpha: number[], code: ReactionModelCode = 'F1') => fittedConversionCurve(curve(T, alpha), reactionModels[code])

describe('conversion of one curve, fitted', () => {
  it('gives Ea and ln A of the right model back from exact curves', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...reactionModelCodes.filter((code) => code !== 'B1')),
        fc.double({ min: 50_000, max: 350_000, noNaN: true }),
        fc.double({ min: 300, max: 1000, noNaN: true }),
        fc.double({ min: 0.5, max: 50, noNaN: true }),
        (code, E, T, beta) => {
          const trueLnA = E / (gasConstant_J_per_mol_K * T) + Math.log(beta / 60 / 20)
          const fit = fittedConversionCurve(curveOf(code, E, trueLnA, beta / 60), reactionModels[code])
          expect(fit.status).toBe('ok')
          expect(Math.abs(fit.Ea / E - 1)).toBeLessThan(1e-10)
          expect(Math.abs(fit.lnA - trueLnA)).toBeLessThan(1e-8)
        },
      ),
      { numRuns: 100 },
    )
  })

  // Errors equal in alpha, 0.003 each, 400 curves a model from seeded draws: the truth is put in.
  it.each(['F1', 'R3', 'A2', 'F2'] as const)(
    '%s: scatters less about the true Ea and ln A than the line, and by its standard errors',
    (code) => {
      const replicates = 400
      let [squares, squaresOfLine, covered, coveredLnA, coveredByLine] = [0, 0, 0, 0, 0]
      for (let i = 0; i < replicates; i++) {
        const draws = randomStream(31, i)
        const fit = fittedConversionCurve(
          curveOf(code, Ea, lnA, rate, () => 0.003 * draws.normal()),
          reactionModels[code],
        )
        expect(fit.status).toBe('ok')
        const t = studentTQuantile(0.975, fit.dof)
        squares += (fit.Ea - Ea) ** 2
        squaresOfLine += (fit.line.Ea - Ea) ** 2
        if (Math.abs(fit.Ea - Ea) <= t * fit.standardError) covered++
        if (Math.abs(fit.lnA - lnA) <= t * fit.lnAStandardError) coveredLnA++
        if (Math.abs(fit.line.Ea - Ea) <= t * fit.line.standardError) coveredByLine++
      }
      expect(squares).toBeLessThan(0.75 * squaresOfLine)
      expect(Math.abs(covered / replicates - 0.95)).toBeLessThan(0.033)
      expect(Math.abs(coveredLnA / replicates - 0.95)).toBeLessThan(0.033)
      expect(coveredByLine).not.toBe(covered)
    },
  )

  it('has an Ea and ln A that rise and fall together', () => {
    const draws = randomStream(4)
    const fit = fittedConversionCurve(
      curveOf('F1', Ea, lnA, rate, () => 0.002 * draws.normal()),
      reactionModels.F1,
    )
    const correlation = fit.covarianceEaLnA / (fit.standardError * fit.lnAStandardError)
    expect(correlation).toBeGreaterThan(0.99)
    expect(correlation).toBeLessThanOrEqual(1)
    expect(fit.residuals).toHaveLength(19)
  })

  it('finds a wrong Ea with a wrong model: it is no way to choose one', () => {
    const fit = fittedConversionCurve(curveOf('F1', Ea, lnA, rate), reactionModels.A2)
    expect(fit.status).toBe('ok')
    expect(fit.Ea / Ea).toBeLessThan(0.6)
    expect(fit.residualStandardDeviation).toBeLessThan(0.001)
  })

  it('says why it has no numbers', () => {
    expect(of([500, 510], [0.4, 0.5], 'B1')).toMatchObject({ status: 'model-does-not-apply', Ea: Number.NaN })
    expect(of([500], [0.4]).status).toBe('too-few-points')
    expect(of([500, 510], [0.5, 0.4]).status).toBe('energy-not-positive')
    expect(of([500, 510], [0.4, 0.5])).toMatchObject({ status: 'ok', dof: 0, standardError: Number.NaN })
    expect(() => fittedConversionCurve({ ...curve([500, 510], [0.4, 0.5]), heatingRate: quantity(0, 'K/s') }, reactionModels.F1)).toThrow(
      expect.objectContaining({ code: 'no-heating-rate' }) as Error,
    )
  })
})

import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import norris from '../check-values/certified/nist-norris.json'
import { temperatureAtConversion } from '../check-values/exact-model-curve.ts'
import { reactionModelCodes, reactionModels, type ReactionModelCode } from '../reaction-models/registry.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity } from '../units/quantity.ts'
import { compensationLine, lnAFromCompensation, type ArrheniusPair } from './compensation-line.ts'
import { singleCurveFit, type IntegralOfOneCurve } from './single-curve-fit.ts'

const energy = (value: number) => quantity(value, 'J/mol')
const pair = (Ea: number, lnA: number): ArrheniusPair => ({ Ea: energy(Ea), lnA })
const alphas = Array.from({ length: 17 }, (_, i) => (10 + 5 * i) / 100)

/** Pairs of every model but `left` for exact data of one model at one heating rate. */
function pairsFor(
  code: ReactionModelCode,
  Ea_J_per_mol: number,
  lnA: number,
  heatingRate: number,
  left: readonly string[],
  integral: IntegralOfOneCurve,
) {
  const step = { model: reactionModels[code], Ea_J_per_mol, lnA }
  const curve = {
    heatingRate: quantity(heatingRate, 'K/s'),
    temperature_K: alphas.map((alpha) => temperatureAtConversion(step, heatingRate, alpha)),
    conversion: alphas,
  }
  return reactionModelCodes
    .filter((other) => !left.includes(other))
    .map((other) => singleCurveFit(curve, reactionModels[other], integral))
    .filter((fit) => fit.status === 'ok')
}

describe('the compensation line', () => {
  it('is the certified line of NIST Norris where the pairs are its points', () => {
    const line = compensationLine(norris.x.map((x, i) => pair(x, norris.y[i] as number)))
    const { slope, intercept, slopeStandardError, interceptStandardError, residualStandardDeviation, r2 } = norris.certified
    expect(line.slope_mol_per_J / Number(slope)).toBeCloseTo(1, 12)
    expect(line.intercept / Number(intercept)).toBeCloseTo(1, 9)
    expect(line.slopeStandardError_mol_per_J / Number(slopeStandardError)).toBeCloseTo(1, 10)
    expect(line.interceptStandardError / Number(interceptStandardError)).toBeCloseTo(1, 10)
    expect(line.residualStandardDeviation / Number(residualStandardDeviation)).toBeCloseTo(1, 10)
    expect(line.r2).toBeCloseTo(Number(r2), 12)
  })

  const anyModel = fc.constantFrom<ReactionModelCode>('F1', 'A2', 'A3', 'R2', 'R3', 'F3/2', 'F2', 'D2')
  it('through wrong models only still holds the true ln A at the true Ea, within its interval and a factor 10 of A', () => {
    fc.assert(
      fc.property(
        anyModel,
        fc.double({ min: 60_000, max: 300_000, noNaN: true }),
        fc.double({ min: 20, max: 50, noNaN: true }),
        fc.constantFrom<IntegralOfOneCurve>('coats-redfern', 'exact'),
        (code, Ea, x, integral) => {
          const heatingRate = 5 / 60
          // The reaction runs at about Ea/(R x).
          const lnA = x + Math.log((heatingRate * x * x * gasConstant_J_per_mol_K) / Ea)
          const line = compensationLine(pairsFor(code, Ea, lnA, heatingRate, ['B1', code], integral))
          expect(line.r2).toBeGreaterThan(0.95)
          const found = lnAFromCompensation(line, energy(Ea), energy(0))
          expect(found.lower95).toBeLessThan(lnA)
          expect(found.upper95).toBeGreaterThan(lnA)
          expect(Math.abs(found.lnA - lnA)).toBeLessThan(Math.log(10))
        },
      ),
      { numRuns: 200 },
    )
  })

  it('through first order alone and its Avrami–Erofeev kin gives ln A exactly at the true Ea of first-order data', () => {
    // For A(n), ln g is 1/n of that of first order: with the exact integral F1 itself lies on any line that goes through it.
    const [first] = pairsFor(
      'F1',
      150_000,
      30,
      0.1,
      reactionModelCodes.filter((code) => code !== 'F1'),
      'exact',
    )
    const [second] = pairsFor(
      'F1',
      150_000,
      30,
      0.1,
      reactionModelCodes.filter((code) => code !== 'A2'),
      'exact',
    )
    const line = compensationLine([first, second].flatMap((fit) => (fit === undefined ? [] : [fit])))
    const found = lnAFromCompensation(line, energy(150_000), energy(1000))
    expect(found.lnA).toBeCloseTo(30, 9)
    expect(line).toMatchObject({ status: 'ok', models: 2, dof: 0, slopeStandardError_mol_per_J: Number.NaN })
    expect([found.standardError, found.lower95, found.upper95]).toEqual([Number.NaN, Number.NaN, Number.NaN])
  })

  it("adds to the line's own error that of Ea, and the scatter of the models", () => {
    const line = compensationLine([pair(100_000, 20), pair(150_000, 31), pair(200_000, 40), pair(250_000, 51)])
    const at = (Ea: number, se: number) => lnAFromCompensation(line, energy(Ea), energy(se))
    const s = line.residualStandardDeviation
    // At the mean of Ea the line's error is s/√n.
    expect(at(line.meanEa, 0).standardError).toBeCloseTo(s / 2, 12)
    expect(at(line.meanEa, 0).modelStandardError).toBeCloseTo(s * Math.sqrt(1.25), 12)
    expect(at(line.meanEa, 5000).standardError).toBeCloseTo(Math.hypot(s / 2, 5000 * line.slope_mol_per_J), 12)
    // Elsewhere from variance and covariance of slope and intercept.
    const E = 220_000
    const fromCovariance =
      line.interceptStandardError ** 2 + (E * line.slopeStandardError_mol_per_J) ** 2 + 2 * E * line.covariance_mol_per_J
    expect(at(E, 0).standardError).toBeCloseTo(Math.sqrt(fromCovariance), 9)
    expect(at(E, 0).lnA).toBeCloseTo(line.intercept + E * line.slope_mol_per_J, 10)
    // t(0.975; 2) = 4.3027.
    expect((at(E, 0).upper95 - at(E, 0).lnA) / at(E, 0).modelStandardError).toBeCloseTo(4.3027, 4)
    expect(at(E, Number.NaN).standardError).toBeNaN()
  })

  it('says why there is none, and rejects pairs without numbers', () => {
    expect(compensationLine([])).toMatchObject({ status: 'too-few-models', slope_mol_per_J: Number.NaN })
    expect(compensationLine([pair(100_000, 20)]).status).toBe('too-few-models')
    expect(compensationLine([pair(100_000, 20), pair(100_000, 21)]).status).toBe('energies-not-distinct')
    expect(lnAFromCompensation(compensationLine([]), energy(1e5), energy(0)).lnA).toBeNaN()
    expect(() => compensationLine([pair(100_000, 20), pair(Number.NaN, 20)])).toThrow(/Model 2/)
    expect(() => lnAFromCompensation(compensationLine([pair(1, 2), pair(2, 3)]), energy(1e5), energy(-1))).toThrow(/not negative/)
  })
})

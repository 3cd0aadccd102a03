import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import misra from '../check-values/certified/nist-misra1a.json'
import { randomStream } from '../numerics/random.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import { reactionModelCodes, reactionModels, type ReactionModelCode } from '../reaction-models/registry.ts'
import { quantity } from '../units/quantity.ts'
import type { HoldOptions } from './hold-rows.ts'
import { rateConstantFromHold } from './rate-constant-from-hold.ts'

const T = quantity(400, 'K')
const levels = Array.from({ length: 19 }, (_, i) => (i + 1) / 20)
const free: HoldOptions = { zeroInTime: 'free', range: [0.1, 0.9] }
const fixed: HoldOptions = { ...free, zeroInTime: 'fixed' }

/** A hold read at levels, exact but for an error of conversion at each: t = g(alpha + error)/k + zero. */
function hold(code: ReactionModelCode, k: number, zero_s: number, error: () => number = () => 0) {
  const { g } = reactionModels[code]
  return { temperature: T, time_s: levels.map((alpha) => g(Math.min(1, Math.max(0, alpha + error()))) / k + zero_s), conversion: levels }
}

describe('a rate constant from a hold', () => {
  it.each(reactionModelCodes)('%s: exact runs give k and the zero in time back', (code) => {
    fc.assert(
      fc.property(
        fc.double({ min: -18, max: 3, noNaN: true }),
        fc.double({ min: -0.5, max: 5, noNaN: true }),
        fc.constantFrom(free, fixed),
        (lnK, shift, options) => {
          if (code === 'B1' && options === fixed) return
          const k = Math.exp(lnK)
          const zero = options === free ? shift / k : 0
          const found = rateConstantFromHold(hold(code, k, zero), reactionModels[code], options)
          expect(found.status).toBe('ok')
          expect(Math.abs(found.rateConstant / k - 1)).toBeLessThan(1e-11)
          expect(Math.abs(found.zero_s - zero) * k).toBeLessThan(1e-11)
          expect(found.residualStandardDeviation).toBeLessThan(1e-13)
        },
      ),
      { numRuns: 30 },
    )
  })

  // NIST Statistical Reference Datasets, Misra1a: y = b1 (1 - exp(-b2 x)). With b1 certified, alpha = y/b1 is a first-order run, and k the certified b2.
  it('first order matches the certified parameter of Misra1a', () => {
    const [b1 = Number.NaN, b2 = Number.NaN] = misra.certified.parameters.map(Number)
    const run = { temperature: T, time_s: misra.x, conversion: misra.y.map((y) => y / b1) }
    const found = rateConstantFromHold(run, reactionModels.F1, { zeroInTime: 'fixed', range: [0, 1] })
    expect(Math.abs(found.rateConstant / b2 - 1)).toBeLessThan(1e-9)
  })

  // Errors equal in alpha, 0.003 each, 400 runs a cell from seeded draws: the truth is put in, nothing of it comes from the code.
  it.each([
    ['F1', free],
    ['F1', fixed],
    ['F2', free],
    ['D3', fixed],
    ['R3', free],
    ['A2', free],
  ] as const)('%s: scatters less about the true k than the line of g, and by its standard error (%#)', (code, options) => {
    const k = 1e-3
    const replicates = 400
    let [squares, squaresOfLine, covered, coveredByLine] = [0, 0, 0, 0]
    for (let i = 0; i < replicates; i++) {
      const draws = randomStream(20, i)
      const found = rateConstantFromHold(
        hold(code, k, 0, () => 0.003 * draws.normal()),
        reactionModels[code],
        options,
      )
      expect(found.status).toBe('ok')
      const t = studentTQuantile(0.975, found.dof)
      squares += (found.rateConstant - k) ** 2
      squaresOfLine += (found.linearised.rateConstant_per_s - k) ** 2
      if (Math.abs(found.rateConstant - k) <= t * found.standardError) covered++
      if (Math.abs(found.linearised.rateConstant_per_s - k) <= t * found.linearised.standardError_per_s) coveredByLine++
    }
    expect(squares).toBeLessThan(0.75 * squaresOfLine)
    // 95 % within three standard deviations of a share of 400.
    expect(Math.abs(covered / replicates - 0.95)).toBeLessThan(0.033)
    expect(coveredByLine).toBeLessThan(covered)
  })

  it('does not care for the unit of time, its origin or the order of the rows', () => {
    const draws = randomStream(5)
    const run = hold('F1', 2e-4, 100, () => 0.002 * draws.normal())
    const found = rateConstantFromHold(run, reactionModels.F1, free)
    const other = rateConstantFromHold(
      { temperature: T, time_s: run.time_s.map((t) => 60 * t + 5000).toReversed(), conversion: levels.toReversed() },
      reactionModels.F1,
      free,
    )
    expect((60 * other.rateConstant) / found.rateConstant).toBeCloseTo(1, 9)
    expect((60 * other.standardError) / found.standardError).toBeCloseTo(1, 6)
    expect(other.zero_s).toBeCloseTo(60 * found.zero_s + 5000, 3)
    expect(other.zeroStandardError_s / found.zeroStandardError_s).toBeCloseTo(60, 4)
    expect(other.residuals).toHaveLength(found.rows)
  })

  it('reads columns of a run as well, rows before the start and behind the end of the reaction included', () => {
    const times = Array.from({ length: 80 }, (_, i) => 30 * i)
    const run = { temperature: T, time_s: times, conversion: times.map((t) => 1 - (1 - Math.min(1, Math.max(0, 1e-3 * (t - 240)))) ** 3) }
    const found = rateConstantFromHold(run, reactionModels.R3, { zeroInTime: 'free', range: [0, 1] })
    expect(found.status).toBe('ok')
    expect(found.rateConstant / 1e-3).toBeCloseTo(1, 9)
    expect(found.zero_s).toBeCloseTo(240, 6)
  })

  it('says why there is none', () => {
    const run = { temperature: T, time_s: [0, 10, 20], conversion: [0.5, 0.4, 0.3] }
    const whole = { zeroInTime: 'free', range: [0, 1] } as const
    const of = (changed: object, options: HoldOptions = whole, code: ReactionModelCode = 'F1') =>
      rateConstantFromHold({ ...run, ...changed }, reactionModels[code], options)
    expect(of({})).toMatchObject({ status: 'not-positive', rateConstant: Number.NaN })
    expect(of({ conversion: [0, 0, 1] }, { ...whole, range: [0.1, 0.9] })).toMatchObject({ status: 'too-few-rows' })
    expect(of({ time_s: [5, 5, 5] })).toMatchObject({ status: 'time-not-distinct' })
    expect(of({ conversion: [0.3, 0.4, 0.5] }, fixed, 'B1')).toMatchObject({ status: 'model-does-not-apply', standardError: Number.NaN })
    expect(of({ time_s: [0, 10, Number.NaN], conversion: [0.3, 0.4, 0.5] })).toMatchObject({
      status: 'ok',
      dof: 0,
      standardError: Number.NaN,
    })
    expect(() => of({}, { ...whole, range: [0.9, 0.1] })).toThrow(/range/)
    expect(() => of({ time_s: [0] })).toThrow(/as many/)
  })
})

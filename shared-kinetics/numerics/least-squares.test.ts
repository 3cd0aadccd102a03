import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import boxbod from '../check-values/certified/nist-boxbod.json'
import misra1a from '../check-values/certified/nist-misra1a.json'
import norris from '../check-values/certified/nist-norris.json'
import { Cancelled } from '../errors.ts'
import type { FitParameter } from './fit-parameter.ts'
import { leastSquares, type LeastSquaresProblem } from './least-squares.ts'
import { lineFit } from './line-fit.ts'
import { startsAround } from './starts-around.ts'

/** A problem from a model of plain numbers. */
function problemOf(
  model: (p: readonly number[], x: number) => number,
  x: readonly number[],
  y: readonly number[],
  parameters: readonly FitParameter[],
): LeastSquaresProblem {
  return {
    parameters,
    residualCount: x.length,
    residuals: (p, out) => {
      const plain = [...p]
      x.forEach((value, i) => {
        out[i] = model(plain, value) - (y[i] ?? Number.NaN)
      })
    },
  }
}

const decay = ([amount = 0, constant = 0, rest = 0]: readonly number[], t: number): number => amount * Math.exp(-constant * t) + rest
const times = Array.from({ length: 15 }, (_, i) => i / 2)
/** Errors without pattern, fixed. */
const errors = [0.3, -0.5, 0.2, 0.6, -0.4, -0.1, 0.5, -0.6, 0.1, 0.2, -0.3, 0.4, -0.2, 0.1, -0.4]
const decayed = times.map((t, i) => decay([10, 0.6, 2], t) + (errors[i] ?? 0))
const decayParameters = (scale: 'plain' | 'log'): FitParameter[] => [
  { name: 'amount', start: 5, scale },
  { name: 'constant', start: 0.2, scale },
  { name: 'rest', start: 1 },
]
const relative = (a: number, b: number): number => Math.abs(a / b - 1)

const saturating = ([b1 = 0, b2 = 0]: readonly number[], x: number): number => -b1 * Math.expm1(-b2 * x)

const product = ([a = 0, b = 0, c = 0]: readonly number[], t: number): number => a * b * Math.exp(-c * t)

describe('least squares', () => {
  it('recovers the parameters of an exact problem to nearly double precision from a start some way off', () => {
    const factor = fc.double({ min: 0.5, max: 2, noNaN: true })
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 100, noNaN: true }),
        fc.double({ min: 0.2, max: 1, noNaN: true }),
        fc.double({ min: 0.5, max: 10, noNaN: true }),
        fc.tuple(factor, factor, factor),
        (amount, constant, rest, [f1, f2, f3]) => {
          const truth = [amount, constant, rest]
          const y = times.map((t) => decay(truth, t))
          const fit = leastSquares(
            problemOf(decay, times, y, [
              { name: 'amount', start: amount * f1 },
              { name: 'constant', start: constant * f2, scale: 'log' },
              { name: 'rest', start: rest * f3 },
            ]),
          )
          expect(fit.status).toBe('converged')
          truth.forEach((value, j) => {
            expect(relative(fit.parameters[j] ?? Number.NaN, value)).toBeLessThan(1e-11 * Math.max(1, amount / rest))
          })
        },
      ),
    )
  })

  it('fits a straight line as the line fit does, covariance included', () => {
    const fit = leastSquares(
      problemOf(([a = 0, b = 0], x) => a + b * x, norris.x, norris.y, [
        { name: 'intercept', start: 0 },
        { name: 'slope', start: 0 },
      ]),
    )
    const line = lineFit(norris.x, norris.y)
    expect(fit.status).toBe('converged')
    expect(relative(fit.parameters[0] ?? 0, line.intercept)).toBeLessThan(1e-9)
    expect(relative(fit.parameters[1] ?? 0, line.slope)).toBeLessThan(1e-12)
    expect(relative(fit.standardDeviations[0] ?? 0, line.interceptStandardError)).toBeLessThan(1e-9)
    expect(relative(fit.standardDeviations[1] ?? 0, line.slopeStandardError)).toBeLessThan(1e-9)
    expect(relative(fit.covariance[1] ?? 0, line.covariance)).toBeLessThan(1e-9)
    expect(fit.covariance[1]).toBe(fit.covariance[2])
    expect(fit.dof).toBe(34)
  })

  it('gives the same minimum and spread with plain and with log-scaled parameters', () => {
    const plain = leastSquares(problemOf(decay, times, decayed, decayParameters('plain')))
    const log = leastSquares(problemOf(decay, times, decayed, decayParameters('log')))
    expect([plain.status, log.status]).toEqual(['converged', 'converged'])
    for (let j = 0; j < 3; j++) {
      expect(relative(log.parameters[j] ?? 0, plain.parameters[j] ?? 0)).toBeLessThan(1e-9)
      expect(relative(log.standardDeviations[j] ?? 0, plain.standardDeviations[j] ?? 0)).toBeLessThan(1e-8)
    }
  })

  it('gives the same with an analytic Jacobian and with differences', () => {
    for (const scale of ['plain', 'log'] as const) {
      const numeric = problemOf(decay, times, decayed, decayParameters(scale))
      const analytic: LeastSquaresProblem = {
        ...numeric,
        jacobian: ([amount = 0, constant = 0], out) => {
          times.forEach((t, i) => {
            const share = Math.exp(-constant * t)
            out[i] = share
            out[times.length + i] = -amount * t * share
            out[2 * times.length + i] = 1
          })
        },
      }
      const a = leastSquares(numeric)
      const b = leastSquares(analytic)
      expect(b.status).toBe('converged')
      for (let j = 0; j < 3; j++) expect(relative(a.parameters[j] ?? 0, b.parameters[j] ?? 0)).toBeLessThan(1e-9)
      for (let k = 0; k < 9; k++) expect(relative(a.covariance[k] ?? 0, b.covariance[k] ?? 0)).toBeLessThan(1e-8)
    }
  })

  it('does not depend on the units of parameters and data', () => {
    const fit = leastSquares(problemOf(decay, times, decayed, decayParameters('plain')))
    const scaled = leastSquares(
      problemOf(
        ([a = 0, k = 0, c = 0], t) => decay([a, k * 1e6, c], t),
        times,
        decayed.map((y) => y * 1e-9),
        [
          { name: 'amount', start: 5e-9 },
          { name: 'constant', start: 0.2e-6 },
          { name: 'rest', start: 1e-9 },
        ],
      ),
    )
    expect(scaled.status).toBe('converged')
    const units = [1e-9, 1e-6, 1e-9]
    for (let j = 0; j < 3; j++) {
      expect(relative((scaled.parameters[j] ?? 0) / (units[j] ?? 1), fit.parameters[j] ?? 0)).toBeLessThan(1e-9)
      expect(relative((scaled.standardDeviations[j] ?? 0) / (units[j] ?? 1), fit.standardDeviations[j] ?? 0)).toBeLessThan(1e-8)
    }
  })

  it('takes the noise as known where the residuals are in parts of it', () => {
    const estimated = leastSquares(problemOf(decay, times, decayed, decayParameters('plain')))
    const known = leastSquares(problemOf(decay, times, decayed, decayParameters('plain')), { noise: 'known' })
    for (let j = 0; j < 3; j++) {
      expect(
        relative((estimated.standardDeviations[j] ?? 0) / estimated.residualStandardDeviation, known.standardDeviations[j] ?? 0),
      ).toBeLessThan(1e-12)
    }
  })

  it('has parameters but no spread where as many are fitted as there are points', () => {
    const fit = leastSquares(
      problemOf(
        decay,
        [0, 1, 3],
        [0, 1, 3].map((t) => decay([10, 0.6, 2], t)),
        decayParameters('plain'),
      ),
    )
    expect(fit).toMatchObject({ status: 'converged', dof: 0 })
    expect(relative(fit.parameters[1] ?? 0, 0.6)).toBeLessThan(1e-11)
    expect([...fit.standardDeviations]).toEqual([Number.NaN, Number.NaN, Number.NaN])
  })
})

describe('what is no minimum is not given as an answer', () => {
  const nothing = [Number.NaN, Number.NaN]

  it('a plateau: a start so far out that a parameter has no effect', () => {
    for (const far of [60, 300]) {
      const fit = leastSquares(
        problemOf(saturating, boxbod.x, boxbod.y, [
          { name: 'b1', start: 100 },
          { name: 'b2', start: far },
        ]),
      )
      expect(fit.status).toBe('plateau')
      expect([...fit.parameters]).toEqual(nothing)
      expect([...fit.standardDeviations]).toEqual(nothing)
      expect(fit.residualSumOfSquares).toBeNaN()
      // Where it stopped is the flat line through the mean: 9771.5.
      expect(fit.descents.at(-1)?.residualSumOfSquares).toBeCloseTo(9771.5, 0)
    }
  })

  it('a plateau: parameters that run away because the data ask for none that are finite', () => {
    // A straight line is the limit of amount·(1 - exp(-constant·x)) for constant to 0 with their product kept; curved upwards, the data have no finite best.
    const x = [1, 2, 3, 4, 5, 6]
    const y = x.map((value) => value + 0.05 * value * value)
    const fit = leastSquares(
      problemOf(saturating, x, y, [
        { name: 'amount', start: 10, scale: 'log' },
        { name: 'constant', start: 0.1, scale: 'log' },
      ]),
    )
    expect(fit.status).toBe('plateau')
    expect([...fit.parameters]).toEqual(nothing)
  })

  it('two parameters that only enter as their product: singular', () => {
    for (const scale of ['plain', 'log'] as const) {
      const fit = leastSquares(
        problemOf(product, times, decayed, [
          { name: 'a', start: 2, scale },
          { name: 'b', start: 3, scale },
          { name: 'c', start: 0.4, scale },
        ]),
      )
      expect(fit.status).toBe('singular')
      expect([...fit.parameters]).toEqual([Number.NaN, Number.NaN, Number.NaN])
    }
  })

  it('a minimum below which another start went without arriving: a false minimum', () => {
    // Below p = 2 a minimum of 1 at p = 1, beyond it a valley that falls towards 0.01 for good.
    const fit = leastSquares(
      {
        parameters: [{ name: 'p', start: 1.5 }],
        residualCount: 2,
        residuals: ([p = 0], out) => {
          out[0] = p < 2 ? p - 1 : Math.exp(-p)
          out[1] = p < 2 ? 1 : 0.1
        },
      },
      { starts: [[5]] },
    )
    expect(fit.descents[0]).toMatchObject({ status: 'converged', residualSumOfSquares: 1 })
    expect(fit.status).toBe('false-minimum')
    expect(fit.parameters[0]).toBeNaN()
  })

  it('a start at the point of the model that lies farthest from the data: a saddle', () => {
    // A circle and a point inside it: at p = π the residuals are at right angles to the circle, as at the minimum p = 0.
    const circle: LeastSquaresProblem = {
      parameters: [{ name: 'p', start: Math.PI }],
      residualCount: 2,
      residuals: ([p = 0], out) => {
        out[0] = Math.cos(p) - 0.5
        out[1] = Math.sin(p)
      },
      jacobian: ([p = 0], out) => {
        out[0] = -Math.sin(p)
        out[1] = Math.cos(p)
      },
    }
    const stuck = leastSquares(circle)
    expect(stuck.status).toBe('saddle')
    expect(stuck.parameters[0]).toBeNaN()
    const found = leastSquares(circle, { starts: [[1]] })
    expect(found.status).toBe('converged')
    expect(found.parameters[0]).toBeCloseTo(0, 14)
    expect(found.residualSumOfSquares).toBeCloseTo(0.25, 15)
  })

  it('too few iterations, too few points, residuals that are not to be had', () => {
    const parameters = [
      { name: 'b1', start: 500 },
      { name: 'b2', start: 1e-4 },
    ]
    expect(leastSquares(problemOf(saturating, [1], [1], parameters)).status).toBe('too-few-points')
    expect(leastSquares(problemOf(() => Number.NaN, misra1a.x, misra1a.y, parameters)).status).toBe('not-finite')
    expect(leastSquares(problemOf(rosenbrockLike, [0, 1], [0, 0], parametersOfRosenbrock), { mostIterations: 3 }).status).toBe(
      'iteration-limit',
    )
    expect(leastSquares(problemOf(rosenbrockLike, [0, 1], [0, 0], parametersOfRosenbrock)).status).toBe('converged')
  })
})

const rosenbrockLike = ([a = 0, b = 0]: readonly number[], x: number): number => (x === 0 ? 10 * (b - a * a) : 1 - a)
const parametersOfRosenbrock = [
  { name: 'a', start: -1.2 },
  { name: 'b', start: 1 },
]

describe('bounds', () => {
  it('that do not bind change nothing', () => {
    const free = leastSquares(problemOf(decay, times, decayed, decayParameters('plain')))
    const bounded = leastSquares(
      problemOf(
        decay,
        times,
        decayed,
        decayParameters('plain').map((parameter) => ({ ...parameter, lower: 0, upper: 100 })),
      ),
    )
    expect(bounded.status).toBe('converged')
    for (let j = 0; j < 3; j++) expect(relative(bounded.parameters[j] ?? 0, free.parameters[j] ?? 0)).toBeLessThan(1e-9)
  })

  it('that bind are told, and the other parameters are those of the fit with that one held', () => {
    const bounded = leastSquares(
      problemOf(decay, times, decayed, [
        { name: 'amount', start: 5 },
        { name: 'constant', start: 0.2, scale: 'log', upper: 0.4 },
        { name: 'rest', start: 1 },
      ]),
    )
    const held = leastSquares(
      problemOf(decay, times, decayed, [
        { name: 'amount', start: 5 },
        { name: 'constant', start: 0.4, lower: 0.4, upper: 0.4 },
        { name: 'rest', start: 1 },
      ]),
    )
    // With the constant held the problem is a straight line in exp(-0.4 t).
    const line = lineFit(
      times.map((t) => Math.exp(-0.4 * t)),
      decayed,
    )
    expect(bounded.status).toBe('at-bound')
    expect(bounded.atBound).toEqual(['no', 'upper', 'no'])
    expect(bounded.parameters[1]).toBeCloseTo(0.4, 14)
    expect(bounded.standardDeviations[1]).toBeNaN()
    expect(held.status).toBe('converged')
    expect(held.atBound).toEqual(['no', 'held', 'no'])
    for (const fit of [bounded, held]) {
      expect(relative(fit.parameters[0] ?? 0, line.slope)).toBeLessThan(1e-10)
      expect(relative(fit.parameters[2] ?? 0, line.intercept)).toBeLessThan(1e-10)
    }
    expect(held.dof).toBe(13)
    expect(relative(held.standardDeviations[0] ?? 0, line.slopeStandardError)).toBeLessThan(1e-9)
  })

  it('let go of a start that lies on them', () => {
    const fit = leastSquares(
      problemOf(decay, times, decayed, [
        { name: 'amount', start: 20, upper: 20 },
        { name: 'constant', start: 0.1, lower: 0.1 },
        { name: 'rest', start: 0, lower: 0 },
      ]),
    )
    const free = leastSquares(problemOf(decay, times, decayed, decayParameters('plain')))
    expect(fit.status).toBe('converged')
    for (let j = 0; j < 3; j++) expect(relative(fit.parameters[j] ?? 0, free.parameters[j] ?? 0)).toBeLessThan(1e-9)
  })
})

describe('asking for a fit', () => {
  it('rejects starts and bounds that cannot be', () => {
    const fitWith = (parameter: Omit<FitParameter, 'name'>) => () =>
      leastSquares(problemOf(([a = 0]) => a, [1, 2], [1, 2], [{ name: 'k', ...parameter }]))
    expect(fitWith({ start: Number.NaN })).toThrow(/k starts at/)
    expect(fitWith({ start: 3, upper: 2 })).toThrow(/outside/)
    expect(fitWith({ start: 3, lower: 4, upper: 2 })).toThrow(/below/)
    expect(fitWith({ start: 0, scale: 'log' })).toThrow(/above 0/)
    expect(fitWith({ start: 1, typical: 0 })).toThrow(/typical/)
    const problem = problemOf(decay, times, decayed, decayParameters('plain'))
    expect(() => leastSquares(problem, { starts: [[1, 2]] })).toThrow(/3 values/)
  })

  it('can be cancelled from within', () => {
    let polls = 0
    const checkCancelled = (): void => {
      polls += 1
      if (polls === 5) throw new Cancelled()
    }
    expect(() => leastSquares(problemOf(decay, times, decayed, decayParameters('plain')), { checkCancelled })).toThrow(Cancelled)
  })

  it('draws the same starts for the same seed, within the bounds', () => {
    const parameters: FitParameter[] = [
      { name: 'a', start: 3, lower: 2, upper: 4 },
      { name: 'b', start: -1 },
      { name: 'c', start: 0, typical: 5 },
    ]
    const starts = startsAround(parameters, 30, 11)
    expect(startsAround(parameters, 12, 11)).toEqual(starts.slice(0, 12))
    expect(startsAround(parameters, 30, 12)).not.toEqual(starts)
    for (const [a = 0, b = 0] of starts) {
      expect(a).toBeGreaterThanOrEqual(2)
      expect(a).toBeLessThanOrEqual(4)
      expect(b).toBeLessThan(0)
    }
    expect(new Set(starts.map(([, , c]) => c)).size).toBe(30)
  })
})

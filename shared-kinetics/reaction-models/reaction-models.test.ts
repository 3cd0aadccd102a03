import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import precise from '../check-values/computed/reaction-models-precise.json'
import table from '../check-values/computed/reaction-models.json'
import { gaussLegendre } from '../numerics/quadrature.ts'
import { extendedProutTompkins } from './extended-prout-tompkins.ts'
import type { ReactionModel } from './model.ts'
import { reactionOrder } from './reaction-order.ts'
import {
  reactionModelAliases,
  reactionModelCodes,
  reactionModelFamilies,
  reactionModelFamilyIds,
  reactionModels,
  type ReactionModelCode,
} from './registry.ts'
import { sestakBerggren } from './sestak-berggren.ts'

const modelOf = (code: string): ReactionModel => reactionModels[code as ReactionModelCode]
const relative = (value: number, expected: string | number): number =>
  value === Number(expected) ? 0 : Math.abs(value / Number(expected) - 1)

const L = (alpha: number): number => -Math.log1p(-alpha)
/** In it 1/f is smooth to both ends. */
const logit = (alpha: number): number => Math.log(alpha / (1 - alpha))

/** Central difference of fourth order, the step in proportion to the nearer end of the range. */
function derivative(function_: (alpha: number) => number, alpha: number): number {
  const h = 1e-3 * Math.min(alpha, 1 - alpha)
  return (8 * (function_(alpha + h) - function_(alpha - h)) - (function_(alpha + 2 * h) - function_(alpha - 2 * h))) / (12 * h)
}

/** The largest |g' f - 1| on a grid, and |g| close to alpha = 0: the check that any table of models must pass. */
function disagreement(f: (alpha: number) => number, g: (alpha: number) => number) {
  let largest = 0
  for (let alpha = 0.02; alpha < 0.985; alpha += 0.02) largest = Math.max(largest, Math.abs(derivative(g, alpha) * f(alpha) - 1))
  return { derivative: largest, atStart: Math.abs(g(0)) }
}

const free: readonly ReactionModel[] = [
  reactionOrder(0.7),
  reactionOrder(1.0001),
  sestakBerggren(0.5, 1.2),
  sestakBerggren(-0.4, 0.3, 2),
  sestakBerggren(1.2, 0.8),
  extendedProutTompkins(1.3, 0.7),
  extendedProutTompkins(1, 1, 0.999),
  ...reactionModelFamilyIds.map((id) => reactionModelFamilies[id].make(reactionModelFamilies[id].parameters.map(({ start }) => start))),
]
const everyModel = [...Object.values(reactionModels), ...free].map((model) => ({ code: model.code, model }))

describe('the list of reaction models', () => {
  it('is the common one, each under its code', () => {
    expect(reactionModelCodes).toEqual(table.rows.map((row) => row.code))
    for (const code of reactionModelCodes) expect(reactionModels[code].code).toBe(code)
    for (const code of Object.values(reactionModelAliases)) expect(reactionModels[code].f(0.3)).toBe(1)
  })

  // Table of f and g at 0.1, 0.5, 0.9; 8 significant digits, 12 at 0.5.
  it.each(table.rows)('$code has the printed f and g', ({ code, f, g }) => {
    table.alpha.forEach((alpha, k) => {
      const digits = alpha === 0.5 ? 12 : 8
      expect(Number(modelOf(code).f(alpha).toPrecision(digits)), `f(${alpha})`).toBe(Number(f[k]))
      expect(Number(modelOf(code).g(alpha).toPrecision(digits)), `g(${alpha})`).toBe(Number(g[k]))
    })
  })

  it.each(precise.rows)('$code keeps its digits from 1e-12 to 1 - 1e-12', ({ code, f, g }) => {
    precise.alpha.forEach((alpha, k) => {
      expect(relative(modelOf(code).f(alpha), f[k] as string), `f(${alpha})`).toBeLessThan(4e-15)
      expect(relative(modelOf(code).g(alpha), g[k] as string), `g(${alpha})`).toBeLessThan(4e-15)
    })
  })
})

describe('models with free exponents', () => {
  it.each(precise.sestakBerggren)('SB($m, $n): g is the integral of 1/f', ({ m, n, gZeroAt, g }) => {
    const model = sestakBerggren(m, n)
    expect(model.gZeroAt).toBe(gZeroAt)
    precise.freeAlpha.forEach((alpha, k) => {
      expect(Math.abs(model.g(alpha) - Number(g[k])), `g(${alpha})`).toBeLessThanOrEqual(2e-14 * Math.abs(Number(g[k])))
    })
  })

  it.each(precise.extendedProutTompkins)('extended Prout–Tompkins n $n, m $m, q $q: g is the integral of 1/f', ({ n, m, q, g }) => {
    precise.freeAlpha.forEach((alpha, k) => {
      expect(relative(extendedProutTompkins(n, m, q).g(alpha), g[k] as string), `g(${alpha})`).toBeLessThan(2e-14)
    })
  })

  it('come to the fixed models at their exponents', () => {
    for (const alpha of [1e-6, 0.1, 0.5, 0.9, 0.999]) {
      expect(relative(reactionModelFamilies.RO.make([2]).g(alpha), reactionModels.F2.g(alpha))).toBeLessThan(1e-15)
      expect(relative(reactionModelFamilies.A.make([3]).g(alpha), reactionModels.A3.g(alpha))).toBeLessThan(1e-15)
      expect(relative(reactionModelFamilies.SB.make([0, 1]).g(alpha), reactionModels.F1.g(alpha))).toBeLessThan(1e-14)
      expect(relative(sestakBerggren(-1, 0, 0.5).g(alpha), reactionModels.D1.g(alpha))).toBeLessThan(1e-14)
      expect(relative(sestakBerggren(0.5, 0, 2).g(alpha), reactionModels.P2.g(alpha))).toBeLessThan(1e-14)
      expect(Math.abs(sestakBerggren(1, 1).g(alpha) - reactionModels.B1.g(alpha))).toBeLessThan(
        1e-14 * Math.max(1, Math.abs(reactionModels.B1.g(alpha))),
      )
      expect(relative(reactionModelFamilies.ePT.make([2, 0]).g(alpha), reactionModels.F2.g(alpha))).toBeLessThan(1e-14)
      expect(relative(reactionOrder(1 + 1e-12).g(alpha), reactionModels.F1.g(alpha))).toBeLessThan(1e-11)
    }
  })

  it.each([
    () => reactionOrder(Number.NaN),
    () => reactionModelFamilies.A.make([0]),
    () => reactionModelFamilies.A.make([]),
    () => sestakBerggren(0.5, 1, 0),
    () => sestakBerggren(Number.POSITIVE_INFINITY, 1),
    () => extendedProutTompkins(1, 1, 1),
  ])('refuse exponents that cannot be meant (%#)', (make) => {
    expect(make).toThrow(expect.objectContaining({ code: 'bad-option' }) as Error)
  })
})

describe.each(everyModel)('$code', ({ model }) => {
  it("has g' f = 1, and g(0) = 0 unless its rate starts from nothing", () => {
    const { derivative: off, atStart } = disagreement(model.f, model.g)
    // 1e-3 of the way to the end, to the fourth power, and rounding of g over that step.
    expect(off).toBeLessThan(1e-9)
    expect(atStart).toBe(model.gZeroAt === 0 ? 0 : Number.POSITIVE_INFINITY)
    expect(model.g(model.gZeroAt)).toBe(0)
  })

  it('has the integral of 1/f for differences of g, at random stretches', () => {
    const rule = gaussLegendre(24)
    const anyAlpha = fc.double({ min: 0.02, max: 0.98, noNaN: true })
    fc.assert(
      fc.property(anyAlpha, anyAlpha, (from, to) => {
        let sum = 0
        const half = (logit(to) - logit(from)) / 2
        rule.nodes.forEach((node, i) => {
          const alpha = 1 / (1 + Math.exp(-(logit(from) + half * (1 + node))))
          sum += ((rule.weights[i] as number) * half * alpha * (1 - alpha)) / model.f(alpha)
        })
        const scale = Math.abs(model.g(from)) + Math.abs(model.g(to)) + 1e-3
        expect(Math.abs(model.g(to) - model.g(from) - sum) / scale).toBeLessThan(1e-11)
      }),
    )
  })

  it("has f' as its derivative of f", () => {
    for (let alpha = 0.02; alpha < 0.985; alpha += 0.02) {
      expect(
        Math.abs(derivative(model.f, alpha) - model.dfDalpha(alpha)) / (Math.abs(model.dfDalpha(alpha)) + model.f(alpha)),
      ).toBeLessThan(1e-9)
    }
  })

  it('gives NaN outside 0 to 1', () => {
    for (const alpha of [-1e-12, 1 + 1e-12, Number.NaN]) {
      expect([model.f(alpha), model.dfDalpha(alpha), model.g(alpha)]).toEqual([Number.NaN, Number.NaN, Number.NaN])
    }
  })
})

describe('misprints that stand in open tables', () => {
  const { D4, A3, R2, R3, F2, F3 } = reactionModels
  // One open table of biomass kinetics (2019) prints all of these.
  it.each<[string, (alpha: number) => number, (alpha: number) => number]>([
    ['D4 with f = (3/2)/[1 - (1 - alpha)^(1/3)]', (a) => 1.5 / (1 - Math.cbrt(1 - a)), D4.g],
    ['A3 with f = 3 (1 - alpha) L^(3/2)', (a) => 3 * (1 - a) * L(a) ** 1.5, A3.g],
    ['R2 with g = [1 - (1 - alpha)]^(1/2)', R2.f, (a) => a ** 0.5],
    ['R3 with g = [1 - (1 - alpha)]^(1/3)', R3.f, (a) => a ** (1 / 3)],
  ])("%s: fail the check of g' f = 1", (_name, f, g) => {
    expect(disagreement(f, g).derivative).toBeGreaterThan(0.1)
  })

  it.each<[string, (alpha: number) => number, (alpha: number) => number]>([
    ['F2', F2.f, (a) => 1 / (1 - a)],
    ['F3', F3.f, (a) => 0.5 / (1 - a) ** 2],
  ])('%s without the -1 in g: pass that of the derivative and fail g(0) = 0', (_name, f, g) => {
    expect(disagreement(f, g).derivative).toBeLessThan(1e-9)
    expect(disagreement(f, g).atStart).toBeGreaterThan(0.4)
  })

  it('the misprinted f of D4 is 2.7 times too small at alpha = 0.95', () => {
    expect(1.5 / (1 - Math.cbrt(0.05)) / D4.f(0.95)).toBeCloseTo(2.7, 1)
  })

  it('F3 as f = (1/2)(1 - alpha)³ is another scale, not a misprint: A is doubled', () => {
    const f = (a: number): number => F3.f(a) / 2
    const g = (a: number): number => F3.g(a) * 2
    expect(disagreement(f, g)).toEqual({ derivative: expect.closeTo(0, 8) as number, atStart: 0 })
    expect(F3.normalisation).toMatch(/A is then 2 times as large/)
  })
})

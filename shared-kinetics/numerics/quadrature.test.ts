import { describe, expect, it } from 'vitest'
import { gaussLegendre, type QuadratureRule } from './quadrature.ts'

/** ∫ f(x) dx over [lower, upper] by one application of the rule. */
function integrate(f: (x: number) => number, lower: number, upper: number, { nodes, weights }: QuadratureRule): number {
  const half = 0.5 * (upper - lower)
  return half * nodes.reduce((sum, node, k) => sum + (weights[k] ?? Number.NaN) * f(0.5 * (upper + lower) + half * node), 0)
}

describe('a Gauss–Legendre rule', () => {
  // Abramowitz & Stegun (1964), Table 25.4.
  it('matches the tabulated nodes and weights for 5 points', () => {
    const { nodes, weights } = gaussLegendre(5)
    const expected = { nodes: [-0.906179845938664, -0.538469310105683, 0, 0.538469310105683, 0.906179845938664] }
    expect(Array.from(nodes, (x) => Number(x.toFixed(15)))).toEqual(expected.nodes)
    expect(Array.from(weights, (w) => Number(w.toFixed(15)))).toEqual([
      0.236926885056189, 0.478628670499366, 0.568888888888889, 0.478628670499366, 0.236926885056189,
    ])
  })

  it('is exact for every power up to 2n - 1 and for none above', () => {
    for (let points = 1; points <= 12; points++) {
      const rule = gaussLegendre(points)
      for (let power = 0; power <= 2 * points - 1; power++) {
        expect(integrate((x) => x ** power, 0, 1, rule) * (power + 1)).toBeCloseTo(1, 13)
      }
      expect(Math.abs(integrate((x) => x ** (2 * points), -1, 1, rule) - 2 / (2 * points + 1))).toBeGreaterThan(1e-9)
    }
  })

  it('integrates over any interval', () => {
    expect(integrate(Math.exp, -2, 3, gaussLegendre(16))).toBeCloseTo(Math.exp(3) - Math.exp(-2), 12)
    expect(integrate(Math.exp, 3, -2, gaussLegendre(16))).toBeCloseTo(Math.exp(-2) - Math.exp(3), 12)
  })

  it('rejects a number of points that is none', () => {
    for (const points of [0, 2.5, 65, Number.NaN]) expect(() => gaussLegendre(points)).toThrow(/points/)
  })
})

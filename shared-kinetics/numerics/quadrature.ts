import { KineticsError } from '../errors.ts'

/** Nodes on [-1, 1], ascending, and their weights, which add up to 2. */
export interface QuadratureRule {
  readonly nodes: Float64Array
  readonly weights: Float64Array
}

/**
 * Gauss–Legendre rule of n points: exact for polynomials up to degree 2n - 1. Nodes are the roots of the Legendre polynomial P_n, found by Newton's method
 * from Tricomi's approximation; weights 2/((1 - x²)P_n'(x)²).
 *
 * @param points - whole number, 1 to 64
 * @throws KineticsError `bad-option` outside these
 * @source abramowitz-stegun-1964 25.4.29
 */
export function gaussLegendre(points: number): QuadratureRule {
  if (!Number.isInteger(points) || points < 1 || points > 64) {
    throw new KineticsError('bad-option', `A Gauss–Legendre rule here has 1 to 64 points, not ${points}.`, { points })
  }
  const nodes = new Float64Array(points)
  const weights = new Float64Array(points)
  for (let i = 0; i < Math.ceil(points / 2); i++) {
    let x = points === 2 * i + 1 ? 0 : Math.cos((Math.PI * (i + 0.75)) / (points + 0.5))
    for (let k = 0; k < 20; k++) {
      const { value, derivative } = legendre(points, x)
      const step = value / derivative
      x -= step
      if (Math.abs(step) <= Number.EPSILON) break
    }
    const weight = 2 / ((1 - x * x) * legendre(points, x).derivative ** 2)
    nodes[i] = -x
    nodes[points - 1 - i] = x
    weights[i] = weight
    weights[points - 1 - i] = weight
  }
  return { nodes, weights }
}

/** P_n and its derivative at x, |x| < 1, by the three-term recurrence. */
function legendre(n: number, x: number): { readonly value: number; readonly derivative: number } {
  let before = 1
  let value = x
  for (let k = 2; k <= n; k++) [before, value] = [value, ((2 * k - 1) * x * value - (k - 1) * before) / k]
  return { value, derivative: (n * (before - x * value)) / (1 - x * x) }
}

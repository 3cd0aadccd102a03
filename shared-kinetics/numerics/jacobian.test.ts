import { describe, expect, it } from 'vitest'
import { differenceJacobian, type ResidualFunction } from './jacobian.ts'

/** exp(a t) and a b t at t = 1, 2; derivatives are known. */
const residuals: ResidualFunction = (p, out) => {
  const [a = 0, b = 0] = p
  out[0] = Math.exp(a)
  out[1] = Math.exp(2 * a)
  out[2] = a * b
}
const exact = (a: number, b: number): number[] => [Math.exp(a), 2 * Math.exp(2 * a), b, 0, 0, a]

function worst(a: number, b: number, accuracy: 'quick' | 'fine', bounds: { lower?: number; upper?: number; size?: number } = {}): number {
  const point = Float64Array.from([a, b])
  const at = new Float64Array(3)
  residuals(point, at)
  const out = new Float64Array(6)
  const size = Float64Array.from([bounds.size ?? Math.abs(a), Math.abs(b)])
  const lower = Float64Array.from([bounds.lower ?? -100, -100])
  const upper = Float64Array.from([bounds.upper ?? 100, 100])
  const inside: ResidualFunction = (p, into) => {
    if ((p[0] ?? 0) < (lower[0] ?? 0) || (p[0] ?? 0) > (upper[0] ?? 0)) into.fill(Number.NaN)
    else residuals(p, into)
  }
  differenceJacobian(inside, { point, residuals: at, size, lower, upper }, accuracy, out)
  return Math.max(...exact(a, b).map((value, i) => Math.abs((out[i] ?? Number.NaN) - value) / Math.max(1, Math.abs(value))))
}

describe('a Jacobian by differences', () => {
  it('is exact to nine digits where quick, to eleven where fine', () => {
    expect(worst(0.7, 3, 'quick')).toBeLessThan(1e-9)
    expect(worst(0.7, 3, 'fine')).toBeLessThan(1e-11)
  })

  it('stays within the bounds, and at them', () => {
    expect(worst(0.7, 3, 'fine', { upper: 0.7 })).toBeLessThan(1e-9)
    expect(worst(0.7, 3, 'fine', { lower: 0.7 })).toBeLessThan(1e-9)
    expect(worst(0.7, 3, 'quick', { upper: 0.7000001 })).toBeLessThan(1e-8)
  })

  it('cuts its step where the size given is far too large', () => {
    expect(worst(0.7, 3, 'fine', { size: 5000 })).toBeLessThan(1e-10)
  })

  it('has no column where the residuals are not to be had', () => {
    expect(worst(0.7, 3, 'fine', { lower: 0.69999999, upper: 0.70000001 })).toBeNaN()
  })
})

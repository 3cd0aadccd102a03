import { describe, expect, it } from 'vitest'
import { normalNumbers } from '../check-values/simulated-run.ts'
import { correlatedNoiseOf, noiseOf } from './noise.ts'

const n = 5000
const x = Float64Array.from({ length: n }, (_, i) => i + 0.3 * Math.sin(i))
const curve = (t: number): number => 5 + Math.exp(-(((t - 2500) / 400) ** 2))

describe('noise', () => {
  it('is nothing for a cubic', () => {
    const y = x.map((t) => (t / 1000) ** 3 - (t / 1000) ** 2)
    expect(noiseOf(x, y, 0, n - 1)).toBeLessThan(1e-10)
  })

  it('is the standard deviation that was put on a curve, with one sample in fifty wild', () => {
    const normal = normalNumbers(7)
    const y = x.map((t, i) => curve(t) + 0.01 * normal() + (i % 50 === 0 ? 3 : 0))
    // A wild sample disturbs the five estimates that use it: a tenth of all, which moves the median a little.
    expect(noiseOf(x, y, 0, n - 1)).toBeGreaterThan(0.0095)
    expect(noiseOf(x, y, 0, n - 1)).toBeLessThan(0.0125)
    const clean = normalNumbers(8)
    expect(
      noiseOf(
        x,
        x.map((t) => curve(t) + 0.01 * clean()),
        0,
        n - 1,
      ),
    ).toBeCloseTo(0.01, 3)
  })

  it('that a filter has spread shows at wider strides only', () => {
    const normal = normalNumbers(3)
    const white = x.map(() => normal())
    const filtered = x.map((_, i) => white.subarray(Math.max(0, i - 15), i + 16).reduce((sum, value) => sum + value, 0) / Math.sqrt(31))
    expect(noiseOf(x, filtered, 20, n - 21)).toBeLessThan(0.5)
    const found = correlatedNoiseOf(x, filtered, 20, n - 21, 64)
    expect(found).toBeGreaterThan(0.9)
    expect(found).toBeLessThan(1.2)
  })

  it('cannot be told from fewer than five samples', () => {
    expect(noiseOf(x, x, 0, 3)).toBeNaN()
  })
})

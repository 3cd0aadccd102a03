import { describe, expect, it } from 'vitest'
import { lineFit } from '../numerics/line-fit.ts'
import { randomStream } from '../numerics/random.ts'
import { lackOfFit } from './lack-of-fit.ts'

const residualsOf = (x: readonly number[], y: readonly number[]): number[] => {
  const { valueAtMean, slope, xMean } = lineFit(x, y)
  return y.map((value, i) => value - valueAtMean - slope * ((x[i] as number) - xMean))
}

describe('lack of fit against pure error', () => {
  it('is the classical analysis of variance where replicates share their x', () => {
    // Pure error by hand: pairs (1, 3), (4, 6), (10, 12) give 2 + 2 + 2 = 6 with 3 degrees of freedom.
    const x = [0, 0, 1, 1, 2, 2]
    const y = [1, 3, 4, 6, 10, 12]
    // Means 2, 5, 11 at 0, 1, 2: slope 4.5, line 1.5, 6, 10.5: off by 0.5, -1, 0.5, twice each: 3 with 1 degree of freedom.
    const result = lackOfFit(residualsOf(x, y), [0, 0, 1, 1, 2, 2])
    expect(result).toMatchObject({ dofLackOfFit: 1, dofPureError: 3 })
    expect(result?.F).toBeCloseTo(1.5, 12)
    // P(F(1, 3) > 1.5) is that of |t(3)| > √1.5: 1 - (2/π)(θ + sinθ cosθ), tan θ = t/√3 (Abramowitz & Stegun 1964, 26.7.3).
    const theta = Math.atan(Math.sqrt(1.5 / 3))
    expect(result?.p).toBeCloseTo(1 - (2 / Math.PI) * (theta + Math.sin(theta) * Math.cos(theta)), 12)
  })

  it('has p below 0.05 in one case of twenty where a line with independent errors holds, replicates at x that differ a little', () => {
    let below = 0
    for (let k = 0; k < 4000; k++) {
      const random = randomStream(3, k)
      const x = [0, 0, 1, 1.3, 1.7, 1.7, 2.5].map((value) => value + 0.02 * random.normal())
      const y = x.map((value) => 3 - 2 * value + 0.1 * random.normal())
      if ((lackOfFit(residualsOf(x, y), [0, 0, 1, 2, 3, 3, 4])?.p ?? 1) < 0.05) below++
    }
    expect(below / 4000).toBeGreaterThan(0.04)
    expect(below / 4000).toBeLessThan(0.06)
  })

  it('finds a curve that replicates show to be one', () => {
    const x = [0, 0, 1, 1, 2, 2, 3, 3]
    const noise = [0.01, -0.01, 0.02, -0.01, 0, 0.01, -0.02, 0.01]
    const y = x.map((value, i) => value * value + (noise[i] as number))
    expect(lackOfFit(residualsOf(x, y), [0, 0, 1, 1, 2, 2, 3, 3])?.p).toBeLessThan(1e-6)
  })

  it('is not to be had without replicates, or with two programmes', () => {
    expect(lackOfFit([1, -1, 0.5], [0, 1, 2])).toBeNull()
    expect(lackOfFit([1, -1, 0.5, 0.1], [0, 0, 1, 1])).toBeNull()
    expect(lackOfFit([0, 0, 0, 0], [0, 0, 1, 2])?.p).toBeNaN()
  })
})

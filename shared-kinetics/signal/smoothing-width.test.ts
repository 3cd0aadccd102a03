import { describe, expect, it } from 'vitest'
import { normalNumbers } from '../check-values/simulated-run.ts'
import { localPolynomial } from './local-polynomial.ts'
import { smoothingHalfWidth } from './smoothing-width.ts'

const samplesPerDuration = 1000
const widthFor = (noise: number, samples = samplesPerDuration): number =>
  smoothingHalfWidth({ kind: 'extent', noise, duration: 60, samplesPerDuration: samples })

describe('smoothing width', () => {
  it.each([
    ['extent', 2e-5],
    ['rate', 2e-3],
  ] as const)('leaves a thousandth of the largest rate as noise (%s, by trial)', (kind, noise) => {
    const halfWidth = smoothingHalfWidth({ kind, noise, duration: 1, samplesPerDuration })
    const normal = normalNumbers(11)
    const x = Float64Array.from({ length: 40_000 }, (_, i) => i / samplesPerDuration)
    const { value, slope } = localPolynomial(
      x,
      x.map(() => noise * normal()),
      { halfWidth, degree: 3 },
    )
    const inner = (kind === 'extent' ? slope : value).subarray(1000, 39_000)
    const left = Math.sqrt(inner.reduce((sum, error) => sum + error * error, 0) / inner.length)
    expect(left).toBeGreaterThan(0.00085)
    expect(left).toBeLessThan(0.00115)
  })

  it('grows with the noise, shrinks with the number of samples, and never passes a quarter of the duration', () => {
    const widths = [0, 1e-7, 1e-5, 1e-4, 1e-3, 1e-2, 0.3].map((noise) => widthFor(noise))
    expect(widths).toEqual(widths.toSorted((a, b) => a - b))
    expect(widths[0]).toBe(0)
    expect(widths.at(-1)).toBe(15)
    expect(widthFor(1e-4, 4000)).toBeLessThan(widthFor(1e-4, 1000))
  })

  it('keeps the bias at the top of a bell of half the duration below the noise left there', () => {
    // A normal bell of unit area and height 2 (half the duration 1): its integral is smoothed, the slope at its top compared with 2.
    const sigma = 0.5 / Math.sqrt(2 * Math.PI)
    const noise = 1e-3
    const halfWidth = smoothingHalfWidth({ kind: 'extent', noise, duration: 1, samplesPerDuration })
    const x = Float64Array.from({ length: 3001 }, (_, i) => (i - 1500) / samplesPerDuration)
    let area = 0
    const integral = x.map((t) => (area += Math.exp(-0.5 * (t / sigma) ** 2) / (sigma * Math.sqrt(2 * Math.PI)) / samplesPerDuration))
    const { slope } = localPolynomial(x, integral, { halfWidth, degree: 3 })
    const bias = Math.abs(Math.max(...slope) - 2) / 2
    const noiseLeft = noise * Math.sqrt(17.16 / (samplesPerDuration * halfWidth ** 3))
    expect(bias).toBeLessThan(1.2 * noiseLeft)
    expect(bias).toBeGreaterThan(0.3 * noiseLeft)
  })
})

import { describe, expect, it } from 'vitest'
import norris from '../check-values/certified/nist-norris.json'
import { lineConfidenceBand, linePredictionBand, lineSlopeInterval } from './line-bands.ts'
import { lineFit } from './line-fit.ts'
import { studentTQuantile } from './student-t.ts'

const tenths = (value: number): bigint => BigInt(Math.round(value * 10))
const sumOf = (a: readonly bigint[], b: readonly bigint[]): bigint => a.reduce((sum, value, i) => sum + value * (b[i] ?? 0n), 0n)

/** The quotient of two whole numbers, correct to double precision. */
const quotient = (numerator: bigint, denominator: bigint): number => Number((numerator * 10n ** 40n) / denominator) / 1e40

/**
 * The matrix form s²·(1, x)(XᵀX)⁻¹(1, x)ᵀ with raw sums of whole numbers (tenths of x and y), where nothing is centred and nothing is lost.
 */
function exactAt(
  x: readonly number[],
  y: readonly number[],
  at: number,
): { readonly value: number; readonly ofLine: number; readonly ofNew: number } {
  const X = x.map(tenths)
  const Y = y.map(tenths)
  const p = tenths(at)
  const n = BigInt(x.length)
  const ones = X.map(() => 1n)
  const sx = sumOf(X, ones)
  const sy = sumOf(Y, ones)
  const xx = n * sumOf(X, X) - sx * sx
  const xy = n * sumOf(X, Y) - sx * sy
  const yy = n * sumOf(Y, Y) - sy * sy
  // Residual sum of squares in hundredths: (yy·xx - xy²)/(n·xx); leverage: (Σx² - 2pΣx + np²)/xx.
  const leverage = sumOf(X, X) - 2n * p * sx + n * p * p
  const varianceTimes = (share: bigint): number => quotient((yy * xx - xy * xy) * share, 100n * n * (n - 2n) * xx * xx)
  return {
    value: quotient(sy * xx + xy * (n * p - sx), 10n * n * xx),
    ofLine: Math.sqrt(varianceTimes(leverage)),
    ofNew: Math.sqrt(varianceTimes(leverage + xx)),
  }
}

describe('the bands of a line', () => {
  const fit = lineFit(norris.x, norris.y)

  it.each([-100, 0, 228.1, 1200])('of NIST Norris at x = %f are those of matrix algebra in whole numbers', (x) => {
    const exact = exactAt(norris.x, norris.y, x)
    // t(0.975; 34), as any table prints it.
    const t = 2.0322
    const line = lineConfidenceBand(fit, x)
    expect(line.standardError / exact.ofLine).toBeCloseTo(1, 12)
    expect(Math.abs(line.value - exact.value)).toBeLessThan(1e-11)
    expect((line.upper - line.lower) / 2 / exact.ofLine).toBeCloseTo(t, 4)
    const point = linePredictionBand(fit, x)
    expect(point.standardError / exact.ofNew).toBeCloseTo(1, 12)
    expect((point.upper + point.lower) / 2 - exact.value).toBeCloseTo(0, 10)
    expect((point.upper - point.lower) / 2 / exact.ofNew).toBeCloseTo(t, 4)
  })

  it('at x = 0 have the certified standard error of the intercept', () => {
    expect(lineConfidenceBand(fit, 0).standardError / Number(norris.certified.interceptStandardError)).toBeCloseTo(1, 12)
  })

  it('take another level, and no level outside (0, 1)', () => {
    const wide = lineConfidenceBand(fit, 10, 0.99)
    expect((wide.upper - wide.value) / wide.standardError).toBeCloseTo(studentTQuantile(0.995, 34), 10)
    for (const level of [0, 1, 95, Number.NaN]) expect(() => linePredictionBand(fit, 0, level)).toThrow(/between 0 and 1/)
  })

  it('have no ends through two points, and nothing where there is no line', () => {
    const two = linePredictionBand(lineFit([1, 2], [3, 5]), 3)
    expect(two.value).toBe(7)
    expect(two.lower).toBeNaN()
    expect(lineConfidenceBand(lineFit([1, 1], [2, 3]), 1).value).toBeNaN()
  })
})

describe('the interval of a slope', () => {
  // PMC5610755, table 3 (degradation of a drug, five temperatures): slope -15363.55 with s = 1741.91 K is printed as ± 4835.54, which is t for 4 degrees of freedom. Its k
  // values give another slope; of a line through five points the degrees of freedom are 3.
  const temperatures_K = [333, 343, 348, 353, 363]
  const rateConstants_per_s = [1.931e-6, 1.569e-5, 4.954e-5, 9.537e-5, 2.601e-4]
  const fit = lineFit(
    temperatures_K.map((T) => 1 / T),
    rateConstants_per_s.map(Math.log),
  )

  it('rests on n - 2 degrees of freedom, unlike one published table', () => {
    expect(fit.slope.toFixed(1)).toBe('-20059.4')
    expect(fit.slopeStandardError.toFixed(1)).toBe('1939.8')
    const { lower, upper, standardError } = lineSlopeInterval(fit)
    const factor = (upper - lower) / 2 / standardError
    expect(factor.toFixed(4)).toBe('3.1824')
    const printed = 4835.54 / 1741.91
    expect(printed.toFixed(4)).toBe('2.7760')
    expect(Math.abs(printed - studentTQuantile(0.975, fit.n - 1))).toBeLessThan(5e-4)
    expect(factor / printed).toBeGreaterThan(1.14)
  })
})

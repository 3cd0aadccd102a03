import { describe, expect, it } from 'vitest'
import { normalNumbers } from '../check-values/simulated-run.ts'
import { areaProportionalBaseline, fitTangent, straightBaseline, tangentAt } from './baseline.ts'
import { findQuietEnds } from './quiet-ends.ts'

const n = 2001
const x = Float64Array.from({ length: n }, (_, i) => i / 2)
/** Logistic conversion around 500 with width 30, and its rate. */
const alpha = (t: number): number => 1 / (1 + Math.exp(-(t - 500) / 30))
const rate = (t: number): number => (alpha(t) * (1 - alpha(t))) / 30
const before = { x: 0, value: 2, slope: 0.001 }
const after = { x: 0, value: 1.5, slope: 0.0012 }
const trueBaseline = x.map((t) => (1 - alpha(t)) * tangentAt(before, t) + alpha(t) * tangentAt(after, t))

describe('area-proportional baseline', () => {
  it.each([200, -200])('finds the baseline a signal was made with (area %d)', (area) => {
    const y = x.map((t, i) => (trueBaseline[i] as number) + area * rate(t))
    const { baseline, status, iterations } = areaProportionalBaseline(x, y, before, after)
    expect(status).toBe('ok')
    expect(iterations).toBeLessThan(30)
    // The window ends 16 widths from the middle, where 1e-7 of the reaction is left.
    baseline.forEach((value, i) => expect(value).toBeCloseTo(trueBaseline[i] as number, 4))
  })

  it('says so where there is no area', () => {
    const { status } = areaProportionalBaseline(
      x,
      x.map(() => 0),
      { x: 0, value: 0, slope: 0 },
      { x: 0, value: 0, slope: 0 },
    )
    expect(status).toBe('not-settled')
  })
})

describe('tangents and straight lines', () => {
  it('a tangent is the line through its stretch', () => {
    const tangent = fitTangent(
      x,
      x.map((t) => 4 - 0.2 * t),
      100,
      140,
    )
    expect(tangent.slope).toBeCloseTo(-0.2, 12)
    expect(tangentAt(tangent, 0)).toBeCloseTo(4, 10)
  })

  it('a stretch without room gives the line through two samples', () => {
    const tangent = fitTangent(
      x,
      x.map((t) => 4 - 0.2 * t),
      2000,
      3000,
    )
    expect(tangent.slope).toBeCloseTo(-0.2, 10)
  })

  it('a straight baseline passes through both ends', () => {
    const line = straightBaseline(Float64Array.from([0, 5, 10]), { x: 0, y: 1 }, { x: 10, y: 3 })
    expect([...line]).toEqual([1, 2, 3])
  })
})

describe('quiet ends', () => {
  const height = 200 * rate(500)
  /** Full width of the logistic rate at half its height: 2 ln(3 + √8) widths. */
  const width = 2 * Math.log(3 + Math.sqrt(8)) * 30

  it.each([
    ['up', 1, 0],
    ['down', -1, 0],
    ['up, noisy', 1, 0.01],
  ])('stand on either side of a peak (%s)', (_, sign, noise) => {
    const normal = normalNumbers(5)
    const y = x.map((t, i) => (trueBaseline[i] as number) + sign * 200 * rate(t) + noise * height * normal())
    const quiet = findQuietEnds(x, y, 0, n - 1)
    expect(Math.sign(quiet.height)).toBe(sign)
    // Both are read over the chord, which a step of the baseline tilts.
    expect(Math.abs(quiet.apex - 500)).toBeLessThan(0.1 * width)
    expect(Math.abs(quiet.width / width - 1)).toBeLessThan(0.2)
    const { before: left, after: right } = quiet
    expect(left).not.toBeNull()
    expect(right).not.toBeNull()
    expect(left?.outer ?? 1e9).toBeLessThan(left?.inner ?? 0)
    expect(right?.outer ?? 0).toBeGreaterThan(right?.inner ?? 1e9)
    // Not more than 2 % of the reaction lies inside a stretch: 4 widths from the middle.
    expect(left?.inner ?? 1e9).toBeLessThan(500 - 4 * 30)
    expect(right?.inner ?? 0).toBeGreaterThan(500 + 4 * 30)
    const tangent = fitTangent(x, y, left?.outer ?? 0, left?.inner ?? 0)
    expect(Math.abs(tangentAt(tangent, 500) - tangentAt(before, 500))).toBeLessThan(noise === 0 ? 0.005 * height : 0.03 * height)
  })

  it('are missing where the data end inside the peak', () => {
    const y = x.map((t, i) => (trueBaseline[i] as number) + 200 * rate(t))
    const cut = findQuietEnds(x, y, 0, 1060)
    expect(cut.after).toBeNull()
  })

  it('a line that would cut into the peak is none', () => {
    // A hump before the peak whose rising side, carried on, passes over the apex.
    const y = x.map((t) => 200 * rate(t) + (t < 150 ? t / 150 : Math.max(0, 1 - 0.02 * (t - 150))))
    const { before: left } = findQuietEnds(x, y, 0, n - 1)
    expect(left).not.toBeNull()
    const tangent = fitTangent(x, y, left?.outer ?? 0, left?.inner ?? 0)
    expect(tangentAt(tangent, 500)).toBeLessThan(0.5 * height)
    expect(left?.inner ?? 0).toBeLessThan(500)
  })
})

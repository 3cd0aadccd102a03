import { describe, expect, it } from 'vitest'
import { quantity } from '../units/quantity.ts'
import { linearisedHold } from './linearised-hold.ts'

const T = quantity(400, 'K')
const firstOrder = (alpha: number): number => -Math.log1p(-alpha)
const contracting = (alpha: number): number => 1 - Math.cbrt(1 - alpha)
const times = Array.from({ length: 60 }, (_, i) => 30 * i)

describe('the line of g against t', () => {
  it('gives k and the zero in time back exactly', () => {
    const k = 1.3e-3
    const free = linearisedHold(
      { temperature: T, time_s: times, conversion: times.map((t) => 1 - Math.exp(-k * Math.max(t - 120, 0))) },
      firstOrder,
      { zeroInTime: 'free', range: [0.05, 0.8] },
    )
    expect(free.status).toBe('ok')
    expect(free.rateConstant_per_s).toBeCloseTo(k, 14)
    expect(free.zero_s).toBeCloseTo(120, 8)
    const fixed = linearisedHold({ temperature: T, time_s: times, conversion: times.map((t) => 1 - (1 - 1e-4 * t) ** 3) }, contracting, {
      zeroInTime: 'fixed',
      range: [0, 0.9],
    })
    expect(fixed.rateConstant_per_s).toBeCloseTo(1e-4, 14)
    expect(fixed.zero_s).toBe(0)
  })

  // NIST Statistical Reference Datasets, NoInt1 and NoInt2: y = b x through the origin, certified values.
  it.each([
    [60, [130, 131, 132, 133, 134, 135, 136, 137, 138, 139, 140], '2.07438016528926', '0.0165289256198347', '0.999365492298663'],
    [4, [3, 4, 4], '0.727272727272727', '0.0420827318078432', '0.993348115299335'],
  ])('through the origin matches the certified line from x = %d', (first, y, slope, error, r2) => {
    const fit = linearisedHold(
      { temperature: T, time_s: y.map((_, i) => first + i), conversion: y.map((_, i) => i / 100) },
      (alpha) => y[Math.round(alpha * 100)] ?? Number.NaN,
      { zeroInTime: 'fixed', range: [0, 1] },
    )
    expect(Math.abs(fit.rateConstant_per_s / Number(slope) - 1)).toBeLessThan(1e-14)
    expect(Math.abs(fit.standardError_per_s / Number(error) - 1)).toBeLessThan(1e-13)
    expect(Math.abs(fit.r2 / Number(r2) - 1)).toBeLessThan(1e-14)
  })

  it('says why there is none', () => {
    const run = { temperature: T, time_s: [0, 10, 20], conversion: [0.5, 0.4, 0.3] }
    const free = { zeroInTime: 'free', range: [0, 1] } as const
    expect(linearisedHold(run, firstOrder, free)).toMatchObject({ status: 'not-positive', rateConstant_per_s: Number.NaN })
    expect(linearisedHold({ ...run, conversion: [0, 0, 1] }, firstOrder, { ...free, range: [0.1, 0.9] })).toMatchObject({
      status: 'too-few-rows',
    })
    expect(linearisedHold({ ...run, time_s: [5, 5, 5] }, firstOrder, free)).toMatchObject({ status: 'time-not-distinct' })
    expect(linearisedHold({ ...run, time_s: [0, 0, 0] }, firstOrder, { ...free, zeroInTime: 'fixed' })).toMatchObject({
      status: 'time-not-distinct',
    })
    expect(() => linearisedHold(run, firstOrder, { ...free, range: [0.9, 0.1] })).toThrow(/range/)
    expect(() => linearisedHold({ ...run, time_s: [0] }, firstOrder, free)).toThrow(/as many/)
  })
})

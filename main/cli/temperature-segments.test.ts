import { describe, expect, it } from 'vitest'
import { column } from '../../shared-kinetics/units/quantity.ts'
import { temperatureSegments } from './temperature-segments.ts'

/** A programme made of pieces of constant rate, sampled each second, with a furnace that wavers by a few hundredths of a kelvin. */
function columnsOf(pieces: readonly { readonly rate_K_per_min: number; readonly minutes: number }[]) {
  const temperature: number[] = [300]
  for (const { rate_K_per_min, minutes } of pieces) {
    for (let i = 0; i < minutes * 60; i += 1) temperature.push((temperature.at(-1) ?? 0) + rate_K_per_min / 60)
  }
  const T = temperature.map((value, i) => value + 0.03 * Math.sin(i / 7))
  return { time_s: column(Float64Array.from(T.keys()), 's'), temperature_K: column(Float64Array.from(T), 'K'), signals: [] }
}

const rateOf = (segment: { start_K: number; end_K: number; start_s: number; end_s: number } | undefined): number =>
  segment === undefined ? Number.NaN : ((segment.end_K - segment.start_K) / (segment.end_s - segment.start_s)) * 60

describe('segments of a temperature programme', () => {
  it('is one for one ramp', () => {
    const segments = temperatureSegments(columnsOf([{ rate_K_per_min: 10, minutes: 40 }]))
    expect(segments.map((segment) => segment.kind)).toEqual(['heating'])
    expect(rateOf(segments[0])).toBeCloseTo(10, 1)
  })

  it('finds heating, hold, faster heating and cooling with their places and rates', () => {
    const pieces = [
      { rate_K_per_min: 5, minutes: 20 },
      { rate_K_per_min: 0, minutes: 15 },
      { rate_K_per_min: 10, minutes: 15 },
      { rate_K_per_min: 20, minutes: 10 },
      { rate_K_per_min: -20, minutes: 10 },
    ]
    const segments = temperatureSegments(columnsOf(pieces))
    expect(segments.map((segment) => segment.kind)).toEqual(['heating', 'hold', 'heating', 'heating', 'cooling'])
    for (const [i, { rate_K_per_min }] of pieces.entries()) expect(Math.abs(rateOf(segments[i]) - rate_K_per_min)).toBeLessThan(0.8)
    let end_min = 0
    for (const [i, { minutes }] of pieces.entries()) {
      end_min += minutes
      expect(Math.abs((segments[i]?.end_s ?? Number.NaN) / 60 - end_min)).toBeLessThan(0.8)
    }
  })

  it('has the rate of a ramp even where it begins and ends between two of the places looked at, and tells the hold behind it as one', () => {
    // A look each 0.505 min: the ramp begins and ends in the middle of a step.
    const pieces = [
      { rate_K_per_min: 0, minutes: 30.25 },
      { rate_K_per_min: 20, minutes: 12 },
      { rate_K_per_min: 0, minutes: 58.75 },
    ]
    const segments = temperatureSegments(columnsOf(pieces))
    expect(segments.map((segment) => segment.kind)).toEqual(['hold', 'heating', 'hold'])
    expect((segments[1]?.rate_K_per_s ?? Number.NaN) * 60).toBeCloseTo(20, 0)
    expect(segments[2]?.end_K).toBeCloseTo(540, 0)
  })

  it('takes a cooling that slows down for one', () => {
    const pieces = [10, -40, -20, -10, -5].map((rate_K_per_min) => ({ rate_K_per_min, minutes: 10 }))
    expect(temperatureSegments(columnsOf(pieces)).map((segment) => segment.kind)).toEqual(['heating', 'cooling'])
  })

  it('is empty without time', () => {
    expect(temperatureSegments({ time_s: null, temperature_K: column(Float64Array.of(300, 301), 'K'), signals: [] })).toEqual([])
  })
})

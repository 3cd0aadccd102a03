import { describe, expect, it } from 'vitest'
import { bandHalfWidth, nearestStop, rateConstantStops, stopAt } from './rate-constant-stops.ts'

const row = (temperature_K: number) => ({ temperature_K, rateConstant: 1, standardUncertainty: null, label: null, use: true })
const stops = rateConstantStops({ rows: [row(320), row(300), row(320)], predictAt_K: [310, 320] })

describe('stops of the temperature rail', () => {
  it('go from cold to hot, predictions among the rows, replicates one after the other', () => {
    expect(stops.map(({ place, temperature_K }) => [temperature_K, place.kind, place.index])).toEqual([
      [300, 'row', 1],
      [310, 'prediction', 0],
      [320, 'row', 0],
      [320, 'row', 2],
      [320, 'prediction', 1],
    ])
  })

  it('are found by their place, and the first stands for one that is gone', () => {
    expect(stopAt(stops, { kind: 'row', index: 2 })).toBe(3)
    expect(stopAt(stops, { kind: 'prediction', index: 7 })).toBe(0)
    expect(rateConstantStops({ rows: [], predictAt_K: [] })).toEqual([])
  })

  it('are picked by the nearest 1/T, as the chart lies', () => {
    expect(nearestStop(stops, 1000 / 309)).toBe(1)
    expect(nearestStop(stops, 1000 / 400)).toBe(2)
  })
})

const band = (temperature_K: readonly number[], half: readonly (number | null)[]) => ({
  band: {
    temperature_K,
    lnK: half,
    lnLineLower95: half.map((value) => (value === null ? null : -value)),
    lnLineUpper95: half,
    lnNewLower95: half,
    lnNewUpper95: half,
  },
})

describe('half-width of the band', () => {
  it('is read between the points of the band, whichever way they run', () => {
    expect(bandHalfWidth(band([300, 320], [0.1, 0.3]), 310)).toBeCloseTo(0.2, 12)
    expect(bandHalfWidth(band([320, 300], [0.3, 0.1]), 310)).toBeCloseTo(0.2, 12)
    expect(bandHalfWidth(band([320, 310, 300], [0.3, 0.2, 0.1]), 300)).toBeCloseTo(0.1, 12)
  })

  it('is not to be had beyond them, or where there is no band', () => {
    expect(bandHalfWidth(band([300, 320], [0.1, 0.3]), 330)).toBeNull()
    expect(bandHalfWidth(band([300, 320], [null, null]), 310)).toBeNull()
    expect(bandHalfWidth(band([], []), 310)).toBeNull()
  })
})

import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import tables from '../check-values/published/arrhenius-tables.json' with { type: 'json' }
import { quantity } from '../units/quantity.ts'
import { inHalfUnits } from '../check-values/as-printed.ts'
import { betweenTemperatures } from './between-temperatures.ts'
fc.configureGlobal({ numRuns: 5000 })


const R = 8.31446261815324
const point = (T: number, k: number) => ({ temperature: quantity(T, 'K'), rateConstant: k })

describe('between neighbouring temperatures', () => {
  it('two published rate constants give the published Ea, whichever stands first', () => {
    const published = tables.twoTemperatures.filter((table) => 'temperature_K' in table)
    expect(published.length).toBeGreaterThan(0)
    for (const table of published) {
      const [T1 = 0, T2 = 0] = ('temperature_K' in table ? table.temperature_K : undefined) ?? []
      const [k1 = 0, k2 = 0] = table.k
      for (const points of [
        [point(T1, k1), point(T2, k2)],
        [point(T2, k2), point(T1, k1)],
      ]) {
        const [pair, ...others] = betweenTemperatures(points)
        expect(others).toEqual([])
        expect(inHalfUnits((pair?.Ea ?? 0) / 1000, table.recomputed.Ea)).toBeLessThanOrEqual(1.000001)
      }
    }
  })

  it('exact rate constants give Ea and ln A at every pair, in any order and with replicates about their mean', () => {
    fc.assert(
      fc.property(
        fc.uniqueArray(fc.integer({ min: 250, max: 900 }), { minLength: 2, maxLength: 8 }),
        fc.double({ min: 20e3, max: 300e3, noNaN: true }),
        (temperatures, Ea) => {
          const lnA = 25
          const k = (T: number): number => Math.exp(lnA - Ea / (R * T))
          const points = temperatures.flatMap((T) => [point(T, k(T) * 2), point(T, k(T) / 2)])
          const pairs = betweenTemperatures(points)
          expect(pairs.map((pair) => pair.from as number)).toEqual(
            temperatures
              .toSorted((a, b) => a - b)
              .slice(0, -1)
              .map((T) => expect.closeTo(T, 9) as unknown),
          )
          for (const pair of pairs) {
            expect(pair.Ea / Ea).toBeCloseTo(1, 8)
            expect(pair.lnA).toBeCloseTo(lnA, 5)
          }
        },
      ),
    )
  })

  it('rate constants a whole range of numbers apart have an Ea all the same', () => {
    const [pair] = betweenTemperatures([point(300, 1e-300), point(400, 1e300)])
    expect(pair?.Ea).toBeCloseTo((R * 600 * Math.LN10) / (1 / 300 - 1 / 400), 3)
  })

  it('one temperature has no neighbour; what has no logarithm is refused by its row', () => {
    expect(betweenTemperatures([])).toEqual([])
    expect(betweenTemperatures([point(300, 1), point(300.005, 2)])).toEqual([])
    expect(() => betweenTemperatures([point(300, 1), point(310, 0)])).toThrow(/Row 2/)
  })
})

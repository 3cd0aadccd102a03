import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { constantRateSeries, quiet } from '../check-values/series-of-values.ts'
import { energies, energyGrid, largestEa } from './energy-grid.ts'
import { segmentIntegral } from './segment-integral.ts'
import { scanInOrder, scanOverGrid } from './slope-scan.ts'
import { timeIntegral } from './time-integral.ts'

const rates = [1, 2, 5, 10, 20]
/** Temperatures of five ramps at two levels, each level in the order of the heating rates, else anywhere. */
const ordered = fc
  .tuple(
    fc.double({ min: 300, max: 900, noNaN: true }),
    fc.array(fc.double({ min: 0.01, max: 60, noNaN: true }), { minLength: 5, maxLength: 5 }),
    fc.array(fc.double({ min: 0.01, max: 40, noNaN: true }), { minLength: 5, maxLength: 5 }),
  )
  .map(([start, steps, widths]) => {
    let T = start
    let above = 0
    const first = steps.map((step) => (T += step))
    const second = first.map((value, i) => value + (above += widths[i] ?? 0))
    return [first, second]
  })

describe('the sign of dPhi/dEa from a few grid points', () => {
  it.each([
    ['integrals from zero', timeIntegral],
    ['integrals from level to level', segmentIntegral],
  ] as const)('is that from all of them, wherever it is looked for first: %s', (_, integralOf) => {
    fc.assert(
      fc.property(ordered, fc.integer({ min: 0, max: energies.length - 1 }), (temperature_K, near) => {
        const series = constantRateSeries([0.2, 0.6], rates, temperature_K)
        const integrals = series.runs.map((run) => integralOf(run, largestEa))
        const grid = energyGrid(integrals, 2, quiet)
        for (const level of [0, 1]) {
          const few = scanInOrder(integrals, level, near)
          const all = scanOverGrid(grid, level, rates.length)
          expect(few === null ? null : Array.from(few.signs, Math.sign)).toEqual(all === null ? null : Array.from(all.signs, Math.sign))
        }
      }),
      { numRuns: 150 },
    )
  })

  it('asks for J at a handful of grid points', () => {
    const series = constantRateSeries([0.5], rates, [[543.27, 551.54, 562.85, 571.72, 580.86]])
    let asked = 0
    const integrals = series.runs.map((run) => {
      const integral = timeIntegral(run, largestEa)
      return {
        ...integral,
        atLevel: (Ea: number, level: number) => {
          asked++
          return integral.atLevel(Ea, level)
        },
      }
    })
    // Ea is 200 kJ/mol (published set S2): expected there.
    const near = energies.findIndex((Ea) => Ea > 200e3) - 1
    expect(scanInOrder(integrals, 0, near)).not.toBeNull()
    expect(asked / rates.length).toBeLessThan(7)
  })

  it('is left to the whole grid where runs meet at one temperature, cross, or follow no ramp', () => {
    const replicates = constantRateSeries([0.5], [1, 2, 2], [[540, 550, 550]]).runs.map((run) => timeIntegral(run, largestEa))
    expect(scanInOrder(replicates, 0, 30)).toBeNull()
    const crossing = constantRateSeries(
      [0.2, 0.6],
      [1, 2, 5],
      [
        [500, 510, 505],
        [520, 530, 540],
      ],
    ).runs.map((run) => segmentIntegral(run, largestEa))
    expect(scanInOrder(crossing, 1, 30)).toBeNull()
    const general = constantRateSeries([0.5], [1, 2, 5], [[540, 550, 560]]).runs.map((run) => {
      const { passes: _, ...integral } = timeIntegral(run, largestEa)
      return integral
    })
    expect(scanInOrder(general, 0, 30)).toBeNull()
  })
})

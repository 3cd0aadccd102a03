import { describe, expect, it } from 'vitest'
import { constantRateSeries, quiet } from '../check-values/series-of-values.ts'
import { Cancelled } from '../errors.ts'
import { methods } from '../isoconversional/registry.ts'
import { energyModel } from '../uncertainty/energy-model.ts'
import { column } from '../units/quantity.ts'
import { drawPlan, drawShare, drawsToBeginWith, intervalsOfDraws, noteOnFewerDraws, type DrawOrder } from './draw-uncertainty.ts'

const series = constantRateSeries(
  [0.4, 0.5],
  [2, 5, 10],
  [
    [500, 510, 518],
    [505, 515, 523],
  ],
)
const zeros = () => new Float64Array(6)
const model = energyModel(series, methods.kas.run(series, quiet))
const order: DrawOrder = {
  models: [model, { ...model, method: 'starink' }, { ...model, method: 'tang' }],
  sources: {
    stated: { temperatureCommon_K: 0.5, temperatureRun_K: 0.5, lag_s: 0, statedHeatingRate_share: 0 },
    heatingRate_share: new Float64Array(3),
    noise: {
      time_s: column(zeros(), 's'),
      lnReactionRate: zeros(),
      lnReactionRateSlope_per_s: zeros(),
      correlationWithBefore: zeros(),
    },
    baseline: null,
  },
}
const withLevels = (levels: number): DrawOrder => ({ ...order, models: order.models.map((some) => ({ ...some, levels })) })

describe('the plan of draws', () => {
  it.each([
    ['a common study: all methods together', 99, 2000, 2000, [3]],
    ['two methods, then one', 1000, 10_000, 10_000, [2, 1]],
    ['one after the other, with fewer draws', 2000, 20_000, 10_000, [1, 1, 1]],
  ])('holds at most 2e7 values at once: %s', (_, levels, asked, taken, methodsOf) => {
    const { draws, orders } = drawPlan(withLevels(levels), asked)
    expect(draws).toBe(taken)
    expect(orders.map(({ models }) => models.length)).toEqual(methodsOf)
    expect(orders.flatMap(({ models }) => models.map(({ method }) => method))).toEqual(['kas', 'starink', 'tang'])
    for (const { models } of orders) expect(models.length * levels * draws).toBeLessThanOrEqual(2e7)
    expect(noteOnFewerDraws(draws, asked) === '').toBe(taken === asked)
  })

  it.each([
    ['the more levels', { levels: 2000 }],
    ['the more runs', { runs: 60 }],
  ])('begins with the fewer draws %s there are, but with one at least', (_, change) => {
    const common = drawsToBeginWith({ ...order, models: order.models.map((some) => ({ ...some, levels: 100 })) })
    const larger = drawsToBeginWith({ ...order, models: order.models.map((some) => ({ ...some, levels: 100, ...change })) })
    expect(larger).toBe(Math.floor(common / 20))
    expect(drawsToBeginWith({ ...order, models: order.models.map((some) => ({ ...some, levels: 2000, runs: 200 })) })).toBe(1)
  })

  it('takes methods one after the other where a single draw of all takes long', () => {
    const { draws, orders } = drawPlan({ ...order, models: order.models.map((some) => ({ ...some, levels: 2000, runs: 40 })) }, 2000)
    expect(draws).toBe(2000)
    expect(orders.map(({ models }) => models.map(({ method }) => method))).toEqual([['kas', 'starink'], ['tang']])
  })

  it('gives each method the same numbers as all together', () => {
    const range = { seed: 1, from: 0, to: 50 }
    const together = drawShare({ ...order, range }, quiet)
    expect(order.models.flatMap((alone) => drawShare({ ...order, models: [alone], range }, quiet))).toEqual(together)
  })
})

describe('shares of draws', () => {
  it.each([1, 7, 50])('put together are the same numbers as one whole, %i draws in each', (size) => {
    const draws = 50
    const shares = Array.from({ length: Math.ceil(draws / size) }, (_, i) =>
      drawShare({ ...order, range: { seed: 3, from: i * size, to: Math.min(draws, (i + 1) * size) } }, quiet),
    )
    const [whole] = [drawShare({ ...order, range: { seed: 3, from: 0, to: draws } }, quiet)]
    order.models.forEach((_, m) => {
      expect(shares.flatMap((share) => Array.from(share[m] ?? []))).toEqual(Array.from(whole[m] ?? []))
    })
    expect(intervalsOfDraws(order, shares, 3)).toEqual(intervalsOfDraws(order, [whole], 3))
  })

  it('lie on memory that threads share, so that posting them copies nothing', () => {
    const share = drawShare({ ...order, range: { seed: 1, from: 0, to: 2 } }, quiet)
    for (const energies of share) expect(structuredClone(energies.buffer)).toBeInstanceOf(SharedArrayBuffer)
  })
})

describe('intervals of draws', () => {
  it('look at every level whether anyone still waits', () => {
    const shares = [drawShare({ ...order, range: { seed: 1, from: 0, to: 50 } }, quiet)]
    let looks = 0
    const context = {
      checkCancelled: (): void => {
        if (++looks > 3) throw new Cancelled()
      },
    }
    expect(() => intervalsOfDraws(order, shares, 1, context)).toThrow(Cancelled)
    expect(looks).toBe(4)
  })
})

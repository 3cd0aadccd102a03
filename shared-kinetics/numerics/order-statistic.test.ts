import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { orderStatistic } from './order-statistic.ts'

/** Adding 0 turns -0, which sorting puts before 0, into 0. */
const number = fc.oneof(fc.double({ noNaN: true }), fc.integer({ min: 0, max: 3 })).map((value) => value + 0)
const values = fc.array(number, { minLength: 1, maxLength: 200 })

describe('order statistic', () => {
  it('is what sorting puts at the index, with none larger before it and none smaller behind', () => {
    fc.assert(
      fc.property(values, fc.nat(), (numbers, any) => {
        const k = any % numbers.length
        const sorted = Float64Array.from(numbers).sort()
        const given = Float64Array.from(numbers)
        const found = orderStatistic(given, k)
        expect(found).toBe(sorted[k])
        expect(given.subarray(0, k).every((value) => value <= found)).toBe(true)
        expect(given.subarray(k).every((value) => value >= found)).toBe(true)
        expect(given.toSorted()).toEqual(sorted)
      }),
    )
  })

  it('is found in orders that defeat a choice of the middle: ascending, descending, pipes, one value', () => {
    const n = 4001
    const orders = [
      (i: number) => i,
      (i: number) => -i,
      (i: number) => Math.abs(i - n / 2),
      (i: number) => -Math.abs(i - n / 2),
      (i: number) => i % 2,
      () => 7,
      (i: number) => (i * 7919) % n,
    ]
    for (const order of orders) {
      const numbers = Float64Array.from({ length: n }, (_, i) => order(i))
      const sorted = numbers.toSorted()
      for (const k of [0, 40, n >> 1, n - 41, n - 1]) expect(orderStatistic(numbers.slice(), k)).toBe(sorted[k])
    }
  })

  it('is not to be had beyond the values', () => {
    expect(orderStatistic(new Float64Array(0), 0)).toBeNaN()
    expect(orderStatistic(Float64Array.of(1, 2), 2)).toBeNaN()
  })
})

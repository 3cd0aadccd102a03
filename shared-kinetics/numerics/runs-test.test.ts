import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { runsTest } from './runs-test.ts'

/** Every order of `n` signs, `above` of them positive. */
function ordersOf(n: number, above: number): number[][] {
  return Array.from({ length: 2 ** n }, (_, bits) => Array.from({ length: n }, (_, i) => ((bits >> i) & 1 ? 1 : -1))).filter(
    (signs) => signs.filter((sign) => sign > 0).length === above,
  )
}
const runsOf = (signs: readonly number[]): number => signs.filter((sign, i) => sign !== signs[i - 1]).length
const inOrder = (above: number, below: number, runs: number): number[] => {
  // Runs of one sign each but the last of both, which hold the rest.
  const signs = Array.from({ length: runs }, (_, i) => (i % 2 === 0 ? 1 : -1))
  const [a, b] = [signs.filter((s) => s > 0).length, signs.filter((s) => s < 0).length]
  return signs.flatMap((s, i) => Array<number>(i === 0 ? above - a + 1 : i === 1 ? below - b + 1 : 1).fill(s))
}

describe('the runs test', () => {
  it('is exact: the same as counting every order of the signs', () => {
    for (const [n, above] of [
      [4, 2],
      [7, 3],
      [9, 1],
      [10, 5],
      [11, 8],
    ] as const) {
      const orders = ordersOf(n, above)
      for (const signs of orders.filter((_, i) => i % 7 === 0)) {
        const share = orders.filter((other) => runsOf(other) <= runsOf(signs)).length / orders.length
        const test = runsTest(signs, 0.05)
        expect(test).toMatchObject({ runs: runsOf(signs), above, below: n - above })
        expect(test.probability).toBeCloseTo(share, 12)
      }
    }
  })

  // F. S. Swed, C. Eisenhart, Ann. Math. Stat. 14 (1943) 66, largest number of runs with a chance of at most 0.025 (as reprinted in many handbooks, from memory).
  it.each([
    [5, 5, 2],
    [10, 10, 6],
    [15, 15, 10],
    [20, 20, 14],
  ])('%d and %d signs: %d runs are few, one more is not', (above, below, runs) => {
    expect(runsTest(inOrder(above, below, runs), 0.025).probability).toBeLessThanOrEqual(0.025)
    expect(runsTest(inOrder(above, below, runs + 1), 0.025).probability).toBeGreaterThan(0.025)
  })

  it('says where there are too few signs to tell', () => {
    expect(runsTest([1, 1, -1, -1], 0.05)).toMatchObject({ status: 'too-few-signs', runs: 2 })
    expect(runsTest([1, 2, 0, Number.NaN, 3], 0.05)).toMatchObject({ status: 'too-few-signs', above: 3, below: 0, probability: 1 })
    expect(runsTest([1, 1, 1, 1, -1, -1, -1, -1], 0.05)).toMatchObject({ status: 'tested' })
  })

  it('does not care for the sizes of residuals nor for their common sign', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { maxLength: 60 }), (values) => {
        const test = runsTest(values, 0.05)
        const turned = runsTest(
          values.map((value) => -3 * Math.sign(value)),
          0.05,
        )
        expect(turned.probability).toBeCloseTo(test.probability, 12)
        expect(test.probability).toBeGreaterThanOrEqual(0)
        expect(test.probability).toBeLessThanOrEqual(1)
      }),
    )
  })
})

import { compiled, expn } from 'cephes'
import { beforeAll, describe, expect, it } from 'vitest'
import { halfUnit, inHalfUnits, roundedTwice } from '../check-values/as-printed.ts'
import table from '../check-values/published/astm-e1641-table.json'
import { doyleA, doyleSlope, doyleTableSlope } from './doyle-table.ts'

beforeAll(async () => {
  await compiled
})

const printedB = (x: number): number => Number(table.rows.find((row) => row.x === x)?.b)
/** a(x) by another library. */
const a = (x: number): number => -Math.log10(expn(2, x) / x)
const units = (value: number, printed: string): number => inHalfUnits(value, printed) / 2

describe('the table of ASTM E1641', () => {
  // Five-decimal columns computed with 40 digits.
  it('has the computed a, backward difference and derivative at every x', () => {
    for (const row of table.rows) {
      expect(inHalfUnits(doyleA(row.x), row.aExact), `a(${row.x})`).toBeLessThanOrEqual(roundedTwice)
      expect(inHalfUnits(doyleTableSlope(row.x), row.differenceExact), `difference(${row.x})`).toBeLessThanOrEqual(roundedTwice)
      expect(inHalfUnits(doyleSlope(row.x), row.slopeExact), `b(${row.x})`).toBeLessThanOrEqual(roundedTwice)
    }
  })

  it('has exact a where its printed digits stand, but for the slip at x = 10', () => {
    const apart = table.rows.filter((row) => units(doyleA(row.x), row.a) > 1.35)
    expect(apart.map((row) => row.x)).toEqual([10])
    expect(units(doyleA(10), apart[0]?.a ?? '')).toBeCloseTo(10.7, 1)
  })

  it('holds in its b column the backward difference of a, not the derivative', () => {
    const printedA = new Map(table.rows.map((row) => [row.x, row.a]))
    for (const row of table.rows) {
      const before = printedA.get(row.x - 1)
      const ofPrintedA =
        before === undefined ? Number.NaN : Math.abs(Number(row.a) - Number(before) - Number(row.b)) / (2 * halfUnit(row.b))
      const ofExactA = units(doyleTableSlope(row.x), row.b)
      // 1.2: the largest remainder met, at x = 10 and 56.
      expect(Math.min(ofExactA, Number.isNaN(ofPrintedA) ? Number.POSITIVE_INFINITY : ofPrintedA), `b(${row.x})`).toBeLessThan(1.21)
    }
    for (const row of table.rows.filter(({ x }) => x <= 25)) {
      expect(Number(row.b) - doyleSlope(row.x), `b(${row.x}) against the derivative`).toBeGreaterThan(halfUnit(row.b))
    }
  })

  it('makes Ea refined with its b differ from Ea refined exactly by the printed shares', () => {
    expect(inHalfUnits(printedB(10), '0.5187')).toBe(0)
    expect(inHalfUnits(doyleSlope(10), '0.51477')).toBeLessThanOrEqual(1)
    expect(inHalfUnits(printedB(30), '0.4629')).toBe(0)
    expect(inHalfUnits(doyleSlope(30), '0.46239')).toBeLessThanOrEqual(1)
    // E = -R/b d log beta/d(1/T): at one slope Ea goes with 1/b.
    for (const [x, percent] of [
      [10, '0.76'],
      [20, '0.23'],
      [30, '0.11'],
      [60, '0.03'],
    ] as const) {
      expect(inHalfUnits(100 * (printedB(x) / doyleSlope(x) - 1), percent), `x ${x}`).toBeLessThanOrEqual(1)
      // The difference of exact a says the same to within one unit of the printed b.
      expect(Math.abs(doyleTableSlope(x) / doyleSlope(x) - printedB(x) / doyleSlope(x)), `x ${x}`).toBeLessThan(1.2 * 1e-4 * 2.3)
    }
  })
})

describe("Doyle's a and b", () => {
  it('agree with p(x) of another library', () => {
    for (let x = 0.05; x < 600; x *= 1.3) {
      expect(Math.abs(doyleA(x) - a(x)), `a(${x})`).toBeLessThan(1e-13 * Math.max(1, a(x)))
      // p'(x) = -e⁻ˣ/x².
      expect(doyleSlope(x) / (Math.exp(-x) / x / (expn(2, x) * Math.LN10)) - 1, `b(${x})`).toBeCloseTo(0, 12)
    }
    for (const n of [2, 3, 8, 30, 100, 500]) expect(doyleTableSlope(n)).toBeCloseTo(a(n) - a(n - 1), 11)
  })

  it('run in straight lines between whole x', () => {
    for (const n of [2, 8, 29, 59]) {
      for (const share of [0.25, 0.5, 0.9]) {
        const line = doyleTableSlope(n) + share * (doyleTableSlope(n + 1) - doyleTableSlope(n))
        expect(doyleTableSlope(n + share)).toBeCloseTo(line, 14)
      }
    }
  })

  it('tend to log10 e for large x, without loss of digits', () => {
    for (const b of [doyleSlope, doyleTableSlope]) {
      // b = log10 e·(1 + 2/x - 2/x² + …), half a unit below x for the difference.
      expect(b(1e6) / Math.LOG10E - 1).toBeCloseTo(2e-6, 10)
      expect(b(1e12)).toBeCloseTo(Math.LOG10E, 11)
    }
  })

  it('have no backward difference below x = 2, and no x that is not a positive number', () => {
    expect(doyleTableSlope(1.99)).toBeNaN()
    for (const x of [0, -1, Number.NaN, Number.POSITIVE_INFINITY]) {
      for (const f of [doyleA, doyleSlope, doyleTableSlope]) expect(() => f(x), `${f.name}(${x})`).toThrow(/Ea\/\(RT\)/)
    }
  })
})

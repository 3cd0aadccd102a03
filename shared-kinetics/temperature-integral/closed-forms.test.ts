import { compiled, expn } from 'cephes'
import { beforeAll, describe, expect, it } from 'vitest'
import { inHalfUnits, roundedTwice } from '../check-values/as-printed.ts'
import printed from '../check-values/computed/temperature-integral-forms.json'
import { closedForms, type ClosedFormId } from './closed-forms.ts'
import { lnPOfX } from './p-of-x.ts'
import { lnPBySenumYang } from './senum-yang.ts'

beforeAll(async () => {
  await compiled
})

const relativeError = (id: ClosedFormId, x: number): number => Math.expm1(closedForms[id].lnP(x) - Math.log(expn(2, x) / x))
const slope = (id: ClosedFormId): number => closedForms[id].lnP(20) - closedForms[id].lnP(21)
const ids = Object.keys(closedForms) as ClosedFormId[]

describe('the closed forms of the temperature integral', () => {
  it('are all in the printed table', () => {
    expect([...printed.closedForms.rows, ...printed.doyle.rows].map((row) => row.form).toSorted()).toEqual(ids.toSorted())
  })

  // Table of relative errors, 40-digit arithmetic; p(x) here by another library.
  it.each(printed.closedForms.rows)('$form has the printed error at every x', ({ form, percent }) => {
    printed.closedForms.x.forEach((x, k) => {
      const error = 100 * relativeError(form as ClosedFormId, x)
      expect(inHalfUnits(error, percent[k] as string), `x ${x}: ${error}`).toBeLessThanOrEqual(roundedTwice)
    })
  })

  it.each(printed.doyle.rows)('$form has the printed error at every x', ({ form, percent }) => {
    printed.doyle.x.forEach((x, k) => {
      const error = 100 * relativeError(form as ClosedFormId, x)
      expect(inHalfUnits(error, percent[k] as string), `x ${x}: ${error}`).toBeLessThanOrEqual(roundedTwice)
    })
  })

  it.each(ids)('%s keeps its stated accuracy, which is not stated too wide', (id) => {
    for (const { from, to, largestError } of closedForms[id].accuracy) {
      let largest = 0
      for (let i = 0; i <= 1000; i++) largest = Math.max(largest, Math.abs(relativeError(id, from + ((to - from) * i) / 1000)))
      expect(largest, `${from} to ${to}`).toBeLessThanOrEqual(largestError)
      expect(largest, `${from} to ${to}`).toBeGreaterThan(0.98 * largestError)
    }
  })

  it('Gorbachev is the first rational form of Senum and Yang', () => {
    for (const x of [0.1, 1, 7, 33, 2000]) expect(closedForms.gorbachev.lnP(x)).toBeCloseTo(lnPBySenumYang(x, 1), 10)
  })

  it("the two printed slopes of Doyle's line differ by 0.04 %", () => {
    expect(inHalfUnits(slope('doyle'), '1.05159')).toBeLessThanOrEqual(1)
    expect(inHalfUnits(100 * (slope('doyle-ln') / slope('doyle') - 1), '0.04')).toBeLessThanOrEqual(1)
  })

  it('give NaN where the formula gives no positive p, and neither overflow nor underflow', () => {
    expect(closedForms['coats-redfern'].lnP(2)).toBeNaN()
    expect(closedForms.agrawal.lnP(1)).toBeNaN()
    expect(closedForms.agrawal.lnP(2.2)).toBeNaN()
    expect(closedForms.li.lnP(2.4)).toBeNaN()
    for (const id of ['murray-white', 'coats-redfern', 'gorbachev', 'agrawal', 'li'] as const) {
      expect(closedForms[id].lnP(1e5), `by ${id}`).toBeCloseTo(lnPOfX(1e5), 4)
    }
    for (const id of ids) expect(closedForms[id].lnP(1e4), `by ${id}`).toBeLessThan(-9000)
  })

  it.each(ids)('%s rejects an x that is not a positive number', (id) => {
    for (const x of [0, -1, Number.NaN, Number.POSITIVE_INFINITY]) expect(() => closedForms[id].lnP(x)).toThrow(/Ea\/\(RT\)/)
  })
})

import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import values from '../check-values/computed/lambert-w.json'
import { lambertWOfExp } from './lambert-w.ts'

describe("Lambert's function of an exponential", () => {
  it.each(values.rows)('at z = $z is what mpmath gives', ({ z, w }) => {
    expect(Math.abs(lambertWOfExp(z) / Number(w) - 1)).toBeLessThan(1e-15 * (1 + Math.abs(z)))
  })

  it('is the root of w + ln w = z', () => {
    fc.assert(
      fc.property(fc.double({ min: -600, max: 1e5, noNaN: true }), (z) => {
        const w = lambertWOfExp(z)
        expect(Math.abs(w + Math.log(w) - z)).toBeLessThan(1e-14 * (1 + Math.abs(z)))
      }),
    )
  })

  it('refuses what is no number', () => {
    expect(() => lambertWOfExp(Number.NaN)).toThrow(/finite/)
  })
})

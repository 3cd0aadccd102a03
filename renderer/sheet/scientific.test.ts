import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { mantissaAndPower, scientific } from './scientific.ts'

describe('numbers with powers of ten', () => {
  it('stand plain where they are of ordinary size, with a power of ten where not', () => {
    expect([3.46e-5, 0.0151, 0.15, 3.7028, 26.383, 125.4, 3.8163e13, -0.001].map((value) => scientific(value))).toEqual([
      '3.46e-5',
      '0.0151',
      '0.150',
      '3.70',
      '26.4',
      '125',
      '3.82e13',
      '-1.00e-3',
    ])
    expect([null, undefined, Number.NaN].map((value) => scientific(value))).toEqual(['', '', ''])
    expect(mantissaAndPower('-3.46e-5')).toEqual(['−3.46', '−5'])
    expect(mantissaAndPower('0.150')).toEqual(['0.150', ''])
  })

  it('keep three digits of whatever size', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-300, max: 1e300, noNaN: true }), (value) => {
        expect(Math.abs(Number(scientific(value)) / value - 1)).toBeLessThan(0.00501)
      }),
    )
  })
})

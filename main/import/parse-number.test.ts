import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { isNumber, parseNumber } from './parse-number.ts'

const parse = (text: string, decimal: 'point' | 'comma' = 'point'): number => parseNumber(text, 0, text.length, decimal)

describe('parseNumber', () => {
  // Oracle: the correctly rounded conversion of the language itself.
  it('rounds every decimal as Number() does', () => {
    const digits = fc.stringMatching(/^\d{1,22}$/)
    const number = fc.tuple(
      fc.constantFrom('', '-', '+'),
      digits,
      fc.option(digits, { nil: null }),
      fc.option(fc.integer({ min: -320, max: 300 }), { nil: null }),
    )
    fc.assert(
      fc.property(number, ([sign, whole, behind, exponent]) => {
        const text = `${sign}${whole}${behind === null ? '' : `.${behind}`}${exponent === null ? '' : `e${exponent}`}`
        const expected = Number(text)
        const wanted = Number.isFinite(expected) ? expected : Number.NaN
        expect(parse(text)).toBe(wanted)
        expect(parse(text.replace('.', ','), 'comma')).toBe(wanted)
      }),
      { numRuns: 3000, seed: 7 },
    )
  })

  it('returns what was printed, for any double', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(parse(String(value))).toBe(Number(String(value)))
        expect(parse(value.toExponential(8))).toBe(Number(value.toExponential(8)))
      }),
      { numRuns: 3000, seed: 11 },
    )
  })

  it.each([
    ['1 234,5', 'comma', 1234.5],
    ['1\u2009234\u2009567', 'point', 1234567],
    ['1\u202f234,25', 'comma', 1234.25],
    ['\u221212.5', 'point', -12.5],
    ["1'234.5", 'point', 1234.5],
    ['1,234.5', 'point', 1234.5],
    ['1.234,5', 'comma', 1234.5],
    ['-1.234.567', 'comma', -1234567],
    ['6.87E-03', 'point', 0.00687],
    ['6,87e+3', 'comma', 6870],
    ['.5', 'point', 0.5],
    ['5.', 'point', 5],
  ] as const)('reads %s with a decimal %s', (text, decimal, value) => {
    expect(parse(text, decimal)).toBe(value)
  })

  it.each([
    ['', 'point'],
    ['-', 'point'],
    ['.', 'point'],
    ['e5', 'point'],
    ['1e', 'point'],
    ['1e5.5', 'point'],
    ['1.2.3', 'point'],
    ['12,34', 'point'],
    ['0,123', 'point'],
    ['1234,567', 'point'],
    ['1 23', 'point'],
    ['5,', 'comma'],
    ['1,2,3', 'comma'],
    ['12 mg', 'point'],
    ['0x10', 'point'],
    ['NaN', 'point'],
    ['Infinity', 'point'],
    ['1e999', 'point'],
    ['1_000', 'point'],
    ['12:30', 'point'],
  ] as const)('takes "%s" with a decimal %s for no number', (text, decimal) => {
    expect(parse(text, decimal)).toBeNaN()
    expect(isNumber(text, decimal)).toBe(false)
  })

  it('reads only what lies between the bounds it is given', () => {
    expect(parseNumber('99;12.5;77', 3, 7, 'point')).toBe(12.5)
  })
})

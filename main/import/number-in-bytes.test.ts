import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { numberInBytes } from './number-in-bytes.ts'
import { parseNumber } from './parse-number.ts'

const inBytes = (text: string, decimal: 'point' | 'comma' = 'point'): number => {
  const bytes = Buffer.from(`;${text};`, 'utf8')
  return numberInBytes(bytes, 1, bytes.length - 1, decimal)
}

describe('numberInBytes', () => {
  // Oracle: the correctly rounded conversion of the language itself.
  it('rounds every decimal as Number() does', () => {
    const digits = fc.stringMatching(/^\d{1,22}$/)
    const exponent = fc.option(fc.integer({ min: -320, max: 300 }), { nil: null })
    fc.assert(
      fc.property(fc.constantFrom('', '-', '+'), digits, fc.option(digits, { nil: null }), exponent, (sign, whole, behind, power) => {
        const text = `${sign}${whole}${behind === null ? '' : `.${behind}`}${power === null ? '' : `e${power}`}`
        const expected = Number.isFinite(Number(text)) ? Number(text) : Number.NaN
        expect(inBytes(text)).toBe(expected)
        expect(inBytes(text.replace('.', ','), 'comma')).toBe(expected)
      }),
      { numRuns: 3000, seed: 17 },
    )
  })

  it('returns what was printed, for any double', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(inBytes(String(value))).toBe(Number(String(value)))
        expect(inBytes(value.toPrecision(17))).toBe(Number(value.toPrecision(17)))
      }),
      { numRuns: 3000, seed: 19 },
    )
  })

  it('takes for a number what parseNumber takes for one, and nothing else', () => {
    const pieces = fc.constantFrom(
      '0',
      '7',
      '12',
      '345',
      '.',
      ',',
      '-',
      '+',
      '\u2212',
      'e',
      'E',
      ' ',
      "'",
      '\u00a0',
      '\u2009',
      'x',
      '°',
      '',
    )
    fc.assert(
      fc.property(
        fc.array(pieces, { minLength: 1, maxLength: 8 }),
        fc.constantFrom('point' as const, 'comma' as const),
        (parts, decimal) => {
          const text = parts.join('')
          expect(inBytes(text, decimal)).toBe(parseNumber(text, 0, text.length, decimal))
        },
      ),
      { numRuns: 20_000, seed: 23 },
    )
  })
})

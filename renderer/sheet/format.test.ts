import { describe, expect, it } from 'vitest'
import { formatInterval, formatSigned, formatWithInterval } from './format.ts'

describe('interval about a value', () => {
  it('is one number where it is even, two where it is lopsided', () => {
    expect(formatWithInterval(146.12, 145.14, 147.1)).toBe('146.1 ± 1.0')
    expect(formatWithInterval(146.1, 144.9, 149.4)).toBe('146.1 −1.2 +3.3')
    expect(formatWithInterval(146.1, 146.09, 146.11)).toBe('146.1 ± < 0.1')
  })

  it('says which end it lacks, and is left out where it lacks both', () => {
    expect(formatInterval(146.1, 140, null)).toBe('−6.1, open above')
    expect(formatInterval(146.1, null, 150)).toBe('open below, +3.9')
    expect(formatWithInterval(146.1, null, null)).toBe('146.1')
    expect(formatWithInterval(null, 1, 2)).toBe('')
  })

  it('gives its ends where it does not hold the value', () => {
    expect(formatWithInterval(146.1, 147, 149)).toBe('146.1 (147.0 … 149.0)')
  })
})

describe('number with its sign', () => {
  it('has none where it rounds to zero', () => {
    expect([1.2, -0.31, 0.004, -0.004, 0].map((value) => formatSigned(value, 2))).toEqual(['+1.20', '−0.31', '0.00', '0.00', '0.00'])
    expect(formatSigned(null, 2)).toBe('')
  })
})

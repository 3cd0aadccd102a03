import { describe, expect, it } from 'vitest'
import { digits } from './words.ts'

describe('numbers as sentences give them', () => {
  it.each([
    [0.123456, 3, '0.123'],
    [1500, 3, '1500'],
    [-12.3456, 2, '-12'],
    [6.1523e-9, 3, '6.15 × 10⁻⁹'],
    [1.52e14, 1, '2 × 10¹⁴'],
    [0, 3, '0'],
    [Number.NaN, 3, 'NaN'],
    [3.6e-120, 2, '3.6 × 10⁻¹²⁰'],
    [-2.5e25, 3, '-2.5 × 10²⁵'],
  ])('%s with %s digits is %s', (value, significant, text) => {
    expect(digits(value, significant)).toBe(text)
  })
})

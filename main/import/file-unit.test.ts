import { unit } from 'mathjs'
import { describe, expect, it } from 'vitest'
import { unitOf } from './file-unit.ts'

describe('unitOf', () => {
  // Oracle: the unit tables of mathjs.
  it.each([
    ['s', 's', 's'],
    ['[s]', 's', 's'],
    ['min', 'minute', 's'],
    ['(h)', 'hour', 's'],
    ['ms', 'ms', 's'],
    ['K', 'K', 'K'],
    ['[k]', 'K', 'K'],
    ['°C', 'degC', 'K'],
    ['º C', 'degC', 'K'],
    ['℃', 'degC', 'K'],
    ['deg C', 'degC', 'K'],
    ['deg. C', 'degC', 'K'],
    ['Celsius', 'degC', 'K'],
    ['oC', 'degC', 'K'],
    ['Â°C', 'degC', 'K'],
    ['\ufffdC', 'degC', 'K'],
    ['?C', 'degC', 'K'],
    ['°F', 'degF', 'K'],
    ['mg', 'mg', 'kg'],
    ['g', 'g', 'kg'],
    ['µg', 'ug', 'kg'],
    ['μg', 'ug', 'kg'],
    ['mW', 'mW', 'W'],
    ['µW', 'uW', 'W'],
    ['W/g', 'W/g', 'W/kg'],
    ['W per g', 'W/g', 'W/kg'],
    ['W·g⁻¹', 'W/g', 'W/kg'],
    ['W g^-1', 'W/g', 'W/kg'],
    ['mW/mg', 'mW/mg', 'W/kg'],
    ['mW mg-1', 'mW/mg', 'W/kg'],
    ['mW / mg', 'mW/mg', 'W/kg'],
    ['mW/g', 'mW/g', 'W/kg'],
    ['µW/mg', 'uW/mg', 'W/kg'],
  ])('converts %s as mathjs converts %s to %s', (written, oracle, si) => {
    for (const value of [-12.375, 0, 0.1, 25, 1234.5]) {
      const expected = unit(value, oracle).toNumber(si)
      expect(Math.abs((unitOf(written)?.toSI(value) ?? Number.NaN) - expected)).toBeLessThanOrEqual(
        4e-16 * Math.max(Math.abs(expected), 300 * Number(si === 'K')),
      )
    }
  })

  it.each([
    ['%', 0.255],
    ['wt.-%', 0.255],
    ['wt%', 0.255],
    ['wt. %', 0.255],
    ['percent', 0.255],
    ['-', 25.5],
    ['1', 25.5],
    ['mg/mg', 25.5],
  ])('reads 25.5 %s as the fraction %d', (written, fraction) => {
    expect(unitOf(written)).toMatchObject({ dimension: 'fraction' })
    expect(unitOf(written)?.toSI(25.5)).toBe(fraction)
  })

  it.each([
    '',
    'V',
    'µV',
    'cc/min',
    'mL/min',
    '%/min',
    '1/s',
    's-1',
    's^-1',
    'mg/min',
    'K/min',
    '%/°C',
    'Pa',
    'Time',
    'bar',
    'kW/m2',
    'mW/K',
    'm',
  ])('knows no unit "%s"', (written) => {
    expect(unitOf(written)).toBeNull()
  })
})

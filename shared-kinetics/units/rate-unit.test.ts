import { unit } from 'mathjs'
import { describe, expect, it } from 'vitest'
import { parseRateUnit } from './rate-unit.ts'

describe('the unit of a rate constant', () => {
  it.each([
    ['1/s', '1/s'],
    ['s-1', '1/s'],
    ['s^-1', '1/s'],
    ['s^(-1)', '1/s'],
    ['s⁻¹', '1/s'],
    ['s−1', '1/s'],
    ['/s', '1/s'],
    ['per second', '1/s'],
    ['sec-1', '1/s'],
    ['1/min', '1/min'],
    ['min⁻¹', '1/min'],
    ['h-1', '1/h'],
    ['1/hr', '1/h'],
    ['per day', '1/d'],
    ['d^-1', '1/d'],
    ['1/year', '1/a'],
    ['%/h', '%/h'],
    ['L/(mol s)', 'L/(mol s)'],
    ['L/(mol·s)', 'L/(mol s)'],
    ['L/mol/s', 'L/(mol s)'],
    ['L/mol s', 'L/(mol s)'],
    ['L mol-1 s-1', 'L/(mol s)'],
    ['l·mol⁻¹·s⁻¹', 'L/(mol s)'],
    ['M-1 s-1', '1/(M s)'],
    ['1/(M min)', '1/(M min)'],
    ['dm3 mol-1 s-1', 'dm^3/(mol s)'],
    ['cm³ molecule⁻¹ s⁻¹', 'cm^3/(molecule s)'],
    ['mol/(L s)', 'mol/(L s)'],
    ['mol L-1 s-1', 'mol/(L s)'],
    ['mg/(g min)', 'mg/(g min)'],
  ])('%s is %s', (written, text) => {
    expect(parseRateUnit(written)).toMatchObject({ ok: true, value: { text, isPerTimeOnly: /^1\/\w+$/.test(text) } })
  })

  // Oracle: the unit tables of mathjs; the year is that of 365.25 days (IAU).
  it.each([
    ['1/s', 'second'],
    ['1/min', 'minute'],
    ['1/h', 'hour'],
    ['1/d', 'day'],
    ['per week', 'week'],
  ])('%s is per second what mathjs makes of a %s', (written, oracle) => {
    const parsed = parseRateUnit(written)
    expect(parsed.ok ? parsed.value.perSecond : Number.NaN).toBeCloseTo(1 / unit(1, oracle).toNumber('s'), 15)
  })

  it('the text of a unit is read as the same unit', () => {
    for (const written of ['cm³ molecule⁻¹ s⁻¹', 'L/mol s', 'M-1 s-1', '1/year', '%/h']) {
      const once = parseRateUnit(written)
      expect(once.ok && parseRateUnit(once.value.text)).toEqual(once)
    }
  })

  it.each(['', 's', 'K', '1/K', 'mol/L', 's-2', '1/(s min)', 'corrected', 'mg', '1/s)', '(1/s', 'W/g', '10^-5', 'L//s s', '1e5/s'])(
    '"%s" is none',
    (written) => {
      expect(parseRateUnit(written)).toMatchObject({ ok: false, reason: expect.stringMatching(/\w/) as unknown })
    },
  )
})

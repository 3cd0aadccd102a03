import { unit } from 'mathjs'
import { describe, expect, it } from 'vitest'
import { fahrenheitToKelvin, kelvinToCelsius } from './convert.ts'
import { parseHeatingRate, parsePercent, parseTemperatureDifference, parseTemperature, parseTime } from './parse-quantity.ts'

const value = (parsed: { ok: boolean; value?: number; reason?: string }): number => {
  expect(parsed.reason).toBeUndefined()
  return parsed.value ?? Number.NaN
}

describe('a typed quantity', () => {
  // Oracle: the unit tables of mathjs.
  it.each([
    ['250 C', '250 degC'],
    ['250', '250 degC'],
    ['250,5 °C', '250.5 degC'],
    ['523 K', '523 K'],
    ['482 F', '482 degF'],
    ['-40 °F', '-40 degF'],
    ['2.5e2C', '250 degC'],
    ['−10 °C', '-10 degC'],
  ])('temperature %s is what mathjs makes of %s', (typed, oracle) => {
    expect(value(parseTemperature(typed))).toBeCloseTo(unit(oracle).toNumber('K'), 10)
  })

  it.each([
    ['10', '10 minute'],
    ['90 s', '90 s'],
    ['1,5 h', '1.5 h'],
    ['2 d', '2 day'],
  ])('time %s is what mathjs makes of %s', (typed, oracle) => {
    expect(value(parseTime(typed))).toBeCloseTo(unit(oracle).toNumber('s'), 10)
  })

  it.each([
    ['10 K/min', '10 K/minute'],
    ['10,4', '10.4 K/minute'],
    ['0.2 K/s', '0.2 K/s'],
    ['5 °C/min', '5 K/minute'],
    ['18 F/min', '10 K/minute'],
    ['5 K per min', '5 K/minute'],
  ])('heating rate %s is what mathjs makes of %s', (typed, oracle) => {
    expect(value(parseHeatingRate(typed))).toBeCloseTo(unit(oracle).toNumber('K/s'), 12)
  })

  it.each([
    [parseTemperature('-300 C'), /below absolute zero/],
    [parseTemperature('0 K'), /below absolute zero/],
    [parseTemperature('hot'), /does not start with a number/],
    [parseTemperature('250 bar'), /no unit of temperature/],
    [parseTime('10 K'), /no unit of time/],
    [parseHeatingRate('10 min'), /no unit of heating rate/],
    [parseHeatingRate('0 K/min'), /greater than zero/],
    [parseTemperature(''), /does not start with a number/],
  ])('that cannot be meant is refused in words (%#)', (parsed, reason) => {
    expect(parsed).toMatchObject({ ok: false, reason: expect.stringMatching(reason) as unknown })
  })

  it('converts at the fixed points of the scales', () => {
    // The degree Celsius is defined by 0 °C = 273.15 K; 32 °F = 0 °C and 212 °F = 100 °C by the definition of the degree Fahrenheit.
    expect(fahrenheitToKelvin(32)).toBe(273.15)
    expect(kelvinToCelsius(fahrenheitToKelvin(212))).toBeCloseTo(100, 10)
  })
})

describe('a temperature difference', () => {
  it.each([
    ['0.5 K', 0.5],
    ['0,5', 0.5],
    ['2 °C', 2],
    ['1.8 F', 1],
    ['0', 0],
  ])('%s', (text, kelvins) => expect(parseTemperatureDifference(text)).toEqual({ ok: true, value: kelvins }))

  it('refuses another unit', () =>
    expect(parseTemperatureDifference('3 s')).toMatchObject({ ok: false, reason: expect.stringContaining('"s"') as string }))
})

describe('a share', () => {
  it.each([
    ['2 %', 0.02],
    ['2', 0.02],
    ['0,5%', 0.005],
  ])('%s', (text, share) => expect(parsePercent(text)).toEqual({ ok: true, value: share }))

  it('refuses another unit', () => expect(parsePercent('2 K')).toMatchObject({ ok: false }))
})

import { unit } from 'mathjs'
import { describe, expect, it } from 'vitest'
import { heatingRateIn, heatingRateOfName } from './heating-rate-text.ts'

describe('a heating rate in words', () => {
  // Oracle: the unit tables of mathjs.
  it.each([
    ['10 K/min', '10 K/minute'],
    ['30 °C to 720 °C, 9,0 K/min', '9 K/minute'],
    ['4 K min⁻¹', '4 K/minute'],
    ['4 K min^-1', '4 K/minute'],
    ['5 °C/min', '5 K/minute'],
    ['5 degC per minute', '5 K/minute'],
    ['0.5 K/s', '0.5 K/s'],
    ['60 K/h', '60 K/hour'],
    ['DSC-5K/min', '5 K/minute'],
    ['T_5Kmin', '5 K/minute'],
    ['18 °F/min', '10 K/minute'],
    ['ramp 20 C/min to 600 C under 50 mL/min', '20 K/minute'],
    ['10 K/min, then again 10 K/min', '10 K/minute'],
  ])('%s', (text, oracle) => {
    expect(heatingRateIn(text)?.heatingRate_K_per_s).toBeCloseTo(unit(oracle).toNumber('K/s'), 14)
  })

  it.each(['50 mL/min', '720 C', 'hold at 120 °C for 30 min', '5 K/min then 20 K/min', '-10 K/min', '1,000 K/min', '10', '120 C s', ''])(
    'is not in "%s"',
    (text) => {
      expect(heatingRateIn(text)).toBeNull()
    },
  )
})

describe('a heating rate in a file name', () => {
  it.each([
    ['lk3_9Kmin', 9],
    ['cure 2.5 K per min', 2.5],
    ['UMET_TGA_N2_100K_1', 100],
    ['10K_R2', 10],
    ['5 C-min', 5],
    ['2p5Kmin', 2.5],
    ['2,5Kmin', 2.5],
    ['FSRI_Wood_STA_N2_3K_R1', 3],
    ['resin_10K-min_2', 10],
    ['10°Cmin', 10],
    ['run 20 K', 20],
    ['sample_0.5Kmin', 0.5],
  ])('%s: %d K/min', (name, rate) => {
    expect((heatingRateOfName(name)?.heatingRate_K_per_s ?? 0) * 60).toBeCloseTo(rate, 13)
  })

  it.each([
    'run-12',
    'tz_16',
    'hold 120 C',
    'hold 400K',
    'isothermal_150K',
    'iso 120K',
    'programme-1',
    'sample 300K',
    '10K and 20K',
    'LK3',
    '10Kmix',
    '4 kinds',
    'K2',
    'CO2 5 C',
    '2026-12-01',
    '10KB',
  ])('is not in %s', (name) => {
    expect(heatingRateOfName(name)).toBeNull()
  })
})

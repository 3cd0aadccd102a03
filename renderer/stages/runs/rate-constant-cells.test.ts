import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { RateConstantTable } from '../../../shared-kinetics/contract/study-result.ts'
import {
  parseCellRateConstant,
  parseCellTemperature,
  parseCellUncertainty,
  parseTemperatures,
  predictionsText,
  rateConstantText,
  temperaturesText,
  temperatureText,
} from './rate-constant-cells.ts'
import {
  convertedTo,
  emptyTable,
  joined,
  ratioOfUnits,
  unitsOfSameKind,
  withNumbers,
  withTemperaturesMeantIn,
} from './rate-constant-edits.ts'

const row = (temperature_K: number, rateConstant: number) => ({
  temperature_K,
  rateConstant,
  standardUncertainty: null,
  label: null,
  use: true,
})
const table: RateConstantTable = { ...emptyTable, rateUnit: '1/s', rows: [row(298.15, 3.46e-5), row(308.15, 1.35e-4)] }

describe('cells of a table of rate constants', () => {
  it('take a temperature in the table’s unit, or in the one typed', () => {
    for (const [text, kelvin] of [
      ['25', 298.15],
      ['25,5', 298.65],
      ['298.15 K', 298.15],
      ['77 °F', 298.15],
      ['−5', 268.15],
    ] as const) {
      const parsed = parseCellTemperature(text, 'C')
      expect(parsed.ok && parsed.value).toBeCloseTo(kelvin, 9)
    }
    expect(parseCellTemperature('77', 'F')).toMatchObject({ ok: true })
    expect(parseCellTemperature('-300', 'C')).toMatchObject({ ok: false, reason: expect.stringMatching(/absolute zero/) as unknown })
    expect(parseCellTemperature('warm', 'C').ok).toBe(false)
    expect(parseCellTemperature('', 'C')).toMatchObject({ ok: false, reason: 'A temperature is missing.' })
  })

  it('take k as it is printed, and convert a unit of the same kind', () => {
    for (const text of ['3.46e-5', '3,46e-5', '3.46×10⁻⁵', '3.46 x 10^-5', '3.46·10-5', '3.46e-5 1/s', '3.46 × 10⁻⁵ s⁻¹', '0.0000346']) {
      const parsed = parseCellRateConstant(text, '1/s')
      expect([text, parsed.ok && Number(parsed.value.rateConstant.toPrecision(12))]).toEqual([text, 3.46e-5])
    }
    const perMinute = parseCellRateConstant('6 1/min', '1/s')
    expect(perMinute.ok && perMinute.value).toEqual({ rateConstant: 0.1, rateUnit: '1/s' })
    expect(parseCellRateConstant('6 1/min', '')).toEqual({ ok: true, value: { rateConstant: 6, rateUnit: '1/min' } })
    for (const text of ['', 'fast', '0', '-1e-5', '3 mg', '3 L/(mol s)'])
      expect([text, parseCellRateConstant(text, '1/s').ok]).toEqual([text, false])
  })

  it('ask about a power of ten that lost its height and sign, as a paste does', () => {
    for (const text of ['7.87 × 107', '7.87 x 10 7', '7.87·1012', '7,87*107 1/s']) {
      const reason = expect.stringContaining('“× 107” may be 10^7 or a hundred and seven. Write it as 7.87e7 or 7.87 × 10^7.') as unknown
      expect([text, parseCellRateConstant(text, '1/s')]).toEqual([text, { ok: false, reason }])
      expect([text, parseCellUncertainty(text, { rateConstant: 1 }, '1/s')]).toEqual([text, { ok: false, reason }])
    }
    for (const text of ['7.87e7', '7.87 × 10^7', '7.87×10⁷', '7,87*10**7', '7.87·10^{7} s⁻¹', '7.87 × 10+7 1/s'])
      expect([text, parseCellRateConstant(text, '1/s')]).toEqual([text, { ok: true, value: { rateConstant: 7.87e7, rateUnit: '1/s' } }])
    // A sign says that it is a power, as a page that lost the height prints it.
    expect(parseCellRateConstant('7.87 × 10−7', '1/s')).toMatchObject({ ok: true, value: { rateConstant: 7.87e-7 } })
  })

  it('take an uncertainty in the unit of k or as a share of it, or none', () => {
    expect(parseCellUncertainty('5 %', { rateConstant: 2e-4 }, '1/s')).toEqual({ ok: true, value: 1e-5 })
    expect(parseCellUncertainty('2e-6', { rateConstant: 2e-4 }, '')).toEqual({ ok: true, value: 2e-6 })
    expect(parseCellUncertainty(' ', { rateConstant: 2e-4 }, '1/s')).toEqual({ ok: true, value: null })
    expect(parseCellUncertainty('0', { rateConstant: 2e-4 }, '1/s').ok).toBe(false)
  })

  it('take several temperatures, however they are parted', () => {
    for (const text of ['25 C, 310 K', '25 C; 310K', '25 C,310 K', '25 and 310 K']) {
      const parsed = parseTemperatures(text, 'C')
      expect([text, parsed.ok && parsed.value.map((T) => T.toFixed(2))]).toEqual([text, ['298.15', '310.00']])
    }
    expect(parseTemperatures('25,5', 'C')).toMatchObject({ ok: true, value: [298.65] })
    expect(parseTemperatures('', 'C')).toEqual({ ok: true, value: [] })
    expect(parseTemperatures('25 C; soon', 'C').ok).toBe(false)
  })

  it('show numbers so that typing what is shown changes nothing', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-30, max: 1e30, noNaN: true }), (k) => {
        const parsed = parseCellRateConstant(rateConstantText(k), '1/s')
        expect(parsed.ok && parsed.value.rateConstant / k).toBeCloseTo(1, 9)
      }),
    )
    fc.assert(
      fc.property(fc.constantFrom('K', 'C', 'F'), fc.double({ min: 20, max: 5000, noNaN: true }), (unit, T) => {
        const parsed = parseTemperatures(temperaturesText([T, T + 10], unit), unit)
        expect(parsed.ok && parsed.value[0]).toBeCloseTo(T, 5)
        const cell = parseCellTemperature(temperatureText(T, unit), unit)
        expect(cell.ok && cell.value).toBeCloseTo(T, 5)
      }),
    )
    expect(temperatureText(298.15, 'C')).toBe('25')
    expect(rateConstantText(3.46e-5)).toBe('3.46e-5')
    expect(rateConstantText(null)).toBe('')
  })
})

describe('changes to a table of rate constants', () => {
  it('tell numbers meant in another unit from numbers converted', () => {
    const meant = withTemperaturesMeantIn({ ...table, temperatureUnitShown: 'K', rows: [row(25, 1), row(35, 2)] }, 'C')
    expect(meant?.rows.map(({ temperature_K }) => temperature_K)).toEqual([298.15, 308.15])
    expect(withTemperaturesMeantIn({ ...table, rows: [row(263.15, 1)] }, 'K')).toBeNull()
    expect(convertedTo(table, '1/min')?.rows[0]?.rateConstant).toBeCloseTo(60 * 3.46e-5, 12)
    expect(convertedTo(table, 'L/(mol s)')).toBeNull()
    expect(convertedTo({ ...table, rateUnit: '' }, '1/s')).toBeNull()
  })

  it('know which units convert into which', () => {
    expect(ratioOfUnits('1/s', '1/h')).toBe(3600)
    expect(ratioOfUnits('L/(mol s)', 'L/(mol min)')).toBeCloseTo(60, 12)
    expect(ratioOfUnits('L/(mol s)', '1/s')).toBeNull()
    expect(ratioOfUnits('', '1/s')).toBeNull()
    expect(unitsOfSameKind('L/(mol s)')).toEqual(['L/(mol s)', 'L/(mol min)', 'L/(mol h)', 'L/(mol d)'])
    expect(unitsOfSameKind('')).toEqual([])
  })

  it('join rows in the unit of the table that was there first', () => {
    const other: RateConstantTable = { ...table, rateUnit: '1/min', rows: [row(318.15, 6)] }
    expect(joined(table, other)?.rows.at(-1)?.rateConstant).toBeCloseTo(0.1, 12)
    expect(joined(table, { ...other, rateUnit: 'L/(mol s)' })).toBeNull()
    expect(joined({ ...table, rateUnit: '' }, other)).toBeNull()
    expect(joined(table, { ...other, rateUnit: '' })).toBeNull()
    expect(joined({ ...emptyTable, predictAt_K: [300] }, other)).toMatchObject({ rateUnit: '1/min', rows: other.rows, predictAt_K: [300] })
  })

  it('say of a file’s table that its numbers are no longer the file’s', () => {
    const file: RateConstantTable = { ...table, source: { kind: 'file', name: 'k.csv', sha256: 'a'.repeat(64) } }
    expect(withNumbers(file, 0, { rateConstant: 1 }).source).toEqual({ kind: 'typed', name: 'k.csv, then changed by hand', sha256: null })
  })
})

describe('the field of predictions', () => {
  const asked = parseTemperatures('5 C, 60 C', 'F')
  const temperatures_K = asked.ok ? asked.value : []

  it('keeps what was typed in another unit than the table’s', () => {
    expect(temperatures_K).toEqual([278.15, 333.15])
    expect(predictionsText(temperatures_K, 'F', { text: '5 C, 60 C', temperatures_K })).toBe('5 C, 60 C')
  })

  it('shows the temperatures in the table’s unit where nobody typed them here, or the study asks for others by now', () => {
    expect(predictionsText(temperatures_K, 'F', null)).toBe('41 °F; 140 °F')
    expect(predictionsText([278.15], 'F', { text: '5 C, 60 C', temperatures_K })).toBe('41 °F')
    expect(predictionsText([278.15, 300], 'K', { text: '5 C, 60 C', temperatures_K })).toBe('278.15 K; 300 K')
  })
})

import Papa from 'papaparse'
import { describe, expect, it } from 'vitest'
import type { RateConstantTable } from '../../shared-kinetics/rate-constants/rate-constant-table.ts'
import { evaluateRateConstants } from '../../shared-kinetics/tasks/evaluate-rate-constants.ts'
import { rateConstantsCsv } from './rate-constants-csv.ts'
import { rateConstantLines, rateConstantsShortTable } from './rate-constants-lines.ts'

// F. Daniels, E. H. Johnston, J. Am. Chem. Soc. 43 (1921) 53: N2O5, three of their rate constants.
const table: RateConstantTable = {
  rows: [
    [298, 3.46e-5],
    [308, 1.35e-4],
    [318, 4.98e-4],
  ].map(([temperature_K = 0, rateConstant = 0]) => ({ temperature_K, rateConstant, standardUncertainty: null, label: null, use: true })),
  rateUnit: '1/s',
  temperatureUnitShown: 'K',
  predictAt_K: [10, 303],
  source: { kind: 'typed', name: null, sha256: null },
  notes: [],
}
const result = evaluateRateConstants(table)
const { data } = Papa.parse<string[]>(rateConstantsCsv(result, { separator: ',', decimal: '.' }), { skipEmptyLines: true })
const [headings = []] = data
const cell = (row: readonly string[] | undefined, heading: string): string => row?.[headings.indexOf(heading)] ?? 'no cell'
const rowsOf = (quantity: string): string[][] => data.filter(([name]) => name === quantity)

describe('the exported table of rate constants', () => {
  it('leaves a k beyond the range of numbers empty and gives its logarithm', () => {
    const [far, , near] = rowsOf('k, predicted')
    expect([cell(far, 'temperature (K)'), cell(far, 'value'), cell(far, 'lower 95 %')]).toEqual(['10', '', ''])
    expect(Number(cell(near, 'value'))).toBeGreaterThan(3.46e-5)
    const [lnFar, lnNear] = rowsOf('ln k, predicted')
    expect(Number(cell(lnFar, 'value'))).toBeLessThan(Math.log(Number.MIN_VALUE))
    expect(Number(cell(lnNear, 'value'))).toBeCloseTo(Math.log(Number(cell(near, 'value'))), 4)
    expect(rateConstantLines(result).find((line) => line.startsWith('ln k at 10 K'))).toMatch(
      /k is beyond the range of numbers \(line .* to .*\); 288 K below the data/,
    )
  })

  it('gives A with the interval of ln A carried over, unequal to both sides', () => {
    const { line } = result
    const [row] = rowsOf('A')
    expect(Number(cell(row, 'lower 95 %')) / Math.exp(line.lnALower95 ?? Number.NaN)).toBeCloseTo(1, 5)
    expect(Number(cell(row, 'upper 95 %')) / Math.exp(line.lnAUpper95 ?? Number.NaN)).toBeCloseTo(1, 5)
    const [A, lower, upper] = [line.A ?? 0, line.ALower95 ?? 0, line.AUpper95 ?? 0]
    expect((A / lower) * (A / upper)).toBeCloseTo(1, 9)
    expect(upper - A).toBeGreaterThan(A - lower)
    expect(rateConstantLines(result).find((text) => text.startsWith('ln A:'))).toMatch(/, A \d.*e\d+ 1\/s \(.* to .*\)$/)
  })

  it('lists Ea between neighbouring temperatures in lines too, all of them beside the table and the first on a terminal', () => {
    const between = rateConstantLines(result).filter((line) => line.startsWith('Ea between'))
    // R ln(1.35e-4/3.46e-5)/(1/298 - 1/308) and R ln(4.98e-4/1.35e-4)/(1/308 - 1/318), by hand.
    expect(between[0]).toMatch(/^Ea between 298 K \(24\.85 °C\) and 308 K \(34\.85 °C\): 103\.\d\d kJ\/mol, ln A 31\.\d\d$/)
    expect(between).toHaveLength(2)
    const many = evaluateRateConstants({
      ...table,
      rows: Array.from({ length: 40 }, (_, i) => ({
        ...(table.rows[0] as (typeof table.rows)[number]),
        temperature_K: 300 + i,
        rateConstant: Math.exp(i / 10),
      })),
    })
    expect(rateConstantLines(many).filter((line) => line.startsWith('Ea between'))).toHaveLength(39)
    const short = rateConstantsShortTable(many).split('\n')
    expect(short.filter((line) => line.startsWith('Ea between'))).toHaveLength(12)
    expect(short).toContain('and between 27 further pairs of neighbouring temperatures')
  })

  it('writes negative numbers with a power of ten as numbers, under either decimal sign', () => {
    // Exact rate constants: what is left of ln k is rounding, of both signs.
    const exact = evaluateRateConstants({
      ...table,
      rows: [298, 303, 308, 318].map((T, i) => ({
        temperature_K: T,
        rateConstant: 1e13 * Math.exp(-1e5 / (8.31446261815324 * T)) * (1 + (i - 1.5) * 1e-9),
        standardUncertainty: null,
        label: null,
        use: true,
      })),
    })
    for (const [style, sign] of [
      [{ separator: ',', decimal: '.' }, /^-?\d(?:\.\d+)?e-\d+$/],
      [{ separator: ';', decimal: ',' }, /^-?\d(?:,\d+)?e-\d+$/],
    ] as const) {
      const rows = Papa.parse<string[]>(rateConstantsCsv(exact, style), { delimiter: style.separator, skipEmptyLines: true }).data
      const residuals = rows.filter(([name]) => name === 'k, measured').map((row) => cell(row, 'residual of ln k'))
      expect(residuals.some((text) => text.startsWith('-'))).toBe(true)
      for (const text of residuals) expect(text).toMatch(sign)
    }
  })

  it('gives Ea between each two neighbouring temperatures', () => {
    const pairs = rowsOf('Ea between two temperatures')
    expect(pairs.map((row) => cell(row, 'label'))).toEqual(['298 K to 308 K', '308 K to 318 K'])
    expect(Number(cell(pairs[1], 'value'))).toBeCloseTo((8.31446261815324e-3 * Math.log(4.98e-4 / 1.35e-4)) / (1 / 308 - 1 / 318), 4)
    expect(rowsOf('ln A between two temperatures').map((row) => cell(row, 'unit'))).toEqual(['A in 1/s', 'A in 1/s'])
  })
})

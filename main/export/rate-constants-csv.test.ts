import Papa from 'papaparse'
import { describe, expect, it } from 'vitest'
import type { RateConstantTable } from '../../shared-kinetics/rate-constants/rate-constant-table.ts'
import { evaluateRateConstants } from '../../shared-kinetics/tasks/evaluate-rate-constants.ts'
import { rateConstantsCsv } from './rate-constants-csv.ts'
import { rateConstantLines } from './rate-constants-lines.ts'

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

  it('gives Ea between each two neighbouring temperatures', () => {
    const pairs = rowsOf('Ea between two temperatures')
    expect(pairs.map((row) => cell(row, 'label'))).toEqual(['298 K to 308 K', '308 K to 318 K'])
    expect(Number(cell(pairs[1], 'value'))).toBeCloseTo((8.31446261815324e-3 * Math.log(4.98e-4 / 1.35e-4)) / (1 / 308 - 1 / 318), 4)
    expect(rowsOf('ln A between two temperatures').map((row) => cell(row, 'unit'))).toEqual(['A in 1/s', 'A in 1/s'])
  })
})

import { describe, expect, it } from 'vitest'
import type { PeakMethodResult } from '../../../shared-kinetics/contract/study-result.ts'
import { copyText } from '../../sheet/data-table.ts'
import { ownNumbers, peakColumns, peakCopyColumns, peakName, peakNote } from './peak-rows.ts'

const e698: PeakMethodResult = {
  method: 'astm-e698',
  label: 'ASTM E698',
  sources: ['a standard', 'a paper'],
  runId: null,
  runLabel: null,
  applies: true,
  reason: null,
  Ea_kJ_per_mol: 177.83,
  standardError_kJ_per_mol: 2.63,
  lower95_kJ_per_mol: 169.47,
  upper95_kJ_per_mol: 186.19,
  dof: 3,
  lnA_per_s: 30.322,
  lnAStandardError: 0.538,
  covarianceEaLnA_kJ_per_mol: 1.4,
  covarianceWithOrder: null,
  r2: 0.999411,
  numbers: [
    { key: 'D', label: 'D = −d ln p/dx', value: 1.05497, standardError: null, unit: '1' },
    { key: 'confirmation-temperature', label: 'temperature of a half-life of 60 min', value: 550.15, standardError: 0.62, unit: 'K' },
  ],
  remarks: ['First remark.', 'An estimate for planning.'],
  line: null,
}
const nothing: PeakMethodResult = {
  ...e698,
  method: 'augis-bennett',
  label: 'Augis–Bennett',
  applies: false,
  reason: 'it is made for crystallisation, which does not change the mass',
  Ea_kJ_per_mol: null,
  standardError_kJ_per_mol: null,
  lower95_kJ_per_mol: null,
  upper95_kJ_per_mol: null,
  dof: 0,
  lnA_per_s: null,
  lnAStandardError: null,
  r2: null,
  numbers: [],
  remarks: [],
}

const at = (key: PeakMethodResult['numbers'][number]['key'], value: number) =>
  ({ key, label: 'conversion', value, standardError: null, unit: '1' }) as const

describe('rows of peak and single-run methods', () => {
  it('show Ea, interval and ln A with its error', () => {
    expect(peakColumns.map((column) => column.text(e698))).toEqual(['177.8', '8.4', '30.32 ±\u00a00.54', '0.9994'])
    expect(peakColumns.map((column) => column.text(nothing))).toEqual(['', '', '', ''])
  })

  it('say why a row has no interval, or one that reaches below 0', () => {
    const [, column] = peakColumns
    const two: PeakMethodResult = { ...e698, standardError_kJ_per_mol: null, lower95_kJ_per_mol: null, upper95_kJ_per_mol: null, dof: 0 }
    expect([e698, two].map((row) => [column?.text(row), column?.remark?.(row)])).toEqual([
      ['8.4', null],
      ['none', 'not to be had with fewer than three distinct programmes'],
    ])
    expect(column?.remark?.({ ...e698, lower95_kJ_per_mol: -20, upper95_kJ_per_mol: 375.66 })).toMatch(/^reaches below 0/)
    expect(column?.remark?.(nothing)).toBeNull()
    const [head, first] = copyText(peakCopyColumns(), [two])
      .split('\n')
      .map((line) => line.split('\t'))
    expect(first?.[head?.indexOf('On the interval') ?? -1]).toBe('not to be had with fewer than three distinct programmes')
  })

  it('give own numbers in words, temperatures in °C, or the reason why a method does not apply', () => {
    expect(ownNumbers(e698)).toBe('D = −d ln p/dx: 1.05; temperature of a half-life of 60 min 277.0 ±\u00a00.6 °C')
    expect(ownNumbers(nothing)).toBe('It is made for crystallisation, which does not change the mass.')
    const numbers = [
      at('conversion-at-peak-lowest', 0.781),
      at('conversion-at-peak-highest', 0.816),
      at('conversion-at-peak-first-order', 0.612),
    ]
    expect(ownNumbers({ ...e698, numbers })).toBe('peaks at α 0.78 to 0.82, of a first-order reaction at 0.61')
  })

  it('say in the row what nobody may overlook', () => {
    expect(peakNote({ ...e698, method: 'borchardt-daniels' }, 'heat-flow')).toBe('not to be relied on alone')
    expect(peakNote({ ...e698, method: 'borchardt-daniels' }, 'mass')).toBe('not to be relied on alone; standard is for DSC')
    expect(peakNote(e698, 'mass')).toBe('standard is for DSC')
    expect(peakNote(e698, 'heat-flow')).toBe('')
    expect(peakNote({ ...e698, method: 'kissinger' }, 'mass')).toBe('')
    expect(peakNote(nothing, 'mass')).toBe('')
  })

  it('name a single-run method by its run', () => {
    expect(peakName(e698)).toBe('ASTM E698')
    expect(peakName({ ...e698, label: 'Borchardt–Daniels', runLabel: 'run 3' })).toBe('Borchardt–Daniels, run 3')
  })

  it('are copied with units, errors, reasons and what to know before relying on them', () => {
    const [head, first, second] = copyText(peakCopyColumns(), [e698, nothing])
      .split('\n')
      .map((line) => line.split('\t'))
    const cell = (row: readonly string[] | undefined, heading: string): string | undefined => row?.[head?.indexOf(heading) ?? -1]
    expect(cell(first, 'Ea (kJ/mol)')).toBe('177.83')
    expect(cell(first, '± 95 %, Student-t (kJ/mol)')).toBe('8.36')
    expect(cell(first, 's.e. of ln A')).toBe('0.538')
    expect(cell(first, 'temperature of a half-life of 60 min (°C)')).toBe('277.000')
    expect(cell(first, 'To know before relying on it')).toBe('First remark. An estimate for planning.')
    expect(cell(second, 'Ea (kJ/mol)')).toBe('')
    expect(cell(second, 'Own numbers, or why it does not apply')).toContain('crystallisation')
  })
})

import { Window } from 'happy-dom'
import { assert, constantFrom, double, property, string } from 'fast-check'
import Papa from 'papaparse'
import { describe, expect, it } from 'vitest'
import { emptyStudy, type StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import type { Figure } from '../../shared-kinetics/figure/figure.ts'
import type { PeakMethodResult, ProfileResult, RunResult, StudyResult } from '../../shared-kinetics/tasks/study-result.ts'
import type { ExportSource } from './activation-json.ts'
import { csvTable, tableStyle } from './csv-table.ts'
import { runInfoOf } from '../../shared-kinetics/check-values/run-info-of.ts'
import { exportResults, type ExportFormat } from './export-results.ts'
import { figureSvg } from './figure-svg.ts'
import { peakMethodLines } from './peak-method-lines.ts'
import { shortTable } from './short-table.ts'

const hostile = "=cmd|'/c calc'!A1 <script>&\"é\u0001"

const profile: ProfileResult = {
  method: 'friedman',
  label: 'Friedman',
  sources: ['H. L. Friedman, J. Polym. Sci. C 6 (1964) 183'],
  evidence: 'line',
  interval: { kind: 'student-t', level: 0.95, dof: 3, pointwise: true },
  Ea_kJ_per_mol: [211.2345678901234, -3.5, null],
  standardError_kJ_per_mol: [1.9, 0.00001, null],
  lower95_kJ_per_mol: [205.1, -3.6, null],
  upper95_kJ_per_mol: [217.3, -3.4, null],
  lnAf_per_s: [33.1, -1.25, null],
  lnAfStandardError: [0.4, 0.1, null],
  covarianceEaLnAf_kJ_per_mol: [null, null, null],
  lnA_per_s: [null, null, null],
  otherIntervals: [],
  systematicError_percent: [0, 0, 0],
  lackOfFit: null,
  r2: [0.9991, 0.5, null],
  status: ['ok', 'ok', 'level-not-reached'],
  lines: [],
  phi: [],
  mean: {
    from: 0.1,
    to: 0.9,
    Ea_kJ_per_mol: 103.9,
    spread_kJ_per_mol: 214.7,
    standardError_kJ_per_mol: null,
    lower95_kJ_per_mol: null,
    upper95_kJ_per_mol: null,
    levelsUsed: 2,
    levelsInRange: 3,
    firstLevel: 0.1,
    lastLevel: 0.5,
    note: 'From the scatter of the runs alone.',
  },
}

const withoutInterval: ProfileResult = {
  ...profile,
  method: 'ofw',
  label: 'Ozawa–Flynn–Wall',
  interval: { ...profile.interval, dof: 0 },
  standardError_kJ_per_mol: [null, null, null],
  lower95_kJ_per_mol: [null, null, null],
  upper95_kJ_per_mol: [null, null, null],
  lnAf_per_s: [Number.NaN, null, null],
  lnAfStandardError: [null, null, null],
}

const run: RunResult = {
  runId: 'r1',
  label: hostile,
  fileName: `${hostile}.csv`,
  column: 'Mass (mg)',
  sha256: 'ab'.repeat(32),
  signal: 'mass',
  signalUnit: 'kg',
  programme: 'constant-heating-rate',
  programmeGroup: 0,
  nominalHeatingRate_K_per_min: 10,
  heatingRate_K_per_min: 10.42,
  heatingRateStandardError_K_per_min: 0.01,
  heatingRateSource: 'measured',
  holdTemperature_K: null,
  holdStart_s: null,
  conversionBeforeHold: null,
  rows: 999,
  initialMass_kg: 8e-6,
  window: { kind: 'temperature', start_K: 430, end_K: 870 },
  peak_K: 640.1,
  enthalpy_J_per_g: null,
  enthalpyMagnitude_J_per_g: null,
  temperatureAtLevel_K: [600, 610, null],
  timeAtLevel_s: [1, 2, null],
  reactionRateAtLevel_per_s: [0.1, 0.2, null],
  signalAtLevel: [7e-6, 5e-6, null],
  curve: {
    time_s: new Float64Array(2),
    temperature_K: new Float64Array(2),
    signal: new Float64Array(2),
    conversion: new Float64Array(2),
    reactionRate_per_s: new Float64Array(2),
    baseline: new Float64Array(0),
  },
}

const hold: RunResult = {
  ...run,
  runId: 'r2',
  label: 'hold',
  programme: 'isothermal',
  heatingRateSource: null,
  heatingRate_K_per_min: null,
  window: { kind: 'time', start_s: 0, end_s: 600 },
}

const e698: PeakMethodResult = {
  method: 'astm-e698',
  label: 'ASTM E698',
  sources: ['ASTM E698'],
  runId: null,
  runLabel: null,
  applies: true,
  reason: null,
  Ea_kJ_per_mol: 209.25,
  standardError_kJ_per_mol: 2.125,
  lower95_kJ_per_mol: 202.5,
  upper95_kJ_per_mol: 216,
  dof: 3,
  lnA_per_s: 34.25,
  lnAStandardError: 0.375,
  covarianceEaLnA_kJ_per_mol: 0.75,
  covarianceWithOrder: null,
  r2: 0.999,
  numbers: [
    { key: 'confirmation-temperature', label: 'temperature of a half-life of 60 min', value: 407.65, standardError: 0.5, unit: 'K' },
    { key: 'D', label: 'D', value: 1.0625, standardError: null, unit: '1' },
    { key: 'first-estimate', label: 'Ea before it is refined', value: 210.5, standardError: null, unit: 'kJ/mol' },
  ],
  remarks: ['To confirm: age a sample for 60 min at 134.5 °C.'],
  line: { ordinate: 'log β', x_per_K: [0.0016], y: [-0.8], slope_K: -11000, intercept: 17 },
}

const doesNotApply: PeakMethodResult = {
  ...e698,
  method: 'augis-bennett',
  label: 'Augis–Bennett',
  applies: false,
  reason: 'It is made for crystallisation.',
  Ea_kJ_per_mol: null,
  standardError_kJ_per_mol: null,
  lower95_kJ_per_mol: null,
  upper95_kJ_per_mol: null,
  dof: 0,
  lnA_per_s: null,
  lnAStandardError: null,
  covarianceEaLnA_kJ_per_mol: null,
  covarianceWithOrder: null,
  r2: null,
  numbers: [],
  remarks: [],
  line: null,
}

const at = (key: 'lowest' | 'highest' | 'first-order', value: number) =>
  ({ key: `conversion-at-peak-${key}`, label: key, value, standardError: null, unit: '1' }) as const

const singleRun: PeakMethodResult = {
  ...e698,
  method: 'borchardt-daniels',
  label: 'Borchardt–Daniels',
  runId: 'r1',
  runLabel: 'Run one',
  numbers: [{ key: 'order', label: 'n, reaction order', value: 1.0625, standardError: 0.125, unit: '1' }],
  remarks: [],
  line: null,
}

const result: StudyResult = {
  levels: [0.05, 0.1, 0.15000000000000002],
  signal: 'mass',
  signalsToChooseFrom: ['mass'],
  runs: [run, hold],
  profiles: [profile, withoutInterval],
  kissinger: {
    Ea_kJ_per_mol: 208.1,
    standardError_kJ_per_mol: 2.2,
    lower95_kJ_per_mol: 201,
    upper95_kJ_per_mol: 215.2,
    lnA_per_s: 34.1,
    peaks_K: [612],
    conversionAtPeak: [0.61],
    sources: ['H. E. Kissinger, Anal. Chem. 29 (1957) 1702'],
  },
  peakMethods: [e698, doesNotApply, singleRun],
  findings: [
    {
      code: 'heating-rate-differs-from-nominal',
      severity: 'caution',
      stage: 'runs',
      title: 'Heated at 10.42, not 10',
      message: 'Line one\nline two',
      run: 'r1',
      level: null,
      evidence: { measured: 10.42 },
      basis: 'common practice',
      sources: [],
    },
  ],
}

const document: StudyDocument = {
  ...emptyStudy('study', hostile),
  runs: [runInfoOf('r1', { label: hostile, file: { name: run.fileName, sha256: run.sha256, byteLength: 1 }, signals: [] })],
}

const source: ExportSource = { document, result, program: { name: 'rampfold', version: '1.2.3' } }

const textOf = (format: ExportFormat, index = 0): string =>
  new TextDecoder('utf-8', { fatal: true }).decode(exportResults(source, format)[index]?.bytes)

/** The text beside the table where the one run is changed. */
function notesOf(change: Partial<RunResult>): string {
  const files = exportResults({ ...source, result: { ...result, runs: [{ ...run, ...change }] } }, 'csv')
  return new TextDecoder('utf-8').decode(files[1]?.bytes)
}

describe('peak and single-run methods in exports', () => {
  it('stand in the JSON as they are, and beside the table as sentences', () => {
    expect((JSON.parse(textOf('json')) as Record<string, unknown>).peakMethods).toEqual([e698, doesNotApply, singleRun])
    const notes = textOf('csv', 1)
    expect(notes).toContain(
      '  ASTM E698: Ea 209.25 kJ/mol, standard error 2.13 (95 % Student-t, 3 degrees of freedom: 202.5 to 216.0), ln A 34.25, standard error 0.38 (A in 1/s), ' +
        'temperature of a half-life of 60 min 407.65 K (134.50 °C), standard error 0.50 K, D 1.063, Ea before it is refined 210.50 kJ/mol. Method: ASTM E698\n' +
        '    To confirm: age a sample for 60 min at 134.5 °C.\n',
    )
    expect(notes).toContain('  Augis–Bennett: does not apply. It is made for crystallisation.\n')
    expect(notes).toContain('  Borchardt–Daniels, Run one: Ea 209.25 kJ/mol')
    expect(notes).toContain('n, reaction order 1.063, standard error 0.125')
    expect(notes).toContain('estimate for planning')
  })

  it('without an interval or an A say so', () => {
    const bare = {
      ...e698,
      standardError_kJ_per_mol: null,
      lower95_kJ_per_mol: null,
      upper95_kJ_per_mol: null,
      lnA_per_s: null,
      numbers: [],
    }
    expect(peakMethodLines(bare)[0]).toBe('ASTM E698: Ea 209.25 kJ/mol, no interval, no A. Method: ASTM E698')
  })

  it('say what the conversions at the peaks mean', () => {
    const lines = peakMethodLines({
      ...e698,
      numbers: [at('lowest', 0.48), at('highest', 0.55), at('first-order', 0.62)],
      remarks: ['Confirm it.'],
    })
    expect(lines.slice(1)).toEqual([
      expect.stringMatching(/^ {2}Peaks at conversion 0\.48 to 0\.55: about alike .* is off\.$/),
      '  Confirm it.',
    ])
  })

  it('stand in the short table where they apply, single runs in one line with their caution', () => {
    const table = shortTable({
      ...result,
      peakMethods: [e698, doesNotApply, singleRun, { ...singleRun, runLabel: 'Run two', lower95_kJ_per_mol: null }],
    })
    expect(table).toContain('\nASTM E698: 209.3 ±6.8 kJ/mol, ln A 34.25 (A in 1/s)\n')
    expect(table).not.toContain('Augis')
    expect(table).toContain('\nBorchardt–Daniels, each run alone, not to be relied on: Run one 209.3 ±6.8 kJ/mol; Run two 209.3 kJ/mol\n')
  })
})

describe('activation.json, as scripts rely on it', () => {
  const json = JSON.parse(textOf('json')) as Record<string, unknown>

  it('has the fields of the format under their names', () => {
    expect(json).toMatchObject({
      format: 'rampfold.activation/1',
      program: { name: 'rampfold', version: '1.2.3' },
      levels: [0.05, 0.1, 0.15000000000000002],
      kissinger: {
        Ea_kJ_per_mol: 208.1,
        standardError_kJ_per_mol: 2.2,
        lower95_kJ_per_mol: 201,
        upper95_kJ_per_mol: 215.2,
        lnA_per_s: 34.1,
        peaks_K: [612],
        conversionAtPeak: [0.61],
      },
    })
    expect((json.runs as unknown[])[0]).toMatchObject({
      file: `${hostile}.csv`,
      column: 'Mass (mg)',
      sha256: 'ab'.repeat(32),
      label: hostile,
      signal: 'mass',
      programme: 'constant-heating-rate',
      nominalHeatingRate_K_per_min: 10,
      heatingRate_K_per_min: 10.42,
      heatingRateStandardError_K_per_min: 0.01,
      heatingRateSource: 'measured',
      rows: 999,
      window: { start_K: 430, end_K: 870 },
      peak_K: 640.1,
      enthalpy_J_per_g: null,
      enthalpyMagnitude_J_per_g: null,
    })
    expect((json.runs as unknown[])[1]).toMatchObject({ window: { start_K: null, end_K: null, start_s: 0, end_s: 600 } })
    expect((json.findings as unknown[])[0]).toMatchObject({
      code: 'heating-rate-differs-from-nominal',
      severity: 'caution',
      run: hostile,
      level: null,
      message: 'Line one\nline two',
      evidence: { measured: 10.42 },
      basis: 'common practice',
    })
  })

  it('keeps full precision, gives arrays as long as the levels, and null for what is not to be had', () => {
    const [first, second] = json.profiles as Record<string, unknown[]>[]
    expect(first).toMatchObject({
      method: 'friedman',
      interval: { kind: 'student-t', level: 0.95, dof: 3, pointwise: true },
      Ea_kJ_per_mol: [211.2345678901234, -3.5, null],
      standardError_kJ_per_mol: [1.9, 0.00001, null],
      lower95_kJ_per_mol: [205.1, -3.6, null],
      upper95_kJ_per_mol: [217.3, -3.4, null],
      lnAf_per_s: [33.1, -1.25, null],
      lnAfStandardError: [0.4, 0.1, null],
      r2: [0.9991, 0.5, null],
      status: ['ok', 'ok', 'level-not-reached'],
    })
    expect(second?.lnAf_per_s).toEqual([null, null, null])
    expect(textOf('json')).not.toContain('NaN')
  })
})

describe('activation.csv', () => {
  it('has one heading row and one row a level, the unit in every heading, empty cells for null', () => {
    const { data, errors } = Papa.parse<string[]>(textOf('csv').trim())
    expect(errors).toEqual([])
    expect(data[0]).toEqual([
      'conversion',
      'Ea Friedman (kJ/mol)',
      'Ea Friedman standard error (kJ/mol)',
      'Ea Friedman lower 95 % (kJ/mol)',
      'Ea Friedman upper 95 % (kJ/mol)',
      'ln[A f] Friedman (A in 1/s)',
      'Ea Ozawa-Flynn-Wall (kJ/mol)',
      'Ea Ozawa-Flynn-Wall standard error (kJ/mol)',
      'Ea Ozawa-Flynn-Wall lower 95 % (kJ/mol)',
      'Ea Ozawa-Flynn-Wall upper 95 % (kJ/mol)',
      'ln[A f] Ozawa-Flynn-Wall (A in 1/s)',
      'ln[A f] Friedman standard error',
    ])
    expect(data.slice(1)).toEqual([
      ['0.05', '211.2346', '1.9', '205.1', '217.3', '33.1', '211.2346', '', '', '', '', '0.4'],
      ['0.1', '-3.5', '0.00001', '-3.6', '-3.4', '-1.25', '-3.5', '', '', '', '', '0.1'],
      ['0.15', '', '', '', '', '', '', '', '', '', '', ''],
    ])
  })

  it('keeps the heading in ASCII, which every spreadsheet reads alike', () => {
    expect(textOf('csv').split('\r\n')[0]).toMatch(/^[\x20-\x7e]+$/)
  })

  it('names caution, interval, settings, provenance and findings in the text beside it', () => {
    const notes = textOf('csv', 1)
    expect(exportResults(source, 'csv').map((file) => file.fileName)).toEqual(['activation.csv', 'activation.csv.txt'])
    expect(notes).toContain('does not replace tests on the real amount, package and plant')
    expect(notes).toContain('Friedman: 95 % Student-t interval, 3 degrees of freedom')
    expect(notes).toContain('Ozawa–Flynn–Wall: no standard error and no interval')
    expect(notes).toContain(`SHA-256 ${'ab'.repeat(32)}`)
    expect(notes).toContain('heating rate 10.420 K/min (measured, standard error 0.010 K/min, nominal 10 K/min)')
    expect(notes).toContain('window 430.00 K (156.85 °C) to 870.00 K (596.85 °C); peak 640.10 K (366.95 °C)')
    expect(notes).toContain('window 0.000 to 10.000 min')
    expect(notes).toContain('caution, heating-rate-differs-from-nominal')
    expect(notes).toContain('Line one line two')
    expect(notes).toContain('levels of conversion: 0.05 0.1')
    expect(notes).toContain('Friedman: 103.90 kJ/mol over conversion 0.1 to 0.9 (2 of 3 levels, 0.1 to 0.5)')
    expect(notes).toMatch(/Kissinger.*Method: H\. E\. Kissinger/)
  })

  it('gives an enthalpy its sign, or says that it has none', () => {
    expect(notesOf({ enthalpy_J_per_g: -250, enthalpyMagnitude_J_per_g: 250 })).toContain('enthalpy -250.0 J/g (exothermic is negative)')
    expect(notesOf({ enthalpyMagnitude_J_per_g: 250 })).toContain('enthalpy 250.0 J/g, its sign not known')
    expect(notesOf({})).not.toContain('enthalpy')
  })
})

describe('csv table', () => {
  const styles = [tableStyle('.'), tableStyle(','), tableStyle('.', '\t'), tableStyle(',', '\t'), tableStyle('.', ';')]

  it('gives numbers back as they were, to seven digits, in every style', () => {
    assert(
      property(double({ noNaN: true, noDefaultInfinity: true, min: -1e12, max: 1e12 }), constantFrom(...styles), (value, style) => {
        const [[text] = ['']] = Papa.parse<[string]>(csvTable([[value, 'x']], style), { delimiter: style.separator }).data
        expect(text).toMatch(/^-?\d+([.,]\d+)?$/)
        expect(Math.abs(Number(text.replace(style.decimal, '.')) - value)).toBeLessThanOrEqual(Math.abs(value) * 1e-6 + 1e-12)
      }),
    )
  })

  it('gives any text back whole, and never lets it start a formula', () => {
    assert(
      property(
        string({ unit: 'binary' }),
        constantFrom('', '=', '+', '-', '@', '\t', '\r'),
        constantFrom(...styles),
        (tail, head, style) => {
          const text = head + tail
          const cell =
            Papa.parse<string[]>(csvTable([[text, 1]], style), { delimiter: style.separator, newline: '\r\n' }).data[0]?.[0] ?? ''
          expect(cell).not.toMatch(/^[=+\-@\t\r]/)
          expect(cell.replace(/^'(?=[=+\-@\t\r\n＝＋－＠])/, '')).toBe(text)
        },
      ),
    )
  })

  it('takes the semicolon with a decimal comma, and refuses one sign for both', () => {
    expect(tableStyle(',')).toEqual({ decimal: ',', separator: ';' })
    expect(() => tableStyle(',', ',')).toThrow(/separator/)
    expect(csvTable([[-1.5, null, 'a;b', 'say "x"']], tableStyle(','))).toBe('-1,5;;"a;b";"say ""x"""\r\n')
  })
})

const svgOf = (text: string) => new new Window().DOMParser().parseFromString(text, 'image/svg+xml')

describe('figures as SVG', () => {
  const svg = textOf('svg')
  const page = svgOf(svg)

  it('is one well-formed SVG 1.1 document at print size, with title and description', () => {
    expect(page.querySelector('parsererror')).toBeNull()
    expect(page.documentElement.getAttribute('version')).toBe('1.1')
    expect(page.documentElement.getAttribute('width')).toBe('160mm')
    expect(page.querySelector('title')?.textContent).toBe('Activation energy against conversion')
    expect(page.querySelector('desc')?.textContent).toContain('does not replace tests')
    expect(svg).not.toMatch(/NaN|undefined|Infinity/)
  })

  it('titles its axes with their units and names every method in the legend', () => {
    const texts = [...page.querySelectorAll('text')].map((text) => text.textContent)
    expect(texts).toEqual(
      expect.arrayContaining(['Conversion α', 'Ea (kJ/mol)', 'Friedman', 'Ozawa–Flynn–Wall', '95 % interval (Student-t), Friedman']),
    )
  })

  it('needs nothing from outside', () => {
    expect(svg.replace('http://www.w3.org/2000/svg', '')).not.toMatch(/https?:|href|@import|<script|url\((?!#)/)
  })

  const figure: Figure = {
    id: 'x',
    title: hostile,
    description: hostile,
    x: { label: hostile, unit: hostile, min: 0, max: 10, second: { label: hostile, unit: '°C', ticks: [{ at: 5, text: hostile }] } },
    y: { label: 'ln(β/T^1.92)', unit: '', min: null, max: null, second: null },
    marks: [
      { kind: 'line', name: hostile, tone: { kind: 'ink' }, x: [0, 1, 2, 3, 4], y: [1, 2, Number.NaN, 4, 5] },
      { kind: 'band', name: 'band', tone: { kind: 'accent' }, x: [0, 1, 2, 3], lower: [0, 0, Number.NaN, 0], upper: [1, 1, 1, 1] },
      {
        kind: 'points',
        name: 'points',
        tone: { kind: 'run', place: 0.5, index: 3 },
        x: [1, 2],
        y: [1, 2],
        joined: false,
        lower: [0.5, 1.5],
        upper: [1.5, 2.5],
      },
      { kind: 'rule', name: 'rule', tone: { kind: 'faint' }, along: 'x', at: 3, dash: 'dashed' },
    ],
  }

  it('escapes every text and leaves out what XML cannot hold', () => {
    const drawn = figureSvg(figure)
    const parsed = svgOf(drawn)
    expect(parsed.querySelector('parsererror')).toBeNull()
    expect(parsed.querySelector('script')).toBeNull()
    expect(parsed.querySelector('title')?.textContent).toBe(hostile.replace('\u0001', ''))
    expect(drawn).not.toContain('\u0001')
  })

  it('breaks lines and bands at numbers that are not to be had', () => {
    const paths = [...svgOf(figureSvg(figure)).querySelectorAll('g > path')].map((path) => path.getAttribute('d') ?? '')
    expect(paths[0]?.match(/M/g)).toHaveLength(2)
    expect(paths[0]?.match(/L/g)).toHaveLength(2)
    expect(paths.some((d) => /^M[\d.]+ [\d.]+L[\d.]+ [\d.]+L[\d.]+ [\d.]+L[\d.]+ [\d.]+Z$/.test(d))).toBe(true)
  })

  it('raises powers in axis titles', () => {
    const title = [...svgOf(figureSvg(figure)).querySelectorAll('text')].find((text) => text.textContent?.startsWith('ln'))
    expect(title?.textContent).toBe('ln(β/T1.92)')
    expect(title?.querySelector('tspan')?.textContent).toBe('1.92')
  })

  it('draws a figure without marks as bare axes', () => {
    const bare = figureSvg({ ...figure, marks: [], x: { ...figure.x, min: null, max: null, second: null } })
    expect(bare).not.toMatch(/NaN|undefined|Infinity/)
  })
})

describe('the table on the screen', () => {
  it('gives a row a level, an interval where there is one, a dash where there is no number', () => {
    const lines = shortTable({ ...result, peakMethods: [] }).split('\n')
    expect(lines[1]?.trim()).toMatch(/^conversion +Friedman +Ozawa–Flynn–Wall$/)
    expect(lines[2]?.trim()).toMatch(/^0\.05 +211\.2 ±6\.1 +211\.2$/)
    expect(lines[4]?.trim()).toMatch(/^0\.15 +- +-$/)
    expect(lines.at(-2)).toContain('Kissinger')
    expect(lines.at(-3)).toContain('Friedman 103.9 (2 of 3 levels, 0.1 to 0.5)')
    expect(new Set(lines.slice(1, 5).map((line) => line.length)).size).toBe(1)
  })
})

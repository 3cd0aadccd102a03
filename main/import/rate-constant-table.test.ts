import fc from 'fast-check'
import iconv from 'iconv-lite'
import { describe, expect, it } from 'vitest'
import type { RateConstantReadOptions } from '../../shared-kinetics/contract/rate-constant-schema.ts'
import type { RateConstantTable } from '../../shared-kinetics/rate-constants/rate-constant-table.ts'
import { ImportRefusal } from './import-refusal.ts'
import { rateConstantHeading } from './rate-constant-heading.ts'
import { RateConstantQuestion } from './rate-constant-question.ts'
import { readRateConstantFile, readRateConstantText } from './rate-constant-table.ts'

const read = (text: string, options: RateConstantReadOptions = {}): RateConstantTable =>
  readRateConstantText({ text, name: 'table.csv', source: 'pasted', sha256: null }, options)
const refusal = (text: string, options: RateConstantReadOptions = {}): ImportRefusal => {
  try {
    read(text, options)
  } catch (error) {
    if (error instanceof ImportRefusal) return error
    throw error
  }
  throw new Error('the table was read')
}
const isTableOrRefusal = (text: string): boolean => {
  try {
    return read(text).rows.every((row) => row.rateConstant > 0 && row.temperature_K > 0)
  } catch (error) {
    return error instanceof ImportRefusal
  }
}
const run = (sign: string, times: number): string => sign.repeat(times)
const pairs = (table: RateConstantTable): number[][] => table.rows.map((row) => [row.temperature_K, row.rateConstant])
const codes = (table: RateConstantTable): string[] => table.notes.map((note) => note.code)

// Daniels & Johnston's N2O5, three rows: 298, 308, 318 K; 3.46e-5, 1.35e-4, 4.98e-4 1/s.
const expected = [
  [298, 3.46e-5],
  [308, 1.35e-4],
  [318, 4.98e-4],
]
/** To ten digits: a fraction of 1/T or a logarithm does not hold more. */
const digits = (value: number): number => Number(value.toPrecision(10))
const rounded = (table: RateConstantTable): unknown => [table.rateUnit, pairs(table).map((row) => row.map(digits))]
const wanted = (rateUnit = '1/s', rows: readonly (readonly number[])[] = expected): unknown => [rateUnit, rows]
const fifteen = (value: number): string => value.toPrecision(15)

describe('the same rate constants in many spellings', () => {
  it.each([
    ['comma', 'T (K),k (1/s)\n298,3.46e-5\n308,1.35e-4\n318,4.98e-4\n'],
    ['tab', 'T/K\tk/s-1\n298\t3.46e-5\n308\t1.35e-4\n318\t4.98e-4'],
    ['semicolon and decimal comma', 'T [K];k [s^-1]\r\n298;3,46e-5\r\n308;1,35E-4\r\n318;0,000498\r\n'],
    ['blanks', 'T(K)  k(1/s)\n298 3.46e-5\n308 1.35e-4\n318 4.98e-4'],
    ['tabs, and labels with blanks', 'T (K)\tk (1/s)\tsample\n298\t3.46e-5\tbatch 1\n308\t1.35e-4\tbatch 2\n318\t4.98e-4\tbatch 3'],
    ['blanks and decimal comma', 'T(K) k(1/s)\n298,0 3,46e-5\n308,0 1,35e-4\n318,0 4,98e-4'],
    ['pipe', 'temperature_K|k_per_s\n298|3.46e-5\n308|1.35e-4\n318|4.98e-4'],
    ['°C', 'T (°C),k (s⁻¹)\n24.85,3.46e-5\n34.85,1.35e-4\n44.85,4.98e-4'],
    ['°F', 'Temperature (degF),rate constant (1/s)\n76.73,3.46e-5\n94.73,1.35e-4\n112.73,4.98e-4'],
    ['a row of units', 'T;k\n°C;1/s\n24,85;3,46e-5\n34,85;1,35e-4\n44,85;4,98e-4'],
    ['k first', 'rate constant k / s-1,T / °C\n3.46e-5,24.85\n1.35e-4,34.85\n4.98e-4,44.85'],
    ['powers as papers print them', 'T (K)\tk (s⁻¹)\n298\t3.46×10⁻⁵\n308\t1.35 x 10^-4\n318\t4.98·10−4'.replace('10−4', '10^−4')],
    ['10^5 k', 'T (K),10^5 k (1/s)\n298,3.46\n308,13.5\n318,49.8'],
    ['k × 10^5', 'T (K),k × 10^5 / s^-1\n298,3.46\n308,13.5\n318,49.8'],
    ['a power inside the unit', 'T (K),k (10^-5 1/s)\n298,3.46\n308,13.5\n318,49.8'],
    ['units behind the numbers', '298 K; 3.46e-5 1/s\n308 K; 1.35e-4 1/s\n44.85 °C; 4.98e-4 1/s'],
    ['units behind the numbers, blanks', '298 K 3.46e-5 1/s\n34.85 °C 1.35e-4 1/s\n318K 4.98e-4 1/s'],
    ['a comment sign before the headings', '# T (K), k (1/s)\n298, 3.46e-5\n308, 1.35e-4\n318, 4.98e-4'],
    ['a line above', 'Decomposition of N2O5\nT (K),k (1/s)\n298,3.46e-5\n308,1.35e-4\n318,4.98e-4'],
    ['both K and °C', 'T (°C),T (K),k (1/s)\n24.85,298,3.46e-5\n34.85,308,1.35e-4\n44.85,318,4.98e-4'],
    ['quoted', '"T (K)","k (1/s)"\n"298","3.46e-5"\n"308","1.35e-4"\n"318","4.98e-4"'],
  ])('%s', (_, text) => {
    expect(rounded(read(text))).toEqual(wanted())
  })

  it.each([
    ['1000/T (1/K)', (T: number) => fifteen(1000 / T)],
    ['10^3/T (K^-1)', (T: number) => fifteen(1000 / T)],
    ['1000 K/T', (T: number) => fifteen(1000 / T)],
    ['1/T (1/K)', (T: number) => fifteen(1 / T)],
    ['1/T', (T: number) => fifteen(1 / T)],
    ['inverse temperature (1/K)', (T: number) => fifteen(1 / T)],
  ])('%s', (heading, of) => {
    const table = read(`${heading};k (1/s)\n${expected.map(([T = 0, k = 0]) => `${of(T)};${k}`).join('\n')}`)
    expect(rounded(table)).toEqual(wanted('1/s', expected))
    expect(table.temperatureUnitShown).toBe('K')
    expect(codes(table)).toContain('heading-read-as')
  })

  it.each([
    ['ln k', Math.log, ''],
    ['ln(k / s-1)', Math.log, '1/s'],
    ['ln(k) (1/s)', Math.log, '1/s'],
    ['ln k (1/s)', Math.log, '1/s'],
    ['log10 k (1/s)', Math.log10, '1/s'],
    ['log10(k/s^-1)', Math.log10, '1/s'],
    ['lg k', Math.log10, ''],
    ['log k (1/s)', Math.log10, '1/s'],
  ])('%s', (heading, of, unit) => {
    expect(rounded(read(`T (K)\t${heading}\n${expected.map(([T = 0, k = 0]) => `${T}\t${of(k)}`).join('\n')}`))).toEqual(
      wanted(unit, expected),
    )
  })

  it('keeps the unit of k, whatever it is', () => {
    expect(rounded(read('T (K),k (L mol-1 s-1)\n298,3.46e-5\n308,1.35e-4\n318,4.98e-4'))).toEqual(wanted('L/(mol s)'))
    expect(rounded(read('T (K),k (min-1)\n298,3.46e-5\n308,1.35e-4\n318,4.98e-4'))).toEqual(wanted('1/min'))
    expect(rounded(read('T (K),k/min\n298,3.46e-5\n308,1.35e-4\n318,4.98e-4'))).toEqual(wanted('1/min'))
    expect(rounded(read('T (K),k\n298,3.46e-5\n308,1.35e-4\n318,4.98e-4'))).toEqual(wanted(''))
    expect(rounded(read('T (K),k\n298,3.46e-5\n308,1.35e-4\n318,4.98e-4', { rateUnit: 'h-1' }))).toEqual(wanted('1/h'))
  })

  it('reads uncertainties and labels', () => {
    const table = read('sample,T (K),k (1/s),u(k) (1/s)\na,298,3.46e-5,1e-6\nb,308,1.35e-4,\nc,318,4.98e-4,2e-5')
    expect(table.rows.map((row) => [row.label, row.standardUncertainty])).toEqual([
      ['a', 1e-6],
      ['b', null],
      ['c', 2e-5],
    ])
    expect(read('T (K),k (1/s),relative uncertainty (%)\n298,2e-5,5\n308,1e-4,5').rows[0]?.standardUncertainty).toBeCloseTo(1e-6, 18)
  })

  it('two rows are a table', () => {
    expect(rounded(read('T (K),k (1/s)\n298,3.46e-5\n308,1.35e-4'))).toEqual(wanted('1/s', expected.slice(0, 2)))
  })

  it('takes encodings as exports have them', () => {
    const text = 'T (°C);k (1/s)\n24,85;3,46e-5\n34,85;1,35e-4\n44,85;4,98e-4\n'
    for (const encoding of ['utf8', 'win1252', 'utf-16le']) {
      const table = readRateConstantFile('N2O5.csv', new Uint8Array(iconv.encode(text, encoding, { addBOM: encoding === 'utf-16le' })), {})
      expect(rounded(table)).toEqual(wanted())
      expect(table.source).toMatchObject({ kind: 'file', name: 'N2O5.csv', sha256: expect.stringMatching(/^[0-9a-f]{64}$/) as unknown })
    }
  })
})

describe('powers of ten as they come from a printed page', () => {
  const spellings = [
    '7.87 × 10−7',
    '7.87 x 10-7',
    '7.87 × 10–7',
    '7.87 x 10^-7',
    '7.87·10⁻⁷',
    '7.87 · 10 ⁻⁷',
    '7.87\u00a0×\u00a010−7',
    '7.87\u2009∙\u200910^−7',
    '7.87 × 10^{-7}',
    '7.87 x 10^(−7)',
    '7.87*10**-7',
    '7.87E−7',
  ]
  const layouts = [
    ['tab', 'T (K)\tk (1/s)\n298\tX\n308\t1e-4'],
    ['semicolon', 'T (K);k (1/s)\n298;X\n308;1e-4'],
    ['comma', 'T (K),k (1/s)\n298,X\n308,1e-4'],
    ['pipe', 'T (K)|k (1/s)\n298|1e-4\n308|X'],
    ['blanks', 'T(K) k(1/s)\n298 X\n308 1e-4'],
    ['blanks, k first', 'k(1/s)  T(K)\nX  298\n1e-4  308'],
    ['blanks, units behind', '298 K X 1/s\n308 K 1e-4 1/s'],
    ['tab, unit behind', 'T (K)\tk\n298\tX 1/s\n308\t1e-4 1/s'],
  ] as const
  it.each(layouts)('are read in cells parted by %s', (_, text) => {
    for (const spelling of spellings) {
      const ks = read(text.replace('X', spelling)).rows.map((row) => row.rateConstant)
      expect(ks.toSorted((a, b) => a - b)).toEqual([7.87e-7, 1e-4])
    }
  })

  it('a blank before the sign is one number in a cell, and with a decimal comma as well', () => {
    expect(pairs(read('T (K)\tk (1/s)\n298\t7.87 × 10 −7\n308\t1e-4'))[0]).toEqual([298, 7.87e-7])
    expect(pairs(read('T (K);k (1/s)\n298,5;7,87 × 10 − 7\n308,5;1,5·10−4'))).toEqual([
      [298.5, 7.87e-7],
      [308.5, 1.5e-4],
    ])
  })

  it('a power alone is a number', () => {
    for (const text of ['T (K);k (1/s)\n298;10⁻⁷\n308;10^-4', 'T(K) k(1/s)\n298 10^−7\n308 10⁻⁴', '298 K 10⁻⁷ 1/s\n308 K 10^-4 1/s']) {
      expect(pairs(read(text))).toEqual([
        [298, 1e-7],
        [308, 1e-4],
      ])
    }
  })

  it('blanks that part cells keep parting them', () => {
    // A sample x, a count of 10 and a logarithm stand beside each other.
    expect(pairs(read('T(K) sample n ln(k)\n298 x 10 -7\n308 x 10 -5'))).toEqual([
      [298, Math.exp(-7)],
      [308, Math.exp(-5)],
    ])
    // Two columns of numbers, the second negative; nothing is multiplied.
    expect(pairs(read('T(K) ln(k)\n298 -10\n308 -7'))).toEqual([
      [298, Math.exp(-10)],
      [308, Math.exp(-7)],
    ])
    expect(pairs(read('T(K)\tn\tln(k)\n298\t7 x 10\t-7\n308\t7 x 10\t-5'))).toEqual([
      [298, Math.exp(-7)],
      [308, Math.exp(-5)],
    ])
    // A tab between 10 and its power parts cells whatever stands around it.
    expect(refusal('T (K)\tk (1/s)\n298\t7.87 × 10\t^-7\n308\t1e-4').message).toMatch(/line/)
    expect(refusal('T(K) k(1/s)\n298 7.87 × 10   −7\n308 7.87 × 10   −6').message).toMatch(/line 1: The rows have 5 cells/)
    // A sample x of a batch 10-7 stands under headings of its own.
    expect(pairs(read('T(K) sample batch k(1/s)\n298 x 10-7 3.4e-5\n308 x 10-8 3.4e-4'))).toEqual([
      [298, 3.4e-5],
      [308, 3.4e-4],
    ])
  })

  it('labels keep their words', () => {
    const table = read('T (K);k (1/s);sample\n298;1e-5;sieve 5 × 10–20\n308;1e-4;5 x 10-20')
    expect(table.rows.map((row) => row.label)).toEqual(['sieve 5 × 10–20', '5 x 10-20'])
  })

  it.each(['7.87 × 107', '7.87 x 10 7', '7.87·1012'])('%s may be a product or a power, and is asked about by its line', (cell) => {
    for (const layout of ['T (K)\tk (1/s)\n298\tX\n308\t1e-4', 'T(K) k(1/s)\n298 X\n308 1e-4', '298 K; X 1/s\n308 K; 2 1/s']) {
      const { message, line, remedy } = refusal(layout.replace('X', cell))
      expect(message).toMatch(/raised digits were lost/)
      expect(line).toBe(layout.startsWith('T') ? 2 : 1)
      expect(remedy).toMatch(/7\.87e7/)
    }
  })

  it('what is behind a sign and no power is not taken for one', () => {
    expect(refusal('T (K);k (1/s)\n298;7.87 × 10−7.5\n308;1e-4').message).toMatch(/line/)
    expect(refusal('T (K);k (1/s)\n298;10−7\n308;1e-4\n318;2e-4').message).toMatch(/line/)
  })
})

describe('what is not guessed', () => {
  it('a unit of temperature that nobody stated is asked for, and taken when stated', () => {
    for (const text of ['T,k (1/s)\n298,3.46e-5\n308,1.35e-4', '298 3.46e-5\n308 1.35e-4']) {
      const asked = refusal(text)
      expect(asked).toBeInstanceOf(RateConstantQuestion)
      expect(asked).toMatchObject({ ask: 'temperature-unit' })
      expect(asked.message).toMatch(/--temperature-unit/)
      expect(read(text, { temperatureUnit: 'K' }).rows[0]?.temperature_K).toBe(298)
      expect(read(text, { temperatureUnit: 'C' }).rows[0]?.temperature_K).toBeCloseTo(571.15, 10)
    }
  })

  it('a statement against the heading is followed and said', () => {
    const table = read('T (K),k (1/s)\n25,3.46e-5\n35,1.35e-4', { temperatureUnit: 'C', rateUnit: '1/min' })
    expect(table.rows[0]?.temperature_K).toBeCloseTo(298.15, 10)
    expect(table.rateUnit).toBe('1/min')
    expect(codes(table)).toEqual(['heading-read-as', 'heading-read-as'])
  })

  it('a sign that may be a decimal one is asked for where both readings are possible', () => {
    const asked = refusal('T (K)\tk (1/s)\n300\t1,234\n310\t2,345')
    expect(asked).toMatchObject({ ask: 'decimal-sign' })
    expect(pairs(read('T (K)\tk (1/s)\n300\t1,234\n310\t2,345', { decimalSign: 'comma' }))).toEqual([
      [300, 1.234],
      [310, 2.345],
    ])
    // 298150 K is not possible, so that the point is a decimal sign here.
    expect(pairs(read('T (K)\tk (1/s)\n298.150\t1.5\n308.150\t2.5'))).toEqual([
      [298.15, 1.5],
      [308.15, 2.5],
    ])
  })

  it.each([
    ['T (K),k × 10^-5 (1/s)\n298,3.46\n308,13.5', /10\^-5/],
    ['T (K),k (×10^5 1/s)\n298,3.46\n308,13.5', /10\^5/],
    ['T (K),k (furlong)\n298,3.46\n308,13.5', /furlong/],
    ['x,y\n298,3.46\n308,13.5', /No heading names a temperature/],
    ['T (K),mass (mg)\n298,3.46\n308,13.5', /No heading names rate constants/],
    ['T (K),k (1/s)\n298,3.46e-5\n308,0\n318,1e-3', /line 3: The rate constant “0” is not above 0/],
    ['T (K),k (1/s)\n298,3.46e-5\n308,-2e-5\n318,1e-3', /line 3/],
    ['T (K),k (1/s)\n298,3.46e-5\nabc,def\n318,1e-3', /line 3/],
    ['T (°C),T (K),k (1/s)\n25,298.15,1\n35,318.15,2', /line 3: The columns .* do not agree/],
    ['T (K),k (1/s),ln k\n298,1e-3,-6.9078\n308,2e-3,-5', /line 3: The columns/],
    ['1/T (1/K),k (1/s)\n3.35,1\n3.25,2', /1000\/T/],
    ['T (°C),k (1/s)\n298 K,1\n308 K,2', /unit behind the temperature/],
    ['298 K; 1 1/s\n308 K; 2 1/min', /several units/],
    ['T (°C),k (1/s)\n-300,1\n35,2', /not possible/],
    ['298;1;2\n308;2;3', /Nothing says what the 3 columns hold/],
    ['', /no line holds two numbers/],
    ['just words\nand more', /no line holds two numbers/],
    ['T (K),k (1/s)\n298,15,3,46e-5\n308,15,1,35e-4', /names 2/],
  ])('%j is refused with what is wrong', (text, message) => {
    expect(refusal(text).message).toMatch(message)
  })

  it('rows without a rate constant, lines behind the table and other columns are set aside and said', () => {
    const table = read('T (K),k (1/s),colour\n298,3.46e-5,red\n308,,red\n318,4.98e-4,red\nmeasured in May,,')
    expect(table.rows).toHaveLength(2)
    expect(codes(table)).toEqual(['columns-set-aside', 'rows-set-aside', 'rows-set-aside'])
    expect(table.notes[1]?.message).toMatch(/^A line without a rate constant .*\(line 3\)/)
    expect(table.notes[2]?.message).toMatch(/^A line behind the table .*\(line 5\)/)
  })

  it('more rows than a table holds are refused, a file that is no text too', () => {
    expect(refusal(`T (K),k (1/s)\n${'300,1\n'.repeat(1001)}`).message).toMatch(/at most 1000/)
    expect(() => readRateConstantFile('t.xlsx', new Uint8Array([0x50, 0x4b, 3, 4, 5]), {})).toThrow(/spreadsheet/)
    expect(() => readRateConstantFile('t.csv', new Uint8Array(), {})).toThrow(/empty/)
  })
})

describe('a text that is larger than a table', () => {
  const rows = '\n300,1\n310,2'

  it.each([
    ['blanks in a heading', `T (K),k${run(' ', 32_000)}x${rows}`, /line 1: The line has 32008 characters; .* at most 2000\. Keep/],
    ['brackets in a heading', `T (K),k ${run('(', 8000)}${run(')', 8000)}${rows}`, /line 1: The line has 16008 characters/],
    ['headings without end', `${run('T (K),', 80_000)}${rows}`, /line 1: The line has 480000 characters/],
    ['many columns', `${run('T,', 64)}k${rows}`, /line 1: The line has 65 cells; .* at most 64 columns\. Give one row/],
    ['many columns between blanks', `300${run(' 310', 64)}`, /line 1: The line has 65 cells/],
    ['a long heading', `T (K),k ${run('x', 200)}${rows}`, /line 1: The heading “k x+…” has 202 characters; at most 200 are read\. Shorten/],
    ['many remarks', `${run('remark\n', 1200)}T (K),k${rows}`, /line 1201: The text has 1203 lines; .* at most 1000 rows\. Keep/],
    [
      'a long file of numbers',
      run('300,1\n', 200_000),
      /line 1201: The text has 200000 lines; a table of rate constants holds at most 1000 rows\. Keep/,
    ],
  ])('%s is refused by its line', (_, text, message) => {
    expect(refusal(text).message).toMatch(message)
  })

  it('within the limits, brackets and blanks are looked through once', () => {
    const lines = [
      `k ${run('(', 95)}${run(')', 95)}`,
      `1x10^${run(' ', 1900)}`,
      `a${run(' (', 990)}`,
      `1${run(' \t', 60)}x10${run(' \t', 3)}`,
      run('( ', 1000),
      `${run('1 ', 60)}${run('a ', 900)}`,
    ]
    for (const line of lines) {
      expect(isTableOrRefusal(`${run(`${line}\n`, 300)}T (K),k (1/s)${rows}`)).toBe(true)
      expect(isTableOrRefusal(`T (K),${line}${rows}`)).toBe(true)
    }
    expect(rateConstantHeading(`k ${run('(', 8000)}1/s${run(')', 8000)}`)).toMatchObject({ role: 'rate-constant', unit: '1/s' })
    expect(rateConstantHeading(`k ( ( 1/s )${run(' ', 8000)} )`)).toMatchObject({ role: 'rate-constant', unit: '1/s' })
    expect(rateConstantHeading('k (1/s) (2)')).toMatchObject({ role: 'unclear' })
  })

  it('as many lines and columns as allowed are read, and the note on columns stays short', () => {
    const names = Array.from({ length: 62 }, (_, i) => `a heading that nobody can know, number ${i}`.replace(',', ' '))
    const table = read(`T (K);k (1/s);${names.join(';').slice(0, 1900)}\n300;1\n310;2`)
    expect(table.rows).toHaveLength(2)
    expect(table.notes.every((note) => note.message.length <= 1000)).toBe(true)
    expect(read(`${run('remark\n', 199)}T (K),k (1/s)\n${run('300,1\n', 1000)}`).rows).toHaveLength(1000)
  })

  it('blanks part units in brackets from names as before', () => {
    const table = read('T ( K )   k  ( 1/s )\n298   3.46e-5\n308   1.35e-4')
    expect(table.rateUnit).toBe('1/s')
    expect(table.rows.map((row) => row.temperature_K)).toEqual([298, 308])
  })
})

describe('one decimal sign in a table', () => {
  it.each([
    ['T (°C);k (1/s)\n25,0;7,87 x 10-7\n35,0;2,94E−6\n45,0;1.050e-5', 4, /“1\.050e-5” has a decimal point, the table a decimal comma/],
    ['T (°C);k (1/s)\n25,0;7,87e-7\n35,0;2.94e-6\n45,0;1,050e-5', 3, /“2\.94e-6” has a decimal point, the table a decimal comma/],
    ['25,0 °C;7,87e-7\n35,0 °C;2,94e-6\n45,0 °C;1.050e-5', 3, /“1\.050e-5” has a decimal point/],
    ['45,0 °C;1.050e-5\n25,0 °C;7,87e-7\n35,0 °C;2,94e-6', 1, /“1\.050e-5” has a decimal point/],
    ['T (°C);k (1/s)\n25.0;7.87e-7\n35.0;2.94e-6\n45.0;1,05e-5', 4, /“1,05e-5” has a decimal comma, the table a decimal point/],
    ['T (°C);k (1/s);u(k) (1/s)\n25,0;7,87e-7;1,1e-8\n35,0;2,94e-6;4.2e-8\n45,0;1,050e-5;1,1e-7', 3, /“4\.2e-8” has a decimal point/],
  ])('%j', (text, line, reason) => {
    const refused = refusal(text)
    expect(refused.line).toBe(line)
    expect(refused.reason).toMatch(reason)
  })

  it('a slip in the last row is refused, a remark behind the table set aside', () => {
    const rows = 'T (K)\tk (1/s)\n298\t3.46e-5\n308\t1.35e-4'
    expect(refusal(`${rows}\n318\t4.98e-4O`)).toMatchObject({
      line: 4,
      reason: expect.stringMatching(/4\.98e-4O.* is no number/) as unknown,
    })
    for (const remark of ['measured in 2019', '3\treplicates each', '5 replicates each'])
      expect(read(`${rows}\n${remark}`).rows).toHaveLength(2)
  })
})

const uncertainties = (text: string): unknown[] =>
  read(text).rows.map(({ rateConstant, standardUncertainty }) => [digits(rateConstant), digits(standardUncertainty ?? Number.NaN)])

describe('an uncertainty in the cell of k', () => {
  it.each([
    ['T (°C)\tk (1/s)\n25\t7.87 × 10−7 ± 0.3 × 10−7\n35\t2.94 × 10−6 ± 0.1 × 10−6', 'plus-minus'],
    ['T (°C)\tk (1/s)\n25\t(7.87 ± 0.3) × 10^-7\n35\t(2.94 +/- 0.1)×10⁻⁶', 'plus-minus'],
    ['T (°C);k (1/s)\n25,0;7,87e-7 ± 0,3e-7\n35,0;2,94e-6 ± 0,1e-6', 'plus-minus'],
    ['T (°C);k (10^-7 1/s)\n25,0;7,87 ± 0,3\n35,0;29,4 ± 1,0', 'plus-minus'],
    ['T (°C),k (1/s)\n25,7.87e-7 ± 0.3e-7\n35,2.94e-6 ± 0.1e-6', 'plus-minus'],
    ['T(°C) k(1/s)\n25 7.87e-7 ± 0.3e-7\n35 2.94e-6 ± 0.1e-6', 'plus-minus'],
    ['T (°C)\tk (1/s)\n25\t7.87(30) × 10−7\n35\t2.94(10) × 10^-6', 'brackets'],
    ['T (°C);k (1/s)\n25,0;7,87(0,30)e-7\n35,0;2,94(10)e-6', 'brackets'],
    ['T(°C) k(1/s)\n25 7.87(30)e-7\n35 2.94(10) × 10−6', 'brackets'],
    ['T (°C)\tk\n25\t7.87(30) × 10−7 1/s\n35\t2.94(10) × 10−6 1/s', 'brackets'],
  ])('%j is read, and said', (text, form) => {
    // Concise notation after JCGM 100:2008, 7.2.2: 7.87(30) is 7.87 with a standard uncertainty of 0.30.
    expect(uncertainties(text)).toEqual([
      [7.87e-7, 3e-8],
      [2.94e-6, 1e-7],
    ])
    expect(read(text).notes.filter(({ code }) => code === 'uncertainty-read-as')).toMatchObject([
      { severity: form === 'brackets' ? 'note' : 'caution' },
    ])
  })

  it('percent is of k, in the cell or in a column of its own', () => {
    const wanted = [
      [2e-6, 1e-7],
      [4e-6, 1e-7],
    ]
    expect(uncertainties('T (K)\tk (1/s)\n300\t2e-6 ± 5 %\n310\t4e-6 ± 2.5%')).toEqual(wanted)
    expect(uncertainties('T (K)\tk (1/s)\t±\n300\t2e-6\t5 %\n310\t4e-6\t2.5 %')).toEqual(wanted)
    expect(uncertainties('T(K) k(1/s) ±\n300 2e-6 5 %\n310 4e-6 2.5 %')).toEqual(wanted)
  })

  it('of ln k it is relative', () => {
    const [row] = read('T (K)\tln k\n300\t-10.00(5)\n310\t-9.00(5)').rows
    expect((row?.standardUncertainty ?? 0) / (row?.rateConstant ?? 0)).toBeCloseTo(0.05, 12)
  })

  it('a power behind one of both is refused by its line, and so is an uncertainty of 0', () => {
    const unclear = refusal('T (°C)\tk (1/s)\n25\t7.87e-7\n35\t2.94 ± 0.1 × 10−6\n45\t1.05e-5')
    expect([unclear.line, unclear.reason]).toEqual([
      3,
      expect.stringMatching(/only one of the number and its uncertainty has a power of ten/),
    ])
    expect(refusal('T (K)\tk (1/s)\n300\t2e-6 ± 0e-6\n310\t4e-6 ± 0e-6').reason).toMatch(/is not above 0/)
    expect(refusal('T (K)\tk (1/s)\n300\t2.94 ± 0.1 × 10−6\n310\t4.94 ± 0.1 × 10−6').reason).toMatch(/only one of the number/)
  })

  it('an uncertainty of temperature is set aside, and said', () => {
    const table = read('T (°C)\tk (1/s)\n25.0 ± 0.1\t2e-6\n35.0 ± 0.1\t4e-6')
    expect(pairs(table).map((row) => row.map(digits))).toEqual([
      [298.15, 2e-6],
      [308.15, 4e-6],
    ])
    expect(table.notes).toMatchObject([{ code: 'uncertainty-read-as', message: expect.stringMatching(/temperature/) as unknown }])
  })

  it('more cells than headings has the reason of the sign that parts them', () => {
    expect(refusal('T (K) k (1/s)\n300 2e-6 7 9\n310 4e-6 7 9').remedy).toMatch(/Blanks were taken to part the cells/)
    expect(refusal('T (K)\tk (1/s)\n300\t2e-6\t7\n310\t4e-6\t7').remedy).not.toMatch(/comma/)
  })
})

describe('headings', () => {
  it.each([
    ['K', { role: 'temperature', unit: 'K' }],
    ['k', { role: 'rate-constant', form: 'k', unit: null }],
    ['°C', { role: 'temperature', unit: 'C' }],
    ['T', { role: 'temperature', unit: null }],
    ['Temp. [°C]', { role: 'temperature', unit: 'C' }],
    ['temperature_C', { role: 'temperature', unit: 'C' }],
    ['Temperatur / K', { role: 'temperature', unit: 'K' }],
    ['1/s', { role: 'rate-constant', unit: '1/s' }],
    ['rate_constant_per_min', { role: 'rate-constant', unit: '1/min' }],
    ['rate constant k (L/(mol·s))', { role: 'rate-constant', unit: 'L/(mol s)' }],
    ['k_obs / h^-1', { role: 'rate-constant', unit: '1/h' }],
    ['k1 [1/min]', { role: 'rate-constant', unit: '1/min' }],
    ['k, 1/s', { role: 'rate-constant', unit: '1/s' }],
    ['k in 1/s', { role: 'rate-constant', unit: '1/s' }],
    ['standard error (1/s)', { role: 'uncertainty', relative: 'no', unit: '1/s' }],
    ['k(T) (1/s)', { role: 'rate-constant', unit: '1/s' }],
    ['k_{obs} (s-1)', { role: 'rate-constant', unit: '1/s' }],
    ['k error (1/s)', { role: 'uncertainty', unit: '1/s' }],
    ['k uncertainty', { role: 'uncertainty', unit: null }],
    ['time (s)', { role: 'other' }],
    ['Tg of it', { role: 'other' }],
    ['half-life (h)', { role: 'other' }],
  ])('%s', (text, meaning) => {
    expect(rateConstantHeading(text)).toMatchObject(meaning)
  })
})

describe('properties', () => {
  const table = fc.array(fc.record({ T: fc.integer({ min: 2500, max: 9000 }), lnK: fc.double({ min: -25, max: 10, noNaN: true }) }), {
    minLength: 2,
    maxLength: 12,
  })

  it('degrees and kelvins, points and commas, tabs and semicolons give the same table', () => {
    fc.assert(
      fc.property(table, (rows) => {
        const k = rows.map(({ lnK }) => Number(Math.exp(lnK).toPrecision(6)))
        const kelvin = read(`T (K)\tk (1/s)\n${rows.map(({ T }, i) => `${T / 10}\t${k[i]?.toExponential()}`).join('\n')}`)
        const celsius = read(
          `T (°C);k (1/s)\n${rows.map(({ T }, i) => `${(T / 10 - 273.15).toFixed(2)};${k[i]?.toExponential()}`.replaceAll('.', ',')).join('\n')}`,
        )
        expect(celsius.rows.map((row) => row.rateConstant)).toEqual(kelvin.rows.map((row) => row.rateConstant))
        celsius.rows.forEach((row, i) => {
          expect(row.temperature_K).toBeCloseTo(kelvin.rows[i]?.temperature_K ?? Number.NaN, 9)
        })
      }),
    )
  })

  it('whatever is pasted is a table or a refusal', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 200 }), fc.constantFrom('', 'T (K);k (1/s)\n300;1\n'), (text, before) => {
        expect(isTableOrRefusal(before + text)).toBe(true)
      }),
    )
  })
})

import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { columnOverrideFromWords, type ImportOptions, importOptionsSchema } from '../../shared-kinetics/contract/import-options.ts'
import { runInfoSchema } from '../../shared-kinetics/contract/study-document.ts'
import { Cancelled, KineticsError } from '../../shared-kinetics/errors.ts'
import type { RunInfo } from '../../shared-kinetics/series/run.ts'
import { columnsKey } from './columns-key.ts'
import { readExport } from './read-export.ts'

const context = { checkCancelled: () => undefined, progress: () => undefined }
const read = (text: string, options: ImportOptions = {}, name = 'sample.csv') => readExport(name, Buffer.from(text), options, context).runs
const only = (text: string, options: ImportOptions = {}, name = 'sample.csv') => {
  const runs = read(text, options, name)
  expect(runs).toHaveLength(1)
  return runs[0] ?? expect.unreachable()
}
const codes = (info: RunInfo): string[] => info.importNotes.map((note) => note.code)
const table = (...lines: string[]): string => lines.join('\n')
const simple = table('Time (s),Temperature (K),Mass (mg)', '0,300,8', '60,310,7.5', '120,320,7', '180,330,6')

describe('a run as read', () => {
  it('is plain data that a study can hold, with its file and its columns named by their bytes', () => {
    const { info, columns } = only(simple, {}, 'folder/first run.csv')
    expect(runInfoSchema.parse(info)).toEqual(info)
    const sha256 = createHash('sha256').update(simple).digest('hex')
    expect(info).toMatchObject({
      label: 'first run',
      file: { name: 'first run.csv', sha256, byteLength: simple.length },
      rows: 4,
      use: true,
    })
    const bytes = createHash('sha256')
    // The same numbers by hand: s, K and mg over a million.
    for (const numbers of [
      [0, 60, 120, 180],
      [300, 310, 320, 330],
      [8 / 1e6, 7.5 / 1e6, 7 / 1e6, 6 / 1e6],
    ])
      bytes.update(Buffer.from(Float64Array.from(numbers).buffer))
    expect(info.columnsKey).toBe(bytes.digest('hex'))
    expect(columnsKey(columns)).toBe(info.columnsKey)
    expect(columns.temperature_K.buffer).toBeInstanceOf(SharedArrayBuffer)
  })

  it('has the same id for the same file and another for another', () => {
    expect(only(simple).info.id).toBe(only(simple, {}, 'other name.csv').info.id)
    expect(only(`${simple}\n240,340,5`).info.id).not.toBe(only(simple).info.id)
    expect(only(simple).info.id).toMatch(/^[0-9a-zA-Z-]{1,64}$/)
  })

  it('tells each decision with its reason', () => {
    const decisions = new Map(only(simple).info.importDecisions.map(({ step, value, reason }) => [step, { value, reason }]))
    expect(decisions.get('encoding')?.value).toBe('utf-8')
    expect(decisions.get('delimiter')?.value).toBe('comma')
    expect(decisions.get('delimiter')?.reason).toMatch(/4 rows into 3 cells/)
    expect(decisions.get('decimal sign')?.value).toBe('point')
    expect(decisions.get('heading line')?.value).toBe('1')
    expect(decisions.get('unit line')?.value).toBe('none')
    expect(decisions.get('first data line')?.value).toBe('2')
    expect(decisions.get('column 3')?.value).toBe('mass, mg')
    expect(decisions.get('column 3')?.reason).toMatch(/“Mass \(mg\)”/)
  })
})

describe('the lines above the table', () => {
  it('give mass, heating rate and exothermic direction, and the rest as metadata', () => {
    const { info } = only(
      table('Sample mass: 5.11 mg', 'Heating rate: 10 K/min', 'Exothermic: down', 'Gas: N2, 50 mL/min', '# by hand', '', simple),
    )
    expect(info.initialMass_kg).toBe(5.11 / 1e6)
    expect(info.nominalHeatingRate).toEqual({ heatingRate_K_per_s: 10 / 60, source: 'preamble', text: '10 K/min' })
    expect(info.exothermic).toBe('down')
    expect(info.metadata).toEqual([
      { key: 'Gas', value: 'N2, 50 mL/min' },
      { key: 'remark', value: 'by hand' },
    ])
  })

  it.each([
    ['Sample mass;6,118;mg', 6.118],
    ['Sample mass (mg);6,118', 6.118],
    ['Initial weight: 6.1180 mg', 6.118],
    ['Sample Weight;6118 ug', 6.118],
    ['mass = 0,006118 g', 6.118],
    ['Sample size: 6,118 mg', 6.118],
  ])('%s is %d mg in a file with a decimal comma', (line, mass) => {
    expect(
      (only(table(line, 'Time (s);T (°C);Heat flow (mW)', '0;20,5;1', '1;21,5;1', '2;22,5;2')).info.initialMass_kg ?? 0) * 1e6,
    ).toBeCloseTo(mass, 12)
  })

  it.each(['Sample mass: 6.118', 'Sample: 6.118 mg of it', 'Sample mass: unknown', 'Mass flow: 5 mg', 'Sample mass: 1,234 mg'])(
    '"%s" gives no mass',
    (line) => {
      expect(only(table(line, 'Time (s)\tT (°C)\tHeat flow (mW)', '0\t20.5\t1', '1\t21.5\t1', '2\t22.5\t2')).info.initialMass_kg).toBeNull()
    },
  )

  it.each([
    ['Heating rate: 10 K/min', 10],
    ['Heating rate (K/min): 2.5', 2.5],
    ['Program: 30 °C to 720 °C, 9 K/min', 9],
    ['Nominal heating rate = 5 °C/min', 5],
    ['Heating rate: 7.5 K/min\nMethod: after the ramp at 20 K/min cool', 7.5],
  ])('%s is a nominal heating rate of %d K/min', (line, rate) => {
    const nominal = only(table(line, simple), {}, '3Kmin.csv').info.nominalHeatingRate
    expect(nominal?.source).toBe('preamble')
    expect((nominal?.heatingRate_K_per_s ?? 0) * 60).toBeCloseTo(rate, 12)
  })

  it('with two programmes, or a remark about some other rate, leave the file name to say', () => {
    for (const line of ['Program: 5 K/min to 100 °C, 20 K/min to 600 °C', 'Remark: calibrated at 20 K/min']) {
      expect(only(table(line, simple), {}, '3Kmin.csv').info.nominalHeatingRate).toMatchObject({ source: 'name', text: '3Kmin' })
    }
  })

  it.each([
    ['Exothermic: up', 'up'],
    ['Exo down', 'down'],
    ['Endothermic: up', 'down'],
    ['Exothermic direction: down', 'down'],
    ['Exothermic effects are up', null],
    ['Exothermic;positive', 'up'],
    ['Exo: up\nEndo: up', null],
    ['Sample: exotic', null],
  ])('%s: exothermic %s', (line, way) => {
    expect(only(table(line, simple)).info.exothermic).toBe(way)
  })

  it('stand back behind what the heading and the options say', () => {
    const text = table('Exothermic: up', 'Heating rate: 10 K/min', simple.replace('Temperature (K)', 'Temperature at 4 K/min (K)'))
    expect(only(text).info.nominalHeatingRate).toMatchObject({ source: 'heading', heatingRate_K_per_s: 4 / 60 })
    expect(only(text, { exothermic: 'down' }).info.exothermic).toBe('down')
    expect(only(simple.replace('Mass (mg)', 'DSC (exo down) (mW)')).info.exothermic).toBe('down')
  })

  it('may hold numbers of their own', () => {
    const { info } = only(table('1,2,3', 'Channel,5,7', '', simple))
    expect(info.rows).toBe(4)
    expect(info.importDecisions.find((decision) => decision.step === 'heading line')?.value).toBe('4')
  })
})

describe('runs side by side', () => {
  it('are one run each, with the heating rate of their headings and their own length', () => {
    const runs = read(
      table(
        'Temp 4 K/min (°C);Mass 4 K/min (%);Temp 8 K/min (°C);Mass 8 K/min (%)',
        ...Array.from({ length: 9 }, (_, i) => (i < 5 ? `${20 + i};${100 - i};${20 + i};${100 - 2 * i}` : `;;${20 + i};${100 - 2 * i}`)),
      ),
      {},
      'all runs.csv',
    )
    expect(runs.map(({ info }) => [info.label, info.rows, info.nominalHeatingRate?.source])).toEqual([
      ['all runs · 4 K/min', 5, 'heading'],
      ['all runs · 8 K/min', 9, 'heading'],
    ])
    expect(runs[1]?.columns.signals[0]?.at(-1)).toBe(0.84)
    expect(new Set(runs.map(({ info }) => info.id)).size).toBe(2)
    expect(runs.flatMap(({ info }) => codes(info))).toEqual(['time-missing', 'time-missing'])
  })

  it('may be cut short to the right', () => {
    const runs = read(
      table(
        'T a (°C),m a (mg),T b (°C),m b (mg)',
        ...Array.from({ length: 30 }, (_, i) => (i < 5 ? `${20 + i},9,${20 + i},8` : `${20 + i},9`)),
      ),
    )
    expect(runs.map(({ info }) => [info.label, info.rows])).toEqual([
      ['sample · a', 30],
      ['sample · b', 5],
    ])
  })

  it('with time, signal first, or with replicates of one heating rate', () => {
    const three = read(
      table(
        't (s),T (K),m (mg),t (s),T (K),m (mg),t (s),T (K),m (mg)',
        ...[0, 1, 2, 3].map((i) =>
          Array(3)
            .fill(`${i},${300 + i},${9 - i}`)
            .join(','),
        ),
      ),
    )
    expect(three.map(({ info }) => [info.label, info.hasTime])).toEqual([1, 2, 3].map((k) => [`sample · run ${k}`, true]))
    const replicates = read(table('m 5 K/min (mg),T 5 K/min (K),m 5 K/min (mg),T 5 K/min (K)', '9,300,8,300', '8,301,7,301', '7,302,6,302'))
    expect(replicates.map(({ info }) => info.label)).toEqual(['sample · 5 K/min', 'sample · 5 K/min (2)'])
    expect(replicates[1]?.columns.signals[0]?.[0]).toBe(8 / 1e6)
  })

  it('may share one temperature: the signals of several heating rates beside it', () => {
    const runs = read(table('Temperature (°C),Conversion 2 K/min (-),Conversion 5 K/min (-)', '100,0,0', '110,0.5,0.25', '120,1,0.75'))
    expect(runs.map(({ info, columns }) => [info.label, columns.signals[0]?.[1], columns.temperature_K[2]])).toEqual([
      ['sample · 2 K/min', 0.5, 393.15],
      ['sample · 5 K/min', 0.25, 393.15],
    ])
  })

  it('take heating rate and label from titles above their headings', () => {
    const runs = read(table('5 K/min,,cooled first 10 K/min,', 'T (°C),Mass (mg),T (°C),Mass (mg)', '20,9,20,8', '21,9,21,8', '22,8,22,7'))
    expect(
      runs.map(({ info }) => [info.label, (info.nominalHeatingRate?.heatingRate_K_per_s ?? 0) * 60, info.nominalHeatingRate?.source]),
    ).toEqual([
      ['sample · 5 K/min', 5, 'heading'],
      ['sample · cooled first 10 K/min', 10, 'heading'],
    ])
  })

  it('share one time column that stands in front of all of them', () => {
    const runs = read(table('Time (min),T 1 (K),m 1 (mg),T 2 (K),m 2 (mg)', '0,300,9,300,8', '1,301,8,305,7', '2,302,7,310,6'))
    expect(runs.map(({ info, columns }) => [info.label, columns.time_s?.at(-1), columns.temperature_K.at(-1)])).toEqual([
      ['sample · 1', 120, 302],
      ['sample · 2', 120, 310],
    ])
  })

  it('are not made of a second temperature or of a second unit of one', () => {
    const { info } = only(
      table(
        'Time (s),Temperature (K),Temperature (°C),Program temperature (°C),Mass (mg)',
        '0,300,26.85,27,9',
        '1,301,27.85,28,8',
        '2,302,28.85,29,7',
      ),
    )
    expect(codes(info)).toEqual(['columns-set-aside'])
    expect(info.importNotes[0]?.message).toMatch(
      /Program temperature.*not the temperature of the sample.*Temperature \(°C\)” \(the run has such a column already/,
    )
  })
})

describe('units that the values tell', () => {
  it.each([
    ['Time (s),Temperature,Mass (mg)', ['0,25,9', '100,125,8', '200,225,7'], 'Temperature', '°C'],
    ['Time (s),Temperature (K),Mass', ['0,300,100.0', '100,400,90.0', '200,500,20.0'], 'Mass', '%'],
    ['Time (s),Temperature (K),Conversion', ['0,300,0', '100,400,50.5', '200,500,99.5'], 'Conversion', '%'],
    ['Time,Temperature (K),Mass (mg)', ['0,300,9', '1500,400,8', '3000,500,7'], 'Time', 's'],
  ])('%s', (head, rows, column, unit) => {
    const { info } = only(table(head, ...rows))
    expect(info.importNotes).toMatchObject([{ code: 'unit-from-values', severity: 'caution', evidence: { column, unit } }])
  })

  it('or the heating rate that is stated tells', () => {
    const rows = ['0,300,9', '10,400,8', '20,500,7']
    const text = table('Time,Temperature (K),Mass (mg)', ...rows)
    expect(only(text, {}, 'x_10Kmin.csv').columns.time_s?.at(-1)).toBe(1200)
    expect(only(table('Heating rate: 600 K/min', text)).columns.time_s?.at(-1)).toBe(20)
  })
})

describe('columns that are kept or set aside', () => {
  it('keeps every signal, the total of one quantity first', () => {
    const { info } = only(
      table(
        'Time (s),T (K),Reversing Heat Flow (W/g),Total Heat Flow (W/g),Mass (mg),DTG (mg/min)',
        '0,300,1,3,9,0',
        '1,301,1,3,9,0',
        '2,302,1,3,9,0',
      ),
    )
    expect(info.signals.map((signal) => signal.label)).toEqual(['Total Heat Flow (W/g)', 'Reversing Heat Flow (W/g)', 'Mass (mg)'])
    expect(codes(info)).toEqual(['columns-set-aside', 'several-columns-of-one-quantity'])
  })

  it('passes over marks for missing numbers in columns that are not used', () => {
    const rows = Array.from({ length: 60 }, (_, i) => `${i},${300 + i},${9 - i / 10},${i < 3 ? 'NaN' : 0.1}`)
    expect(only(table('Time (s),T (K),Mass (mg),DTG (mg/min)', ...rows)).info.rows).toBe(60)
  })

  it('reads headings behind a comment sign and a unit row that starts with %', () => {
    expect(
      only(table('# sample 7', '# Time (s)  Sample Temp (K)  Mass (mg)', '0 300 9', '1 301 8', '2 302 7')).info.signals[0]?.label,
    ).toBe('Mass (mg)')
    const { columns } = only(table('Mass;Temp.;Time', '%;°C;s', '100;20,5;0', '99,5;21,5;1', '99;22,5;2'))
    expect([...(columns.signals[0] ?? [])]).toEqual([1, 0.995, 0.99])
  })

  it('passes over words, times of day and blanks in columns that are not used', () => {
    const { info } = only(
      table(
        'Time (s),T (K),Mass (mg),Remark,Clock',
        '0,300,9,start,12:00:00',
        '1,301,8,,12:00:01',
        '2,302,7,n/a,12:00:02',
        '3,303,6,-,12:00:03',
      ),
    )
    expect(info.rows).toBe(4)
    expect(info.importNotes[0]?.message).toMatch(/Remark.*Clock/)
  })

  it('reads mass from a loss or a change', () => {
    const percent = (name: string, values: number[]): Float64Array | undefined =>
      only(table(`Time (s),T (K),${name} (%)`, ...values.map((value, i) => `${i},${300 + i},${value}`))).columns.signals[0]
    expect([...(percent('Mass loss', [0, 12.5, 50]) ?? [])]).toEqual([1, 0.875, 0.5])
    expect([...(percent('Weight loss', [0, -12.5, -50]) ?? [])]).toEqual([1, 0.875, 0.5])
    expect([...(percent('Mass change', [0, -12.5, 25]) ?? [])]).toEqual([1, 0.875, 1.25])
    const change = table('Sample mass: 8 mg', 'Time (s),T (K),Mass change (mg)', '0,300,0', '1,301,-2', '2,302,-4')
    expect([...(only(change).columns.signals[0] ?? [])].map((value) => value * 1e6)).toEqual([8, 6, 4])
    expect(() => only(change.replace('Sample mass: 8 mg\n', ''))).toThrow(/mass at the start is not known/)
  })

  it('keeps a placeholder row, repeated times and the first plausible mass', () => {
    const { info, columns } = only(table('Time (s),T (K),Mass (mg)', '0,273.15,0', '1,301,9', '1,301,9', '2,302,8.5'))
    expect(info.rows).toBe(4)
    expect(info.initialMass_kg).toBe(9 / 1e6)
    expect(columns.temperature_K[0]).toBe(273.15)
  })

  it('sets rows aside that are cut short at the end, and remarks behind it, naming their lines', () => {
    const { info } = only(`${simple}\n240,340\n\nEnd of run\n`)
    expect(info.rows).toBe(4)
    expect(info.importNotes).toMatchObject([
      { code: 'rows-set-aside', severity: 'caution', evidence: { lines: '8' } },
      { code: 'rows-set-aside', severity: 'caution', evidence: { lines: '6' } },
    ])
  })
})

describe('what is stated', () => {
  it('settles each thing that the file leaves open', () => {
    const ambiguous = table('Time (s);Temperature (K);Mass (ug)', '1;300;1,234', '2;310;1,233', '3;320;1,232')
    expect(only(ambiguous, { decimalSign: 'comma' }).columns.signals[0]?.[0]).toBe(1.234 / 1e9)
    expect(only(ambiguous, { decimalSign: 'point' }).columns.signals[0]?.[0]).toBe(1234 / 1e9)
    const bare = table('0,300,9', '1,310,8', '2,320,7')
    const columns = ['1=time:min', '2=temperature:K', '3=mass:mg'].map(columnOverrideFromWords)
    expect(only(bare, { columns }).columns.time_s?.at(-1)).toBe(120)
    // 300 °F = (300 - 32)/1.8 + 273.15 K, by the definition of the degree Fahrenheit.
    expect(only(simple, { columns: [{ column: 'Temperature (K)', unit: '°F' }] }).columns.temperature_K[0]).toBeCloseTo(422.039, 3)
    expect(only(simple, { columns: [{ column: 3, quantity: 'conversion', unit: '%' }] }).info.signals[0]?.quantity).toBe('conversion')
    expect(() => only(simple, { columns: [{ column: 3, quantity: 'set-aside' }] })).toThrow(/signal/)
    expect(only(table('20,21,22', simple), { headingLine: 2, firstDataLine: 4 }).info.rows).toBe(3)
    const latin = Buffer.from('Temp (\xb0C);Mass (%)\n20,5;99,5\n21,5;98,5\n22,5;97,5', 'latin1')
    expect(
      readExport('a.csv', latin, { encoding: 'windows-1252', delimiter: 'semicolon', decimalSign: 'comma' }, context).runs[0]?.columns
        .temperature_K[0],
    ).toBeCloseTo(293.65, 12)
  })

  it('is parsed from words and by the schema', () => {
    expect(columnOverrideFromWords('HRR (W/g)=heat-release')).toEqual({ column: 'HRR (W/g)', quantity: 'heat-release' })
    expect(columnOverrideFromWords('2=:K')).toEqual({ column: 2, unit: 'K' })
    for (const words of ['', '3', '=mass', '3=weight', '3=', '0=mass']) expect(() => columnOverrideFromWords(words)).toThrow(KineticsError)
    expect(importOptionsSchema.safeParse({ delimiter: 'tab', columns: [{ column: 1, quantity: 'time', unit: 's' }] }).success).toBe(true)
    expect(importOptionsSchema.safeParse({ delimiter: ',' }).success).toBe(false)
    expect(importOptionsSchema.safeParse({ other: 1 }).success).toBe(false)
  })
})

describe('numbers that could be read in two ways', () => {
  it('are read in the one that gives a possible temperature', () => {
    const { columns, info } = only(table('Temperature (°C);Mass (%)', '126,850;99,971', '127,100;99,970', '127,350;99,969'))
    expect(columns.temperature_K[0]).toBe(126.85 + 273.15)
    expect(info.importDecisions.find((decision) => decision.step === 'decimal sign')?.value).toBe('comma')
  })

  it('are settled by one cell anywhere in the file', () => {
    const rows = Array.from({ length: 900 }, (_, i) => `${i + 1};${300 + i};1,${String(900 - (i % 700)).padStart(3, '0')}`)
    const head = 'Time (s);Temperature (K);Mass (mg)'
    expect(() => only(table(head, ...rows))).toThrow(/two ways/)
    expect(only(table(head, ...rows, '901;1201;0,512')).columns.signals[0]?.at(-1)).toBe(0.512 / 1e6)
    expect(only(table(head, ...rows, '901;1201;1,234.5')).columns.signals[0]?.at(-1)).toBe(1234.5 / 1e6)
  })
})

describe('a long file', () => {
  const long = table(
    'Time (s);Temperature (K);Mass (mg);DSC (mW/mg)',
    ...Array.from(
      { length: 20_000 },
      (_, i) =>
        `${(i * 0.05).toFixed(3)};${(300 + i * 0.03).toFixed(4)};${(9 - i * 1e-4).toFixed(6)};${Math.sin(i / 900).toExponential(5)}`,
    ),
  )

  it('tells how far it is and stops when asked', () => {
    const told: number[] = []
    readExport('long.csv', Buffer.from(long), {}, { checkCancelled: () => undefined, progress: (done, total) => told.push(done / total) })
    expect(told.length).toBeGreaterThan(2)
    expect(told).toEqual(told.toSorted((a, b) => a - b))
    expect(told.at(-1)).toBe(1)
    let calls = 0
    const stop = (): void => {
      calls++
      if (calls > 2) throw new Cancelled()
    }
    expect(() => readExport('long.csv', Buffer.from(long), {}, { checkCancelled: stop, progress: () => undefined })).toThrow(Cancelled)
  })

  it('of 20,000 rows is read to its last row', () => {
    const { runs } = readExport('long.csv', Buffer.from(long), {}, context)
    expect(runs[0]?.info.rows).toBe(20_000)
    expect(runs[0]?.columns.time_s?.at(-1)).toBeCloseTo(999.95, 9)
  })
})

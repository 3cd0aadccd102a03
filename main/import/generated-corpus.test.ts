import iconv from 'iconv-lite'
import { unit } from 'mathjs'
import { describe, expect, it } from 'vitest'
import type { DecimalSignWord, DelimiterWord } from '../../shared-kinetics/contract/import-options.ts'
import { ImportRefusal, readExport } from './read-export.ts'
import { delimiterCharacter } from './split-cells.ts'

// Exports written by a seeded generator that crosses encodings, delimiters, decimal signs, headings and units, with known truth:
// each must be read right, or refused with the true reason. Conversions are checked against the unit tables of mathjs.
const context = { checkCancelled: () => undefined, progress: () => undefined }

/** Mulberry32: a small seeded generator. */
function seeded(seed: number): () => number {
  let state = seed
  return () => {
    state = (state + 0x6d2b79f5) | 0
    let t = Math.imul(state ^ (state >>> 15), 1 | state)
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296
  }
}

const encodings = {
  'utf-8': (text: string) => Buffer.from(text, 'utf8'),
  'utf-8 with mark': (text: string) => Buffer.from(`\ufeff${text}`, 'utf8'),
  'utf-16le with mark': (text: string) => Buffer.from(`\ufeff${text}`, 'utf16le'),
  'utf-16le': (text: string) => Buffer.from(text, 'utf16le'),
  'utf-16be with mark': (text: string) => iconv.encode(text, 'utf-16be', { addBOM: true }),
  'utf-16be': (text: string) => iconv.encode(text, 'utf-16be', { addBOM: false }),
  'windows-1252': (text: string) => iconv.encode(text, 'windows-1252'),
} as const

interface Quantity {
  readonly name: readonly string[]
  readonly units: readonly (readonly [written: string, oracle: string, si: string])[]
}
const time: Quantity = {
  name: ['Time', 't', 'time', 'Elapsed time'],
  units: [
    ['s', 's', 's'],
    ['min', 'minute', 's'],
    ['h', 'hour', 's'],
    ['sec', 's', 's'],
  ],
}
const temperature: Quantity = {
  name: ['Temperature', 'Temp.', 'Temp', 'T', 'Sample Temperature', 'Ts'],
  units: [
    ['°C', 'degC', 'K'],
    ['K', 'K', 'K'],
    ['°F', 'degF', 'K'],
    ['degC', 'degC', 'K'],
    ['C', 'degC', 'K'],
  ],
}
const signals: Readonly<Record<string, Quantity>> = {
  mass: {
    name: ['Mass', 'Weight', 'TG', 'TGA', 'Sample mass'],
    units: [
      ['mg', 'mg', 'kg'],
      ['g', 'g', 'kg'],
      ['µg', 'ug', 'kg'],
      ['%', '%', '1'],
      ['wt%', '%', '1'],
    ],
  },
  'heat-flow': {
    name: ['Heat Flow', 'DSC', 'HF', 'Heat flow rate'],
    units: [
      ['mW', 'mW', 'W'],
      ['W/g', 'W/g', 'W/kg'],
      ['mW/mg', 'mW/mg', 'W/kg'],
      ['µW', 'uW', 'W'],
      ['W', 'W', 'W'],
    ],
  },
  'heat-release': {
    name: ['HRR', 'Heat release rate', 'Specific heat release rate'],
    units: [['W/g', 'W/g', 'W/kg']],
  },
  conversion: {
    name: ['Conversion', 'alpha', 'Extent of reaction', 'Degree of conversion', 'α'],
    units: [
      ['%', '%', '1'],
      ['-', '1', '1'],
    ],
  },
}

type Style = 'round' | 'square' | 'slash' | 'comma' | 'last word' | 'underscore' | 'unit row' | 'unit row in brackets' | 'units alone'
const styles: readonly Style[] = [
  'round',
  'square',
  'slash',
  'comma',
  'last word',
  'underscore',
  'unit row',
  'unit row in brackets',
  'units alone',
]

function headings(style: Style, names: readonly string[], units: readonly string[]): readonly (readonly string[])[] {
  const each = (write: (name: string, unit: string) => string): string[] => names.map((name, i) => write(name, units[i] ?? ''))
  switch (style) {
    case 'round':
      return [each((name, u) => `${name} (${u})`)]
    case 'square':
      return [each((name, u) => `${name} [${u}]`)]
    case 'slash':
      return [each((name, u) => `${name}/${u}`)]
    case 'comma':
      return [each((name, u) => `${name}, ${u}`)]
    case 'last word':
      return [each((name, u) => `${name} ${u}`)]
    case 'underscore':
      return [each((name, u) => `${name}_${u}`.replaceAll(' ', '_'))]
    case 'unit row':
      return [names, units]
    case 'unit row in brackets':
      return [names, units.map((u) => `[${u}]`)]
    case 'units alone':
      return [units.map((u) => `[${u}]`)]
  }
}

interface Written {
  readonly bytes: Uint8Array
  readonly columns: readonly { readonly values: readonly number[]; readonly oracle: string; readonly si: string }[]
  readonly quantity: string
  /** Refusal that is right for this file; null where only a right reading is. */
  readonly refusal: RegExp | null
  readonly title: string
}

function write(seed: number): Written {
  const random = seeded(seed)
  const pick = <T>(list: readonly T[]): T => list[Math.floor(random() * list.length)] as T
  const encoding = pick(Object.keys(encodings) as (keyof typeof encodings)[])
  const delimiter = pick<DelimiterWord>(['comma', 'semicolon', 'tab', 'pipe', 'blanks'])
  const decimal = pick<DecimalSignWord>(['point', 'comma'])
  const style = pick(styles)
  const quantity = pick(Object.keys(signals))
  const signal = signals[quantity] ?? time
  const withTime = random() < 0.85
  const kinds = withTime ? [time, temperature, signal] : [temperature, signal]
  const units = kinds.map((kind) => pick(kind.units))
  // Windows-1252 has no alpha.
  const names = kinds.map((kind) => pick(kind.name)).map((name) => (encoding === 'windows-1252' ? name.replace('α', 'alpha') : name))
  const lineEnd = pick(['\n', '\r\n', '\r'])
  const digits = Math.floor(random() * 6)
  const exponents = random() < 0.25
  const quoteAll = delimiter !== 'blanks' && random() < 0.2

  const rows = 12 + Math.floor(random() * 60)
  const step = 0.1 + random() * 20
  const start = 20 + random() * 200
  const written: string[][] = []
  const values: number[][] = kinds.map(() => [])
  for (let i = 0; i < rows; i++) {
    const row = kinds.map((kind, k) => {
      const extent = i / (rows - 1)
      const value =
        kind === time
          ? i * step
          : kind === temperature
            ? start + i * 3.7 + (units[k]?.[0] === 'K' ? 250 : 0)
            : quantity === 'conversion'
              ? extent * (units[k]?.[0] === '%' ? 100 : 1)
              : quantity === 'mass'
                ? (units[k]?.[2] === '1' ? 100 : 7.123) * (1 - 0.6 * extent)
                : -0.4 + 2 * Math.sin(7 * extent)
      const text = exponents ? value.toExponential(Math.max(digits, 3)) : value.toFixed(kind === signal ? Math.max(digits, 4) : digits)
      values[k]?.push(Number(text))
      return decimal === 'comma' ? text.replace('.', ',') : text
    })
    written.push(row)
  }

  const character = delimiter === 'blanks' ? '  ' : delimiterCharacter[delimiter]
  const cell = (text: string): string =>
    quoteAll || (delimiter !== 'blanks' && text.includes(character)) ? `"${text.replaceAll('"', '""')}"` : text
  const join = (cells: readonly string[]): string => cells.map(cell).join(character)
  const preamble = pick([
    [],
    ['Sample: invented polymer 7', 'Gas: nitrogen'],
    ['# exported for the records', '# operator: somebody'],
    delimiter === 'blanks'
      ? ['Remark']
      : [join(['Sample', 'invented']), join(['Flow', decimal === 'comma' ? '50,0' : '50.0', 'mL/min']), ''],
  ])
  const trailing = pick([[], [], ['End of data'], ['', 'checked by: nobody']])
  const table = headings(
    style,
    names,
    units.map(([text]) => text),
  )
  const lines = [...preamble, ...table.map(join), ...written.map(join), ...trailing]
  const text = lines.join(lineEnd) + (random() < 0.7 ? lineEnd : '')

  const undecided = style === 'units alone' && (quantity === 'conversion' || units.at(-1)?.[2] === '1')
  const heldAsHeatFlow = style === 'units alone' && quantity === 'heat-release'
  const commaTwice =
    delimiter === 'comma' &&
    decimal === 'comma' &&
    !quoteAll &&
    kinds.some((_, k) => written.some((row) => row[k]?.includes(',') === true && !cell(row[k] ?? '').startsWith('"')))
  return {
    bytes: encodings[encoding](text),
    columns: kinds.map((_, k) => ({ values: values[k] ?? [], oracle: units[k]?.[1] ?? '', si: units[k]?.[2] ?? '' })),
    quantity: heldAsHeatFlow ? 'heat-flow' : quantity,
    refusal: undecided ? /No column holds a signal/ : commaTwice ? /cells|headings|columns|rows/ : null,
    title: [
      encoding,
      delimiter,
      decimal,
      style,
      ...names,
      ...units.map(([u]) => u),
      JSON.stringify(lineEnd),
      `digits ${digits}`,
      quoteAll ? 'quoted' : '',
    ].join(' | '),
  }
}

const inSI = (value: number, oracle: string, si: string): number =>
  oracle === '%' ? value / 100 : oracle === '1' ? value : unit(value, oracle).toNumber(si)

const files = Array.from({ length: 1500 }, (_, i) => write(i + 1))

describe('generated exports', () => {
  it('crosses every encoding, delimiter, decimal sign and heading style', () => {
    const counts: [string, number][] = []
    for (const word of [...Object.keys(encodings), ...styles, 'comma', 'semicolon', 'tab', 'pipe', 'blanks', 'point']) {
      counts.push([word, files.filter((file) => file.title.includes(word)).length])
    }
    expect(counts.filter(([, count]) => count <= 20)).toEqual([])
    expect(files.filter((file) => file.refusal === null).length).toBeGreaterThan(1000)
  })

  it('are all read right, or refused with the true reason', () => {
    const wrong: string[] = []
    for (const file of files) {
      const verdict = judge(file)
      if (verdict !== null) wrong.push(`${file.title}: ${verdict}`)
    }
    expect(wrong).toEqual([])
  })
})

/** null where the reading is right; else what is wrong with it. */
function judge(file: Written): string | null {
  let run: ReturnType<typeof readExport>['runs'][number] | undefined
  try {
    const imported = readExport('generated.csv', file.bytes, {}, context)
    run = imported.runs[0]
    if (imported.runs.length !== 1 || run === undefined) return `${imported.runs.length} runs`
  } catch (error) {
    if (!(error instanceof ImportRefusal)) throw error
    return file.refusal?.test(error.reason) === true ? null : `refused: ${error.message}`
  }
  if (file.refusal !== null) return 'read although it cannot be understood'
  const read = [...(run.columns.time_s === null ? [] : [run.columns.time_s]), run.columns.temperature_K, ...run.columns.signals]
  if (read.length !== file.columns.length) return `${read.length} columns`
  if (run.info.signals[0]?.quantity !== file.quantity) return `quantity ${run.info.signals[0]?.quantity}`
  for (const [k, { values, oracle, si }] of file.columns.entries()) {
    const column = read[k]
    if (column?.length !== values.length) return `${column?.length} rows instead of ${values.length}`
    for (const [i, value] of values.entries()) {
      const truth = inSI(value, oracle, si)
      const got = column[i] ?? Number.NaN
      if (!(Math.abs(got - truth) <= 1e-13 * Math.max(Math.abs(truth), 1e-12)))
        return `column ${k + 1} row ${i + 1}: ${got} instead of ${truth}`
    }
  }
  return null
}

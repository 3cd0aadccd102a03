import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { DecimalSignWord, DelimiterWord } from '../../shared-kinetics/contract/import-options.ts'
import { ImportRefusal } from './import-refusal.ts'
import type { PlannedColumn } from './plan-columns.ts'
import { readColumns } from './read-columns.ts'
import { textLines } from './text-lines.ts'

const context = { checkCancelled: () => undefined, progress: () => undefined }
const refuse = (line: number | null, reason: string, remedy: string): ImportRefusal => new ImportRefusal('table', line, reason, remedy)
const separators = { comma: ',', semicolon: ';', tab: '\t', pipe: '|', blanks: '  ' } as const

/** A column that is read, or set aside. */
const planned = (index: number, isUsed: boolean): PlannedColumn => ({
  index,
  label: `column ${index + 1}`,
  heading: { text: '', name: '', unit: null, unitText: null, heatingRate: null },
  quantity: isUsed ? 'mass' : null,
  rank: 1,
  as: 'value',
  unit: null,
  unitText: '',
  setAside: isUsed ? null : 'not wanted',
  weighty: false,
  reason: '',
})

function read(text: string, delimiter: DelimiterWord, decimal: DecimalSignWord, used: readonly boolean[]) {
  const lines = textLines({ bytes: Buffer.from(text, 'utf8'), encoding: 'utf-8' }, context, refuse)
  const plan = used.map((isUsed, i) => planned(i, isUsed))
  const nothing = { preamble: [], headingLine: null, headings: [], titles: [], unitLine: null, units: [], trailing: [] }
  const layout = { ...nothing, firstData: 0, lastData: lines.count - 1 }
  const dialect = { delimiter, decimal, delimiterReason: '', decimalReason: '', numericColumns: used }
  return readColumns(lines, layout, dialect, plan, context, refuse)
}

const number = fc.oneof(
  fc.double({ min: -1e4, max: 1e4, noNaN: true }).map((value) => value.toFixed(4)),
  fc.double({ noNaN: true, noDefaultInfinity: true }).map((value) => value.toExponential(6)),
  fc.double({ noNaN: true, noDefaultInfinity: true }).map(String),
  fc.integer({ min: -9999, max: 9999 }).map(String),
  fc.nat(999).map((value) => `+${value}`),
)

/** Cells with the number each holds (NaN: empty), rows of them, and how they are written: the truth, and a table to read it from. */
const tables = fc
  .record({
    delimiter: fc.constantFrom<DelimiterWord>('comma', 'semicolon', 'tab', 'pipe', 'blanks'),
    comma: fc.boolean(),
    used: fc.array(fc.boolean(), { minLength: 2, maxLength: 5 }),
    lineEnd: fc.constantFrom('\n', '\r\n', '\r'),
    endsInDelimiter: fc.boolean(),
    lastLineEnd: fc.boolean(),
  })
  .chain((way) => {
    const isBlanks = way.delimiter === 'blanks'
    const quoted = isBlanks ? fc.constant(false) : fc.nat(30).map((n) => n === 0)
    const padded = isBlanks ? fc.constant(false) : fc.nat(10).map((n) => n === 0)
    const filled = fc.record({ text: number, quoted, padded, wide: fc.nat(30).map((n) => n === 0) })
    const cell = isBlanks ? filled : fc.option(filled, { nil: null, freq: 12 })
    const row = fc.oneof(
      { weight: 20, arbitrary: fc.array(cell, { minLength: way.used.length, maxLength: way.used.length }) },
      { weight: 1, arbitrary: fc.constant('blank' as const) },
    )
    return fc.record({ way: fc.constant(way), rows: fc.array(row, { minLength: 1, maxLength: 40 }) })
  })

describe('readColumns', () => {
  it('reads the numbers that were written, whichever lines are plain and whichever are not', () => {
    fc.assert(
      fc.property(tables, ({ way, rows }) => {
        const decimal = way.comma && way.delimiter !== 'comma' ? 'comma' : 'point'
        const separator = separators[way.delimiter]
        const written = rows.map((row) => {
          if (row === 'blank') return '  '
          const cells = row.map((cell) => {
            if (cell === null) return ''
            const text = decimal === 'comma' ? cell.text.replace('.', ',') : cell.text
            // A minus sign of the typographer's kind makes a cell that is not ASCII.
            const signed = cell.wide ? text.replace(/^-/, '\u2212') : text
            return cell.quoted ? `"${signed}"` : cell.padded ? ` ${signed} ` : signed
          })
          return cells.join(separator) + (way.endsInDelimiter ? separator : '')
        })
        const text = written.join(way.lineEnd) + (way.lastLineEnd ? way.lineEnd : '')
        const kept = rows.flatMap((row, i) => (row === 'blank' || written[i]?.trim() === '' ? [] : [{ row, line: i + 1 }]))

        const table = read(text, way.delimiter, decimal, way.used)
        expect(table.rows).toBe(kept.length)
        expect([...table.lineOfRow]).toEqual(kept.map(({ line }) => line))
        way.used.forEach((isUsed, column) => {
          const truth = kept.map(({ row }) => Number(row[column]?.text ?? Number.NaN))
          const filled = truth.filter((value) => !Number.isNaN(value)).length
          expect(table.columns[column] === undefined ? undefined : [...table.columns[column]]).toEqual(isUsed ? truth : undefined)
          expect(table.filled[column]).toBe(isUsed ? filled : Math.min(filled, 1))
        })
      }),
      { numRuns: 1500, seed: 29 },
    )
  })

  it('names line and cell of what is no number, wherever it stands among plain lines', () => {
    fc.assert(
      fc.property(
        fc.nat(39),
        fc.nat(2),
        fc.constantFrom('x', '7.5mg', '"7x"', '1e999', '-', '1.2.3', 'NaN', '7;5'),
        (line, column, cell) => {
          const rows = Array.from({ length: 40 }, (_, i) => [`${i}`, `${i}.25`, `-${i}e-3`])
          const broken = rows[line]
          if (broken === undefined) throw new Error('There is no such line.')
          broken[column] = cell
          const text = rows.map((row) => row.join(',')).join('\n')
          const failure = failureOf(() => read(text, 'comma', 'point', [true, true, true]))
          expect(failure.line).toBe(line + 1)
          expect(failure.reason).toContain(`“${cell.replaceAll('"', '')}`)
          expect(read(text, 'comma', 'point', [column !== 0, column !== 1, column !== 2]).rows).toBe(40)
        },
      ),
      { numRuns: 300, seed: 31 },
    )
  })

  it('refuses cells beyond the last column, but not empty ones', () => {
    expect(read('1,2,,\n3,4,,', 'comma', 'point', [true, true]).rows).toBe(2)
    expect(failureOf(() => read('1,2\n3,4,5', 'comma', 'point', [true, true]))).toMatchObject({ line: 2 })
  })
})

function failureOf(attempt: () => unknown): ImportRefusal {
  try {
    attempt()
  } catch (error) {
    if (error instanceof ImportRefusal) return error
    throw error
  }
  throw new Error('It was read.')
}

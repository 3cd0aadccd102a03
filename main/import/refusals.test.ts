import { describe, expect, it } from 'vitest'
import { largestUploadBytes } from '../../shared-kinetics/contract/host-api.ts'
import type { ImportOptions } from '../../shared-kinetics/contract/import-options.ts'
import { decodeAnswer, encodeFailure } from '../../shared-kinetics/contract/wire-answer.ts'
import { ImportRefusal, readExport, refusedFile } from './read-export.ts'

const context = { checkCancelled: () => undefined, progress: () => undefined }

function refusal(content: string | Uint8Array, options: ImportOptions = {}, name = 'run.csv'): ImportRefusal {
  try {
    readExport(name, typeof content === 'string' ? Buffer.from(content) : content, options, context)
  } catch (error) {
    if (error instanceof ImportRefusal) return error
    throw error
  }
  return expect.unreachable('it was read')
}

const head = 'Time (s),Temperature (°C),Mass (mg)'
const rows = (count: number, from = 0): string[] =>
  Array.from({ length: count }, (_, i) => `${(from + i) * 10},${30.5 + (from + i)},${(9 - 0.01 * (from + i)).toFixed(3)}`)
const lines = (...parts: (string | string[])[]): string => parts.flat().join('\n')

interface Case {
  readonly what: string
  readonly content: string | Uint8Array
  readonly options?: ImportOptions
  readonly line: number | null
  readonly reason: RegExp
  readonly remedy: RegExp
}

const cases: readonly Case[] = [
  {
    what: 'a file beyond what is read',
    content: new Uint8Array(largestUploadBytes + 1),
    line: null,
    reason: /larger than 512 MiB/,
    remedy: /coarser/,
  },
  { what: 'an empty file', content: '', line: null, reason: /is empty/, remedy: /Export the run again/ },
  { what: 'nothing but blanks', content: ' \n\t\n', line: null, reason: /nothing but blanks/, remedy: /Export/ },
  {
    what: 'a modern spreadsheet',
    content: Buffer.from('504b0304140000000800', 'hex'),
    line: null,
    reason: /spreadsheet \(\.xlsx/,
    remedy: /CSV/,
  },
  {
    what: 'an old spreadsheet',
    content: Buffer.from('d0cf11e0a1b11ae10000', 'hex'),
    line: null,
    reason: /old binary kind \(\.xls/,
    remedy: /CSV/,
  },
  {
    what: 'a picture',
    content: Buffer.from('89504e470d0a1a0a0000', 'hex'),
    line: null,
    reason: /picture \(PNG\)/,
    remedy: /numbers of the curve/,
  },
  { what: 'a PDF', content: '%PDF-1.7\n1 0 obj', line: null, reason: /PDF/, remedy: /as text/ },
  { what: 'a compressed file', content: Buffer.from('1f8b0800', 'hex'), line: null, reason: /gzip/, remedy: /Unpack/ },
  {
    what: 'other binary data',
    content: Uint8Array.from({ length: 5000 }, (_, i) => (i * 37) % 251),
    line: null,
    reason: /not text/,
    remedy: /as text/,
  },
  {
    what: 'prose',
    content: lines('Dear colleague,', 'the runs follow tomorrow.', 'Yours'),
    line: null,
    reason: /No table of numbers/,
    remedy: /columns of numbers/,
  },
  { what: 'headings without rows', content: head, line: null, reason: /No table of numbers/, remedy: /columns/ },
  {
    what: 'one endless line',
    content: `a${',1'.repeat(200_000)}`,
    line: null,
    reason: /more than 100000 characters/,
    remedy: /row of numbers a line/,
  },
  {
    what: 'numbers with no names and no units',
    content: lines(rows(5)),
    line: 1,
    reason: /no names and no units/,
    remedy: /row of headings/,
  },
  {
    what: 'a comma as delimiter and as decimal sign',
    content: lines('Time (s),Temperature (°C),Mass (mg)', ['0,0,30,5,9,01', '1,0,31,5,9,00', '2,0,32,5,8,99', '3,0,33,5,8,98']),
    line: 1,
    reason: /rows have 6 cells but this line names 3 columns/,
    remedy: /decimal comma needs another delimiter/,
  },
  {
    what: 'numbers that may have a decimal comma or thousands',
    content: lines('Time (s);Temperature (K);Mass (ug)', ['1;300;1,234', '2;310;1,233', '3;320;1,232', '4;330;1,231']),
    line: null,
    reason: /read in two ways/,
    remedy: /“decimal sign”, point or comma .*--decimal-sign/,
  },
  {
    what: 'a word amid the numbers',
    content: lines(head, rows(4), '40,34.5,error', rows(3, 5)),
    line: 6,
    reason: /“error” in column “Mass \(mg\)” is not a number/,
    remedy: /remove this line/,
  },
  {
    what: 'a broken third row',
    content: lines(head, rows(2), '20,3x.5,8.9', rows(20, 3)),
    line: 4,
    reason: /“3x\.5” in column “Temperature \(°C\)” is not a number/,
    remedy: /Mend/,
  },
  {
    what: 'a delimiter inside a name, which would move names onto other numbers',
    content: lines('Time (s),Temp, sample (K),Mass (mg),DSC (mW)', ['0,300,9,1', '1,310,8,1', '2,320,7,2']),
    line: 1,
    reason: /names 5 columns but the rows have 4 cells/,
    remedy: /quotation marks/,
  },
  {
    what: 'names of several words between blanks',
    content: lines('Gas Flow Temp Mass DSC', ['50 300 9 1', '50 310 8 1', '50 320 7 2']),
    line: 1,
    reason: /names 5 columns but the rows have 4 cells/,
    remedy: /rename/,
  },
  {
    what: 'a mark for a missing number in a column that is needed',
    content: lines(head, rows(4), '40,34.5,NaN', rows(3, 5)),
    line: 6,
    reason: /“NaN” in column “Mass \(mg\)” is not a number/,
    remedy: /remove/,
  },
  {
    what: 'a broken first row',
    content: lines(head, '0,x,9', rows(20, 1)),
    line: 2,
    reason: /“0,x,9”.*neither headings nor a row of numbers/,
    remedy: /Mend/,
  },
  {
    what: 'an empty cell amid the numbers',
    content: lines(head, rows(4), '40,,8.9', rows(8, 5)),
    line: 6,
    reason: /“Temperature \(°C\)” is empty/,
    remedy: /column 2/,
  },
  {
    what: 'a row with too many cells',
    content: lines(head, rows(4), '40,34.5,8.9,77', rows(8, 5)),
    line: 6,
    reason: /“77” stands in cell 4/,
    remedy: /delimiter/,
  },
  {
    what: 'a value beyond double precision',
    content: lines(head, rows(4), '40,1e999,8.9', rows(8, 5)),
    line: 6,
    reason: /“1e999”.*not a number/,
    remedy: /Mend/,
  },
  {
    what: 'headings repeated amid the rows',
    content: lines(head, rows(4), head, rows(4)),
    line: 6,
    reason: /headings are repeated/,
    remedy: /file of its own/,
  },
  {
    what: 'another decimal sign from the middle on',
    content: lines('Time (s);T (°C);Mass (mg)', ['0;1,5;2,5', '1;1,6;2,5', '2;1,7;2,5', '3;1,8;2,5', '4;1.9;2.5', '5;2,0;2,5']),
    line: 6,
    reason: /“1\.9”/,
    remedy: /Mend/,
  },
  {
    what: 'a second table that ends in something else',
    content: lines(
      head,
      rows(10),
      Array.from({ length: 60 }, (_, i) => `remark ${i}`),
    ),
    line: 12,
    reason: /60 lines are no rows of numbers/,
    remedy: /one table/,
  },
  {
    what: 'no temperature',
    content: lines('Time (s),Mass (mg),Flow (mL/min)', ['0,9,50', '1,8,50', '2,7,50']),
    line: 1,
    reason: /No column holds the temperature.*“Mass \(mg\)”/,
    remedy: /“temperature”/,
  },
  {
    what: 'only the temperature of the furnace',
    content: lines('Time (s),Furnace temperature (K),Mass (mg)', ['0,300,9', '1,310,8', '2,320,7']),
    line: 1,
    reason: /temperature of the sample/,
    remedy: /“temperature”/,
  },
  {
    what: 'no signal',
    content: lines('Time (s),Temperature (K),Oxygen (%)', ['0,300,20', '1,310,20', '2,320,20']),
    line: 1,
    reason: /No column holds a signal.*“Oxygen \(%\)”/,
    remedy: /“mass”/,
  },
  {
    what: 'a signal in an unknown unit',
    content: lines('Time (s),Temperature (K),DSC (µV)', ['0,300,2', '1,310,2', '2,320,3']),
    line: 1,
    reason: /unit “µV” is not one of heat flow/,
    remedy: /“heat-flow”/,
  },
  {
    what: 'a column that is empty in every row',
    content: lines('Time (s),Temperature (K),Mass (mg),x', ['0,300,,1', '1,310,,1', '2,320,,1', '3,330,,1']),
    line: 1,
    reason: /Empty in every row: “Mass \(mg\)”/,
    remedy: /“mass”/,
  },
  {
    what: 'a temperature in mg',
    content: lines('Time (s),Temperature (mg),Mass (mg)', ['0,300,9', '1,310,8', '2,320,7']),
    line: 1,
    reason: /Column 2.*unit “mg” is not one of temperature/,
    remedy: /“column 2”/,
  },
  {
    what: 'two units for one column',
    content: lines('Time (s),Temperature (K),Mass (mg)', 's,°C,mg', ['0,300,9', '1,310,8', '2,320,7']),
    line: 1,
    reason: /Column 2 has two units/,
    remedy: /“column 2”/,
  },
  {
    what: 'a temperature that may be in °C or K',
    content: lines('Time (s),Temperature,Mass (mg)', ['0,310,9', '100,410,8', '200,510,7']),
    line: 2,
    reason: /in which unit column 2.*leave it open/,
    remedy: /“column 2”/,
  },
  {
    what: 'a time that may be in s or min',
    content: lines('Time,Temperature (K),Mass (mg)', ['0,310,9', '30,410,8', '60,510,7']),
    line: 2,
    reason: /in which unit column 1/,
    remedy: /“column 1”/,
  },
  {
    what: 'a mass without a unit',
    content: lines('Time (s),Temperature (K),Mass', ['0,310,9', '30,410,8', '60,510,7']),
    line: 2,
    reason: /in which unit column 3/,
    remedy: /“column 3”/,
  },
  {
    what: 'a temperature below absolute zero',
    content: lines('# exported', head, rows(5), '50,-280,8.9', rows(5, 6)),
    line: 8,
    reason: /absolute zero/,
    remedy: /column 2/,
  },
  {
    what: 'a temperature beyond any furnace',
    content: lines(head, rows(5), '50,31000,8.9', rows(5, 6)),
    line: 7,
    reason: /31273\.2 K, above any/,
    remedy: /Check this row/,
  },
  {
    what: 'time going backwards',
    content: lines(head, rows(5), '', '39,36,8.9', rows(5, 6)),
    line: 8,
    reason: /Time goes backwards: 39 follows 40/,
    remedy: /one segment a file/,
  },
  {
    what: 'an unknown unit that was stated',
    content: lines(head, rows(5)),
    options: { columns: [{ column: 3, unit: 'furlong' }] },
    line: null,
    reason: /“furlong”, is not known/,
    remedy: /mg, g/,
  },
  {
    what: 'a column stated that is not there',
    content: lines(head, rows(5)),
    options: { columns: [{ column: 'DSC', unit: 'mW' }] },
    line: null,
    reason: /does not have: “DSC”/,
    remedy: /has 3/,
  },
  {
    what: 'an encoding stated that is not that of the file',
    content: Buffer.from('Temp (\xb0C),Mass (mg)\n30,1\n31,1\n32,1', 'latin1'),
    options: { encoding: 'utf-8' },
    line: null,
    reason: /not valid UTF-8/,
    remedy: /windows-1252/,
  },
  {
    what: 'a delimiter stated that is not that of the file',
    content: lines(head, rows(5)),
    options: { delimiter: 'semicolon' },
    line: null,
    reason: /with what was stated \(semicolon\)/,
    remedy: /delimiter/,
  },
  {
    what: 'a first data line beyond the end',
    content: lines(head, rows(5)),
    options: { firstDataLine: 99 },
    line: 99,
    reason: /holds nothing/,
    remedy: /first data line/,
  },
  {
    what: 'a heading line below the data',
    content: lines(head, rows(5)),
    options: { headingLine: 4 },
    line: 4,
    reason: /not stand above/,
    remedy: /heading line/,
  },
  {
    what: 'a quoted cell that is no number',
    content: lines('"Time (s)","Temp, sample (K)","Mass (mg)"', ['"0","300","9"', '"1","310","8"', '"2","31O","7"', '"3","330","6"']),
    line: 4,
    reason: /“31O” in column “Temp, sample \(K\)”/,
    remedy: /Mend/,
  },
  {
    what: 'runs side by side, one with a hole',
    content: lines('Temp 2 K/min (°C),Mass 2 K/min (%),Temp 5 K/min (°C),Mass 5 K/min (%)', [
      '20,100,20,100',
      '21,99,21,99',
      '22,98,22,99',
      '23,97,,',
      '24,96,24,97',
    ]),
    line: 5,
    reason: /empty here, and more of its rows follow/,
    remedy: /Remove/,
  },
]

describe('a file that cannot be understood', () => {
  it.each(cases)('$what is refused with line, reason and remedy', ({ content, options, line, reason, remedy }) => {
    const refused = refusal(content, options)
    expect(refused.reason).toMatch(reason)
    expect(refused.remedy).toMatch(remedy)
    expect(refused.line).toBe(line)
    expect(refused.code).toBe('not-readable')
    expect(refused.message.startsWith(line === null ? 'run.csv: ' : `run.csv, line ${line}: `)).toBe(true)
    expect(refused.message.length).toBeLessThan(1500)
  })

  it('is told the same way on the other side of a wire', () => {
    const refused = refusal(lines(head, rows(4), '40,34.5,error', rows(3, 5)), {}, 'C:\\data\\run 7.csv')
    let received: unknown
    try {
      decodeAnswer(encodeFailure(refused))
    } catch (error) {
      received = error
    }
    expect(refusedFile(received)).toEqual({ fileName: 'run 7.csv', line: 6, reason: refused.reason, remedy: refused.remedy })
    expect(refusedFile(refused)).toEqual(refusedFile(received))
    expect(refusedFile(new Error('other'))).toBeNull()
  })
})

import { zipSync, type Zippable } from 'fflate/browser'
import { describe, expect, it } from 'vitest'
import { emptyStudy, type StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'
import { column } from '../../shared-kinetics/units/quantity.ts'
import { sampleRun, textBytes } from '../host/testing/host-testing.ts'
import { encodeColumns } from './columns-file.ts'
import { openSavedCopy, packSavedCopy, type SavedCopy } from './saved-copy.ts'

const bytes = textBytes('time;temperature;mass\n0;300;1\n')
const run = sampleRun('Calcite 10.csv', 10, bytes)
const document: StudyDocument = { ...emptyStudy('calcite', 'Calcite, µ-crucible'), runs: [run.info] }
const copy: SavedCopy = {
  document,
  columns: new Map([[run.info.columnsKey, run.columns]]),
  files: new Map([[run.info.file.sha256, bytes]]),
}
const columnsPath = `columns/${run.info.columnsKey}.bin`
const exportPath = `exports/${run.info.file.sha256}`
const whole = (): Record<string, Uint8Array> => ({
  'study.json': textBytes(JSON.stringify(document)),
  [columnsPath]: encodeColumns(run.columns),
  [exportPath]: bytes,
})
const zipped = (files: Zippable): Uint8Array => zipSync(files)

function refusal(file: Uint8Array): string {
  try {
    openSavedCopy(file)
  } catch (error) {
    if (error instanceof KineticsError && error.code === 'bad-study') return error.message
    throw error
  }
  throw new Error('the copy was opened')
}

describe('a saved copy', () => {
  it('gives back document, columns (bit by bit, NaN included) and original files', () => {
    const opened = openSavedCopy(packSavedCopy(copy))
    expect(opened.document).toEqual(document)
    const columns = opened.columns.get(run.info.columnsKey)
    expect(columns?.time_s).toEqual(run.columns.time_s)
    expect(columns?.temperature_K).toEqual(run.columns.temperature_K)
    expect(columns?.signals[0]).toEqual(run.columns.signals[0])
    expect(columns?.signals[0]?.[7]).toBeNaN()
    expect(columns?.temperature_K.buffer).toBeInstanceOf(SharedArrayBuffer)
    expect(opened.files.get(run.info.file.sha256)).toEqual(bytes)
  })

  it('is the same bytes for the same study', () => {
    expect(packSavedCopy(copy)).toEqual(packSavedCopy(copy))
  })

  it('opens without the original files, which may never have been kept', () => {
    const { [exportPath]: _gone, ...rest } = whole()
    expect(openSavedCopy(zipped(rest)).files.size).toBe(0)
  })

  it('is refused when a newer version wrote it, with that word', () => {
    expect(refusal(zipped({ ...whole(), 'study.json': textBytes(JSON.stringify({ ...document, format: 'rampfold.study/2' })) }))).toMatch(
      /newer version/,
    )
  })

  it('is refused when it is no ZIP, cut short, or without its description', () => {
    const packed = packSavedCopy(copy)
    expect(refusal(textBytes('PK no'))).toMatch(/not a whole file/)
    expect(refusal(packed.subarray(0, packed.byteLength - 40))).toMatch(/cannot be read/)
    const { 'study.json': _gone, ...rest } = whole()
    expect(refusal(zipped(rest))).toMatch(/no study\.json/)
  })

  it.each(['../../.bashrc', '/etc/passwd', 'exports/../../x', 'columns\\x.bin', 'exports/CON', 'study.json/x'])(
    'is refused for an entry named %s',
    (name) => {
      expect(refusal(zipped({ ...whole(), [name]: textBytes('x') }))).toMatch(/does not have/)
    },
  )

  it('is refused when it would unpack beyond all measure', () => {
    // 100 MiB of zeros pack to 100 kB: a ratio of a thousand.
    const bomb = new Uint8Array(100 * 2 ** 20)
    expect(refusal(zipped({ ...whole(), [`exports/${'0'.repeat(64)}`]: [bomb, { level: 9 }] }))).toMatch(/more than a study may hold/)
  })

  it('is refused when it says it unpacks to little and does not', () => {
    const packed = zipped(whole())
    // The size that the central directory gives for study.json (its first entry), made 16 bytes.
    const view = new DataView(packed.buffer)
    const directory = view.getUint32(packed.byteLength - 6, true)
    expect(view.getUint32(directory, true)).toBe(0x02014b50)
    view.setUint32(directory + 24, 16, true)
    expect(refusal(packed)).toMatch(/cannot be read/)
  })

  it('is refused when columns or original file are damaged, missing or another run’s', () => {
    const columns = encodeColumns(run.columns)
    columns[100] = (columns[100] ?? 0) ^ 1
    expect(refusal(zipped({ ...whole(), [columnsPath]: columns }))).toMatch(/checksum/)
    expect(refusal(zipped({ ...whole(), [columnsPath]: columns.subarray(0, 500) }))).toMatch(/not as long as/)
    expect(refusal(zipped({ ...whole(), [exportPath]: textBytes('other') }))).toMatch(/original file of Calcite 10 is damaged/)
    const { [columnsPath]: _gone, ...rest } = whole()
    expect(refusal(zipped(rest))).toMatch(/columns of a run are missing/)
    const short = { ...run.columns, signals: [] }
    expect(refusal(zipped({ ...whole(), [columnsPath]: encodeColumns(short) }))).toMatch(/not those/)
  })

  it('is refused with the field that is wrong in its description', () => {
    const wrong = { ...document, settings: { ...document.settings, levels: [0.5, 0.4] } }
    expect(refusal(zipped({ ...whole(), 'study.json': textBytes(JSON.stringify(wrong)) }))).toMatch(/settings\.levels/)
    expect(refusal(zipped({ ...whole(), 'study.json': textBytes('{') }))).toMatch(/not JSON/)
    expect(refusal(zipped({ ...whole(), 'study.json': textBytes('{"format":"other/1"}') }))).toMatch(/does not say that it is a study/)
  })

  it('packs constant columns so that its own limits let them in again', () => {
    const rows = 1_600_000
    const signals = Array.from({ length: 6 }, () => ({ quantity: 'mass', unit: 'kg', label: 'm', fileUnit: 'mg' }) as const)
    const info = { ...run.info, rows, hasTime: false, signals }
    const columns = {
      time_s: null,
      temperature_K: column(new Float64Array(rows).fill(300), 'K'),
      signals: signals.map(() => new Float64Array(rows)),
    }
    const packed = packSavedCopy({
      document: { ...document, runs: [info] },
      columns: new Map([[info.columnsKey, columns]]),
      files: new Map(),
    })
    expect(openSavedCopy(packed).columns.get(info.columnsKey)?.temperature_K[rows - 1]).toBe(300)
  })
})

import { describe, expect, it } from 'vitest'
import { applyChange, labelOfChange, studyChangeSchema } from './study-change.ts'
import { emptyStudy, parseStudyDocument } from './study-document.ts'
import { runInfoOf } from '../check-values/run-info-of.ts'
import type { RateConstantTable } from '../rate-constants/rate-constant-table.ts'
import type { RunInfo } from '../series/run.ts'

const run = (id: string): RunInfo => runInfoOf(id, { label: `run ${id}` })
const study = applyChange(emptyStudy('s1'), { kind: 'add-runs', runs: [run('a'), run('b')], importNotes: [] })

describe('a change', () => {
  it('touches the run it names and no other', () => {
    const after = applyChange(study, { kind: 'use-run', runId: 'b', use: false })
    expect(after.runs.map((r) => r.use)).toEqual([true, false])
    expect(after.runs[0]).toBe(study.runs[0])
  })

  it('that names a run that is gone changes nothing', () => {
    expect(applyChange(study, { kind: 'remove-run', runId: 'z' })).toEqual(study)
  })

  it.each([
    [['lab 7, 2 K per min', 'lab 7, 10 K per min'], 'lab 7'],
    [['pine_N2_3K_R1', 'pine_N2_10K_R1', 'pine_N2_10K_R2'], 'pine_N2'],
    [['a', 'b'], 'a'],
    [['alone'], 'alone'],
  ])('that adds the first runs %j names the study %s, once', (labels, name) => {
    const first = applyChange(emptyStudy('s1'), {
      kind: 'add-runs',
      runs: labels.map((label) => ({ ...run(label), label })),
      importNotes: [],
    })
    expect(first.name).toBe(name)
    expect(applyChange(first, { kind: 'add-runs', runs: [run('other')], importNotes: [] }).name).toBe(name)
  })

  it('says in the undo line what it was', () => {
    expect(labelOfChange(study, { kind: 'set-run-window', runId: 'b', window: null })).toBe('window of run b')
  })

  it('never touches the study it is applied to', () => {
    const before = structuredClone(study)
    applyChange(study, { kind: 'set-levels', levels: [0.5] })
    expect(study).toEqual(before)
  })

  it.each([
    { kind: 'set-levels', levels: [0.5, 0.4] },
    { kind: 'set-levels', levels: [0, 0.5] },
    { kind: 'set-levels', levels: [] },
    { kind: 'set-window', window: { kind: 'temperature', start_K: 500, end_K: 400 } },
    { kind: 'set-window', window: { kind: 'temperature', start_K: Number.NaN, end_K: 400 } },
    { kind: 'set-run-heating-rate', runId: 'a', heatingRate_K_per_s: -1 },
    { kind: 'set-methods', methods: ['no-such-method'] },
    { kind: 'format-disk' },
  ])('that makes no sense is refused on arrival: %j', (change) => {
    expect(studyChangeSchema.safeParse(change).success).toBe(false)
  })
})

describe('a study document', () => {
  it('is read back as it was written', () => {
    expect(parseStudyDocument(JSON.parse(JSON.stringify(study)))).toEqual(study)
  })

  it('of another format is refused', () => {
    expect(() => parseStudyDocument({ ...study, format: 'rampfold.study/9' })).toThrow(/format/)
  })
})

describe('a table of rate constants in a study', () => {
  const table: RateConstantTable = {
    rows: [
      { temperature_K: 298, rateConstant: 3.46e-5, standardUncertainty: null, label: null, use: true },
      { temperature_K: 308, rateConstant: 1.35e-4, standardUncertainty: 2e-6, label: 'b', use: false },
    ],
    rateUnit: '1/s',
    temperatureUnitShown: 'C',
    predictAt_K: [350],
    source: { kind: 'file', name: 'N2O5 in air.csv', sha256: null },
    notes: [],
  }

  it('is set as a whole, named in the undo line, and read back as it was written', () => {
    const change = { kind: 'set-rate-constants', table } as const
    const after = applyChange(emptyStudy('s1'), change)
    expect(after.rateConstants).toEqual(table)
    expect(labelOfChange(after, change)).toBe('table of rate constants')
    expect(after.name).toBe('N2O5 in air')
    expect(parseStudyDocument(JSON.parse(JSON.stringify(after)))).toEqual(after)
    expect(applyChange(after, { kind: 'set-rate-constants', table: null })).toMatchObject({ rateConstants: null, name: 'N2O5 in air' })
  })

  it('is not in studies that were saved before there were such tables', () => {
    const { rateConstants: _, ...older } = study
    expect(parseStudyDocument(JSON.parse(JSON.stringify(older)))).toEqual(study)
  })

  it.each([
    { rows: [{ ...table.rows[0], rateConstant: 0 }] },
    { rows: [{ ...table.rows[0], rateConstant: -1 }] },
    { rows: [{ ...table.rows[0], temperature_K: 0 }] },
    { rows: [{ ...table.rows[0], temperature_K: 1e6 }] },
    { rows: Array.from({ length: 1001 }, () => table.rows[0]) },
    { predictAt_K: [Number.NaN] },
    { temperatureUnitShown: 'R' },
    { source: { ...table.source, sha256: 'x' } },
  ])('that makes no sense is refused on arrival (%#)', (wrong) => {
    expect(studyChangeSchema.safeParse({ kind: 'set-rate-constants', table }).success).toBe(true)
    expect(studyChangeSchema.safeParse({ kind: 'set-rate-constants', table: { ...table, ...wrong } }).success).toBe(false)
  })
})

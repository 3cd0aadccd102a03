import { describe, expect, it } from 'vitest'
import { applyChange, labelOfChange, studyChangeSchema } from './study-change.ts'
import { emptyStudy, parseStudyDocument } from './study-document.ts'
import { runInfoOf } from '../check-values/run-info-of.ts'
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

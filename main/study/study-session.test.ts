import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { StudyChange } from '../../shared-kinetics/contract/study-change.ts'
import { studyChangeSchema } from '../../shared-kinetics/contract/study-change.ts'
import { emptyStudy } from '../../shared-kinetics/contract/study-document.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'
import { sampleRun } from '../host/testing/host-testing.ts'
import { createStudySession, longestPatchLog } from './study-session.ts'

const runIds = Array.from({ length: 5 }, (_, i) => `run-${i}`)
const runInfo = (id: string) => ({ ...sampleRun(`${id}.csv`, 10).info, id })
const runId = fc.constantFrom(...runIds)
const window = fc.option(
  fc.record({
    kind: fc.constant('temperature' as const),
    start_K: fc.integer({ min: 300, max: 400 }),
    end_K: fc.integer({ min: 401, max: 900 }),
  }),
)
const levels = fc
  .uniqueArray(fc.integer({ min: 1, max: 99 }), { minLength: 1, maxLength: 9 })
  .map((all) => all.toSorted((a, b) => a - b).map((n) => n / 100))
const name = fc.string({ minLength: 1, maxLength: 20 })

const change: fc.Arbitrary<StudyChange> = fc
  .oneof(
    fc.record({ kind: fc.constant('rename-study'), name }),
    fc.record({
      kind: fc.constant('add-runs'),
      runs: fc.array(runId.map(runInfo), { minLength: 1, maxLength: 3 }),
      importNotes: fc.constant([]),
    }),
    fc.record({ kind: fc.constant('remove-run'), runId }),
    fc.record({ kind: fc.constant('relabel-run'), runId, label: name }),
    fc.record({ kind: fc.constant('use-run'), runId, use: fc.boolean() }),
    fc.record({ kind: fc.constant('set-run-window'), runId, window }),
    fc.record({ kind: fc.constant('set-run-heating-rate'), runId, heatingRate_K_per_s: fc.option(fc.constantFrom(0.1, 0.2)) }),
    fc.record({ kind: fc.constant('set-exothermic'), runId: fc.option(runId), exothermic: fc.constantFrom('up', 'down') }),
    fc.record({ kind: fc.constant('set-signal'), signal: fc.constantFrom(null, 'mass', 'heat-flow') }),
    fc.record({ kind: fc.constant('set-levels'), levels }),
    fc.record({ kind: fc.constant('set-methods'), methods: fc.constantFrom(null, ['kas'], ['friedman', 'vyazovkin']) }),
    fc.record({ kind: fc.constant('set-window'), window }),
    fc.record({ kind: fc.constant('set-baseline'), baseline: fc.constantFrom('straight', 'area-proportional') }),
    fc.record({ kind: fc.constant('set-mean-range'), meanRange: fc.constantFrom([0.1, 0.9], [0.2, 0.8]) }),
  )
  .map((value) => studyChangeSchema.parse(value))

const changes = fc.array(change, { maxLength: 25 })

describe('the study session', () => {
  it('comes back to the first document when every change is undone, and to the last when every undo is redone', () => {
    fc.assert(
      fc.property(changes, (all) => {
        const first = emptyStudy('a')
        const session = createStudySession(first)
        for (const one of all) session.change(session.revision, one)
        const last = structuredClone(session.document)
        let undone = 0
        for (; session.snapshot().undo !== null; undone += 1) session.undo(session.revision)
        expect(session.document).toEqual(first)
        for (; session.snapshot().redo !== null; undone -= 1) session.redo(session.revision)
        expect(session.document).toEqual(last)
        expect(undone).toBe(0)
      }),
    )
  })

  it('undoes one change at a time, with the label of each', () => {
    fc.assert(
      fc.property(changes, (all) => {
        const session = createStudySession(emptyStudy('a'))
        const states = [structuredClone(session.document)]
        for (const one of all) {
          const before = session.revision
          if (session.change(session.revision, one).revision > before) states.push(structuredClone(session.document))
        }
        while (states.length > 0) {
          expect(session.document).toEqual(states.pop())
          expect(session.snapshot().undo === null).toBe(states.length === 0)
          session.undo(session.revision)
        }
      }),
    )
  })

  it('names every column that document or log can still bring back', () => {
    fc.assert(
      fc.property(changes, fc.nat({ max: 25 }), (all, undos) => {
        const session = createStudySession(emptyStudy('a'))
        const seen = new Set<string>()
        const look = (): void => {
          for (const run of session.document.runs) seen.add(run.columnsKey)
        }
        for (const one of all) {
          session.change(session.revision, one)
          look()
        }
        for (let i = 0; i < undos; i += 1) session.undo(session.revision)
        // Redo is still possible, so nothing that was ever shown may have been let go of.
        expect([...seen].every((key) => session.namesInUse().columnsKeys.has(key))).toBe(true)
      }),
    )
  })

  it('counts the revision up by one with every change, undo, redo and opened study, and not for a change that alters nothing', () => {
    const session = createStudySession(emptyStudy('a'))
    const start = session.revision
    expect(session.change(start, { kind: 'rename-study', name: 'Calcite' }).revision).toBe(start + 1)
    expect(session.change(start + 1, { kind: 'rename-study', name: 'Calcite' }).revision).toBe(start + 1)
    expect(session.undo(start + 1)).toMatchObject({ revision: start + 2, undo: null, redo: 'name of the study' })
    expect(session.redo(start + 2)).toMatchObject({ revision: start + 3, undo: 'name of the study', redo: null })
    expect(session.open(emptyStudy('b'))).toMatchObject({ revision: start + 4, undo: null, redo: null })
  })

  it('refuses what was made on an older revision, and leaves the study as it was', () => {
    const session = createStudySession(emptyStudy('a'))
    session.change(session.revision, { kind: 'rename-study', name: 'Calcite' })
    const now = session.snapshot()
    const stale = [
      () => session.change(now.revision - 1, { kind: 'rename-study', name: 'Other' }),
      () => session.undo(now.revision - 1),
      () => session.redo(now.revision + 1),
    ]
    for (const call of stale) {
      expect(call).toThrow(KineticsError)
      expect(call).toThrow(expect.objectContaining({ code: 'revision-conflict' }))
    }
    expect(session.snapshot()).toEqual(now)
  })

  it('clears redo with a new change', () => {
    const session = createStudySession(emptyStudy('a'))
    session.change(session.revision, { kind: 'rename-study', name: 'Calcite' })
    session.undo(session.revision)
    expect(session.change(session.revision, { kind: 'set-signal', signal: 'mass' }).redo).toBeNull()
  })

  it('lets go of the oldest entries of a long log, and of their columns', () => {
    const session = createStudySession(emptyStudy('a'))
    const added = sampleRun('gone.csv', 10).info
    session.change(session.revision, studyChangeSchema.parse({ kind: 'add-runs', runs: [added], importNotes: [] }))
    session.change(session.revision, { kind: 'remove-run', runId: added.id })
    expect(session.namesInUse().columnsKeys).toContain(added.columnsKey)
    for (let i = 0; i < longestPatchLog; i += 1) session.change(session.revision, { kind: 'rename-study', name: `Name ${i}` })
    expect(session.namesInUse().columnsKeys).not.toContain(added.columnsKey)
  })
})

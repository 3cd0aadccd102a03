import * as fc from 'fast-check'
import { describe, expect, it, vi } from 'vitest'
import { applyChange, type StudyChange } from '../../shared-kinetics/contract/study-change.ts'
import { emptyStudy, type StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import type { RunInfo, StudyResult } from '../../shared-kinetics/contract/study-result.ts'
import { Cancelled, KineticsError } from '../../shared-kinetics/errors.ts'
import { HostUnreachable } from '../transport/host-unreachable.ts'
import { runInfoOf } from '../../shared-kinetics/check-values/run-info-of.ts'
import { createMemoryHost, type MemoryHost } from '../transport/testing/memory-transport.ts'
import { createStudySession, type StudySession } from './study-session.ts'
import { isStale } from './study-state.ts'

const run = (id: string): RunInfo => runInfoOf(id, { label: id })

const twoRuns: StudyDocument = { ...emptyStudy('study-1'), runs: [run('a'), run('b')] }

/** A result that carries, in its levels, how many runs it was made of. */
const resultOf = (document: StudyDocument): StudyResult => ({
  levels: [document.runs.filter((one) => one.use).length / 10],
  signal: 'mass',
  signalsToChooseFrom: ['mass'],
  runs: [],
  profiles: [],
  kissinger: null,
  peakMethods: [],
  findings: [],
})

async function started(host: MemoryHost): Promise<StudySession> {
  const session = createStudySession(host)
  await session.start()
  await settled()
  return session
}

/** Lets every promise that is ready run. */
const settled = async (): Promise<void> => {
  await new Promise((resolve) => {
    setTimeout(resolve, 0)
  })
}

/** A promise that a test fulfils when it likes. */
function createGate(): { readonly opened: Promise<void>; readonly open: () => void } {
  const waiting: (() => void)[] = []
  const opened = new Promise<void>((resolve) => {
    waiting.push(resolve)
  })
  return { opened, open: () => waiting[0]?.() }
}

const rename = (name: string): StudyChange => ({ kind: 'rename-study', name })
const use = (runId: string, used: boolean): StudyChange => ({ kind: 'use-run', runId, use: used })
const documentOf = (session: StudySession): StudyDocument | undefined => session.store.getState().replica?.document

describe('replica of the study', () => {
  it('shows a change before the host has answered it', async () => {
    const gate = createGate()
    const host = createMemoryHost({
      document: twoRuns,
      evaluate: resultOf,
      before: async ({ name }) => (name === 'study.change' ? gate.opened : undefined),
    })
    const session = await started(host)
    const sent = session.change(rename('PMMA in nitrogen'))
    expect(documentOf(session)?.name).toBe('PMMA in nitrogen')
    expect(session.store.getState().replica?.confirmed.document.name).toBe('Untitled study')
    gate.open()
    await sent
    expect(session.store.getState().replica).toMatchObject({ pending: [], confirmed: { document: { name: 'PMMA in nitrogen' } } })
  })

  it('sends changes one after the other, each with the revision the one before it made', async () => {
    const host = createMemoryHost({ document: twoRuns, evaluate: resultOf })
    const session = await started(host)
    await Promise.all([session.change(rename('one')), session.change(use('a', false)), session.change(rename('two'))])
    const revisions = host.calls.flatMap((call) => (call.name === 'study.change' ? [call.input.revision] : []))
    expect(revisions).toEqual([1, 2, 3])
    expect(documentOf(session)).toMatchObject({ name: 'two', runs: [{ use: false }, { use: true }] })
  })

  it('re-reads on a conflict and puts its own change on top of the other window’s', async () => {
    let interfered = false
    const host = createMemoryHost({
      document: twoRuns,
      evaluate: resultOf,
      before: ({ name }) => {
        if (name !== 'study.change' || interfered) return
        interfered = true
        host.changeElsewhere(use('b', false))
      },
    })
    const session = await started(host)
    await session.change(rename('mine'))
    expect(documentOf(session)).toMatchObject({ name: 'mine', runs: [{ use: true }, { use: false }] })
    expect(session.store.getState().notice).toBeNull()
  })

  it('drops a change that the host refuses, shows the study as it is, and says why', async () => {
    const host = createMemoryHost({
      document: twoRuns,
      evaluate: resultOf,
      before: ({ name }) => {
        if (name === 'study.change') throw new KineticsError('bad-request', 'The name is too long.')
      },
    })
    const session = await started(host)
    await session.change(rename('x'))
    expect(session.store.getState().replica).toMatchObject({ pending: [], document: { name: 'Untitled study' } })
    expect(session.store.getState().notice).toEqual({ kind: 'failure', text: 'The name is too long.' })
  })

  it('reads again when another window has changed the study', async () => {
    const host = createMemoryHost({ document: twoRuns, evaluate: resultOf })
    const session = await started(host)
    host.changeElsewhere(rename('theirs'))
    await settled()
    expect(documentOf(session)?.name).toBe('theirs')
  })

  it('ends at the host’s document whatever is changed in whichever window', async () => {
    const anyChange = fc.oneof(
      fc.constantFrom('one', 'two', 'three').map(rename),
      fc.tuple(fc.constantFrom('a', 'b'), fc.boolean()).map(([id, used]) => use(id, used)),
    )
    await fc.assert(
      fc.asyncProperty(fc.array(fc.record({ change: anyChange, here: fc.boolean() }), { maxLength: 8 }), async (steps) => {
        const host = createMemoryHost({ document: twoRuns, evaluate: resultOf })
        const session = await started(host)
        for (const { change, here } of steps) {
          if (here) void session.change(change)
          else host.changeElsewhere(change)
        }
        await session.refresh()
        const { replica } = session.store.getState()
        expect(replica?.pending).toEqual([])
        expect(replica?.document).toEqual((await host.call('study.read', {})).document)
      }),
      { numRuns: 40 },
    )
  })

  it('undoes and redoes by the host, and takes its labels', async () => {
    const host = createMemoryHost({ document: twoRuns, evaluate: resultOf })
    const session = await started(host)
    await session.change(use('a', false))
    expect(session.store.getState().replica?.confirmed.undo).toBe('leaving out a')
    await session.undo()
    expect(documentOf(session)).toEqual(twoRuns)
    expect(session.store.getState().replica?.confirmed.redo).toBe('leaving out a')
    await session.redo()
    expect(documentOf(session)).toEqual(applyChange(twoRuns, use('a', false)))
  })
})

describe('results', () => {
  it('follow each change, stay in sight meanwhile and are known to be stale', async () => {
    const host = createMemoryHost({ document: twoRuns, evaluate: resultOf })
    const session = await started(host)
    expect(session.store.getState().evaluated?.result.levels).toEqual([0.2])
    const changing = session.change(use('a', false))
    expect(isStale(session.store.getState())).toBe(true)
    expect(session.store.getState().evaluated?.result.levels).toEqual([0.2])
    await changing
    await settled()
    expect(session.store.getState().evaluated?.result.levels).toEqual([0.1])
    expect(isStale(session.store.getState())).toBe(false)
  })

  it('of an older revision that come late are dropped', async () => {
    const answers: (() => void)[] = []
    const host = createMemoryHost({
      document: twoRuns,
      evaluate: async (document) => {
        const result = resultOf(document)
        await new Promise<void>((resolve) => {
          answers.push(resolve)
        })
        return result
      },
    })
    const session = await started(host)
    await session.change(use('a', false))
    await settled()
    expect(answers).toHaveLength(2)
    answers[1]?.()
    await settled()
    answers[0]?.()
    await settled()
    expect(session.store.getState().evaluated?.result.levels).toEqual([0.1])
    expect(session.store.getState().evaluation.kind).toBe('settled')
  })

  it('that were stopped are no fault; they come when asked for again', async () => {
    let stopped = false
    const host = createMemoryHost({
      document: twoRuns,
      evaluate: (document) => {
        if (stopped) return resultOf(document)
        stopped = true
        throw new Cancelled()
      },
    })
    const session = await started(host)
    expect(session.store.getState().evaluation).toEqual({ kind: 'stopped' })
    session.evaluateAgain()
    await settled()
    expect(session.store.getState()).toMatchObject({ evaluation: { kind: 'settled' }, evaluated: { result: { levels: [0.2] } } })
  })

  it('of another study never stay on the screen', async () => {
    const host = createMemoryHost({ document: twoRuns, evaluate: resultOf })
    const session = await started(host)
    await session.open({ name: 'study.new' })
    expect(session.store.getState().evaluated).toBeNull()
    expect(session.store.getState().replica?.document.runs).toEqual([])
  })
})

describe('files', () => {
  const mebibyte = 2 ** 20

  it('are sent in pieces of 1 MiB at most, and become runs', async () => {
    const host = createMemoryHost({ evaluate: resultOf, read: (names) => ({ runs: names.map((name) => run(name)), refused: [] }) })
    const session = await started(host)
    await session.importFiles([new File([new Uint8Array(2.5 * mebibyte)], 'one.csv'), new File(['x'], 'two.csv')])
    const pieces = host.calls.flatMap((call) => (call.name === 'upload.append' ? [call.input.bytes.byteLength] : []))
    expect(pieces).toEqual([mebibyte, mebibyte, mebibyte / 2, 1])
    expect(documentOf(session)?.runs.map((one) => one.label)).toEqual(['one.csv', 'two.csv'])
    expect(session.store.getState().importing).toBeNull()
  })

  it('that are refused are listed with their reason until dismissed', async () => {
    const refused = [{ fileName: 'bad.csv', line: 7, reason: 'There is no temperature.', remedy: 'Export it too.' }]
    const host = createMemoryHost({ evaluate: resultOf, read: () => ({ runs: [], refused }) })
    const session = await started(host)
    await session.importFiles([new File(['x'], 'bad.csv')])
    expect(session.store.getState().refused).toEqual(refused)
    session.dismissRefused()
    expect(session.store.getState().refused).toEqual([])
  })

  it('on their way are discarded when cancelled, and nothing is read', async () => {
    const host = createMemoryHost({
      evaluate: resultOf,
      before: async ({ name }) => {
        if (name === 'upload.append') await session.cancelImport()
      },
    })
    const session = createStudySession(host)
    await session.start()
    await session.importFiles([new File([new Uint8Array(3 * mebibyte)], 'one.csv')])
    expect(host.received.size).toBe(0)
    expect(host.calls.map((call) => call.name)).not.toContain('runs.import')
    expect(session.store.getState()).toMatchObject({ importing: null, notice: null })
  })
})

describe('a host that cannot be reached', () => {
  it('is said plainly, keeps the study on the screen, and is found again on retry', async () => {
    let reachable = true
    const host = createMemoryHost({
      document: twoRuns,
      evaluate: resultOf,
      before: () => {
        if (!reachable) throw new HostUnreachable('It has ended.')
      },
    })
    const session = await started(host)
    reachable = false
    await session.change(rename('later'))
    expect(session.store.getState()).toMatchObject({
      connection: { kind: 'lost', message: 'It has ended.' },
      replica: { document: { name: 'later' } },
    })
    reachable = true
    await session.refresh()
    expect(session.store.getState().connection).toEqual({ kind: 'ready' })
    expect((await host.call('study.read', {})).document.name).toBe('later')
    expect(session.store.getState().replica?.pending).toEqual([])
  })

  it('is said before anything is asked of it, and found again by the first event after that', async () => {
    const host = createMemoryHost({ document: twoRuns, evaluate: resultOf })
    const session = await started(host)
    host.loseConnection(new HostUnreachable('It has ended.'))
    expect(session.store.getState().connection).toEqual({ kind: 'lost', message: 'It has ended.' })
    const { revision } = await host.call('study.read', {})
    host.tell({ kind: 'study-changed', revision })
    await vi.waitFor(() => expect(session.store.getState().connection).toEqual({ kind: 'ready' }))
  })
})

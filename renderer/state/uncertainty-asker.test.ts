import { describe, expect, it } from 'vitest'
import { runInfoOf } from '../../shared-kinetics/check-values/run-info-of.ts'
import { defaultUncertainty, emptyStudy, type StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import type { UncertaintyResult } from '../../shared-kinetics/contract/study-result.ts'
import { Cancelled } from '../../shared-kinetics/errors.ts'
import { result } from '../stages/activation/testing/small-result.ts'
import { createMemoryHost, type MemoryHost, type MemoryHostOptions } from '../transport/testing/memory-transport.ts'
import { createStudySession, type StudySession } from './study-session.ts'

const document: StudyDocument = { ...emptyStudy('study-1'), runs: [runInfoOf('a'), runInfoOf('b')] }
const estimateOf = ({ uncertainty }: StudyDocument): UncertaintyResult => ({
  levels: result.levels,
  seed: uncertainty.seed,
  draws: uncertainty.draws,
  profiles: [],
})

const settled = async (): Promise<void> => {
  await new Promise((resolve) => {
    setTimeout(resolve, 0)
  })
}

async function started(options: MemoryHostOptions): Promise<{ readonly host: MemoryHost; readonly session: StudySession }> {
  const host = createMemoryHost({ document, evaluate: () => ({ ...result }), estimate: estimateOf, ...options })
  const session = createStudySession(host)
  await session.start()
  await settled()
  return { host, session }
}
const asked = (host: MemoryHost): number[] => host.calls.flatMap((call) => (call.name === 'study.uncertainty' ? [call.input.revision] : []))
const seeded = (seed: number) => ({ kind: 'set-uncertainty', uncertainty: { ...defaultUncertainty, seed } }) as const

/** Promises that a test fulfils or breaks one by one, in the order in which they were asked for. */
function createGates() {
  const gates: { readonly open: () => void; readonly fail: (error: Error) => void }[] = []
  const wait = async (): Promise<void> =>
    new Promise<void>((open, fail) => {
      gates.push({ open, fail })
    })
  return { gates, wait }
}

describe('intervals that take longer than an evaluation', () => {
  it('are asked for behind the evaluation while somebody looks, once for every revision', async () => {
    const { host, session } = await started({})
    expect(asked(host)).toEqual([])
    session.uncertainty.want(true)
    await settled()
    expect(asked(host)).toEqual([1])
    const { uncertain, evaluated } = session.store.getState()
    expect(uncertain?.about).toBe(evaluated)
    session.uncertainty.want(false)
    session.uncertainty.want(true)
    await session.change(seeded(7))
    await settled()
    expect(asked(host)).toEqual([1, 2])
    expect(session.store.getState()).toMatchObject({ uncertain: { result: { seed: 7 } }, uncertaintyWork: { kind: 'settled' } })
    session.uncertainty.want(false)
    await session.change(seeded(8))
    await settled()
    expect(asked(host)).toEqual([1, 2])
  })

  it('do not hold up a change, and an answer that a newer revision overtook is dropped', async () => {
    const { gates, wait } = createGates()
    const { host, session } = await started({
      estimate: async (of) => {
        await wait()
        return estimateOf(of)
      },
    })
    session.uncertainty.want(true)
    await settled()
    expect(session.store.getState().uncertaintyWork.kind).toBe('running')
    await session.change(seeded(2))
    await settled()
    expect(session.store.getState().replica?.document.uncertainty.seed).toBe(2)
    expect(asked(host)).toEqual([1, 2])
    gates[1]?.open()
    await settled()
    gates[0]?.open()
    await settled()
    expect(session.store.getState().uncertain?.result.seed).toBe(2)
    expect(session.store.getState().uncertain?.about.revision).toBe(2)
  })

  it('tell how far they are, can be stopped, and are asked for again', async () => {
    const { gates, wait } = createGates()
    const { host, session } = await started({
      estimate: async (of) => {
        await wait()
        return estimateOf(of)
      },
    })
    session.uncertainty.want(true)
    await settled()
    host.tell({ kind: 'progress', work: 'uncertainty', done: 30, total: 100, what: 'resampled runs' })
    expect(session.store.getState()).toMatchObject({ uncertaintyWork: { kind: 'running', done: 30, total: 100 }, importing: null })
    const there = session.uncertainty.settled()
    await session.uncertainty.cancel()
    expect(host.calls.at(-1)).toEqual({ name: 'work.cancel', input: { work: 'uncertainty' } })
    gates[0]?.fail(new Cancelled())
    expect(await there).toBe(false)
    expect(session.store.getState()).toMatchObject({ uncertain: null, uncertaintyWork: { kind: 'stopped' } })
    session.uncertainty.again()
    await settled()
    gates[1]?.open()
    expect(await session.uncertainty.settled()).toBe(true)
    expect(asked(host)).toEqual([1, 1])
  })

  it('that failed say why, and the results stay', async () => {
    const { session } = await started({
      estimate: () => {
        throw new Error('The worker ran out of memory.')
      },
    })
    session.uncertainty.want(true)
    await settled()
    expect(session.store.getState()).toMatchObject({
      evaluation: { kind: 'settled' },
      uncertaintyWork: { kind: 'failed', message: 'The worker ran out of memory.' },
      notice: null,
    })
    expect(session.store.getState().evaluated).not.toBeNull()
  })

  it('of another study are gone with it', async () => {
    const { session } = await started({ demo: { ...emptyStudy('demo'), runs: document.runs } })
    session.uncertainty.want(true)
    await settled()
    session.uncertainty.want(false)
    await session.open({ name: 'study.open-demo' })
    await settled()
    expect(session.store.getState()).toMatchObject({ uncertain: null, evaluated: { studyId: 'demo' } })
  })
})

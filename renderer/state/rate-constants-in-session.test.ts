import { describe, expect, it } from 'vitest'
import type { RateConstantsRead } from '../../shared-kinetics/contract/host-api.ts'
import { emptyStudy } from '../../shared-kinetics/contract/study-document.ts'
import type { RateConstantsResult, RateConstantTable } from '../../shared-kinetics/contract/study-result.ts'
import { runInfoOf } from '../../shared-kinetics/check-values/run-info-of.ts'
import { createMemoryHost, type MemoryHost, type MemoryHostOptions } from '../transport/testing/memory-transport.ts'
import { createStudySession, type StudySession } from './study-session.ts'
import { isStale } from './study-state.ts'

const table = (rows: number): RateConstantTable => ({
  rows: Array.from({ length: rows }, (_, i) => ({
    temperature_K: 300 + 10 * i,
    rateConstant: 1e-5 * 3 ** i,
    standardUncertainty: null,
    label: null,
    use: true,
  })),
  rateUnit: '1/s',
  temperatureUnitShown: 'K',
  predictAt_K: [],
  source: { kind: 'typed', name: null, sha256: null },
  notes: [],
})

/** Carries in its unit how many rows it was made of. */
const resultOf = ({ rows }: RateConstantTable): RateConstantsResult => ({ rateUnit: String(rows.length) }) as RateConstantsResult
const ratedRows = (session: StudySession): string | null => session.store.getState().rated?.result.rateUnit ?? null

const read = (rows: number): RateConstantsRead => ({ kind: 'table', table: table(rows) })
const refused = (fileName: string) => ({ fileName, line: 1, reason: 'No column holds a signal.', remedy: 'Name it.' })

const settled = async (): Promise<void> => {
  await new Promise((resolve) => {
    setTimeout(resolve, 0)
  })
}

async function started(options: MemoryHostOptions): Promise<{ readonly host: MemoryHost; readonly session: StudySession }> {
  const host = createMemoryHost({ evaluateTable: resultOf, ...options })
  const session = createStudySession(host)
  await session.start()
  await settled()
  return { host, session }
}

describe('results of a table of rate constants', () => {
  it('follow every change and undo, and go with the table', async () => {
    const { host, session } = await started({})
    expect(ratedRows(session)).toBeNull()
    await session.change({ kind: 'set-rate-constants', table: table(3) })
    await settled()
    expect([ratedRows(session), isStale(session.store.getState())]).toEqual(['3', false])
    const sent = session.change({ kind: 'set-rate-constants', table: table(4) })
    expect(isStale(session.store.getState())).toBe(true)
    await sent
    await settled()
    expect(ratedRows(session)).toBe('4')
    await session.undo()
    await settled()
    expect(ratedRows(session)).toBe('3')
    await session.undo()
    await settled()
    expect(ratedRows(session)).toBeNull()
    expect(host.calls.filter((call) => call.name === 'rate-constants.evaluate')).toHaveLength(3)
  })

  it('are asked for again when another window has changed the table', async () => {
    const { host, session } = await started({ document: { ...emptyStudy('study-1'), rateConstants: table(2) } })
    expect(ratedRows(session)).toBe('2')
    host.changeElsewhere({ kind: 'set-rate-constants', table: table(5) })
    await settled()
    expect(ratedRows(session)).toBe('5')
  })
})

describe('a table that is offered', () => {
  it('is a pasted text, read with what was stated, until it is withdrawn', async () => {
    const { host, session } = await started({ readTable: () => read(3) })
    await session.offerTable({ kind: 'text', text: '300 1e-5' }, { temperatureUnit: 'K' })
    expect(session.store.getState().offer).toMatchObject({ read: { kind: 'table' }, options: { temperatureUnit: 'K' } })
    expect(host.calls.at(-1)).toMatchObject({ name: 'rate-constants.read-text', input: { options: { temperatureUnit: 'K' } } })
    expect(session.store.getState().replica?.document.rateConstants).toBeNull()
    session.withdrawOffer()
    expect(session.store.getState().offer).toBeNull()
  })

  it('is a file that is refused as a run but reads as a table; the others stay refused', async () => {
    const { session } = await started({
      read: (names) => ({ runs: [], refused: names.map(refused) }),
      readTable: (name) => (name === 'k.csv' ? read(3) : { kind: 'refused', refused: refused(name), ask: null }),
    })
    await session.importFiles([new File(['x'], 'other.csv'), new File(['T k'], 'k.csv')])
    const { offer, refused: left } = session.store.getState()
    expect(offer).toMatchObject({ origin: { kind: 'file' }, read: { kind: 'table' } })
    expect(left.map((file) => file.fileName)).toEqual(['other.csv'])
  })

  it('is nothing that a study of runs is asked about', async () => {
    const { host, session } = await started({
      document: { ...emptyStudy('study-1'), runs: [runInfoOf('a', { label: 'a' })] },
      evaluate: () => ({
        levels: [],
        signal: null,
        signalsToChooseFrom: [],
        runs: [],
        profiles: [],
        kissinger: null,
        peakMethods: [],
        findings: [],
      }),
      read: (names) => ({ runs: [], refused: names.map(refused) }),
      readTable: () => read(3),
    })
    await session.importFiles([new File(['T k'], 'k.csv')])
    expect(session.store.getState()).toMatchObject({ offer: null, refused: [{ fileName: 'k.csv' }] })
    expect(host.calls.some((call) => call.name === 'rate-constants.read-file')).toBe(false)
  })

  it('is the next file dropped on a study that holds a table already', async () => {
    const { host, session } = await started({
      document: { ...emptyStudy('study-1'), rateConstants: table(2) },
      readTable: () => read(4),
    })
    await session.importFiles([new File(['T k'], 'more.csv')])
    expect(session.store.getState().offer).toMatchObject({ read: { kind: 'table', table: { rows: table(4).rows } } })
    expect(host.calls.some((call) => call.name === 'runs.import')).toBe(false)
  })
})

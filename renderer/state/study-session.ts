import { createStore, type StoreApi } from 'zustand/vanilla'
import type {
  HostEvent,
  HostTransport,
  RefusedFile,
  RequestAnswers,
  RequestInput,
  RequestName,
  StudySnapshot,
} from '../../shared-kinetics/contract/host-api.ts'
import { rateConstantLimits, type RateConstantReadOptions } from '../../shared-kinetics/contract/rate-constant-schema.ts'
import type { StudyChange } from '../../shared-kinetics/contract/study-change.ts'
import { Cancelled, KineticsError } from '../../shared-kinetics/errors.ts'
import { HostUnreachable } from '../transport/host-unreachable.ts'
import { continuedStudy } from './continued-study.ts'
import { createEvaluator } from './evaluator.ts'
import { importFiles } from './import-files.ts'
import { rebased, replicaOf, withChange, withFirstAnswered } from './replica.ts'
import { watchRateConstants } from './rate-constant-evaluator.ts'
import { isTable, readTable, type TableOrigin } from './table-offer.ts'
import { createUncertaintyAsker, type UncertaintyAsker } from './uncertainty-asker.ts'
import { initialStudyState, type StudyState } from './study-state.ts'

/** Everything a person can do to the study from this window. Every promise settles without throwing: what went wrong is in the store. */
export interface StudySession {
  readonly store: StoreApi<StudyState>
  readonly start: () => Promise<void>
  /** Shows the change at once and sends it; calls are sent one after the other. */
  readonly change: (change: StudyChange) => Promise<void>
  readonly undo: () => Promise<void>
  readonly redo: () => Promise<void>
  readonly open: (request: OpenRequest) => Promise<void>
  readonly importFiles: (files: readonly File[]) => Promise<void>
  readonly cancelImport: () => Promise<void>
  readonly cancelEvaluation: () => Promise<void>
  readonly evaluateAgain: () => void
  /** Intervals by resampling and from measured sources: asked for in the background while somebody looks at them. */
  readonly uncertainty: Pick<UncertaintyAsker, 'want' | 'again' | 'cancel' | 'settled'>
  /** The answer, or null when it could not be had (the store then says why). */
  readonly ask: <Name extends AskName>(name: Name, input: AskInput<Name>) => Promise<RequestAnswers[Name] | null>
  /** Reads a table of rate constants and offers it; what is offered already gives way. */
  readonly offerTable: (origin: TableOrigin, options?: RateConstantReadOptions) => Promise<void>
  readonly withdrawOffer: () => void
  readonly readRecent: () => Promise<void>
  readonly refresh: () => Promise<void>
  readonly dismissRefused: () => void
  readonly dismissNotice: () => void
  readonly say: (kind: 'failure' | 'done', text: string) => void
  readonly stop: () => void
}

export type OpenRequest =
  | { readonly name: 'study.new' }
  | { readonly name: 'study.open-demo' }
  | { readonly name: 'study.open-recent'; readonly studyId: string }

type AskName = 'study.save-copy' | 'results.export' | 'rate-constants.from-holds'

/** The revision is the session's own business. */
type AskInput<Name extends RequestName> = Omit<RequestInput<Name>, 'revision'>

/** A change that meets newer studies again and again is given up after so many tries. */
const triesOnConflict = 5

/** Refused files that are tried as tables of rate constants; a folder of damaged exports is not read twice. */
const tablesTried = 5

const isSavedStudy = (file: File): boolean => /\.rampfold$/i.test(file.name)

const isConflict = (error: unknown): boolean => error instanceof KineticsError && error.code === 'revision-conflict'

export function createStudySession(transport: HostTransport): StudySession {
  const store = createStore<StudyState>(() => initialStudyState)
  const set = (part: Partial<StudyState>): void => store.setState(part)
  const get = store.getState
  const evaluator = createEvaluator(transport, store, refresh)
  const uncertainty = createUncertaintyAsker(transport, store)
  watchRateConstants(transport, store, refresh)
  let steps: Promise<void> = Promise.resolve()
  let waitingSteps = 0
  let importControl: AbortController | null = null
  let unsubscribe: (() => void) | null = null

  /** Adds a step to the one line in which everything that needs the newest revision waits. */
  function inOrder(step: () => Promise<void>): Promise<void> {
    waitingSteps += 1
    steps = takeTurn(steps, step)
    return steps
  }

  async function takeTurn(before: Promise<void>, step: () => Promise<void>): Promise<void> {
    await before
    try {
      await step()
    } catch (error) {
      explain(error)
    }
    waitingSteps -= 1
    if (waitingSteps === 0) evaluator.wanted()
  }

  function adopt(snapshot: StudySnapshot): void {
    const { replica, evaluated } = get()
    if (replica !== null && snapshot.document.id === replica.confirmed.document.id && snapshot.revision < replica.confirmed.revision) return
    const sameStudy = evaluated?.studyId === snapshot.document.id
    const next = replica === null ? replicaOf(snapshot) : rebased(replica, snapshot)
    set({ replica: next, connection: { kind: 'ready' }, ...(sameStudy ? {} : { evaluated: null, uncertain: null }) })
  }

  function explain(error: unknown): void {
    if (error instanceof Cancelled) return
    if (error instanceof HostUnreachable) {
      set({ connection: { kind: 'lost', message: error.message } })
      return
    }
    set({ notice: { kind: 'failure', text: error instanceof Error ? error.message : String(error) } })
  }

  const revision = (): number => get().replica?.confirmed.revision ?? 0

  /** Sends what is pending, oldest first; what could not be sent stays pending and goes first next time. */
  async function sendPending(): Promise<void> {
    for (let change = get().replica?.pending[0]; change !== undefined; change = get().replica?.pending[0]) await sendChange(change)
  }

  async function sendChange(change: StudyChange): Promise<void> {
    for (let tries = 1; ; tries += 1) {
      try {
        const snapshot = await transport.call('study.change', { revision: revision(), change })
        settleFirst(snapshot)
        return
      } catch (error) {
        if (error instanceof HostUnreachable) throw error
        const current = await transport.call('study.read', {})
        if (!isConflict(error) || tries >= triesOnConflict) {
          settleFirst(current)
          throw error
        }
        adopt(current)
      }
    }
  }

  function settleFirst(snapshot: StudySnapshot): void {
    const { replica } = get()
    if (replica !== null) set({ replica: withFirstAnswered(replica, snapshot), connection: { kind: 'ready' } })
  }

  async function step(name: 'study.undo' | 'study.redo'): Promise<void> {
    try {
      adopt(await transport.call(name, { revision: revision() }))
    } catch (error) {
      if (!isConflict(error)) throw error
      adopt(await transport.call('study.read', {}))
      set({
        notice: { kind: 'failure', text: 'The study was changed in another window meanwhile. It has been read again; nothing was undone.' },
      })
    }
  }

  function refresh(): Promise<void> {
    return inOrder(async () => {
      const snapshot = await transport.call('study.read', {})
      const { connection, replica } = get()
      // After a lost connection the host may be a new process whose count of revisions starts again.
      if (connection.kind === 'ready') adopt(snapshot)
      else set({ replica: replicaOf(snapshot, replica?.pending ?? []), connection: { kind: 'ready' } })
      await sendPending()
    })
  }

  async function readRecent(): Promise<void> {
    try {
      set({ recent: (await transport.call('study.recent', {})).studies })
    } catch (error) {
      explain(error)
    }
  }

  function hear(event: HostEvent): void {
    if (event.kind === 'study-changed') {
      const isNews = event.revision > revision() || get().connection.kind === 'lost'
      if (isNews && waitingSteps === 0) void refresh()
      return
    }
    if (event.kind === 'not-saved') {
      set({ notice: { kind: 'failure', text: event.message } })
      return
    }
    if (event.work === 'evaluate') evaluator.heard(event)
    else if (event.work === 'uncertainty') uncertainty.heard(event)
    else if (get().importing?.phase === 'reading') {
      set({ importing: { phase: 'reading', what: event.what, done: event.done, total: event.total } })
    }
  }

  async function offerTable(origin: TableOrigin, options: RateConstantReadOptions = {}): Promise<void> {
    const offer = { origin, options, read: null }
    set({ offer })
    try {
      const read = await readTable(transport, origin, options)
      if (get().offer === offer) set({ offer: { ...offer, read } })
    } catch (error) {
      if (get().offer === offer && origin.kind === 'file') set({ offer: null })
      explain(error)
    }
  }

  /** The files still refused after the first that reads as a table of rate constants has been offered; only a study without runs takes one. */
  async function withoutTable(refused: readonly RefusedFile[], files: readonly File[]): Promise<readonly RefusedFile[]> {
    if (get().replica?.document.runs.length !== 0) return refused
    for (const one of refused.slice(0, tablesTried)) {
      const file = files.find(({ name }) => name === one.fileName)
      if (file === undefined || file.size > rateConstantLimits.bytes) continue
      const origin = { kind: 'file', file } as const
      const read = await readTable(transport, origin, {})
      if (!isTable(read)) continue
      set({ offer: { origin, options: {}, read } })
      return refused.filter((other) => other !== one)
    }
    return refused
  }

  return {
    store,
    async start() {
      unsubscribe ??= transport.subscribe(hear, explain)
      await refresh()
      await readRecent()
      const { replica, recent } = get()
      set({ continued: continuedStudy(recent, replica?.document.id, new Date()) })
    },
    change(change) {
      const { replica } = get()
      if (replica === null) return Promise.resolve()
      set({ replica: withChange(replica, change) })
      return inOrder(sendPending)
    },
    undo: () => inOrder(async () => step('study.undo')),
    redo: () => inOrder(async () => step('study.redo')),
    open: (request) =>
      inOrder(async () => {
        const answer =
          request.name === 'study.open-recent'
            ? await transport.call('study.open-recent', { studyId: request.studyId })
            : await transport.call(request.name, {})
        set({ refused: [], notice: null, offer: null, continued: null })
        adopt(answer)
      }),
    offerTable,
    withdrawOffer: () => set({ offer: null }),
    async importFiles(files) {
      const [only] = files
      const holdsTable = (get().replica?.document.rateConstants ?? null) !== null && get().replica?.document.runs.length === 0
      if (holdsTable && files.length === 1 && only !== undefined && !isSavedStudy(only)) {
        // Runs have no place beside such a table, so the file can only be another one.
        await offerTable({ kind: 'file', file: only })
        return
      }
      if (importControl !== null) {
        set({ notice: { kind: 'failure', text: 'Files are being read already. Wait until they are in, or cancel.' } })
        return
      }
      importControl = new AbortController()
      try {
        const answer = await importFiles(transport, files, importControl.signal, (importing) => set({ importing }))
        if (answer.snapshot !== null) adopt(answer.snapshot)
        set({ refused: await withoutTable(answer.refused, files) })
        evaluator.wanted()
      } catch (error) {
        explain(error)
      } finally {
        importControl = null
        set({ importing: null })
      }
    },
    async cancelImport() {
      importControl?.abort()
      if (get().importing?.phase !== 'reading') return
      try {
        await transport.call('work.cancel', { work: 'import' })
      } catch (error) {
        explain(error)
      }
    },
    cancelEvaluation: () => evaluator.cancel(),
    evaluateAgain: () => evaluator.again(),
    uncertainty,
    async ask<Name extends AskName>(name: Name, input: AskInput<Name>) {
      let answer: RequestAnswers[Name] | null = null
      await inOrder(async () => {
        const full = name === 'study.save-copy' ? input : { ...input, revision: revision() }
        answer = await transport.call(name, full as RequestInput<Name>)
      })
      return answer
    },
    readRecent,
    refresh,
    dismissRefused: () => set({ refused: [] }),
    dismissNotice: () => set({ notice: null }),
    say: (kind, text) => set({ notice: { kind, text } }),
    stop() {
      unsubscribe?.()
      unsubscribe = null
    },
  }
}

import type { StoreApi } from 'zustand/vanilla'
import type { HostEvent, HostTransport } from '../../shared-kinetics/contract/host-api.ts'
import { Cancelled, KineticsError } from '../../shared-kinetics/errors.ts'
import { HostUnreachable } from '../transport/host-unreachable.ts'
import type { StudyState } from './study-state.ts'

export interface UncertaintyAsker {
  /** Whether somebody looks at where it is shown; as long as one does, it is asked for behind every evaluation that settles. */
  want(isWanted: boolean): void
  /** Asks even so, after a stop or a failure. */
  again(): void
  cancel(): Promise<void>
  /** Waits for what is on its way, and tells whether the intervals of the results at hand are there. */
  settled(): Promise<boolean>
  heard(event: Extract<HostEvent, { kind: 'progress' }>): void
}

/** Gets the intervals that take longer than an evaluation, behind it and only for results that are of the study as it stands. An answer that a newer revision overtook is dropped. */
export function createUncertaintyAsker(transport: HostTransport, store: StoreApi<StudyState>): UncertaintyAsker {
  const set = (part: Partial<StudyState>): void => store.setState(part)
  let isWanted = false
  let latest = 0
  let askedFor: string | null = null
  let onItsWay: Promise<void> = Promise.resolve()

  async function estimate(about: NonNullable<StudyState['evaluated']>): Promise<void> {
    latest += 1
    const own = latest
    set({ uncertaintyWork: { kind: 'running', done: 0, total: 0, what: '' } })
    try {
      const { result } = await transport.call('study.uncertainty', { revision: about.revision })
      if (own === latest) set({ uncertain: { about, result }, uncertaintyWork: { kind: 'settled' } })
    } catch (error) {
      if (own === latest) settleFailure(error)
    }
  }

  function settleFailure(error: unknown): void {
    if (error instanceof Cancelled || (error instanceof KineticsError && error.code === 'revision-conflict')) {
      set({ uncertaintyWork: { kind: 'stopped' } })
    } else if (error instanceof HostUnreachable) {
      askedFor = null
      set({ uncertaintyWork: { kind: 'stopped' }, connection: { kind: 'lost', message: error.message } })
    } else {
      set({ uncertaintyWork: { kind: 'failed', message: error instanceof Error ? error.message : String(error) } })
    }
  }

  /** The study, its results or who looks may have changed: what is at hand or on its way is asked for no second time. */
  function wanted(): void {
    const { replica, evaluated, evaluation, connection } = store.getState()
    if (!isWanted || evaluated === null || replica === null || connection.kind !== 'ready') return
    const { revision, document } = replica.confirmed
    const isOfStudy = evaluated.studyId === document.id && evaluated.revision === revision && replica.pending.length === 0
    const key = `${evaluated.studyId} ${evaluated.revision}`
    if (evaluation.kind !== 'settled' || !isOfStudy || evaluated.result.profiles.length === 0 || key === askedFor) return
    askedFor = key
    onItsWay = estimate(evaluated)
  }

  store.subscribe((now, before) => {
    if (now.evaluated !== before.evaluated || now.evaluation !== before.evaluation || now.replica !== before.replica) wanted()
  })

  return {
    want(next) {
      isWanted = next
      wanted()
    },
    again() {
      askedFor = null
      wanted()
    },
    async cancel() {
      await transport.call('work.cancel', { work: 'uncertainty' }).then(undefined, settleFailure)
    },
    async settled() {
      await onItsWay
      const { uncertain, evaluated } = store.getState()
      return uncertain !== null && uncertain.about === evaluated
    },
    heard(event) {
      if (store.getState().uncertaintyWork.kind !== 'running') return
      set({ uncertaintyWork: { kind: 'running', done: event.done, total: event.total, what: event.what } })
    },
  }
}

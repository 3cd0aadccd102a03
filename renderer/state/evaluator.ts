import type { StoreApi } from 'zustand/vanilla'
import type { HostEvent, HostTransport } from '../../shared-kinetics/contract/host-api.ts'
import { Cancelled, KineticsError } from '../../shared-kinetics/errors.ts'
import { HostUnreachable } from '../transport/host-unreachable.ts'
import type { StudyState } from './study-state.ts'

export interface Evaluator {
  /** The study may have changed: asks for results unless those at hand or on the way are of this revision. */
  wanted(): void
  /** Asks even so, after a stop or a failure. */
  again(): void
  cancel(): Promise<void>
  heard(event: Extract<HostEvent, { kind: 'progress' }>): void
}

/** Keeps results in step with the confirmed study. The host cancels an older evaluation when a newer one is asked for; its late answer is dropped here. */
export function createEvaluator(transport: HostTransport, store: StoreApi<StudyState>, refresh: () => Promise<void>): Evaluator {
  const set = (part: Partial<StudyState>): void => store.setState(part)
  let latest = 0
  let askedFor: string | null = null

  async function evaluate(revision: number, studyId: string): Promise<void> {
    latest += 1
    const own = latest
    set({ evaluation: { kind: 'running', done: 0, total: 0, what: '' } })
    try {
      const answer = await transport.call('study.evaluate', { revision })
      if (own === latest) set({ evaluated: { studyId, revision: answer.revision, result: answer.result }, evaluation: { kind: 'settled' } })
    } catch (error) {
      if (own === latest) await settleFailure(error)
    }
  }

  async function settleFailure(error: unknown): Promise<void> {
    if (error instanceof KineticsError && error.code === 'revision-conflict') {
      askedFor = null
      await refresh()
    } else if (error instanceof Cancelled) {
      set({ evaluation: { kind: 'stopped' } })
    } else if (error instanceof HostUnreachable) {
      askedFor = null
      set({ evaluation: { kind: 'settled' }, connection: { kind: 'lost', message: error.message } })
    } else {
      set({ evaluation: { kind: 'failed', message: error instanceof Error ? error.message : String(error) } })
    }
  }

  function wanted(): void {
    const { replica, connection } = store.getState()
    if (replica === null || connection.kind !== 'ready') return
    const { revision, document } = replica.confirmed
    const key = `${document.id} ${revision}`
    if (key === askedFor) return
    askedFor = key
    if (document.runs.length > 0) {
      void evaluate(revision, document.id)
      return
    }
    latest += 1
    set({ evaluated: null, evaluation: { kind: 'settled' } })
  }

  return {
    wanted,
    again() {
      askedFor = null
      wanted()
    },
    async cancel() {
      await transport.call('work.cancel', { work: 'evaluate' }).then(undefined, settleFailure)
    },
    heard(event) {
      if (store.getState().evaluation.kind !== 'running') return
      set({ evaluation: { kind: 'running', done: event.done, total: event.total, what: event.what } })
    },
  }
}

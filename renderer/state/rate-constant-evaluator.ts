import type { StoreApi } from 'zustand/vanilla'
import type { HostTransport } from '../../shared-kinetics/contract/host-api.ts'
import { Cancelled, KineticsError } from '../../shared-kinetics/errors.ts'
import { HostUnreachable } from '../transport/host-unreachable.ts'
import type { StudyState } from './study-state.ts'

/** Keeps what follows from the table of rate constants in step with the confirmed study; a study without such a table has nothing of the kind. */
export function watchRateConstants(transport: HostTransport, store: StoreApi<StudyState>, refresh: () => Promise<void>): void {
  let latest = 0
  let askedFor: string | null = null

  async function evaluate(studyId: string, revision: number): Promise<void> {
    latest += 1
    const own = latest
    try {
      const { result } = await transport.call('rate-constants.evaluate', { revision })
      if (own === latest) store.setState({ rated: { studyId, revision, result } })
    } catch (error) {
      if (own === latest) await settleFailure(error)
    }
  }

  async function settleFailure(error: unknown): Promise<void> {
    if (error instanceof KineticsError && error.code === 'revision-conflict') {
      askedFor = null
      await refresh()
    } else if (error instanceof HostUnreachable) {
      askedFor = null
      store.setState({ connection: { kind: 'lost', message: error.message } })
    } else if (!(error instanceof Cancelled)) {
      const text = error instanceof Error ? error.message : String(error)
      store.setState({ notice: { kind: 'failure', text: `The rate constants could not be evaluated: ${text}` } })
    }
  }

  store.subscribe((now, before) => {
    if (now.replica === before.replica && now.connection === before.connection) return
    const { replica, connection, rated } = now
    if (replica === null || connection.kind !== 'ready') return
    const { revision, document } = replica.confirmed
    const key = document.rateConstants === null ? null : `${document.id} ${revision}`
    if (rated !== null && (key === null || rated.studyId !== document.id)) {
      latest += 1
      store.setState({ rated: null })
    }
    if (key === askedFor || replica.pending.length > 0) return
    askedFor = key
    if (key !== null) void evaluate(document.id, revision)
  })
}

import type { StudySnapshot } from '../../shared-kinetics/contract/host-api.ts'
import { applyChange, type StudyChange } from '../../shared-kinetics/contract/study-change.ts'
import type { StudyDocument } from '../../shared-kinetics/contract/study-document.ts'

/** The study as this window holds it: what the host last confirmed, and the changes made here that it has not answered yet. */
export interface Replica {
  readonly confirmed: StudySnapshot
  readonly pending: readonly StudyChange[]
  /** `confirmed.document` with `pending` applied: what the screen shows. */
  readonly document: StudyDocument
}

export function replicaOf(confirmed: StudySnapshot, pending: readonly StudyChange[] = []): Replica {
  return { confirmed, pending, document: pending.reduce(applyChange, confirmed.document) }
}

/** The replica with one more change made here, shown at once. */
export const withChange = (replica: Replica, change: StudyChange): Replica => replicaOf(replica.confirmed, [...replica.pending, change])

/** The replica after the host answered the oldest pending change, whether it took it or refused it. */
export const withFirstAnswered = (replica: Replica, confirmed: StudySnapshot): Replica => replicaOf(confirmed, replica.pending.slice(1))

/** The replica on a study read anew (another window changed it): pending changes stand on top of it again. */
export const rebased = (replica: Replica, confirmed: StudySnapshot): Replica => replicaOf(confirmed, replica.pending)

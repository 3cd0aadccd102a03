import type { RecentStudy, RefusedFile } from '../../shared-kinetics/contract/host-api.ts'
import type { RateConstantsResult, StudyResult, UncertaintyResult } from '../../shared-kinetics/contract/study-result.ts'
import type { Replica } from './replica.ts'
import type { TableOffer } from './table-offer.ts'

export type Connection = { readonly kind: 'connecting' } | { readonly kind: 'ready' } | { readonly kind: 'lost'; readonly message: string }

export type Evaluation =
  | { readonly kind: 'settled' }
  | { readonly kind: 'running'; readonly done: number; readonly total: number; readonly what: string }
  | { readonly kind: 'stopped' }
  | { readonly kind: 'failed'; readonly message: string }

/** Files on their way in: first sent (bytes), then read by the host (its own count). */
export interface ImportWork {
  readonly phase: 'sending' | 'reading'
  readonly what: string
  readonly done: number
  readonly total: number
}

export interface Evaluated {
  readonly studyId: string
  readonly revision: number
  readonly result: StudyResult
}

/** What follows from the table of rate constants. */
export interface Rated {
  readonly studyId: string
  readonly revision: number
  readonly result: RateConstantsResult
}

/** Intervals by resampling and from measured sources, and the results that they are about. */
export interface Uncertain {
  readonly about: Evaluated
  readonly result: UncertaintyResult
}

/** Document and results as this window knows them; what is looked at and how is in `view-store`. */
export interface StudyState {
  readonly connection: Connection
  readonly replica: Replica | null
  readonly evaluated: Evaluated | null
  readonly evaluation: Evaluation
  /** May be about earlier results than those at hand. */
  readonly uncertain: Uncertain | null
  readonly uncertaintyWork: Evaluation
  /** null in a study without a table of rate constants. */
  readonly rated: Rated | null
  /** A table that waits to be taken into the study. */
  readonly offer: TableOffer | null
  readonly importing: ImportWork | null
  readonly refused: readonly RefusedFile[]
  /** One sentence about the last thing that went wrong or was done; null when dismissed. */
  readonly notice: { readonly kind: 'failure' | 'done'; readonly text: string } | null
  readonly recent: readonly RecentStudy[]
  /** The stored study that this window opened on, with when it was last changed before; null where it began with an empty one. */
  readonly continued: RecentStudy | null
}

export const initialStudyState: StudyState = {
  connection: { kind: 'connecting' },
  replica: null,
  evaluated: null,
  evaluation: { kind: 'settled' },
  uncertain: null,
  uncertaintyWork: { kind: 'settled' },
  rated: null,
  offer: null,
  importing: null,
  refused: [],
  notice: null,
  recent: [],
  continued: null,
}

/** Whether what was worked out apart from an evaluation is about another state of the study than the document's: a number of it must not stand beside a setting of now. */
export const isUncertaintyBehind = (state: StudyState): boolean =>
  state.uncertain !== null && (isStale(state) || state.uncertain.about !== state.evaluated)

/** Whether the results on the screen belong to an earlier state of the study. */
export function isStale(state: StudyState): boolean {
  const { evaluated, rated, replica } = state
  if (replica === null || (evaluated === null && rated === null)) return false
  const isBehind = (results: { readonly revision: number } | null): boolean =>
    results !== null && results.revision !== replica.confirmed.revision
  return replica.pending.length > 0 || isBehind(evaluated) || isBehind(rated)
}

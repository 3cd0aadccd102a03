import type { MethodId } from '../isoconversional/result.ts'
import type { ImportNote, RunInfo, Window } from '../series/run.ts'
import type { SignalQuantity } from '../series/signal-quantity.ts'

export const baselineKinds = ['area-proportional', 'straight'] as const
export type BaselineKind = (typeof baselineKinds)[number]

/** Every setting that a number of the study depends on. */
export interface AnalysisSettings {
  /** null: the first of `signalQuantities` that every used run has. */
  readonly signal: SignalQuantity | null
  /** Ascending, inside (0, 1). */
  readonly levels: readonly number[]
  /** null: all that apply. */
  readonly methods: readonly MethodId[] | null
  /** For all runs that have none of their own; null: found in the data. */
  readonly window: Window | null
  /** For heat flow only. */
  readonly baseline: BaselineKind
  /** Range of conversion over which a mean Ea is given, ends included. */
  readonly meanRange: readonly [number, number]
}

/** What `evaluateStudy` works on, besides the columns: the part of the study document that numbers depend on. */
export interface StudyInput {
  readonly runs: readonly RunInfo[]
  readonly settings: AnalysisSettings
  /** Notes that belong to no run: files that were left out on request. */
  readonly importNotes?: readonly ImportNote[]
  /** Nobody will look at a chart of the runs or of Phi(Ea): their curves are left empty. */
  readonly withoutCurves?: boolean
}

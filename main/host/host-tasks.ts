import type { MethodId, TaskContext } from '../../shared-kinetics/isoconversional/result.ts'
import type { RunColumns, RunInfo } from '../../shared-kinetics/series/run.ts'
import type { HoldOptions } from '../../shared-kinetics/rate-constants/hold-rows.ts'
import type { RateConstantTable } from '../../shared-kinetics/rate-constants/rate-constant-table.ts'
import type { HoldAtLevels } from '../../shared-kinetics/rate-constants/rate-constants-of-holds.ts'
import type { ReactionModelCode } from '../../shared-kinetics/reaction-models/registry.ts'
import type { RateConstantsResult } from '../../shared-kinetics/tasks/rate-constants-result.ts'
import type { DrawOrder } from '../../shared-kinetics/tasks/draw-uncertainty.ts'
import type { UncertaintyEstimate } from '../../shared-kinetics/tasks/estimate-uncertainty.ts'
import type { StudyInput } from '../../shared-kinetics/tasks/study-input.ts'
import type { IntervalResult, StudyResult } from '../../shared-kinetics/tasks/study-result.ts'
import type { UncertaintySettings } from '../../shared-kinetics/uncertainty/measured-sources.ts'
import type { DrawRange } from '../../shared-kinetics/uncertainty/monte-carlo.ts'
import type { RefusedFile } from '../../shared-kinetics/contract/host-api.ts'
import type { SavedCopy } from '../study/saved-copy.ts'

export interface ImportedRun {
  readonly info: RunInfo
  readonly columns: RunColumns
}

/** Everything a worker can be asked: input and answer of each task, as they travel over worker_threads. */
export interface HostTasks {
  'evaluate-study': {
    input: { readonly study: StudyInput; readonly columns: ReadonlyMap<string, RunColumns> }
    answer: StudyResult
  }
  /** What resampling and the budget say, and what draws are to be made from; as slow as it is, it looks at its flag often. */
  'estimate-uncertainty': {
    input: { readonly study: StudyInput; readonly columns: ReadonlyMap<string, RunColumns>; readonly uncertainty: UncertaintySettings }
    answer: UncertaintyEstimate
  }
  /** A share of the draws. */
  'draw-energies': { input: DrawOrder & { readonly range: DrawRange }; answer: readonly Float64Array[] }
  /** All shares to intervals. */
  'intervals-of-draws': {
    input: { readonly order: DrawOrder; readonly shares: readonly (readonly Float64Array[])[]; readonly seed: number }
    answer: ReadonlyMap<MethodId, IntervalResult>
  }
  /** Fits every reaction model to every hold: seconds with a thousand levels. */
  'rate-constants-of-holds': {
    input: { readonly holds: readonly HoldAtLevels[]; readonly model: ReactionModelCode; readonly options: HoldOptions }
    answer: RateConstantTable
  }
  'evaluate-rate-constants': { input: { readonly table: RateConstantTable }; answer: RateConstantsResult }
  /** Reads one export. A file that cannot be used is an answer, not a failure. */
  'import-file': {
    input: { readonly fileName: string; readonly bytes: Uint8Array }
    answer: { readonly kind: 'runs'; readonly runs: readonly ImportedRun[] } | { readonly kind: 'refused'; readonly refused: RefusedFile }
  }
  'pack-saved-copy': { input: SavedCopy; answer: Uint8Array }
  'open-saved-copy': { input: { readonly bytes: Uint8Array }; answer: SavedCopy }
}

export type TaskName = keyof HostTasks
export type TaskInput<Name extends TaskName> = HostTasks[Name]['input']
export type TaskAnswer<Name extends TaskName> = HostTasks[Name]['answer']

/** Task name to function: the same table runs in a worker and, in tests, in this thread. */
export type TaskTable = {
  readonly [Name in TaskName]: (input: TaskInput<Name>, context: TaskContext) => TaskAnswer<Name> | Promise<TaskAnswer<Name>>
}

export interface TaskOptions {
  /** Raised: the task stops at its next look and the promise rejects with `Cancelled`. */
  readonly signal?: AbortSignal
  readonly progress?: (done: number, total: number) => void
}

/** Where tasks run. */
export interface TaskPool {
  /** Rejects with what the task threw (`KineticsError` and `Cancelled` keep their type), or an `Error` when its worker died. */
  run<Name extends TaskName>(name: Name, input: TaskInput<Name>, options?: TaskOptions): Promise<TaskAnswer<Name>>
  /** Ends all workers; tasks that wait or run are rejected with `Cancelled`. */
  close(): Promise<void>
}

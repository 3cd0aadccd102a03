import type { FileOut, RequestAnswers, RequestInput, RequestName } from '../../../shared-kinetics/contract/host-api.ts'
import type { StudyDocument } from '../../../shared-kinetics/contract/study-document.ts'
import type { StudyResult } from '../../../shared-kinetics/tasks/study-result.ts'
import type { EventHub } from '../event-hub.ts'
import type { Evaluation } from '../evaluation.ts'
import type { TaskPool } from '../host-tasks.ts'
import type { Uploads } from '../uploads.ts'
import type { Workspace } from '../workspace.ts'

/** One function a request; the only place where requests are answered, whichever way they come. */
export type HandlerTable = {
  readonly [Name in RequestName]: (input: RequestInput<Name>) => RequestAnswers[Name] | Promise<RequestAnswers[Name]>
}

export type Shell = RequestAnswers['program.describe']['shell']

export interface DemoSeries {
  /** Name of the study the series opens as. */
  readonly name: string
  files(): readonly { readonly fileName: string; readonly bytes: Uint8Array }[]
}

export interface ExportSource {
  readonly document: StudyDocument
  readonly result: StudyResult
  readonly program: { readonly name: 'rampfold'; readonly version: string }
}

/** The parts of the program that the host hands work to. */
export interface ProgramParts {
  readonly demo: DemoSeries
  readonly exportResults: (source: ExportSource, format: RequestInput<'results.export'>['format']) => readonly FileOut[]
}

/** Imports that run now, so that `work.cancel` and a newly opened study can stop them. */
export type RunningImports = Set<AbortController>

export interface HandlerContext {
  readonly workspace: Workspace
  readonly pool: TaskPool
  readonly uploads: Uploads
  readonly events: EventHub
  readonly evaluation: Evaluation
  readonly imports: RunningImports
  readonly parts: ProgramParts
  readonly version: string
  readonly shell: Shell
  readonly randomId: () => string
}

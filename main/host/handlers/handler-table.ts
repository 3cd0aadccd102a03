import type { FileOut, TableStyle, RequestAnswers, RequestInput, RequestName } from '../../../shared-kinetics/contract/host-api.ts'
import type { DemoSeries } from '../../demo/demo-series.ts'
import type { ExportSource } from '../../export/activation-json.ts'
import type { RateConstantsSource } from '../../export/rate-constants-json.ts'
import type { ExportFormat } from '../../export/export-results.ts'
import type { EventHub } from '../event-hub.ts'
import type { Evaluation } from '../evaluation.ts'
import type { TaskPool } from '../host-tasks.ts'
import type { Uncertainty } from '../uncertainty.ts'
import type { Uploads } from '../uploads.ts'
import type { Workspace } from '../workspace.ts'

/** One function a request; the only place where requests are answered, whichever way they come. */
export type HandlerTable = {
  readonly [Name in RequestName]: (input: RequestInput<Name>) => RequestAnswers[Name] | Promise<RequestAnswers[Name]>
}

export type Shell = RequestAnswers['program.describe']['shell']

/** The parts of the program that the host hands work to; the real ones are in `program-parts.ts`. */
export interface ProgramParts {
  demoSeries(): DemoSeries
  exportResults(source: ExportSource, format: ExportFormat, style?: TableStyle): readonly FileOut[]
  exportRateConstants(source: RateConstantsSource, format: ExportFormat, style?: TableStyle): readonly FileOut[]
}

/** Imports that run now, so that `work.cancel` and a newly opened study can stop them. */
export type RunningImports = Set<AbortController>

export interface HandlerContext {
  readonly workspace: Workspace
  readonly pool: TaskPool
  readonly uploads: Uploads
  readonly events: EventHub
  readonly evaluation: Evaluation
  readonly uncertainty: Uncertainty
  readonly imports: RunningImports
  readonly parts: ProgramParts
  readonly version: string
  readonly shell: Shell
  readonly randomId: () => string
}

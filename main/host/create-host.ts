import { randomUUID } from 'node:crypto'
import type { HostEvent, HostTransport, RequestAnswers, RequestInput, RequestName } from '../../shared-kinetics/contract/host-api.ts'
import { decodeMessage } from '../../shared-kinetics/contract/wire.ts'
import { encodeAnswer, encodeFailure } from '../../shared-kinetics/contract/wire-answer.ts'
import { openStudyStore, type StudyStore } from '../study/study-store.ts'
import { createEvaluation } from './evaluation.ts'
import { createEventHub } from './event-hub.ts'
import { evaluateHandlers } from './handlers/evaluate.ts'
import type { HandlerTable, ProgramParts, RunningImports, Shell } from './handlers/handler-table.ts'
import { importHandlers } from './handlers/import.ts'
import { rateConstantHandlers } from './handlers/rate-constants.ts'
import { studyHandlers } from './handlers/study.ts'
import { uploadHandlers } from './handlers/upload.ts'
import type { TaskPool } from './host-tasks.ts'
import { checkRequestName, parseRequest } from './parse-request.ts'
import { programParts } from './program-parts.ts'
import { createUncertainty } from './uncertainty.ts'
import { createUploads } from './uploads.ts'
import { createWorkspace, type Workspace } from './workspace.ts'

export interface HostOptions {
  /** Where studies are kept and the last one is found again; null keeps nothing. */
  readonly dataFolder: string | null
  /** Closed together with the host. */
  readonly pool: TaskPool
  /** The program's own by default. */
  readonly parts?: ProgramParts
  readonly version: string
  readonly shell: Shell
  /** Told in words what could not be kept or recovered; standard error by default. */
  readonly warn?: (message: string) => void
  /** Milliseconds since 1970. */
  readonly now?: () => number
  /** Lower-case letters, digits and hyphens. */
  readonly randomId?: () => string
}

/** The host: one study, one table of handlers, whichever shell stands in front of it. */
export interface Host extends HostTransport {
  /** Answers one encoded request; whatever goes wrong is an encoded failure, never a rejection. */
  answer(name: string, body: Uint8Array): Promise<Uint8Array>
  call<Name extends RequestName>(name: Name, input: RequestInput<Name>): Promise<RequestAnswers[Name]>
  subscribe(listener: (event: HostEvent) => void): () => void
  /** Resolves when the last state is on the disk and the workers have ended. `save: false` leaves the disk as it is. */
  close(options?: { readonly save: boolean }): Promise<void>
}

/** A host at work at once; requests wait until the study that was open last is there again. */
export function createHost(options: HostOptions): Host {
  const { pool, parts = programParts, version, shell, now = Date.now, randomId = randomUUID } = options
  const warn = options.warn ?? ((message: string) => void process.stderr.write(`${message}\n`))
  const events = createEventHub(now)
  const uploads = createUploads(randomId)
  const imports: RunningImports = new Set()

  const open = async (): Promise<{ workspace: Workspace; handlers: HandlerTable; cancelAll: () => void }> => {
    const store = await openStore(options.dataFolder, randomId(), now, warn)
    const workspace = await createWorkspace({ store, events, randomId, warn })
    const evaluation = createEvaluation(workspace, pool, events, shell === 'command-line')
    const uncertainty = createUncertainty(workspace, pool, events)
    const context = { workspace, pool, uploads, events, evaluation, uncertainty, imports, parts, version, shell, randomId }
    const handlers = {
      ...studyHandlers(context),
      ...uploadHandlers(context),
      ...importHandlers(context),
      ...evaluateHandlers(context),
      ...rateConstantHandlers(context),
    }
    const cancelAll = (): void => {
      evaluation.cancel()
      uncertainty.cancel()
      for (const running of imports) running.abort()
    }
    return { workspace, handlers, cancelAll }
  }
  const ready = open()
  // Asked for by each request below; without a request nobody else would hear of a failure.
  ready.catch(() => undefined)

  const run = async <Name extends RequestName>(name: Name, input: RequestInput<Name>): Promise<RequestAnswers[Name]> => {
    const { handlers } = await ready
    return handlers[name](input)
  }
  let closing: Promise<void> | null = null

  return {
    answer: async (name, body) => {
      try {
        const known = checkRequestName(name)
        return encodeAnswer(await run(known, parseRequest(known, decodeMessage(body))))
      } catch (error) {
        return encodeFailure(error)
      }
    },
    call: async (name, input) => run(name, parseRequest(name, input)),
    subscribe: (listener) => events.subscribe(listener),
    close: async ({ save } = { save: true }) => {
      closing ??= (async () => {
        const opened = await ready.catch(() => null)
        opened?.cancelAll()
        uploads.close()
        await opened?.workspace.close({ save })
        await pool.close()
      })()
      return closing
    },
  }
}

/** A folder that cannot be used costs the keeping of studies, not the work. */
async function openStore(
  dataFolder: string | null,
  token: string,
  now: () => number,
  warn: (message: string) => void,
): Promise<StudyStore | null> {
  if (dataFolder === null) return null
  try {
    return await openStudyStore(dataFolder, token, now)
  } catch (error) {
    const why = error instanceof Error ? error.message : String(error)
    warn(`Studies are not kept: the folder ${dataFolder} cannot be used (${why}). Set RAMPFOLD_DATA to one that can.`)
    return null
  }
}

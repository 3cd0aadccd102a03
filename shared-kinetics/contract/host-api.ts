import * as z from 'zod/mini'
import type { RateConstantTable } from '../rate-constants/rate-constant-table.ts'
import type { RateConstantsResult } from '../tasks/rate-constants-result.ts'
import type { StudyResult, UncertaintyResult } from '../tasks/study-result.ts'
import type { DeepReadonly } from './deep-readonly.ts'
import { fromHoldsSchema, rateConstantLimits, rateConstantReadOptionsSchema } from './rate-constant-schema.ts'
import { studyChangeSchema } from './study-change.ts'
import type { StudyDocument } from './study-document.ts'

/** Largest piece of a file that one `upload.append` carries. */
export const uploadChunkBytes = 1 << 20
/** Largest single export that is read; a larger one is refused with a word. */
export const largestUploadBytes = 512 * 2 ** 20

const id = z.string().check(z.regex(/^[0-9a-zA-Z-]{1,64}$/))
const bytes = z.instanceof(Uint8Array)
const nothing = z.strictObject({})
const tableStyleSchema = z
  .strictObject({ decimal: z.enum(['.', ',']), separator: z.enum([',', ';', '\t']) })
  .check(z.refine((style) => style.decimal !== style.separator, 'decimal sign and separator differ'))

/**
 * Every request a page, a desktop window or the command line can make, with the schema its input is parsed by.
 * One table of handlers in `main/host/handlers` answers them; IPC and HTTP only carry them.
 */
export const requestSchemas = {
  'program.describe': nothing,
  'study.read': nothing,
  'study.change': z.strictObject({ revision: z.int(), change: studyChangeSchema }),
  'study.undo': z.strictObject({ revision: z.int() }),
  'study.redo': z.strictObject({ revision: z.int() }),
  'study.new': nothing,
  'study.open-demo': nothing,
  'study.recent': nothing,
  'study.open-recent': z.strictObject({ studyId: id }),
  'study.save-copy': nothing,
  'study.evaluate': z.strictObject({ revision: z.int() }),
  /** Intervals by resampling and from measured sources, with their budget: takes longer than an evaluation, and is asked for apart. */
  'study.uncertainty': z.strictObject({ revision: z.int() }),
  'upload.begin': z.strictObject({
    fileName: z.string().check(z.minLength(1), z.maxLength(400)),
    byteLength: z.int().check(z.nonnegative()),
  }),
  'upload.append': z.strictObject({
    uploadId: id,
    bytes: bytes.check(z.refine((b) => b.byteLength <= uploadChunkBytes, 'a piece of an upload is at most 1 MiB')),
  }),
  'upload.discard': z.strictObject({ uploadId: id }),
  /** `noteLeftOut`: files that cannot be used are noted in the study, so that its review and every export name them. */
  'runs.import': z.strictObject({ uploadIds: z.array(id).check(z.minLength(1), z.maxLength(500)), noteLeftOut: z.optional(z.boolean()) }),
  'work.cancel': z.strictObject({ work: z.enum(['import', 'evaluate', 'uncertainty']) }),
  /** A pasted or typed table into rows, units told or asked for; nothing is changed: `set-rate-constants` puts the table into the study. */
  'rate-constants.read-text': z.strictObject({
    text: z.string().check(z.maxLength(rateConstantLimits.characters)),
    source: z.optional(z.enum(['typed', 'pasted'])),
    options: z.optional(rateConstantReadOptionsSchema),
  }),
  'rate-constants.read-file': z.strictObject({ uploadId: id, options: z.optional(rateConstantReadOptionsSchema) }),
  /** Rate constants of the isothermal runs under a chosen model, as a table; nothing is changed. */
  'rate-constants.from-holds': fromHoldsSchema,
  'rate-constants.evaluate': z.strictObject({ revision: z.int() }),
  /** `of`: where left out, the table of rate constants in a study without runs, else the runs. */
  'results.export': z.strictObject({
    revision: z.int(),
    format: z.enum(['csv', 'json', 'svg']),
    tableStyle: z.optional(tableStyleSchema),
    of: z.optional(z.enum(['activation', 'rate-constants'])),
    /** With the intervals that `study.uncertainty` gives. */
    withUncertainty: z.optional(z.boolean()),
  }),
} as const

export type RequestName = keyof typeof requestSchemas
export type RequestInput<Name extends RequestName> = DeepReadonly<z.infer<(typeof requestSchemas)[Name]>>

/** How numbers and cells of an exported table are written; point and comma where none is named. */
export type TableStyle = DeepReadonly<z.infer<typeof tableStyleSchema>>

/** The study as a replica holds it. `revision` counts up by one with every change, undo, redo or opened study. */
export interface StudySnapshot {
  readonly revision: number
  readonly document: StudyDocument
  readonly undo: string | null
  readonly redo: string | null
}

/** A file that could not be used, in words a person can act on. */
export interface RefusedFile {
  readonly fileName: string
  /** 1-based; null where no single line is at fault. */
  readonly line: number | null
  readonly reason: string
  /** What to do about it. */
  readonly remedy: string
}

/** A table of rate constants as read, or why it cannot be; `ask` names what a person can state so that it can. */
export type RateConstantsRead =
  | { readonly kind: 'table'; readonly table: RateConstantTable }
  | { readonly kind: 'refused'; readonly refused: RefusedFile; readonly ask: 'temperature-unit' | 'decimal-sign' | null }

export interface ImportAnswer {
  readonly addedRunIds: readonly string[]
  readonly refused: readonly RefusedFile[]
  /** Set when a saved study was among the files and has replaced the one before. */
  readonly openedStudy: boolean
  readonly snapshot: StudySnapshot
}

export interface FileOut {
  readonly fileName: string
  readonly mediaType: string
  readonly bytes: Uint8Array
}

export interface RecentStudy {
  readonly studyId: string
  readonly name: string
  readonly runs: number
  /** Rows of its table of rate constants; 0 where it holds none. */
  readonly rateConstants: number
  /** ISO 8601, UTC. */
  readonly changedAt: string
}

export interface RequestAnswers {
  'program.describe': { readonly name: 'rampfold'; readonly version: string; readonly shell: 'browser' | 'desktop' | 'command-line' }
  'study.read': StudySnapshot
  'study.change': StudySnapshot
  'study.undo': StudySnapshot
  'study.redo': StudySnapshot
  'study.new': StudySnapshot
  'study.open-demo': StudySnapshot
  'study.recent': { readonly studies: readonly RecentStudy[] }
  'study.open-recent': StudySnapshot
  'study.save-copy': FileOut
  'study.evaluate': { readonly revision: number; readonly result: StudyResult }
  'study.uncertainty': { readonly revision: number; readonly result: UncertaintyResult }
  'upload.begin': { readonly uploadId: string }
  'upload.append': { readonly receivedBytes: number }
  'upload.discard': Record<string, never>
  'runs.import': ImportAnswer
  'work.cancel': Record<string, never>
  'rate-constants.read-text': RateConstantsRead
  'rate-constants.read-file': RateConstantsRead
  'rate-constants.from-holds': { readonly table: RateConstantTable }
  'rate-constants.evaluate': { readonly revision: number; readonly result: RateConstantsResult }
  'results.export': { readonly files: readonly FileOut[] }
}

/** What the host tells every window without being asked. */
export type HostEvent =
  | { readonly kind: 'study-changed'; readonly revision: number }
  /** An autosave failed (disk full, folder gone); the next change tries again. */
  | { readonly kind: 'not-saved'; readonly message: string }
  | {
      readonly kind: 'progress'
      readonly work: 'import' | 'evaluate' | 'uncertainty'
      readonly done: number
      readonly total: number
      readonly what: string
    }

/** A way to reach the host; the renderer has one for each shell, tests have their own. */
export interface HostTransport {
  /** Rejects with a `KineticsError` the host sent, `Cancelled`, or a plain `Error` when the host cannot be reached. */
  call<Name extends RequestName>(name: Name, input: RequestInput<Name>): Promise<RequestAnswers[Name]>
  /**
   * Returns the call that ends the subscription.
   * @param lost - told, where the way to the host can tell, that the host does not answer any more, before it is asked anything
   */
  subscribe(listener: (event: HostEvent) => void, lost?: (error: Error) => void): () => void
}

/** The one method a desktop window is given; encoded by `wire.ts`, like the body of an HTTP request. */
export interface DesktopBridge {
  request(name: string, body: Uint8Array): Promise<Uint8Array>
  subscribe(listener: (event: Uint8Array) => void): () => void
}

export { channels, httpPaths } from './channels.ts'

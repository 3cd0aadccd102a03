import { setMaxListeners } from 'node:events'
import type { ImportAnswer, RefusedFile } from '../../../shared-kinetics/contract/host-api.ts'
import { runInfoSchema, type StudyDocument } from '../../../shared-kinetics/contract/study-document.ts'
import { KineticsError } from '../../../shared-kinetics/errors.ts'
import type { ImportNote, RunInfo } from '../../../shared-kinetics/series/run.ts'
import { savedCopySuffix } from '../../study/saved-copy-suffix.ts'
import type { ImportedRun } from '../host-tasks.ts'
import type { UploadedFile } from '../uploads.ts'
import type { HandlerContext } from './handler-table.ts'
import { inOrderOfHeatingRate } from './in-order-of-heating-rate.ts'

/**
 * Reads files and adds what is in them: runs as one change, in order of heating rate; a saved study is opened first, in place
 * of the one that was open. Files that cannot be used are listed with the reason, and the rest is still added.
 * @param noteLeftOut - whether files that cannot be used are noted in the study as well
 * @throws Cancelled when stopped, or when another study was opened meanwhile; then nothing is added
 */
export async function importFiles(context: HandlerContext, files: readonly UploadedFile[], noteLeftOut = false): Promise<ImportAnswer> {
  const { workspace } = context
  const stop = new AbortController()
  // One listener a file is meant, and is no leak.
  setMaxListeners(0, stop.signal)
  context.imports.add(stop)
  try {
    const { whole, partial } = split(files)
    const copies = whole.filter((file) => isSavedCopy(file))
    const exports = whole.filter((file) => !isSavedCopy(file))
    const opened = await openCopies(context, copies, stop.signal)
    const study = workspace.study
    const read = await readExports(context, exports, stop.signal)
    const { fresh, repeated } = withoutRepeats(workspace.session.document.runs, read.runs)
    const runs = withFreshIds(workspace.session.document.runs, inOrderOfHeatingRate(fresh), context.randomId)
    const originals = new Map(read.runs.map(({ run, bytes }) => [run.info.file.sha256, bytes]))
    const refusedFiles = [...partial, ...opened.refused, ...read.refused, ...repeated]
    const notes = noteLeftOut ? refusedFiles.map(leftOutNote) : []
    if (runs.length > 0) refuseBesideTable(workspace.session.document)
    const snapshot = runs.length === 0 ? workspace.session.snapshot() : workspace.addRuns(study, runs, originals, notes)
    return {
      addedRunIds: runs.map((run) => run.info.id),
      refused: refusedFiles,
      openedStudy: opened.openedStudy,
      snapshot,
    }
  } finally {
    context.imports.delete(stop)
  }
}

const isSavedCopy = (file: UploadedFile): boolean => file.fileName.toLowerCase().endsWith(savedCopySuffix)

const isWhole = (file: UploadedFile): boolean => file.bytes.byteLength === file.declaredBytes

function split(files: readonly UploadedFile[]): { whole: readonly UploadedFile[]; partial: readonly RefusedFile[] } {
  return {
    whole: files.filter(isWhole),
    partial: files
      .filter((file) => !isWhole(file))
      .map((file) =>
        refused(file.fileName, `Only ${file.bytes.byteLength} of its ${file.declaredBytes} bytes arrived.`, 'Add the file again.'),
      ),
  }
}

async function openCopies(
  context: HandlerContext,
  copies: readonly UploadedFile[],
  signal: AbortSignal,
): Promise<{ refused: readonly RefusedFile[]; openedStudy: boolean }> {
  const [first, ...others] = copies
  if (first === undefined) return { refused: [], openedStudy: false }
  const refusedFiles = others.map((file) => refused(file.fileName, 'Another saved study was opened.', 'Open one saved study at a time.'))
  try {
    const copy = await context.pool.run('open-saved-copy', { bytes: first.bytes }, { signal })
    context.evaluation.cancel()
    context.uncertainty.cancel()
    // An id of its own: the study it was copied from may have moved on, and must not be overwritten.
    await context.workspace.replace({ ...copy, document: { ...copy.document, id: context.randomId() }, folder: null })
    return { refused: refusedFiles, openedStudy: true }
  } catch (error) {
    if (!(error instanceof KineticsError)) throw error
    return { refused: [refused(first.fileName, error.message, 'Open another copy of the study.'), ...refusedFiles], openedStudy: false }
  }
}

interface ReadRun {
  readonly run: ImportedRun
  readonly bytes: Uint8Array
}

async function readExports(
  { pool, events }: HandlerContext,
  exports: readonly UploadedFile[],
  signal: AbortSignal,
): Promise<{ runs: readonly ReadRun[]; refused: readonly RefusedFile[] }> {
  const report = events.progressOf('import')
  let done = 0
  const answers = await Promise.all(
    exports.map(async ({ fileName, bytes }) => {
      const answer = await pool.run('import-file', { fileName, bytes }, { signal })
      done += 1
      report(done, exports.length, fileName)
      return { answer, bytes }
    }),
  )
  const runs: ReadRun[] = []
  const refusedFiles: RefusedFile[] = []
  for (const { answer, bytes } of answers) {
    if (answer.kind === 'refused') refusedFiles.push(answer.refused)
    else if (answer.runs.every(({ info }) => runInfoSchema.safeParse(info).success))
      runs.push(...answer.runs.map((run) => ({ run, bytes })))
    else refusedFiles.push(beyondLimits(answer.runs[0]?.info.file.name ?? ''))
  }
  return { runs, refused: refusedFiles }
}

/** What the schema of a study does not take could be saved but never opened again. */
const beyondLimits = (fileName: string): RefusedFile =>
  refused(
    fileName,
    'It holds more text or more columns than a study takes.',
    'Export the run again with fewer columns and shorter remarks.',
  )

/** A file already in the study, or twice in one go, would count one measurement twice. */
function withoutRepeats(
  held: readonly RunInfo[],
  read: readonly ReadRun[],
): { fresh: readonly ImportedRun[]; repeated: readonly RefusedFile[] } {
  const labelOf = new Map(held.map((run) => [run.file.sha256, run.label]))
  const fresh: ImportedRun[] = []
  const repeated = new Map<string, RefusedFile>()
  const fileOf = new Map<string, Uint8Array>()
  for (const { run, bytes } of read) {
    const { sha256, name } = run.info.file
    const first = fileOf.get(sha256) ?? bytes
    fileOf.set(sha256, first)
    const label = labelOf.get(sha256)
    if (label !== undefined) {
      repeated.set(
        name,
        refused(name, `This file is in the study already, as ${label}.`, 'Remove that run first if the file is to be read again.'),
      )
    } else if (first !== bytes) {
      repeated.set(name, refused(name, 'The same content is among these files twice, and counts once.', 'Leave one of the two out.'))
    } else {
      fresh.push(run)
    }
  }
  return { fresh, repeated: [...repeated.values()] }
}

/** Ids are unique in a study even where two files would give their runs the same. */
function withFreshIds(held: readonly RunInfo[], runs: readonly ImportedRun[], randomId: () => string): readonly ImportedRun[] {
  const taken = new Set(held.map((run) => run.id))
  return runs.map((run) => {
    const id = taken.has(run.info.id) ? randomId() : run.info.id
    taken.add(id)
    return { ...run, info: { ...run.info, id } }
  })
}

function leftOutNote({ fileName, line, reason, remedy }: RefusedFile): ImportNote {
  const where = line === null ? fileName : `${fileName}, line ${line}`
  return {
    code: 'file-left-out',
    severity: 'caution',
    message: `${where}: ${reason.replace(/\.?$/, '.')} ${remedy}`,
    evidence: { file: fileName, line },
  }
}

const refused = (fileName: string, reason: string, remedy: string): RefusedFile => ({ fileName, line: null, reason, remedy })

/** A study holds runs or a table of rate constants; both only where the table was made from the runs. */
function refuseBesideTable({ rateConstants }: StudyDocument): void {
  if (rateConstants === null || rateConstants.source.kind === 'isothermal-runs') return
  throw new KineticsError('bad-request', 'This study holds a table of rate constants. Start a new study for runs.')
}

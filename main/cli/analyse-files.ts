import { uploadChunkBytes, type FileOut, type RefusedFile } from '../../shared-kinetics/contract/host-api.ts'
import type { ImportOptions } from '../../shared-kinetics/contract/import-options.ts'
import type { StudyChange } from '../../shared-kinetics/contract/study-change.ts'
import type { StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'
import type { Finding } from '../../shared-kinetics/review/finding.ts'
import type { StudyResult } from '../../shared-kinetics/tasks/study-result.ts'
import type { TableStyle } from '../export/csv-table.ts'
import { exportResults } from '../export/export-results.ts'
import { createHost, type Host } from '../host/create-host.ts'
import type { TaskTable } from '../host/host-tasks.ts'
import { createInProcessPool } from '../host/in-process-pool.ts'
import { programParts } from '../host/program-parts.ts'
import { createTaskTable } from '../host/task-table.ts'
import { InputError, UsageError, type CliIo } from './cli-io.ts'
import type { InputFile } from './expand-paths.ts'
import type { ProgressLine } from './progress-line.ts'

export interface AnalysisOrder {
  readonly files: readonly InputFile[]
  readonly importOptions: ImportOptions
  readonly studyName: string
  readonly changes: readonly StudyChange[]
  /** K/s, one for each run in the order in which the runs stand in the files; null: as the files say. */
  readonly heatingRates_K_per_s: readonly number[] | null
  readonly skipUnusable: boolean
  readonly tableStyle: TableStyle
}

export interface Analysis {
  readonly document: StudyDocument
  readonly result: StudyResult
  readonly files: readonly FileOut[]
}

/**
 * Reads files, settles the study, works it out and makes every export, by the same handlers that answer a window. One short run does not earn a
 * worker thread, so the work is done in this one.
 * @throws InputError for a file or run that cannot be used (unless those are to be skipped), UsageError where heating rates do not fit the runs
 */
export async function analyseFiles(order: AnalysisOrder, io: CliIo, progress: ProgressLine): Promise<Analysis> {
  const readOrder = new Map<string, readonly string[]>()
  const leftOut: Finding[] = []
  const host = createHost({
    dataFolder: null,
    pool: createInProcessPool(rememberingOrder(createTaskTable(order.importOptions), readOrder)),
    parts: {
      ...programParts,
      exportResults: (source, format) =>
        exportResults({ ...source, result: withFindings(source.result, leftOut) }, format, order.tableStyle),
    },
    version: io.version,
    shell: 'command-line',
    warn: (message) => io.stderr(`${message}\n`),
  })
  const stop = host.subscribe((event) => {
    if (event.kind === 'progress')
      progress.show(`${event.work === 'import' ? 'Reading' : 'Working out'} ${event.done} of ${event.total}: ${event.what}`)
  })
  try {
    const refused = await importAll(host, order.files)
    if (refused.length > 0 && !order.skipUnusable) throw new InputError(refusedText(refused, order.files))
    leftOut.push(...refused.map((file) => leftOutFinding(file, order.files)))
    const { document: read } = await host.call('study.read', {})
    if (read.runs.length === 0) throw new InputError(`None of the files can be used. ${refusedText(refused, order.files)}`)
    const rates = ratesByRun(order.heatingRates_K_per_s, order.files, read, readOrder)
    for (const change of [{ kind: 'rename-study', name: order.studyName } as const, ...rates, ...order.changes]) await applied(host, change)
    const { revision, document } = await host.call('study.read', {})
    const { result } = await host.call('study.evaluate', { revision })
    if (!order.skipUnusable) refuseUnusableRuns(document, result)
    const files: FileOut[] = []
    for (const format of ['json', 'csv', 'svg'] as const) files.push(...(await host.call('results.export', { revision, format })).files)
    return { document, result: withFindings(result, leftOut), files }
  } catch (error) {
    throw error instanceof KineticsError ? new InputError(error.message) : error
  } finally {
    stop()
    progress.clear()
    await host.close({ save: false })
  }
}

/** Runs may be sorted once they are in the study; heating rates are named in the order in which they were read. */
function rememberingOrder(tasks: TaskTable, readOrder: Map<string, readonly string[]>): TaskTable {
  return {
    ...tasks,
    'import-file': async (input, context) => {
      const answer = await tasks['import-file'](input, context)
      const sha256 = answer.kind === 'runs' ? answer.runs[0]?.info.file.sha256 : undefined
      if (answer.kind === 'runs' && sha256 !== undefined)
        readOrder.set(
          `${input.fileName}\n${sha256}`,
          answer.runs.map((run) => run.info.id),
        )
      return answer
    },
  }
}

async function importAll(host: Host, files: readonly InputFile[]): Promise<readonly RefusedFile[]> {
  const uploadIds: string[] = []
  for (const { fileName, bytes } of files) {
    const { uploadId } = await host.call('upload.begin', { fileName, byteLength: bytes.byteLength })
    uploadIds.push(uploadId)
    for (let at = 0; at < bytes.byteLength; at += uploadChunkBytes) {
      await host.call('upload.append', { uploadId, bytes: bytes.subarray(at, at + uploadChunkBytes) })
    }
  }
  return (await host.call('runs.import', { uploadIds })).refused
}

async function applied(host: Host, change: StudyChange): Promise<void> {
  const { revision } = await host.call('study.read', {})
  await host.call('study.change', { revision, change })
}

function ratesByRun(
  rates: readonly number[] | null,
  files: readonly InputFile[],
  document: StudyDocument,
  readOrder: ReadonlyMap<string, readonly string[]>,
): readonly StudyChange[] {
  if (rates === null) return []
  const place = (fileName: string): number => files.findIndex((file) => file.fileName === fileName)
  const ordered = [...readOrder]
    .toSorted(([a], [b]) => place(a.split('\n')[0] ?? '') - place(b.split('\n')[0] ?? ''))
    .flatMap(([, ids]) => ids)
  const runIds = ordered.filter((id) => document.runs.some((run) => run.id === id))
  if (runIds.length !== rates.length) {
    const labels = runIds.map((id) => document.runs.find((run) => run.id === id)?.label ?? id)
    throw new UsageError(`--heating-rates names ${rates.length}, but there are ${runIds.length} runs: ${labels.join(', ')}.`)
  }
  return runIds.map((runId, i) => ({ kind: 'set-run-heating-rate', runId, heatingRate_K_per_s: rates[i] ?? null }))
}

const withFindings = (result: StudyResult, more: readonly Finding[]): StudyResult => ({
  ...result,
  findings: [...result.findings, ...more],
})

function leftOutFinding(file: RefusedFile, files: readonly InputFile[]): Finding {
  return {
    code: 'file-left-out',
    severity: 'caution',
    stage: 'runs',
    title: `${file.fileName} was left out`,
    message: refusedText([file], files),
    run: null,
    level: null,
    evidence: { file: file.fileName, line: file.line },
    basis: 'Asked for: unusable files are skipped.',
    sources: [],
  }
}

/** Every file that cannot be used, with line, reason and remedy. */
export function refusedText(refused: readonly RefusedFile[], files: readonly InputFile[]): string {
  const lines = refused.map(({ fileName, line, reason, remedy }) => {
    const named = files.filter((file) => file.fileName === fileName)
    const path = named.length === 1 ? (named[0]?.path ?? fileName) : fileName
    return `${path}${line === null ? '' : `, line ${line}`}: ${sentence(reason)} ${sentence(remedy)}`
  })
  return lines.join('\n')
}

function refuseUnusableRuns(document: StudyDocument, result: StudyResult): void {
  const unusable = result.findings.filter((finding) => finding.code === 'run-unusable')
  if (unusable.length === 0) return
  const lines = unusable.map((finding) => {
    const run = document.runs.find((candidate) => candidate.id === finding.run)
    // Most messages name the run themselves; its file is what a person has to look for.
    const name = run === undefined ? '' : `${run.file.name}: `
    // Here nothing was left out: the whole call is refused.
    return `${name}${sentence(finding.message.replace(/ The run was left out:.*$/s, ''))}`
  })
  throw new InputError(`${lines.join('\n')}\nOr leave unusable runs out with --skip-unusable.`)
}

const sentence = (text: string): string => (/[.!?]$/.test(text.trim()) ? text.trim() : `${text.trim()}.`)

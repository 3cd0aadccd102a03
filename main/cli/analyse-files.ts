import { createHash } from 'node:crypto'
import type { FileOut, RefusedFile, TableStyle } from '../../shared-kinetics/contract/host-api.ts'
import type { ImportOptions } from '../../shared-kinetics/contract/import-options.ts'
import { naturalOrder } from '../../shared-kinetics/contract/natural-order.ts'
import type { StudyChange } from '../../shared-kinetics/contract/study-change.ts'
import type { StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'
import type { StudyResult, UncertaintyResult } from '../../shared-kinetics/tasks/study-result.ts'
import { createHost, type Host } from '../host/create-host.ts'
import { createInProcessPool } from '../host/in-process-pool.ts'
import { createTaskTable } from '../host/task-table.ts'
import { uploadToHost } from '../host/upload-to-host.ts'
import { InputError, UsageError, type CliIo } from './cli-io.ts'
import type { InputFile } from './expand-paths.ts'
import { createLongWorkNotice } from './long-work-notice.ts'
import type { ProgressLine } from './progress-line.ts'

export interface AnalysisOrder {
  readonly files: readonly InputFile[]
  readonly importOptions: ImportOptions
  readonly studyName: string
  readonly changes: readonly StudyChange[]
  /** K/s, one for each run in the order in which the runs stand in the files; null: as the files say. */
  readonly heatingRates_K_per_s: readonly number[] | null
  readonly skipUnusable: boolean
  /** Intervals by resampling and from measured sources besides. */
  readonly withUncertainty: boolean
  readonly tableStyle: TableStyle
}

export interface Analysis {
  readonly document: StudyDocument
  readonly result: StudyResult
  /** Where it was asked for. */
  readonly uncertainty?: UncertaintyResult
  readonly files: readonly FileOut[]
}

/**
 * Reads files, settles the study, works it out and makes every export, by the same handlers that answer a window. One short run does not earn a
 * worker thread, so the work is done in this one.
 * @throws InputError for a file or run that cannot be used (unless those are to be skipped), UsageError where heating rates do not fit the runs
 */
export async function analyseFiles(order: AnalysisOrder, io: CliIo, progress: ProgressLine): Promise<Analysis> {
  const host = createHost({
    dataFolder: null,
    pool: createInProcessPool(createTaskTable(order.importOptions)),
    version: io.version,
    shell: 'command-line',
    warn: (message) => io.stderr(`${message}\n`),
  })
  const noticeOfDraws = createLongWorkNotice(
    () => performance.now(),
    (line) => {
      progress.clear()
      io.stderr(`${line}\n`)
    },
    'The draws of measured sources',
    'Time grows with levels, methods and draws: fewer --levels, --methods or --draws take less.',
  )
  const stop = host.subscribe((event) => {
    if (event.kind === 'progress' && event.what === 'measured sources') noticeOfDraws(event)
    if (event.kind === 'progress')
      progress.show(`${event.work === 'import' ? 'Reading' : 'Working out'} ${event.done} of ${event.total}: ${event.what}`)
  })
  try {
    const uploadIds = await uploadToHost(host, order.files)
    const { refused } = await host.call('runs.import', { uploadIds, noteLeftOut: order.skipUnusable })
    if (refused.length > 0 && !order.skipUnusable) throw new InputError(refusedText(refused, order.files))
    const { document: read } = await host.call('study.read', {})
    if (read.runs.length === 0) throw new InputError(`None of the files can be used. ${refusedText(refused, order.files)}`)
    const rates = ratesByRun(order.heatingRates_K_per_s, order.files, read)
    for (const change of [{ kind: 'rename-study', name: order.studyName } as const, ...rates, ...order.changes]) await applied(host, change)
    const { revision, document } = await host.call('study.read', {})
    const { result } = await host.call('study.evaluate', { revision })
    if (!order.skipUnusable) refuseUnusableRuns(order.files, document, result)
    const apart = order.withUncertainty ? { uncertainty: (await host.call('study.uncertainty', { revision })).result } : {}
    const out: FileOut[] = []
    for (const format of ['json', 'csv', 'svg'] as const) {
      out.push(
        ...(await host.call('results.export', { revision, format, tableStyle: order.tableStyle, withUncertainty: order.withUncertainty }))
          .files,
      )
    }
    return { document, result, ...apart, files: out }
  } catch (error) {
    throw error instanceof KineticsError ? new InputError(error.message) : error
  } finally {
    stop()
    progress.clear()
    await host.close({ save: false })
  }
}

async function applied(host: Host, change: StudyChange): Promise<void> {
  const { revision } = await host.call('study.read', {})
  await host.call('study.change', { revision, change })
}

/** Heating rates are named in the order of the files and of the runs in each; the study has its runs in order of heating rate. */
function ratesByRun(rates: readonly number[] | null, files: readonly InputFile[], document: StudyDocument): readonly StudyChange[] {
  if (rates === null) return []
  const runs = [...bySha256(files).keys()].flatMap((sha256) =>
    document.runs.filter((run) => run.file.sha256 === sha256).toSorted((one, other) => naturalOrder(one.id, other.id)),
  )
  if (runs.length !== rates.length) {
    throw new UsageError(
      `--heating-rates names ${rates.length}, but there are ${runs.length} runs: ${runs.map((run) => run.label).join(', ')}.`,
    )
  }
  return runs.map((run, i) => ({ kind: 'set-run-heating-rate', runId: run.id, heatingRate_K_per_s: rates[i] ?? null }))
}

/** Names repeat from folder to folder; contents tell files apart, since the same one is never taken twice. */
const bySha256 = (files: readonly InputFile[]): ReadonlyMap<string, InputFile> =>
  new Map(files.map((file) => [createHash('sha256').update(file.bytes).digest('hex'), file]))

/** Every file that cannot be used, with path, line, reason and remedy. */
export function refusedText(refused: readonly RefusedFile[], files: readonly InputFile[]): string {
  const lines = refused.map(({ fileName, line, reason, remedy }) => {
    const paths = files.filter((file) => file.fileName === fileName).map((file) => file.path)
    const path = paths.length === 0 ? fileName : paths.join(' or ')
    return `${path}${line === null ? '' : `, line ${line}`}: ${sentence(reason)} ${sentence(remedy)}`
  })
  return lines.join('\n')
}

function refuseUnusableRuns(files: readonly InputFile[], document: StudyDocument, result: StudyResult): void {
  const unusable = result.findings.filter((finding) => finding.code === 'run-unusable')
  if (unusable.length === 0) return
  const fileOf = bySha256(files)
  const withoutSignal = runsWithoutSignal(document, result)
  const lines = unusable.flatMap((finding) => {
    if (withoutSignal !== null && withoutSignal.runIds.has(finding.run ?? '')) return []
    const run = document.runs.find((candidate) => candidate.id === finding.run)
    const path = run === undefined ? '' : `${fileOf.get(run.file.sha256)?.path ?? run.file.name}: `
    // The path stands for the label; and here nothing was left out: the whole call is refused.
    const reason = finding.message.replace(`${run?.label ?? ''}: `, '').replace(/ The run was left out:.*$/s, '')
    return [`${path}${sentence(reason)}`]
  })
  const all = withoutSignal === null ? lines : [withoutSignal.words, ...lines]
  throw new InputError(`${all.join('\n')}\nOr leave unusable runs out with --skip-unusable.`)
}

/** Several runs that lack the signal which is analysed are one matter: runs of different kinds, or a signal to be named. */
function runsWithoutSignal(
  { runs }: StudyDocument,
  { signal, findings }: StudyResult,
): { readonly runIds: ReadonlySet<string>; readonly words: string } | null {
  if (signal === null) return null
  const used = runs.filter((run) => run.use)
  const unusable = new Set(findings.flatMap(({ code, run }) => (code === 'run-unusable' && run !== null ? [run] : [])))
  const lacking = used.filter((run) => unusable.has(run.id) && !quantities(run).includes(signal))
  if (lacking.length < 2) return null
  const theirs = [...new Set(lacking.flatMap(quantities))]
  const common = theirs.filter((quantity) => used.every((run) => quantities(run).includes(quantity)))
  const remedy =
    common.length === 0
      ? 'No signal is in all runs: they are of different kinds. Name only the files of one kind'
      : `Name a signal that all runs have: ${common.map((quantity) => `--signal ${quantity}`).join(' or ')}`
  return {
    runIds: new Set(lacking.map(({ id }) => id)),
    words:
      `${lacking.length} of ${used.length} runs have no ${signal.replace('-', ' ')} column but ${theirs.map((one) => one.replace('-', ' ')).join(', ')}: ` +
      `${lacking.map(({ label }) => label).join(', ')}. ${remedy}.`,
  }
}

const quantities = (run: StudyDocument['runs'][number]): readonly string[] => run.signals.map(({ quantity }) => quantity)

const sentence = (text: string): string => (/[.!?]$/.test(text.trim()) ? text.trim() : `${text.trim()}.`)

import { defaultSettings } from '../../../shared-kinetics/contract/study-document.ts'
import type { RefusedFile } from '../../../shared-kinetics/contract/host-api.ts'
import { Cancelled, KineticsError } from '../../../shared-kinetics/errors.ts'
import type { TaskContext } from '../../../shared-kinetics/isoconversional/result.ts'
import type { Finding } from '../../../shared-kinetics/review/finding.ts'
import type { RunResult } from '../../../shared-kinetics/tasks/study-result.ts'
import type { ImportedRun, TaskTable } from '../../host/host-tasks.ts'
import { createTaskTable } from '../../host/task-table.ts'
import { refusedText } from '../analyse-files.ts'
import { exitCodes, InputError, UsageError, type CliIo } from '../cli-io.ts'
import { expandPaths, type InputFile } from '../expand-paths.ts'
import { importOptionKinds, importOptionsFrom } from '../import-words.ts'
import { inspectJson, inspectText } from '../inspect-report.ts'
import { parseWords } from '../parse-words.ts'
import { createProgressLine } from '../progress-line.ts'

/** A run as read, with what its own temperature and time tell. */
export interface InspectedRun {
  readonly run: ImportedRun
  /** null where the run cannot be worked out by itself; a finding then says why. */
  readonly result: RunResult | null
  readonly findings: readonly Finding[]
}

export interface InspectedFile {
  readonly file: InputFile
  readonly runs: readonly InspectedRun[]
}

/** `rampfold inspect`: how each file was read. */
export async function inspect(words: readonly string[], io: CliIo): Promise<number> {
  const parsed = parseWords('inspect', words, { json: 'flag', ...importOptionKinds })
  if (parsed.paths.length === 0) throw new UsageError('inspect needs a file or a folder: rampfold inspect PATH….')
  const tasks = createTaskTable(importOptionsFrom(parsed))
  const files = expandPaths(parsed.paths)
  const progress = createProgressLine(io, false)
  const inspected: InspectedFile[] = []
  const refused: RefusedFile[] = []
  for (const [i, file] of files.entries()) {
    progress.show(`Reading ${i + 1} of ${files.length}: ${file.fileName}`)
    const answer = await tasks['import-file']({ fileName: file.fileName, bytes: file.bytes }, plainContext)
    if (answer.kind === 'refused') refused.push(answer.refused)
    else inspected.push({ file, runs: await Promise.all(answer.runs.map(async (run) => inspectRun(run, tasks))) })
  }
  progress.clear()
  io.stdout(parsed.flag('json') ? inspectJson(inspected, refused, io.version) : inspected.map(inspectText).join('\n'))
  if (refused.length > 0) throw new InputError(refusedText(refused, files))
  return exitCodes.done
}

const plainContext: TaskContext = { checkCancelled: () => undefined, progress: () => undefined }
/** Findings about a series of one run say nothing about its file. */
const stageOfRuns = (finding: Finding): boolean => finding.stage === 'runs' && finding.code !== 'too-few-programmes'

async function inspectRun(run: ImportedRun, tasks: TaskTable): Promise<InspectedRun> {
  const study = { runs: [run.info], settings: defaultSettings, withoutCurves: true }
  try {
    const result = await tasks['evaluate-study']({ study, columns: new Map([[run.info.columnsKey, run.columns]]) }, plainContext)
    return { run, result: result.runs[0] ?? null, findings: result.findings.filter(stageOfRuns) }
  } catch (error) {
    // Reading a file is worth reporting even where nothing can be worked out from one run of it.
    if (error instanceof KineticsError || error instanceof Cancelled) return { run, result: null, findings: [] }
    throw error
  }
}

import { join } from 'node:path'
import type { FileOut } from '../../../shared-kinetics/contract/host-api.ts'
import type { RateConstantReadOptions } from '../../../shared-kinetics/contract/rate-constant-schema.ts'
import { KineticsError } from '../../../shared-kinetics/errors.ts'
import type { RateConstantTable } from '../../../shared-kinetics/rate-constants/rate-constant-table.ts'
import { severities } from '../../../shared-kinetics/review/finding.ts'
import type { RateConstantsResult } from '../../../shared-kinetics/tasks/rate-constants-result.ts'
import { rateConstantsShortTable } from '../../export/rate-constants-lines.ts'
import { writeFiles, WriteRefusal } from '../../export/write-files.ts'
import { createHost, type Host } from '../../host/create-host.ts'
import { createInProcessPool } from '../../host/in-process-pool.ts'
import { createTaskTable } from '../../host/task-table.ts'
import { uploadToHost } from '../../host/upload-to-host.ts'
import { refusedText } from '../analyse-files.ts'
import { exitCodes, InputError, UsageError, type CliIo } from '../cli-io.ts'
import { expandPaths, type InputFile } from '../expand-paths.ts'
import { parseWords } from '../parse-words.ts'
import { rateConstantKinds, rateConstantOrder, type RateConstantOrder, type RunsOrder } from '../rate-constant-options.ts'

/** `rampfold rate-constants`: rate constants against temperature into files, and a short table on the screen. */
export async function rateConstants(words: readonly string[], io: CliIo): Promise<number> {
  const parsed = parseWords('rate-constants', words, rateConstantKinds)
  const out = parsed.value('out')
  if (parsed.paths.length === 0)
    throw new UsageError('rate-constants needs the file that holds the table: rampfold rate-constants TABLE --out DIR.')
  if (out === undefined || out === '') throw new UsageError('rate-constants needs --out DIR, the folder the results go into.')
  const order = rateConstantOrder(parsed)
  if (order.from.kind === 'table' && parsed.paths.length > 1) {
    throw new UsageError(
      `rate-constants takes one table, and ${parsed.paths.length} paths are named. Put all rows into one file; or name a reaction model with --model, if these are isothermal runs.`,
    )
  }
  const files = expandPaths(parsed.paths)
  if (order.from.kind === 'table' && files.length > 1) {
    throw new InputError(
      `${parsed.paths[0]}: this folder holds ${files.length} files, and one table is read. Name the file; or name a reaction model with --model, if these are isothermal runs.`,
    )
  }
  const { result, files: results } = await evaluate(files, order, io)
  try {
    await writeFiles(out, results)
  } catch (error) {
    throw error instanceof WriteRefusal ? new InputError(error.message) : error
  }
  if (!parsed.flag('quiet'))
    io.stdout(
      `${rateConstantsShortTable(result, new Map(order.predictAt.map((at) => [at.temperature_K, at.unit])))}\n${findingLines(result)}${join(out, '')}: ${results.map(({ fileName }) => fileName).join(', ')}\n`,
    )
  const stops = result.findings.some((finding) => finding.severity === 'stop')
  return parsed.flag('strict') && stops ? exitCodes.stopFinding : exitCodes.done
}

async function evaluate(
  files: readonly InputFile[],
  { from, predictAt, tableStyle }: RateConstantOrder,
  io: CliIo,
): Promise<{ readonly result: RateConstantsResult; readonly files: readonly FileOut[] }> {
  const importOptions = from.kind === 'runs' ? from.importOptions : {}
  const host = createHost({
    dataFolder: null,
    pool: createInProcessPool(createTaskTable(importOptions)),
    version: io.version,
    shell: 'command-line',
    warn: (message) => io.stderr(`${message}\n`),
  })
  try {
    const read = from.kind === 'table' ? await readTable(host, files, from.options) : await tableOfRuns(host, files, from)
    const { revision } = await host.call('study.read', {})
    const change = { kind: 'set-rate-constants', table: { ...read, predictAt_K: predictAt.map((at) => at.temperature_K) } } as const
    const snapshot = await host.call('study.change', { revision, change })
    const { result } = await host.call('rate-constants.evaluate', { revision: snapshot.revision })
    const out: FileOut[] = []
    for (const format of ['json', 'csv', 'svg'] as const) {
      out.push(...(await host.call('results.export', { revision: snapshot.revision, format, tableStyle, of: 'rate-constants' })).files)
    }
    return { result, files: out }
  } catch (error) {
    throw error instanceof KineticsError ? new InputError(error.message) : error
  } finally {
    await host.close({ save: false })
  }
}

async function readTable(host: Host, files: readonly InputFile[], options: RateConstantReadOptions): Promise<RateConstantTable> {
  const [uploadId = ''] = await uploadToHost(host, files)
  const read = await host.call('rate-constants.read-file', { uploadId, options })
  if (read.kind === 'table') return read.table
  const fileName = files[0]?.fileName ?? read.refused.fileName
  throw new InputError(refusedText([{ ...read.refused, fileName }], files))
}

/** Isothermal runs into a table: the runs stay in the study, so that its exports name them. */
async function tableOfRuns(host: Host, files: readonly InputFile[], { model, zeroInTime, range }: RunsOrder): Promise<RateConstantTable> {
  const { refused } = await host.call('runs.import', { uploadIds: await uploadToHost(host, files) })
  if (refused.length > 0) throw new InputError(refusedText(refused, files))
  const { revision } = await host.call('study.read', {})
  return (await host.call('rate-constants.from-holds', { revision, model, zeroInTime, range: [range[0], range[1]] })).table
}

/** Stops and cautions by name, notes by number. */
function findingLines({ findings }: RateConstantsResult): string {
  const lines = severities.flatMap((severity) => {
    const found = findings.filter((finding) => finding.severity === severity)
    if (found.length === 0) return []
    if (severity === 'note') return [`${found.length} ${found.length === 1 ? 'note' : 'notes'}, see rate-constants.csv.txt`]
    return found.map((finding) => `${severity}: ${finding.title}`)
  })
  return lines.length === 0 ? '' : `${lines.join('\n')}\n\n`
}

import { basename, join } from 'node:path'
import { rateConstantLimits, type RateConstantReadOptions } from '../../../shared-kinetics/contract/rate-constant-schema.ts'
import { decimalSignWords, delimiterWords, encodingWords } from '../../../shared-kinetics/contract/import-options.ts'
import type { FileOut } from '../../../shared-kinetics/contract/host-api.ts'
import { KineticsError } from '../../../shared-kinetics/errors.ts'
import { temperatureUnits } from '../../../shared-kinetics/rate-constants/rate-constant-table.ts'
import { severities } from '../../../shared-kinetics/review/finding.ts'
import type { RateConstantsResult } from '../../../shared-kinetics/tasks/rate-constants-result.ts'
import { parseTemperature } from '../../../shared-kinetics/units/parse-quantity.ts'
import { parseRateUnit } from '../../../shared-kinetics/units/rate-unit.ts'
import { rateConstantsShortTable } from '../../export/rate-constants-lines.ts'
import { writeFiles, WriteRefusal } from '../../export/write-files.ts'
import { createHost } from '../../host/create-host.ts'
import { createInProcessPool } from '../../host/in-process-pool.ts'
import { createTaskTable } from '../../host/task-table.ts'
import { uploadToHost } from '../../host/upload-to-host.ts'
import { refusedText } from '../analyse-files.ts'
import { exitCodes, InputError, UsageError, type CliIo } from '../cli-io.ts'
import { expandPaths, type InputFile } from '../expand-paths.ts'
import { oneOf, tableStyleOption } from '../option-values.ts'
import { parseWords, type ParsedWords } from '../parse-words.ts'

const kinds = {
  out: 'value',
  at: 'value',
  'temperature-unit': 'value',
  'rate-unit': 'value',
  encoding: 'value',
  delimiter: 'value',
  'decimal-sign': 'value',
  decimal: 'value',
  separator: 'value',
  strict: 'flag',
  quiet: 'flag',
} as const

/** `rampfold rate-constants`: rate constants against temperature into files, and a short table on the screen. */
export async function rateConstants(words: readonly string[], io: CliIo): Promise<number> {
  const parsed = parseWords('rate-constants', words, kinds)
  const out = parsed.value('out')
  const [path, ...more] = parsed.paths
  if (path === undefined)
    throw new UsageError('rate-constants needs the file that holds the table: rampfold rate-constants TABLE --out DIR.')
  if (more.length > 0)
    throw new UsageError(`rate-constants takes one table, and ${parsed.paths.length} are named. Put all rows into one file.`)
  if (out === undefined || out === '') throw new UsageError('rate-constants needs --out DIR, the folder the results go into.')
  const order = {
    options: readOptions(parsed),
    predictAt_K: predictAt(parsed.value('at')),
    tableStyle: tableStyleOption(parsed.value('decimal'), parsed.value('separator')),
  }
  const files = await expandPaths([path])
  const [file] = files
  if (file === undefined || files.length > 1)
    throw new InputError(`${path}: this folder holds ${files.length} files, and one table is read. Name the file.`)
  const { result, files: results } = await evaluate(file, order, io)
  try {
    await writeFiles(out, results)
  } catch (error) {
    throw error instanceof WriteRefusal ? new InputError(error.message) : error
  }
  if (!parsed.flag('quiet'))
    io.stdout(
      `${rateConstantsShortTable(result)}\n${findingLines(result)}${join(out, '')}: ${results.map(({ fileName }) => fileName).join(', ')}\n`,
    )
  const stops = result.findings.some((finding) => finding.severity === 'stop')
  return parsed.flag('strict') && stops ? exitCodes.stopFinding : exitCodes.done
}

interface Order {
  readonly options: RateConstantReadOptions
  readonly predictAt_K: readonly number[]
  readonly tableStyle: ReturnType<typeof tableStyleOption>
}

async function evaluate(
  file: InputFile,
  { options, predictAt_K, tableStyle }: Order,
  io: CliIo,
): Promise<{ readonly result: RateConstantsResult; readonly files: readonly FileOut[] }> {
  const host = createHost({
    dataFolder: null,
    pool: createInProcessPool(createTaskTable()),
    version: io.version,
    shell: 'command-line',
    warn: (message) => io.stderr(`${message}\n`),
  })
  try {
    const [uploadId = ''] = await uploadToHost(host, [file])
    const read = await host.call('rate-constants.read-file', { uploadId, options })
    if (read.kind === 'refused') throw new InputError(refusedText([{ ...read.refused, fileName: file.fileName }], [file]))
    const { revision } = await host.call('study.read', {})
    const table = { ...read.table, predictAt_K }
    const snapshot = await host.call('study.change', { revision, change: { kind: 'set-rate-constants', table } })
    const { result } = await host.call('rate-constants.evaluate', { revision: snapshot.revision })
    const files: FileOut[] = []
    for (const format of ['json', 'csv', 'svg'] as const) {
      files.push(...(await host.call('results.export', { revision: snapshot.revision, format, tableStyle, of: 'rate-constants' })).files)
    }
    return { result, files }
  } catch (error) {
    throw error instanceof KineticsError ? new InputError(`${basename(file.path)}: ${error.message}`) : error
  } finally {
    await host.close({ save: false })
  }
}

function readOptions(words: ParsedWords): RateConstantReadOptions {
  const choose = <Word extends string>(option: string, known: readonly Word[]): Word | undefined => {
    const text = words.value(option)
    return text === undefined ? undefined : oneOf(`--${option}`, text, known)
  }
  const temperatureUnit = temperatureUnitOption(words.value('temperature-unit'))
  const rateUnit = words.value('rate-unit')
  if (rateUnit !== undefined) {
    const parsed = parseRateUnit(rateUnit)
    if (!parsed.ok) throw new UsageError(`--rate-unit: ${parsed.reason}.`)
  }
  const encoding = choose('encoding', encodingWords)
  const delimiter = choose('delimiter', delimiterWords)
  const decimalSign = choose('decimal-sign', decimalSignWords)
  return {
    ...(temperatureUnit === undefined ? {} : { temperatureUnit }),
    ...(rateUnit === undefined ? {} : { rateUnit }),
    ...(encoding === undefined ? {} : { encoding }),
    ...(delimiter === undefined ? {} : { delimiter }),
    ...(decimalSign === undefined ? {} : { decimalSign }),
  }
}

const temperatureUnitOption = (text: string | undefined): (typeof temperatureUnits)[number] | undefined =>
  text === undefined ? undefined : oneOf('--temperature-unit', text.replace(/^(?:°|deg)\s*/i, '').toUpperCase(), temperatureUnits)

/** Temperatures at which k is to be predicted: `25C,310K`, each with its unit, since 25 and 310 may be either. A decimal comma needs semicolons between them. */
function predictAt(text: string | undefined): readonly number[] {
  if (text === undefined) return []
  const parts = text
    .split(text.includes(';') ? ';' : ',')
    .map((part) => part.trim())
    .filter((part) => part !== '')
  if (parts.length === 0) throw new UsageError('--at: write temperatures with their unit, for example "25C,310K".')
  if (parts.length > rateConstantLimits.predictions)
    throw new UsageError(`--at: at most ${rateConstantLimits.predictions} temperatures are possible.`)
  return parts.map((part) => {
    if (!/[a-z]\s*$/i.test(part)) throw new UsageError(`--at: "${part}" has no unit; write ${part}C or ${part}K.`)
    const parsed = parseTemperature(part)
    if (!parsed.ok) throw new UsageError(`--at: ${parsed.reason}.`)
    if (parsed.value > 10_000) throw new UsageError(`--at: ${part} is hotter than any rate constant is predicted for.`)
    return parsed.value
  })
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

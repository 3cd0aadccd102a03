import { basename, dirname, join, resolve } from 'node:path'
import type { StudyChange } from '../../../shared-kinetics/contract/study-change.ts'
import { severities } from '../../../shared-kinetics/review/finding.ts'
import type { StudyResult } from '../../../shared-kinetics/tasks/study-result.ts'
import { shortTable } from '../../export/short-table.ts'
import { writeFiles, WriteRefusal } from '../../export/write-files.ts'
import { analyseFiles } from '../analyse-files.ts'
import { exitCodes, InputError, UsageError, type CliIo } from '../cli-io.ts'
import { expandPaths, type InputFile } from '../expand-paths.ts'
import { importOptionKinds, importOptionsFrom } from '../import-words.ts'
import {
  baselineOption,
  heatingRatesOption,
  levelsOption,
  methodsOption,
  signalOption,
  tableStyleOption,
  windowOption,
} from '../option-values.ts'
import { parseWords, type ParsedWords } from '../parse-words.ts'
import { uncertaintyFrom, uncertaintyOptionKinds } from '../uncertainty-options.ts'
import { createProgressLine } from '../progress-line.ts'

const kinds = {
  out: 'value',
  levels: 'value',
  methods: 'value',
  'heating-rates': 'value',
  signal: 'value',
  window: 'value',
  baseline: 'value',
  decimal: 'value',
  separator: 'value',
  strict: 'flag',
  'skip-unusable': 'flag',
  quiet: 'flag',
  ...uncertaintyOptionKinds,
  ...importOptionKinds,
} as const

/** `rampfold activation`: Ea against conversion into files, and a short table on the screen. */
export async function activation(words: readonly string[], io: CliIo): Promise<number> {
  const parsed = parseWords('activation', words, kinds)
  const out = parsed.value('out')
  if (parsed.paths.length === 0)
    throw new UsageError('activation needs the files or the folder of the runs: rampfold activation PATH… --out DIR.')
  if (out === undefined || out === '') throw new UsageError('activation needs --out DIR, the folder the results go into.')
  const uncertainty = uncertaintyFrom(parsed)
  const changes = [...changesFrom(parsed), ...uncertainty.changes]
  const rates = parsed.value('heating-rates')
  const order = {
    importOptions: importOptionsFrom(parsed),
    changes,
    withUncertainty: uncertainty.wanted,
    heatingRates_K_per_s: rates === undefined ? null : heatingRatesOption(rates),
    skipUnusable: parsed.flag('skip-unusable'),
    tableStyle: tableStyleOption(parsed.value('decimal'), parsed.value('separator')),
  }
  const quiet = parsed.flag('quiet')
  const files = expandPaths(parsed.paths)
  const {
    result,
    uncertainty: apart,
    files: results,
  } = await analyseFiles({ ...order, files, studyName: studyName(files) }, io, createProgressLine(io, quiet))
  await written(out, results)
  if (!quiet)
    io.stdout(`${shortTable(result, apart)}\n${findingLines(result)}${join(out, '')}: ${results.map((file) => file.fileName).join(', ')}\n`)
  const stops = result.findings.some((finding) => finding.severity === 'stop')
  return parsed.flag('strict') && stops ? exitCodes.stopFinding : exitCodes.done
}

function changesFrom(words: ParsedWords): readonly StudyChange[] {
  const changes: StudyChange[] = []
  const take = (option: string, change: (text: string) => StudyChange): void => {
    const text = words.value(option)
    if (text !== undefined) changes.push(change(text))
  }
  take('levels', (text) => ({ kind: 'set-levels', levels: [...levelsOption(text)] }))
  take('methods', (text) => ({ kind: 'set-methods', methods: [...methodsOption(text)] }))
  take('signal', (text) => ({ kind: 'set-signal', signal: signalOption(text) }))
  take('window', (text) => ({ kind: 'set-window', window: windowOption(text) }))
  take('baseline', (text) => ({ kind: 'set-baseline', baseline: baselineOption(text) }))
  return changes
}

/** The folder of the runs, if all lie in one. */
function studyName(files: readonly InputFile[]): string {
  const folders = new Set(files.map((file) => dirname(resolve(file.path))))
  const [folder] = folders
  const name = folder === undefined || folders.size > 1 ? '' : basename(folder)
  return name === '' ? `${files.length} files` : name.slice(0, 200)
}

async function written(out: string, files: Parameters<typeof writeFiles>[1]): Promise<void> {
  try {
    await writeFiles(out, files)
  } catch (error) {
    throw error instanceof WriteRefusal ? new InputError(error.message) : error
  }
}

/** Stops and cautions by name, notes by number. */
function findingLines(result: StudyResult): string {
  const lines = severities.flatMap((severity) => {
    const found = result.findings.filter((finding) => finding.severity === severity)
    if (found.length === 0) return []
    if (severity === 'note') return [`${found.length} ${found.length === 1 ? 'note' : 'notes'}, see activation.csv.txt`]
    const leftOut = found.filter(({ code }) => code === 'run-unusable')
    const together =
      leftOut.length < 2
        ? []
        : [
            `${severity}: ${leftOut.length} runs cannot be used: ${leftOut.map(({ title }) => title.replace(/ cannot be used$/, '')).join(', ')}`,
          ]
    const apart = found.filter((finding) => together.length === 0 || !leftOut.includes(finding))
    const lines = apart.map((finding) => {
      const label = result.runs.find((run) => run.runId === finding.run)?.label
      return `${severity}: ${finding.title}${label === undefined || finding.title.includes(label) ? '' : ` (${label})`}`
    })
    return [...together, ...lines]
  })
  return lines.length === 0 ? '' : `${lines.join('\n')}\n\n`
}

import { createHash } from 'node:crypto'
import type { HostTransport, ImportAnswer } from '../../../shared-kinetics/contract/host-api.ts'
import { runInfoOf } from '../../../shared-kinetics/check-values/run-info-of.ts'
import type { RunColumns, RunInfo } from '../../../shared-kinetics/series/run.ts'
import { rateConstantsOfHolds } from '../../../shared-kinetics/rate-constants/rate-constants-of-holds.ts'
import { reactionModels } from '../../../shared-kinetics/reaction-models/registry.ts'
import type { StudyResult } from '../../../shared-kinetics/tasks/study-result.ts'
import { evaluateRateConstants } from '../../../shared-kinetics/tasks/evaluate-rate-constants.ts'
import type { MeasuredSources } from '../../../shared-kinetics/uncertainty/measured-sources.ts'
import { column } from '../../../shared-kinetics/units/quantity.ts'
import { openSavedCopy, packSavedCopy } from '../../study/saved-copy.ts'
import { createHost, type Host, type HostOptions } from '../create-host.ts'
import type { ImportedRun, TaskTable } from '../host-tasks.ts'
import { createInProcessPool } from '../in-process-pool.ts'
import type { ProgramParts } from '../handlers/handler-table.ts'
import { uploadToHost } from '../upload-to-host.ts'

/* For tests of the host and its shells: runs, tasks and parts that do not depend on the importer and the kinetics. */

export const sha256 = (bytes: Uint8Array | string): string => createHash('sha256').update(bytes).digest('hex')
export const textBytes = (text: string): Uint8Array<ArrayBuffer> => new Uint8Array(Buffer.from(text))

/** A run heated at one rate from 300 K, 50 rows of 10 s, mass as signal, with a NaN in it. */
export function sampleRun(
  fileName: string,
  rate_K_per_min: number,
  bytes: Uint8Array = textBytes(`${fileName} ${rate_K_per_min}`),
): ImportedRun {
  const rows = 50
  const time_s = Float64Array.from({ length: rows }, (_, i) => i * 10)
  const mass = Float64Array.from({ length: rows }, (_, i) => (i === 7 ? Number.NaN : 1e-5 * (1 - i / 100)))
  const columns: RunColumns = {
    time_s: column(time_s, 's'),
    temperature_K: column(
      time_s.map((t) => 300 + (rate_K_per_min / 60) * t),
      'K',
    ),
    signals: [mass],
  }
  return { columns, info: sampleInfo(fileName, bytes, rows) }
}

const sampleInfo = (fileName: string, bytes: Uint8Array, rows: number): RunInfo =>
  runInfoOf(`run-${sha256(bytes).slice(0, 12)}`, {
    label: fileName.replace(/\.\w+$/, ''),
    file: { name: fileName, sha256: sha256(bytes), byteLength: bytes.byteLength },
    columnsKey: sha256(`columns of ${sha256(bytes)}`),
    rows,
    initialMass_kg: 1e-5,
  })

const noSources: MeasuredSources = {
  stated: { temperatureCommon_K: 0, temperatureRun_K: 0, lag_s: 0, statedHeatingRate_share: 0 },
  heatingRate_share: new Float64Array(0),
  noise: {
    time_s: column(new Float64Array(0), 's'),
    lnReactionRate: new Float64Array(0),
    lnReactionRateSlope_per_s: new Float64Array(0),
    correlationWithBefore: new Float64Array(0),
  },
  baseline: null,
}

const noNumbers: StudyResult = {
  levels: [0.5],
  signal: null,
  signalsToChooseFrom: [],
  runs: [],
  profiles: [],
  kissinger: null,
  peakMethods: [],
  findings: [],
}

/**
 * Tasks that read files of one line: `rate 10` is a run at 10 K/min, anything else is refused in line 1. Evaluating a study
 * named `slow` goes on until it is cancelled; any other gives one result a run, with columns and a NaN.
 */
export function sampleTasks(counts: { evaluations: number; imports: number } = { evaluations: 0, imports: 0 }): TaskTable {
  return {
    'import-file': ({ fileName, bytes }, context) => {
      counts.imports += 1
      context.progress(1, 1)
      const text = new TextDecoder().decode(new Uint8Array(bytes)).trimEnd()
      const rate = /^rate ([\d.]+)/.exec(text)?.[1]
      if (rate === undefined) {
        const refused = { fileName, line: 1, reason: 'There is no rate.', remedy: 'Write one.' }
        return { kind: 'refused', refused }
      }
      return { kind: 'runs', runs: [sampleRun(fileName, Number(rate), new Uint8Array(bytes))] }
    },
    'estimate-uncertainty': ({ study, uncertainty: { seed, draws } }) => ({
      result: { levels: study.settings.levels, seed, draws, profiles: [] },
      order: { models: [], sources: noSources },
    }),
    'draw-energies': () => [],
    'intervals-of-draws': () => new Map(),
    'evaluate-study': async ({ study, columns }, context) => {
      counts.evaluations += 1
      for (let i = 0; study.runs.some((run) => run.label === 'slow'); i += 1) {
        context.progress(i, 1_000_000)
        context.checkCancelled()
        await new Promise((resolve) => setTimeout(resolve, 1))
      }
      context.progress(1, 1)
      return {
        ...noNumbers,
        levels: study.settings.levels,
        runs: study.runs.map((run) => {
          const held = columns.get(run.columnsKey)
          if (held === undefined) throw new Error('columns are missing')
          return {
            runId: run.id,
            label: run.label,
            fileName: run.file.name,
            column: 'Mass (mg)',
            sha256: run.file.sha256,
            signal: 'mass',
            signalUnit: 'kg',
            programme: 'constant-heating-rate',
            programmeGroup: 0,
            nominalHeatingRate_K_per_min: null,
            heatingRate_K_per_min: 10,
            heatingRateStandardError_K_per_min: Number.NaN,
            heatingRateSource: 'measured',
            holdTemperature_K: null,
            holdStart_s: null,
            conversionBeforeHold: null,
            rows: run.rows,
            initialMass_kg: null,
            window: { kind: 'temperature', start_K: 300, end_K: 400 },
            peak_K: null,
            enthalpy_J_per_g: null,
            enthalpyMagnitude_J_per_g: null,
            temperatureAtLevel_K: [Number.NaN],
            timeAtLevel_s: [null],
            reactionRateAtLevel_per_s: [1],
            signalAtLevel: [1],
            curve: {
              time_s: new Float64Array(held.time_s ?? []),
              temperature_K: new Float64Array(held.temperature_K),
              signal: new Float64Array(held.signals[0] ?? []),
              conversion: new Float64Array(),
              reactionRate_per_s: new Float64Array(),
              baseline: new Float64Array(),
            },
          }
        }),
      }
    },
    'rate-constants-of-holds': ({ holds, model, options }, { checkCancelled }) =>
      rateConstantsOfHolds(holds, reactionModels[model], options, checkCancelled),
    'evaluate-rate-constants': ({ table }) => evaluateRateConstants(table),
    'pack-saved-copy': (copy) => packSavedCopy(copy),
    'open-saved-copy': ({ bytes }) => openSavedCopy(new Uint8Array(bytes)),
  }
}

/** A demo of two runs, fast one first, and exports that say what they were asked. */
const sampleParts: ProgramParts = {
  demoSeries: () => ({
    name: 'Sample demo',
    files: [
      { fileName: 'b fast.csv', bytes: textBytes('rate 20') },
      { fileName: 'a slow one.csv', bytes: textBytes('rate 2') },
    ],
  }),
  exportResults: ({ document, result }, format) => [
    { fileName: `activation.${format}`, mediaType: 'text/plain', bytes: textBytes(`${document.name}, ${result.runs.length} runs`) },
  ],
  exportRateConstants: ({ document, result }, format) => [
    { fileName: `rate-constants.${format}`, mediaType: 'text/plain', bytes: textBytes(`${document.name}, ${result.rows.length} rows`) },
  ],
}

/** A host of samples that keeps nothing, unless told otherwise. */
export function sampleHost(options: Partial<HostOptions> = {}): Host {
  return createHost({
    dataFolder: null,
    pool: createInProcessPool(sampleTasks()),
    parts: sampleParts,
    version: '1.2.3',
    shell: 'browser',
    warn: (message) => {
      throw new Error(message)
    },
    ...options,
  })
}

/** Uploads files of one line each and imports them. */
export async function importTexts(transport: HostTransport, texts: Readonly<Record<string, string>>): Promise<ImportAnswer> {
  const files = Object.entries(texts).map(([fileName, text]) => ({ fileName, bytes: textBytes(text) }))
  return transport.call('runs.import', { uploadIds: await uploadToHost(transport, files) })
}

/** What a promise was rejected with; throws when it was not. */
export async function rejectionOf(promise: Promise<unknown>): Promise<unknown> {
  return promise.then(
    () => {
      throw new Error('It was not rejected.')
    },
    (error: unknown) => error,
  )
}

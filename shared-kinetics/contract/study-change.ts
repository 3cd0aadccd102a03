import * as z from 'zod/mini'
import type { RunInfo } from '../series/run.ts'
import type { DeepReadonly } from './deep-readonly.ts'
import { nameAfter } from './name-after-runs.ts'
import { rateConstantTableSchema } from './rate-constant-schema.ts'
import {
  runInfoSchema,
  settingsSchema,
  studyLimits,
  windowSchema,
  type StudyDocument,
  uncertaintySchema,
  untitled,
} from './study-document.ts'

/** Every change a person can make to a study, as plain data. The host and each replica apply it with `applyChange`. */
export const studyChangeSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('rename-study'), name: z.string().check(z.minLength(1), z.maxLength(200)) }),
  z.object({
    kind: z.literal('add-runs'),
    runs: z.array(runInfoSchema).check(z.minLength(1), z.maxLength(studyLimits.runs)),
    importNotes: runInfoSchema.shape.importNotes,
  }),
  z.object({ kind: z.literal('remove-run'), runId: z.string() }),
  z.object({ kind: z.literal('relabel-run'), runId: z.string(), label: z.string().check(z.minLength(1), z.maxLength(200)) }),
  z.object({ kind: z.literal('use-run'), runId: z.string(), use: z.boolean() }),
  z.object({ kind: z.literal('set-run-window'), runId: z.string(), window: z.nullable(windowSchema) }),
  z.object({ kind: z.literal('set-run-heating-rate'), runId: z.string(), heatingRate_K_per_s: z.nullable(z.number().check(z.positive())) }),
  z.object({ kind: z.literal('set-exothermic'), runId: z.nullable(z.string()), exothermic: z.enum(['up', 'down']) }),
  z.object({ kind: z.literal('set-signal'), signal: settingsSchema.shape.signal }),
  z.object({ kind: z.literal('set-levels'), levels: settingsSchema.shape.levels }),
  z.object({ kind: z.literal('set-methods'), methods: settingsSchema.shape.methods }),
  z.object({ kind: z.literal('set-window'), window: z.nullable(windowSchema) }),
  z.object({ kind: z.literal('set-baseline'), baseline: settingsSchema.shape.baseline }),
  z.object({ kind: z.literal('set-mean-range'), meanRange: settingsSchema.shape.meanRange }),
  z.object({ kind: z.literal('set-uncertainty'), uncertainty: uncertaintySchema }),
  z.object({ kind: z.literal('set-rate-constants'), table: z.nullable(rateConstantTableSchema) }),
])
export type StudyChange = DeepReadonly<z.infer<typeof studyChangeSchema>>

/** What the undo line says: "Undo: window of run 3". */
export function labelOfChange(document: StudyDocument, change: StudyChange): string {
  switch (change.kind) {
    case 'rename-study':
      return 'name of the study'
    case 'add-runs':
      return change.runs.length === 1 ? `adding ${change.runs[0]?.label ?? 'a run'}` : `adding ${change.runs.length} runs`
    case 'remove-run':
      return `removing ${runName(document, change.runId)}`
    case 'relabel-run':
      return `label of ${runName(document, change.runId)}`
    case 'use-run':
      return `${change.use ? 'using' : 'leaving out'} ${runName(document, change.runId)}`
    case 'set-run-window':
      return `window of ${runName(document, change.runId)}`
    case 'set-run-heating-rate':
      return `heating rate of ${runName(document, change.runId)}`
    case 'set-exothermic':
      return 'exothermic direction'
    case 'set-signal':
      return 'choice of signal'
    case 'set-levels':
      return 'levels'
    case 'set-methods':
      return 'choice of methods'
    case 'set-window':
      return 'window of the series'
    case 'set-baseline':
      return 'baseline'
    case 'set-mean-range':
      return 'range of the mean'
    case 'set-uncertainty':
      return 'stated uncertainties'
    case 'set-rate-constants':
      return 'table of rate constants'
  }
}

function runName(document: StudyDocument, runId: string): string {
  return document.runs.find((run) => run.id === runId)?.label ?? 'a run'
}

/** The study after one change. Pure; a change that names a run that is gone leaves the study as it was. */
export function applyChange(document: StudyDocument, change: StudyChange): StudyDocument {
  const mapRuns = (runId: string | null, edit: (run: RunInfo) => RunInfo): StudyDocument => ({
    ...document,
    runs: document.runs.map((run) => (runId === null || run.id === runId ? edit(run) : run)),
  })
  const set = (settings: Partial<StudyDocument['settings']>): StudyDocument => ({
    ...document,
    settings: { ...document.settings, ...settings },
  })
  switch (change.kind) {
    case 'rename-study':
      return { ...document, name: change.name }
    case 'add-runs':
      return {
        ...document,
        name: document.runs.length === 0 && document.name === untitled ? nameAfter(change.runs) : document.name,
        runs: [...document.runs, ...change.runs],
        importNotes: [...document.importNotes, ...change.importNotes],
      }
    case 'remove-run':
      return { ...document, runs: document.runs.filter((run) => run.id !== change.runId) }
    case 'relabel-run':
      return mapRuns(change.runId, (run) => ({ ...run, label: change.label }))
    case 'use-run':
      return mapRuns(change.runId, (run) => ({ ...run, use: change.use }))
    case 'set-run-window':
      return mapRuns(change.runId, (run) => ({ ...run, window: change.window }))
    case 'set-run-heating-rate':
      return mapRuns(change.runId, (run) => ({
        ...run,
        nominalHeatingRate:
          change.heatingRate_K_per_s === null ? null : { heatingRate_K_per_s: change.heatingRate_K_per_s, source: 'option', text: 'typed' },
      }))
    case 'set-exothermic':
      return mapRuns(change.runId, (run) => ({ ...run, exothermic: change.exothermic }))
    case 'set-signal':
      return set({ signal: change.signal })
    case 'set-levels':
      return set({ levels: change.levels })
    case 'set-methods':
      return set({ methods: change.methods })
    case 'set-window':
      return set({ window: change.window })
    case 'set-baseline':
      return set({ baseline: change.baseline })
    case 'set-mean-range':
      return set({ meanRange: change.meanRange })
    case 'set-uncertainty':
      return { ...document, uncertainty: change.uncertainty }
    case 'set-rate-constants':
      return { ...document, name: nameWithTable(document, change.table), rateConstants: change.table }
  }
}

/** A study that nobody has named is named after the file of its table. */
function nameWithTable(document: StudyDocument, table: StudyDocument['rateConstants']): string {
  const fileName = table?.source.kind === 'file' ? (table.source.name ?? '').replace(/\.[a-z0-9]{1,5}$/i, '').trim() : ''
  return document.name === untitled && document.runs.length === 0 && fileName !== '' ? fileName.slice(0, 200) : document.name
}

import * as z from 'zod/mini'
import type { RateConstantTable } from '../rate-constants/rate-constant-table.ts'
import type { MethodId } from '../isoconversional/result.ts'
import type { ImportNote, NominalSource, RunInfo, Window } from '../series/run.ts'
import type { SignalQuantity, SignalUnit } from '../series/signal-quantity.ts'
import type { AnalysisSettings, BaselineKind } from '../tasks/study-input.ts'
import type { StatedUncertainties, UncertaintySettings } from '../uncertainty/measured-sources.ts'
import { rateConstantTableSchema } from './rate-constant-schema.ts'

/** Limits that keep a hostile or damaged file from exhausting the machine. */
export const studyLimits = { runs: 200, levels: 2000, text: 4000, signals: 64, notes: 1000, draws: 20_000 } as const

/** The members of a union of names as a list; the compiler refuses one that is missing or too many. */
const namesOf = <Name extends string>(names: Readonly<Record<Name, true>>): readonly Name[] => Object.keys(names) as Name[]

const methodSchema = z.enum(
  namesOf<MethodId>({
    friedman: true,
    ofw: true,
    'ofw-corrected': true,
    kas: true,
    starink: true,
    vyazovkin: true,
    'vyazovkin-incremental': true,
    'isothermal-integral': true,
    'starink-1996': true,
    tang: true,
    'astm-e1641': true,
    'iso-11358-2': true,
  }),
)
const signalQuantitySchema = z.enum(namesOf<SignalQuantity>({ mass: true, conversion: true, 'heat-release': true, 'heat-flow': true }))
const signalUnitSchema = z.enum(namesOf<SignalUnit>({ kg: true, '1': true, W: true, 'W/kg': true }))
const baselineSchema = z.enum(namesOf<BaselineKind>({ 'area-proportional': true, straight: true }))
const nominalSourceSchema = z.enum(namesOf<NominalSource>({ option: true, heading: true, preamble: true, name: true }))
const importNoteCodeSchema = z.enum(
  namesOf<ImportNote['code']>({
    'rows-set-aside': true,
    'columns-set-aside': true,
    'several-columns-of-one-quantity': true,
    'unit-from-values': true,
    'heading-missing': true,
    'time-missing': true,
    'file-left-out': true,
  }),
)

const text = z.string().check(z.maxLength(studyLimits.text))
const finite = z.number().check(z.refine(Number.isFinite, 'must be a finite number'))
const positive = finite.check(z.positive())

export const windowSchema = z.union([
  z
    .object({ kind: z.literal('temperature'), start_K: finite, end_K: finite })
    .check(z.refine((w) => w.end_K > w.start_K && w.start_K > 0, 'a window ends above its start')),
  z
    .object({ kind: z.literal('time'), start_s: finite, end_s: finite })
    .check(z.refine((w) => w.end_s > w.start_s, 'a window ends after its start')),
])

const signalInfoSchema = z.object({
  quantity: signalQuantitySchema,
  unit: signalUnitSchema,
  label: text,
  fileUnit: text,
})
const evidenceSchema = z.record(text, z.union([text, finite, z.null()]))

export const runInfoSchema = z.object({
  id: text,
  label: text,
  file: z.object({ name: text, sha256: z.string().check(z.regex(/^[0-9a-f]{64}$/)), byteLength: z.int().check(z.nonnegative()) }),
  columnsKey: z.string().check(z.regex(/^[0-9a-f]{64}$/)),
  rows: z.int().check(z.positive()),
  hasTime: z.boolean(),
  signals: z.array(signalInfoSchema).check(z.minLength(1), z.maxLength(studyLimits.signals)),
  nominalHeatingRate: z.nullable(z.object({ heatingRate_K_per_s: positive, source: nominalSourceSchema, text })),
  initialMass_kg: z.nullable(positive),
  exothermic: z.nullable(z.enum(['up', 'down'])),
  metadata: z.array(z.object({ key: text, value: text })).check(z.maxLength(studyLimits.notes)),
  importNotes: z
    .array(
      z.object({
        code: importNoteCodeSchema,
        severity: z.enum(['caution', 'note']),
        message: text,
        evidence: evidenceSchema,
      }),
    )
    .check(z.maxLength(studyLimits.notes)),
  importDecisions: z.array(z.object({ step: text, value: text, reason: text })).check(z.maxLength(studyLimits.notes)),
  use: z.boolean(),
  window: z.nullable(windowSchema),
})

const levelsSchema = z.array(finite.check(z.gt(0), z.lt(1))).check(
  z.minLength(1),
  z.maxLength(studyLimits.levels),
  z.refine((levels) => levels.every((level, i) => i === 0 || level > (levels[i - 1] ?? 0)), 'levels ascend'),
)

export const settingsSchema = z.object({
  signal: z.nullable(signalQuantitySchema),
  levels: levelsSchema,
  methods: z.nullable(z.array(methodSchema).check(z.minLength(1))),
  window: z.nullable(windowSchema),
  baseline: baselineSchema,
  meanRange: z.tuple([finite, finite]),
})

const notNegative = finite.check(z.nonnegative())

/** What a person can state of the measurement. */
export const statedKeys = namesOf<keyof StatedUncertainties>({
  temperatureCommon_K: true,
  temperatureRun_K: true,
  lag_s: true,
  statedHeatingRate_share: true,
})

export const uncertaintySchema = z.object({
  temperatureCommon_K: notNegative,
  temperatureRun_K: notNegative,
  lag_s: notNegative,
  statedHeatingRate_share: notNegative.check(z.lt(1)),
  draws: z.int().check(z.gte(100), z.lte(studyLimits.draws)),
  seed: z.int().check(z.nonnegative()),
  stated: z.optional(z.readonly(z.array(z.enum(statedKeys)).check(z.maxLength(statedKeys.length)))),
})

/**
 * What is taken where nobody has stated anything: 0.5 K between runs; 0.5 K common to all and a lag of 1 s, which are common practice for a calibrated instrument and
 * small samples and stand in no standard; 2 % for a nominal heating rate, likewise. To be replaced by what the analyst's own calibration shows. 2,000 draws know an
 * end of a 95 % interval to some 5 % of its half-width.
 */
export const defaultUncertainty: UncertaintySettings = {
  temperatureCommon_K: 0.5,
  temperatureRun_K: 0.5,
  lag_s: 1,
  statedHeatingRate_share: 0.02,
  draws: 2000,
  seed: 1,
}

/** The study as saved and as every replica holds it: small plain data; the columns live beside it, named by `columnsKey`. */
const studyDocumentSchema = z.object({
  format: z.literal('rampfold.study/1'),
  id: z.string().check(z.regex(/^[0-9a-z-]{1,64}$/)),
  name: text,
  runs: z.array(runInfoSchema).check(z.maxLength(studyLimits.runs)),
  /** Notes about files that were left out on request; shown as findings until the study ends. */
  importNotes: runInfoSchema.shape.importNotes,
  settings: settingsSchema,
  uncertainty: z._default(uncertaintySchema, defaultUncertainty),
  /** Held instead of runs (or made from them); null in studies of runs, and in those saved before there were such tables. */
  rateConstants: z._default(z.nullable(rateConstantTableSchema), null),
})

export interface StudyDocument {
  readonly format: 'rampfold.study/1'
  readonly id: string
  readonly name: string
  readonly runs: readonly RunInfo[]
  readonly importNotes: RunInfo['importNotes']
  readonly settings: AnalysisSettings
  /** What the intervals from measured sources and resampling rest on; no Ea depends on it. */
  readonly uncertainty: UncertaintySettings
  readonly rateConstants: RateConstantTable | null
}

/** 0.05 to 0.95 in steps of 0.05, as the 2011 recommendations ask for (source `ictac-2011`). */
const defaultLevels: readonly number[] = Array.from({ length: 19 }, (_, i) => (i + 1) / 20)

export const defaultSettings: AnalysisSettings = {
  signal: null,
  levels: defaultLevels,
  methods: null,
  window: null,
  baseline: 'area-proportional',
  meanRange: [0.1, 0.9],
}

/** A study that nobody has named is named after the first runs it gets. */
export const untitled = 'Untitled study'

export const emptyStudy = (id: string, name = untitled): StudyDocument => ({
  format: 'rampfold.study/1',
  id,
  name,
  runs: [],
  importNotes: [],
  settings: defaultSettings,
  uncertainty: defaultUncertainty,
  rateConstants: null,
})

/** Parses a study read from a disk or a wire; throws the schema's error, which names the field. */
export const parseStudyDocument = (value: unknown): StudyDocument => studyDocumentSchema.parse(value)

export type { Window }

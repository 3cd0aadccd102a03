import * as z from 'zod/mini'
import type { ReactionModelCode } from '../reaction-models/registry.ts'
import type { RateConstantNote, RateConstantSource, TemperatureUnit } from '../rate-constants/rate-constant-table.ts'
import { decimalSignWords, delimiterWords, encodingWords } from './import-options.ts'

/** Limits that keep a hostile or damaged table from exhausting the machine. */
export const rateConstantLimits = { rows: 1000, predictions: 200, notes: 100, text: 1000, characters: 1_000_000, bytes: 4_000_000 } as const

const namesOf = <Name extends string>(names: Readonly<Record<Name, true>>): readonly Name[] => Object.keys(names) as Name[]
const sourceSchema = z.enum(namesOf<RateConstantSource>({ typed: true, pasted: true, file: true, 'isothermal-runs': true }))
export const temperatureUnitSchema = z.enum(namesOf<TemperatureUnit>({ K: true, C: true, F: true }))
const noteCodeSchema = z.enum(
  namesOf<RateConstantNote['code']>({
    'rows-set-aside': true,
    'columns-set-aside': true,
    'heading-missing': true,
    'heading-read-as': true,
    'uncertainty-read-as': true,
    'model-assumed': true,
  }),
)

const text = z.string().check(z.maxLength(rateConstantLimits.text))
const finite = z.number().check(z.refine(Number.isFinite, 'must be a finite number'))
const positive = finite.check(z.positive())
// Colder or hotter than any reaction is measured; and a temperature that was meant in another unit.
const temperature_K = positive.check(z.lte(10_000))

const share = finite.check(z.gte(0), z.lte(1))
const maybe = z.nullable(finite)

const holdFitsSchema = z.object({
  model: text,
  method: z.literal('least-squares-of-conversion'),
  zeroInTime: z.enum(['free', 'fixed']),
  range: z.tuple([share, share]),
  holds: z
    .array(
      z.object({
        label: text,
        temperature_K,
        rateConstant_per_s: positive,
        standardError_per_s: maybe,
        zero_s: finite,
        zeroStandardError_s: maybe,
        linearisedRateConstant_per_s: positive,
        linearisedR2: maybe,
        residualStandardDeviation: maybe,
        greatestResidual: finite,
        rows: z.int(),
        dof: z.int(),
        signRuns: z.int(),
        signRunsProbability: maybe,
        isSystematic: z.boolean(),
      }),
    )
    .check(z.maxLength(rateConstantLimits.rows)),
  dof: z.int(),
  varianceRatioLimit: maybe,
  models: z
    .array(
      z.object({
        model: text,
        label: text,
        status: z.enum(['ok', 'not-converged', 'model-does-not-apply']),
        residualSumOfSquares: maybe,
        residualStandardDeviation: maybe,
        varianceRatio: maybe,
        fits: z.boolean(),
        Ea_kJ_per_mol: maybe,
        lnA_per_s: maybe,
      }),
    )
    .check(z.maxLength(100)),
})

export const rateConstantTableSchema = z.object({
  rows: z
    .array(
      z.object({
        temperature_K,
        rateConstant: positive,
        standardUncertainty: z.nullable(positive),
        label: z.nullable(text),
        use: z.boolean(),
      }),
    )
    .check(z.maxLength(rateConstantLimits.rows)),
  rateUnit: z.string().check(z.maxLength(60)),
  temperatureUnitShown: temperatureUnitSchema,
  predictAt_K: z.array(temperature_K).check(z.maxLength(rateConstantLimits.predictions)),
  source: z.object({ kind: sourceSchema, name: z.nullable(text), sha256: z.nullable(z.string().check(z.regex(/^[0-9a-f]{64}$/))) }),
  notes: z
    .array(
      z.object({
        code: noteCodeSchema,
        severity: z.enum(['caution', 'note']),
        message: text,
        evidence: z.record(text, z.union([text, finite, z.null()])),
      }),
    )
    .check(z.maxLength(rateConstantLimits.notes)),
  /** Only in tables made from isothermal runs, and not in those saved before models were compared. */
  holdFits: z.optional(holdFitsSchema),
})

/** What a person says about a table of rate constants; whatever is left out must stand in the table, and is asked for where it does not. */
export const rateConstantReadOptionsSchema = z.strictObject({
  temperatureUnit: z.optional(temperatureUnitSchema),
  /** As written: `1/s`, `min-1`, `L/(mol s)`. */
  rateUnit: z.optional(z.string().check(z.minLength(1), z.maxLength(60))),
  delimiter: z.optional(z.enum(delimiterWords)),
  decimalSign: z.optional(z.enum(decimalSignWords)),
  encoding: z.optional(z.enum(encodingWords)),
})
export type RateConstantReadOptions = z.infer<typeof rateConstantReadOptionsSchema>

const modelSchema = z.enum(
  namesOf<ReactionModelCode>({
    'P2/3': true,
    F0: true,
    P2: true,
    P3: true,
    P4: true,
    D1: true,
    D2: true,
    D3: true,
    D4: true,
    F1: true,
    'F3/2': true,
    F2: true,
    F3: true,
    'A3/2': true,
    A2: true,
    A3: true,
    A4: true,
    R2: true,
    R3: true,
    B1: true,
    L2: true,
  }),
)

/** How rate constants are made from the isothermal runs of a study: the model, whether the zero in time is fitted (so where left out), the range of conversion (0.1 to 0.9). */
export const fromHoldsSchema = z.strictObject({
  revision: z.int(),
  model: modelSchema,
  zeroInTime: z.optional(z.enum(['free', 'fixed'])),
  range: z.optional(z.tuple([share, share]).check(z.refine(([from, to]) => from < to, 'a range ends above its start'))),
})

import type { FitsOfHolds } from './fits-of-holds.ts'

/** One row of a table of rate constants, in SI but for k, whose unit is that of the table. */
export interface RateConstantRow {
  readonly temperature_K: number
  readonly rateConstant: number
  /** One standard uncertainty of k, in the unit of k; null where nobody stated one. */
  readonly standardUncertainty: number | null
  readonly label: string | null
  readonly use: boolean
}

/** Something that a person should know about how a table was read. */
export interface RateConstantNote {
  readonly code: 'rows-set-aside' | 'columns-set-aside' | 'heading-missing' | 'heading-read-as' | 'uncertainty-read-as' | 'model-assumed'
  readonly severity: 'caution' | 'note'
  readonly message: string
  readonly evidence: Readonly<Record<string, string | number | null>>
}

export const rateConstantSources = ['typed', 'pasted', 'file', 'isothermal-runs'] as const
export type RateConstantSource = (typeof rateConstantSources)[number]

export const temperatureUnits = ['K', 'C', 'F'] as const
export type TemperatureUnit = (typeof temperatureUnits)[number]

/** Rate constants against temperature: what a study may hold instead of runs. */
export interface RateConstantTable {
  readonly rows: readonly RateConstantRow[]
  /** As `parseRateUnit` spells it: `1/s`, `L/(mol s)`; empty where nobody stated it. */
  readonly rateUnit: string
  readonly temperatureUnitShown: TemperatureUnit
  /** Temperatures at which k is to be predicted. */
  readonly predictAt_K: readonly number[]
  /** `name` of the file, or of what the rows were made from. */
  readonly source: { readonly kind: RateConstantSource; readonly name: string | null; readonly sha256: string | null }
  readonly notes: readonly RateConstantNote[]
  /** Where the table was made from isothermal runs: how the model follows them, and what other models leave. */
  readonly holdFits?: FitsOfHolds | undefined
}

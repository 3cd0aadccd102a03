import type { Column } from '../units/quantity.ts'
import type { SignalQuantity, SignalUnit } from './signal-quantity.ts'

/** The measured columns of one run, all of one length, on shared memory, never written to after import. */
export interface RunColumns {
  /** null when the export has no time; it is then rebuilt from a heating rate that somebody stated. */
  readonly time_s: Column<'s'> | null
  readonly temperature_K: Column<'K'>
  /** One column for each entry of `RunInfo.signals`, in that order, in that entry's unit. */
  readonly signals: readonly Float64Array[]
}

export interface SignalInfo {
  readonly quantity: SignalQuantity
  readonly unit: SignalUnit
  /** Heading as the file has it, e.g. `Mass (mg)`. */
  readonly label: string
  /** Unit as the file has it, e.g. `mg`; shown again on screen and in exports. */
  readonly fileUnit: string
}

/** The part of a run that holds the reaction: in temperature, or (holds) in time counted from the run's first row. */
export type Window =
  | { readonly kind: 'temperature'; readonly start_K: number; readonly end_K: number }
  | { readonly kind: 'time'; readonly start_s: number; readonly end_s: number }

export type NominalSource = 'option' | 'heading' | 'preamble' | 'name'

export interface NominalHeatingRate {
  readonly heatingRate_K_per_s: number
  readonly source: NominalSource
  /** The text it was read from, so that a person can check it. */
  readonly text: string
}

/** A run as plain data: everything about it but its columns. */
export interface RunInfo {
  readonly id: string
  readonly label: string
  readonly file: { readonly name: string; readonly sha256: string; readonly byteLength: number }
  /** Names the columns in the column store: the same key, the same numbers. */
  readonly columnsKey: string
  readonly rows: number
  readonly hasTime: boolean
  readonly signals: readonly SignalInfo[]
  readonly nominalHeatingRate: NominalHeatingRate | null
  readonly initialMass_kg: number | null
  /** Which way an exothermic event points in the heat-flow columns; null where the file does not say. */
  readonly exothermic: 'up' | 'down' | null
  /** Other things the file says (gas, flow, crucible, operator's remarks), as written. */
  readonly metadata: readonly { readonly key: string; readonly value: string }[]
  /** How the file was read, and what was set aside while reading it. */
  readonly importNotes: readonly ImportNote[]
  readonly importDecisions: readonly ImportDecision[]
  readonly use: boolean
  /** This run's own window; null takes the series' window, and without one the window is found in the data. */
  readonly window: Window | null
}

/** Something seen while reading a file that a person should know; becomes a finding. */
export interface ImportNote {
  readonly code:
    | 'rows-set-aside'
    | 'columns-set-aside'
    | 'several-columns-of-one-quantity'
    | 'unit-from-values'
    | 'heading-missing'
    | 'time-missing'
    | 'file-left-out'
  readonly severity: 'caution' | 'note'
  readonly message: string
  readonly evidence: Readonly<Record<string, string | number | null>>
}

/** One decision of the importer in words a person can check: `encoding`, `delimiter`, `decimal sign`, … */
export interface ImportDecision {
  readonly step: string
  readonly value: string
  readonly reason: string
}

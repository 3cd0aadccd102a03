import type { Column } from '../units/quantity.ts'
import type { Programme, TemperatureHistory } from './programme.ts'

/** One run read at every level: three columns as long as the levels, NaN where the run does not reach a level. */
export interface RunAtLevels {
  readonly programme: Programme
  /** Runs of one programme (replicates) share this number; methods count distinct values of it. */
  readonly programmeGroup: number
  /** Largest distance of the local heating rate from the fitted one, as a share; NaN unless a constant heating rate was measured. */
  readonly heatingRateSpread: number
  readonly history: TemperatureHistory
  /** Time from the start of the history to the level. */
  readonly time_s: Column<'s'>
  readonly temperature_K: Column<'K'>
  /** dalpha/dt at the level. */
  readonly reactionRate_per_s: Column<'1/s'>
}

/** What every isoconversional method works on: the runs analysed together, read at common levels. */
export interface SeriesAtLevels {
  /** Ascending, inside (0, 1). */
  readonly levels: Column<'1'>
  readonly runs: readonly RunAtLevels[]
}

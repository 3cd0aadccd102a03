import type { Column } from '../units/quantity.ts'

/** Sources of uncertainty that measured temperatures, heating rates and signals bring. */
export const uncertaintySources = [
  'temperature-common',
  'temperature-run',
  'temperature-lag',
  'heating-rate',
  'signal-noise',
  'baseline',
] as const
export type UncertaintySource = (typeof uncertaintySources)[number]

/** What a person states about how well temperatures and heating rates were measured: standard uncertainties. */
export interface StatedUncertainties {
  /** Of every temperature of the series alike: what a calibration leaves. */
  readonly temperatureCommon_K: number
  /** Of all temperatures of one run, independent of the other runs: how well two runs of one sample repeat. */
  readonly temperatureRun_K: number
  /** Of the time by which the sample lags behind the thermometer: the error of the temperature is this times the heating rate. */
  readonly lag_s: number
  /** Of a heating rate that was stated and not measured, as a share. A measured one has its own. */
  readonly statedHeatingRate_share: number
}

/** The same with what somebody named among it: a value that was typed is stated even where it is the one that is assumed otherwise. */
export interface NamedUncertainties extends StatedUncertainties {
  readonly stated?: readonly (keyof StatedUncertainties)[] | undefined
}

/** What is stated, and how many draws of which seed are made of it. */
export interface UncertaintySettings extends NamedUncertainties {
  readonly draws: number
  /** Of everything drawn at random, resampled runs included; whole, not negative. */
  readonly seed: number
}

/** Everything that a series' measured inputs are uncertain by: plain data that crosses to a worker. Tables hold one entry a run at each level: [level · runs + run]. */
export interface MeasuredSources {
  readonly stated: NamedUncertainties
  /** Relative standard uncertainty of each run's heating rate. */
  readonly heatingRate_share: Float64Array
  /** Standard errors from the noise of the signal; the correlation is that with the level before. */
  readonly noise: {
    readonly time_s: Column<'s'>
    /** Of ln(dα/dt) at a given time, and what an error of the time adds to it. */
    readonly lnReactionRate: Float64Array
    readonly lnReactionRateSlope_per_s: Float64Array
    readonly correlationWithBefore: Float64Array
  }
  /** By how much another admissible baseline moves each point; null where there is no choice of one. */
  readonly baseline: BaselineShift | null
}

export interface BaselineShift {
  /** NaN at a level that a run does not reach with the other baseline. */
  readonly time_s: Column<'s'>
  /** Also NaN where the other baseline leaves no positive rate. */
  readonly lnReactionRate: Float64Array
  /** A sentence that names the run under which no other baseline can be drawn; both tables are then NaN throughout. null: all runs have one. */
  readonly reason: string | null
}

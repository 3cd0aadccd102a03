/** Errors of one draw. The first two hold one entry a run, the others one a run at each level. */
export interface Disturbance {
  /** Added to every temperature of the run, besides what the lag adds. */
  readonly temperature_K: Float64Array
  readonly lnHeatingRate: Float64Array
  /** The same for all runs: added to T is this times dT/dt. */
  lag_s: number
  readonly time_s: Float64Array
  readonly lnReactionRate: Float64Array
}

/** Memory for one level's points, so that thousands of draws do not each ask for it. */
export interface Room {
  readonly a: Float64Array
  readonly b: Float64Array
  readonly c: Float64Array
  readonly d: Float64Array
  readonly e: Float64Array
}

export const roomFor = (runs: number): Room => ({
  a: new Float64Array(runs),
  b: new Float64Array(runs),
  c: new Float64Array(runs),
  d: new Float64Array(runs),
  e: new Float64Array(runs),
})

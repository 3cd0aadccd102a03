import type { Programme, TemperatureHistory } from './programme.ts'
import { valueAt } from './value-at.ts'

export interface RunToGroup {
  readonly programme: Programme
  /** Over the time in which the run reacts, on the clock of the run. */
  readonly reaction: TemperatureHistory
  readonly meanHeatingRate_K_per_s: number
  readonly meanTemperature_K: number
}

/** Heating rates within this share of each other are one programme run twice. */
const sameHeatingRate = 0.05
const sameHold_K = 1
/** General programmes are one where their temperatures are never farther apart than this, at one time … */
const sameHistory_K = 3
/** … at so many times over the reaction. */
const comparedTimes = 50

/**
 * Numbers the distinct programmes of a series from slow to fast, starting with 0; replicates of one programme share a number. Heating rates within 5 % of a
 * group's slowest, holds within 1 K of a group's coolest, and general programmes that keep within 3 K of each other are one programme; so are a constant heating rate and
 * a general programme that keep within 3 K when both clocks are set at the middle of the reaction (a ramp may start anywhere).
 *
 * @returns one number for each run, in the order given
 */
export function programmeGroups(runs: readonly RunToGroup[]): number[] {
  const order = runs.map((_, i) => i).sort((a, b) => compareProgrammes(at(runs, a), at(runs, b)))
  const group = runs.map(() => -1)
  const leaders: RunToGroup[] = []
  for (const i of order) {
    const run = at(runs, i)
    const known = leaders.findIndex((leader) => sameProgramme(leader, run))
    group[i] = known >= 0 ? known : leaders.push(run) - 1
  }
  return group
}

/** Holds first, coolest first; then by mean heating rate over the reaction. */
function compareProgrammes(a: RunToGroup, b: RunToGroup): number {
  const hold = (run: RunToGroup): boolean => run.programme.kind === 'isothermal'
  if (hold(a) !== hold(b)) return hold(a) ? -1 : 1
  return hold(a) ? a.meanTemperature_K - b.meanTemperature_K : a.meanHeatingRate_K_per_s - b.meanHeatingRate_K_per_s
}

function sameProgramme(a: RunToGroup, b: RunToGroup): boolean {
  const one = a.programme
  const other = b.programme
  if (one.kind === 'constant-heating-rate' && other.kind === 'constant-heating-rate') {
    return other.heatingRate <= one.heatingRate * (1 + sameHeatingRate) && other.heatingRate >= one.heatingRate / (1 + sameHeatingRate)
  }
  if (one.kind === 'isothermal' && other.kind === 'isothermal') return Math.abs(one.temperature - other.temperature) <= sameHold_K
  if (one.kind === 'general' && other.kind === 'general') return sameHistory(a.reaction, b.reaction, 0)
  if (one.kind === 'isothermal' || other.kind === 'isothermal') return false
  const middle_K = 0.5 * (a.meanTemperature_K + b.meanTemperature_K)
  return sameHistory(a.reaction, b.reaction, timeAt(a.reaction, middle_K) - timeAt(b.reaction, middle_K))
}

/** When a history first comes to a temperature; NaN where it never does. */
function timeAt({ time_s, temperature_K }: TemperatureHistory, T: number): number {
  return time_s[temperature_K.findIndex((value) => value >= T)] ?? Number.NaN
}

/** Whether b, its clock put on by `shift_s`, keeps to the temperatures of a. */
function sameHistory(a: TemperatureHistory, b: TemperatureHistory, shift_s: number): boolean {
  const start = Math.max(a.time_s[0] ?? Infinity, (b.time_s[0] ?? Infinity) + shift_s)
  const end = Math.min(a.time_s.at(-1) ?? -Infinity, (b.time_s.at(-1) ?? -Infinity) + shift_s)
  const longer = Math.max((a.time_s.at(-1) ?? 0) - (a.time_s[0] ?? 0), (b.time_s.at(-1) ?? 0) - (b.time_s[0] ?? 0))
  // Programmes that share less than half of the longer reaction's time have not been compared at all.
  if (!(end - start >= 0.5 * longer)) return false
  for (let i = 0; i <= comparedTimes; i++) {
    const time = start + ((end - start) * i) / comparedTimes
    const apart = Math.abs(valueAt(a.time_s, a.temperature_K, time) - valueAt(b.time_s, b.temperature_K, time - shift_s))
    if (!(apart <= sameHistory_K)) return false
  }
  return true
}

function at<Item>(items: readonly Item[], i: number): Item {
  const item = items[i]
  if (item === undefined) throw new RangeError(`no item ${i}`)
  return item
}

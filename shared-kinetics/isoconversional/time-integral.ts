import type { RunAtLevels } from '../series/series-at-levels.ts'
import { constantRateIntegral } from './constant-rate-integral.ts'
import { historyIntegral } from './history-integral.ts'

/** ln J and its slope at one Ea; J in s. */
export interface IntegralValue {
  readonly lnJ: number
  /** Mean of 1/T over the integral, weighted by exp(-Ea/(R T)), in 1/K: d ln J/dEa = -(this)/R. */
  readonly inverseT: number
}

/**
 * J(Ea) = ∫ exp(-Ea/(R T(t))) dt of one run, from the start of its history to each level. Only its logarithm is ever held: J itself runs from 1e3 s to below 1e-300 s
 * within the range of Ea that is searched.
 */
export interface TimeIntegral {
  /** Whether the run reaches the level within its history, so that J exists. */
  readonly reaches: (level: number) => boolean
  /** At one level; only where it is reached. */
  readonly atLevel: (Ea: number, level: number) => IntegralValue
  /** At all levels in one pass; entries of levels not reached are left as they are. */
  readonly atAllLevels: (Ea: number, lnJ: Float64Array, inverseT: Float64Array) => void
  /** The two ends of the temperatures that are passed at one heating rate up to the level, in K, where it is one rate; 0 for an integral from zero. */
  readonly passes?: (level: number) => readonly [number, number]
}

/**
 * The same integral, but before each one over a measured history, which is a sum over thousands of nodes, it is asked whether anyone still waits. One in closed form is too quick to ask.
 *
 * @throws Cancelled, by `checkCancelled`
 */
export function interruptible(integral: TimeIntegral, run: RunAtLevels, checkCancelled: () => void): TimeIntegral {
  if (followsRamp(run)) return integral
  return {
    ...integral,
    atLevel: (Ea, level) => {
      checkCancelled()
      return integral.atLevel(Ea, level)
    },
  }
}

/** A local heating rate within this share of the fitted one is that of a straight ramp, noise of the temperature apart. */
const straightWithin = 0.01

/**
 * Whether a run is taken as one straight ramp: heated at a constant rate, and either wandering by at most 1 % or not measured. A ramp that wanders more is taken as
 * it was measured: one fitted rate for all of it would carry a share of that into Ea, larger by 1/ln(fastest/slowest rate).
 */
export const followsRamp = ({ programme, heatingRateSpread }: RunAtLevels): boolean =>
  programme.kind === 'constant-heating-rate' && !(heatingRateSpread > straightWithin)

/**
 * The integral that belongs to a run's programme: closed form for a straight ramp (`followsRamp`), else over the measured history.
 *
 * @param largestEa - in J/mol
 */
export function timeIntegral(run: RunAtLevels, largestEa: number): TimeIntegral {
  return run.programme.kind === 'constant-heating-rate' && followsRamp(run)
    ? constantRateIntegral(run.programme.heatingRate, run.temperature_K)
    : historyIntegral(run.history, run.time_s, largestEa)
}

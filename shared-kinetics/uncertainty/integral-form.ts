import { largestEa, smallestEa } from '../isoconversional/energy-grid.ts'
import type { IsoconversionalResult, TaskContext } from '../isoconversional/result.ts'
import { followsRamp, interruptible, type TimeIntegral } from '../isoconversional/time-integral.ts'
import type { RunAtLevels, SeriesAtLevels } from '../series/series-at-levels.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { hasRebuiltTime, localHeatingRate } from './local-heating-rate.ts'

/**
 * ln J around the undisturbed Ea to third order in e = (Ea' - Ea)/R, whose derivatives are the moments of 1/T over the integral:
 * ln J(e) = ln J - u e + v e²/2 - w e³/6. Where a run leaves the straight ramp, 1/T is spread too widely for that, and a table holds ln J over all of the range of Ea.
 * Tables hold one entry a run at each level: [level · runs + run].
 */
export interface IntegralForm {
  readonly kind: 'integral'
  readonly lnJ: Float64Array
  /** u, in 1/K. */
  readonly inverseT: Float64Array
  /** v, in 1/K². */
  readonly variance: Float64Array
  /** w, in 1/K³. */
  readonly third: Float64Array
  /** d ln J/dt at the level, exp(-Ea/RT)/J, and at the start of the integral, 0 for one from zero. In 1/s. */
  readonly perSecond: Float64Array
  readonly perSecondBefore: Float64Array
  /** -d ln/de of these two: 1/T at the level and at the one before, less u. In 1/K. */
  readonly perSecondFall: Float64Array
  readonly perSecondBeforeFall: Float64Array
  /**
   * d ln J/d(lag), in 1/s: (Ea/R)·mean((dT/dt)/T²), which over a measured history is what d ln J/dt at its end has more than at its start, since the lag is nothing but
   * another time.
   */
  readonly perLag: Float64Array
  /** 1 where J goes with 1/beta: it is taken in closed form, or its duration was rebuilt from beta; else 0. */
  readonly holdsHeatingRate: Uint8Array
  /** Of a series with runs that leave the straight ramp; else null. */
  readonly table: IntegralTable | null
}

export interface IntegralTable {
  /** ln J and u at each place of `tableEnergies`: [(level · places + place) · runs + run]. */
  readonly lnJ: Float64Array
  readonly inverseT: Float64Array
  /** One entry a run: 1 where it is integrated over its history, so that a lag is another time; else 0. */
  readonly isHistory: Uint8Array
  /** [level · runs + run]: 1/T at the end and at the start of the integral, in 1/K; NaN where it starts at T = 0. */
  readonly endInverseT: Float64Array
  readonly startInverseT: Float64Array
  /** dT/dt there, in K/s. */
  readonly startHeatingRate: Float64Array
}

/** Steps of 6 %: the cubic through values and slopes is within some 1e-6 of ln J. */
const steps = 119
export const lnStep = Math.log(largestEa / smallestEa) / steps
/** In J/mol. */
export const tableEnergies: Float64Array = Float64Array.from({ length: steps + 1 }, (_, place) => smallestEa * Math.exp(place * lnStep))

/** Step of e over which the moments are taken, as a share of Ea: the third one is then good to some 1e-5 of itself. */
const step = 0.02

/** The form of a minimising method's result on the series it came from. Over a measured history each level is an integral of its own. @throws Cancelled */
export function integralForm(
  series: SeriesAtLevels,
  result: IsoconversionalResult,
  integralOf: (run: RunAtLevels) => TimeIntegral,
  { checkCancelled }: Pick<TaskContext, 'checkCancelled'>,
): IntegralForm {
  const runs = series.runs.length
  const entries = runs * series.levels.length
  const table = (): Float64Array => new Float64Array(entries).fill(Number.NaN)
  const form = {
    kind: 'integral' as const,
    lnJ: table(),
    inverseT: table(),
    variance: table(),
    third: table(),
    perSecond: table(),
    perSecondBefore: new Float64Array(entries),
    perSecondFall: table(),
    perSecondBeforeFall: new Float64Array(entries),
    perLag: table(),
    holdsHeatingRate: new Uint8Array(entries),
  }
  const isIncremental = result.method === 'vyazovkin-incremental'
  const R = gasConstant_J_per_mol_K
  const integrals = series.runs.map((run) => {
    checkCancelled()
    return interruptible(integralOf(run), run, checkCancelled)
  })
  series.runs.forEach((run, i) => {
    const integral = integrals[i] as TimeIntegral
    const isRamp = followsRamp(run)
    result.Ea.forEach((Ea, level) => {
      if (Number.isNaN(Ea)) return
      checkCancelled()
      const k = level * runs + i
      const fromLevel = isIncremental && level > 0
      const { lnJ, inverseT } = integral.atLevel(Ea, level)
      const above = integral.atLevel(Ea * (1 + step), level).inverseT
      const below = integral.atLevel(Ea * (1 - step), level).inverseT
      const e = (step * Ea) / R
      const variance = (below - above) / (2 * e)
      form.lnJ[k] = lnJ
      form.inverseT[k] = inverseT
      form.variance[k] = variance
      form.third[k] = (above - 2 * inverseT + below) / e ** 2
      const at = 1 / (run.temperature_K[level] ?? Number.NaN)
      const start = startInverseT(run, level, fromLevel)
      const perSecondAt = (x: number): number => Math.exp((-Ea / R) * x - lnJ)
      form.perSecond[k] = perSecondAt(at)
      form.perSecondFall[k] = at - inverseT
      if (fromLevel) {
        form.perSecondBefore[k] = perSecondAt(start)
        form.perSecondBeforeFall[k] = start - inverseT
      }
      form.perLag[k] = isRamp ? (Ea / R) * (inverseT ** 2 + variance) * localHeatingRate(run, level) : perSecondAt(at) - perSecondAt(start)
      // From level to level the duration is a measured one, unless time was rebuilt from the heating rate.
      if (isRamp && (!fromLevel || hasRebuiltTime(run))) form.holdsHeatingRate[k] = 1
    })
  })
  return { ...form, table: series.runs.every(followsRamp) ? null : tableOf(series, integrals, isIncremental, checkCancelled) }
}

/** 1/T at which an integral begins: at the level before, or at the first sample of the history. */
const startInverseT = ({ temperature_K, history }: RunAtLevels, level: number, fromLevel: boolean): number =>
  1 / ((fromLevel ? temperature_K[level - 1] : history.temperature_K[0]) ?? Number.NaN)

const empty = (length: number): Float64Array => new Float64Array(length).fill(Number.NaN)

function tableOf(
  series: SeriesAtLevels,
  integrals: readonly TimeIntegral[],
  isIncremental: boolean,
  checkCancelled: () => void,
): IntegralTable {
  const runs = series.runs.length
  const levels = series.levels.length
  const places = tableEnergies.length
  const table = {
    lnJ: empty(levels * places * runs),
    inverseT: empty(levels * places * runs),
    isHistory: Uint8Array.from(series.runs, (run) => (followsRamp(run) ? 0 : 1)),
    endInverseT: empty(levels * runs),
    startInverseT: empty(levels * runs),
    startHeatingRate: new Float64Array(levels * runs),
  }
  const lnJ = empty(levels)
  const inverseT = empty(levels)
  integrals.forEach((integral, i) => {
    tableEnergies.forEach((Ea, place) => {
      checkCancelled()
      integral.atAllLevels(Ea, lnJ, inverseT)
      for (let level = 0; level < levels; level++) {
        const entry = (level * places + place) * runs + i
        table.lnJ[entry] = lnJ[level] as number
        table.inverseT[entry] = inverseT[level] as number
      }
    })
    const run = series.runs[i] as RunAtLevels
    for (let level = 0; level < levels; level++) {
      const k = level * runs + i
      const fromLevel = isIncremental && level > 0
      table.endInverseT[k] = 1 / (run.temperature_K[level] ?? Number.NaN)
      if (fromLevel || !followsRamp(run)) table.startInverseT[k] = startInverseT(run, level, fromLevel)
      if (fromLevel) table.startHeatingRate[k] = localHeatingRate(run, level - 1)
    }
    lnJ.fill(Number.NaN)
    inverseT.fill(Number.NaN)
  })
  return table
}

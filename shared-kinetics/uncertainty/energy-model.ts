import { largestEa } from '../isoconversional/energy-grid.ts'
import type { IsoconversionalResult, LevelLine, MethodId } from '../isoconversional/result.ts'
import { segmentIntegral } from '../isoconversional/segment-integral.ts'
import { followsRamp, timeIntegral, type TimeIntegral } from '../isoconversional/time-integral.ts'
import type { RunAtLevels, SeriesAtLevels } from '../series/series-at-levels.ts'
import { valueAt } from '../series/value-at.ts'
import { scaledPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column, type Column } from '../units/quantity.ts'

/**
 * How Ea of one method at each level follows from what was measured, small enough to be worked out some thousand times and sent to a worker. Tables hold one entry a
 * run at each level: [level · runs + run].
 */
export interface EnergyModel {
  readonly method: MethodId
  readonly runs: number
  readonly levels: number
  /** Undisturbed; NaN where the level has none. */
  readonly Ea: Column<'J/mol'>
  /** dT/dt where the run passes the level. */
  readonly heatingRate_K_per_s: Float64Array
  /** One entry a run: 1 where time was rebuilt from a stated heating rate, so that its durations and reaction rates bear the error of that rate; else 0. */
  readonly timeIsRebuilt: Uint8Array
  readonly form: LineForm | IntegralForm
}

/** y = intercept + slope/T; Ea changes by energyPerSlope times what the slope changes. */
export interface LineForm {
  readonly kind: 'line'
  readonly temperature_K: Column<'K'>
  readonly y: Float64Array
  /** Indexed by level; in K and J/(mol K). */
  readonly slope_K: Float64Array
  readonly energyPerSlope: Float64Array
  /** Indexed by level: y goes with -s ln T. */
  readonly temperatureExponent: Float64Array
  /** dy/d ln beta and dy/d ln(dα/dt). */
  readonly perLnHeatingRate: number
  readonly perLnReactionRate: number
  /** dy/dt by an error of the time of the level, apart from what T and dα/dt do; 1/t for ln t. In 1/s. */
  readonly perSecond: Float64Array
}

/**
 * ln J around the undisturbed Ea to third order in e = (Ea' - Ea)/R, whose derivatives are the moments of 1/T over the integral:
 * ln J(e) = ln J - u e + v e²/2 - w e³/6.
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
  /** 1 where J goes with 1/beta: it is taken in closed form, or its duration was rebuilt from beta; else 0. */
  readonly holdsHeatingRate: Uint8Array
}

type LineMethodId = Exclude<MethodId, 'vyazovkin' | 'vyazovkin-incremental'>

interface Ordinate {
  readonly holds: 'heating-rate' | 'reaction-rate' | 'time'
  /** y is this times a natural logarithm. */
  readonly scale: number
}

const lnHeatingRate: Ordinate = { holds: 'heating-rate', scale: 1 }
const logHeatingRate: Ordinate = { holds: 'heating-rate', scale: 1 / Math.LN10 }

const ordinates: Readonly<Record<LineMethodId, Ordinate>> = {
  friedman: { holds: 'reaction-rate', scale: 1 },
  ofw: lnHeatingRate,
  'ofw-corrected': lnHeatingRate,
  kas: lnHeatingRate,
  starink: lnHeatingRate,
  'starink-1996': lnHeatingRate,
  tang: lnHeatingRate,
  'astm-e1641': logHeatingRate,
  'iso-11358-2': logHeatingRate,
  'isothermal-integral': { holds: 'time', scale: 1 },
}

/** The model of a method's result on the series it came from. */
export function energyModel(series: SeriesAtLevels, result: IsoconversionalResult): EnergyModel {
  const runs = series.runs.length
  const levels = series.levels.length
  const heatingRate_K_per_s = new Float64Array(runs * levels)
  for (let level = 0; level < levels; level++) {
    series.runs.forEach((run, i) => {
      heatingRate_K_per_s[level * runs + i] = localHeatingRate(run, level)
    })
  }
  const timeIsRebuilt = Uint8Array.from(series.runs, (run) => (hasRebuiltTime(run) ? 1 : 0))
  const common = { method: result.method, runs, levels, Ea: result.Ea, heatingRate_K_per_s, timeIsRebuilt }
  const { method } = result
  if (method === 'vyazovkin') return { ...common, form: integralForm(series, result, (run) => timeIntegral(run, largestEa)) }
  if (method === 'vyazovkin-incremental') return { ...common, form: integralForm(series, result, (run) => segmentIntegral(run, largestEa)) }
  return { ...common, form: lineForm(series, result, method) }
}

/** A heating rate that was not measured is one that time was rebuilt from. */
const hasRebuiltTime = ({ programme }: RunAtLevels): boolean =>
  programme.kind === 'constant-heating-rate' && programme.source !== 'measured'

/** dT/dt where a run passes a level: its heating rate, 0 for a hold, and for any other programme the slope of the history over 1 % of the time on either side. */
function localHeatingRate({ programme, history, time_s }: RunAtLevels, level: number): number {
  if (programme.kind === 'constant-heating-rate') return programme.heatingRate
  if (programme.kind === 'isothermal') return 0
  const start = history.time_s[0] ?? Number.NaN
  const end = history.time_s.at(-1) ?? Number.NaN
  const at = start + (time_s[level] ?? Number.NaN)
  const from = Math.max(start, at - 0.01 * (end - start))
  const to = Math.min(end, at + 0.01 * (end - start))
  return (valueAt(history.time_s, history.temperature_K, to) - valueAt(history.time_s, history.temperature_K, from)) / (to - from)
}

function lineForm(series: SeriesAtLevels, result: IsoconversionalResult, method: LineMethodId): LineForm {
  const { holds, scale } = ordinates[method]
  const runs = series.runs.length
  const levels = series.levels.length
  const form = {
    kind: 'line' as const,
    temperature_K: column(new Float64Array(runs * levels).fill(Number.NaN), 'K'),
    y: new Float64Array(runs * levels).fill(Number.NaN),
    slope_K: new Float64Array(levels).fill(Number.NaN),
    energyPerSlope: new Float64Array(levels).fill(Number.NaN),
    temperatureExponent: new Float64Array(levels),
    perLnHeatingRate: holds === 'heating-rate' ? scale : 0,
    perLnReactionRate: holds === 'reaction-rate' ? scale : 0,
    perSecond: new Float64Array(runs * levels),
  }
  result.lines.forEach((line, level) => {
    line.x_per_K.forEach((x, i) => {
      const k = level * runs + i
      const y = line.y[i] ?? Number.NaN
      form.temperature_K[k] = 1 / x
      form.y[k] = y
      if (holds === 'time') form.perSecond[k] = Math.exp(-y)
    })
    form.slope_K[level] = line.slope_K
    form.energyPerSlope[level] = result.points[level]?.energyPerSlope ?? Number.NaN
    form.temperatureExponent[level] = temperatureExponentOf(series, method, line, result.Ea[level] ?? Number.NaN)
  })
  return form
}

/** The s of an ordinate that goes with -s ln T. */
function temperatureExponentOf(series: SeriesAtLevels, method: LineMethodId, line: LevelLine, Ea: number): number {
  const [x] = line.x_per_K
  const [y] = line.y
  const [run] = series.runs
  if (x === undefined || y === undefined || Number.isNaN(Ea) || run?.programme.kind !== 'constant-heating-rate') return 0
  if (method === 'ofw-corrected') {
    // Its ordinate holds ln p(x) beyond Doyle's line, so that at a given Ea it goes with T as ln beta - ln p(x) does.
    const atMean = (Ea / gasConstant_J_per_mol_K) * (line.x_per_K.reduce((sum, value) => sum + value, 0) / line.x_per_K.length)
    return atMean / scaledPOfX(atMean) + (line.slope_K * gasConstant_J_per_mol_K * atMean) / Ea
  }
  if (ordinates[method] !== lnHeatingRate) return 0
  const s = (y - Math.log(run.programme.heatingRate)) / Math.log(x)
  return Math.abs(s) < 1e-9 ? 0 : s
}

/** Step of e over which the moments are taken, as a share of Ea: the third one is then good to some 1e-5 of itself. */
const step = 0.02

function integralForm(series: SeriesAtLevels, result: IsoconversionalResult, integralOf: (run: RunAtLevels) => TimeIntegral): IntegralForm {
  const runs = series.runs.length
  const table = (): Float64Array => new Float64Array(runs * series.levels.length).fill(Number.NaN)
  const form = {
    kind: 'integral' as const,
    lnJ: table(),
    inverseT: table(),
    variance: table(),
    third: table(),
    perSecond: table(),
    perSecondBefore: new Float64Array(runs * series.levels.length),
    perSecondFall: table(),
    perSecondBeforeFall: new Float64Array(runs * series.levels.length),
    holdsHeatingRate: new Uint8Array(runs * series.levels.length),
  }
  const isIncremental = result.method === 'vyazovkin-incremental'
  const R = gasConstant_J_per_mol_K
  series.runs.forEach((run, i) => {
    const integral = integralOf(run)
    result.Ea.forEach((Ea, level) => {
      if (Number.isNaN(Ea)) return
      const k = level * runs + i
      const { lnJ, inverseT } = integral.atLevel(Ea, level)
      const above = integral.atLevel(Ea * (1 + step), level).inverseT
      const below = integral.atLevel(Ea * (1 - step), level).inverseT
      const e = (step * Ea) / R
      form.lnJ[k] = lnJ
      form.inverseT[k] = inverseT
      form.variance[k] = (below - above) / (2 * e)
      form.third[k] = (above - 2 * inverseT + below) / e ** 2
      const at = 1 / (run.temperature_K[level] ?? Number.NaN)
      form.perSecond[k] = Math.exp((-Ea / R) * at - lnJ)
      form.perSecondFall[k] = at - inverseT
      if (isIncremental && level > 0) {
        const before = 1 / (run.temperature_K[level - 1] ?? Number.NaN)
        form.perSecondBefore[k] = Math.exp((-Ea / R) * before - lnJ)
        form.perSecondBeforeFall[k] = before - inverseT
      }
      // From level to level the duration is a measured one, unless time was rebuilt from the heating rate.
      if (followsRamp(run) && (!(isIncremental && level > 0) || hasRebuiltTime(run))) form.holdsHeatingRate[k] = 1
    })
  })
  return form
}

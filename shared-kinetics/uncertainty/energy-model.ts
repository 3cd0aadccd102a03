import { largestEa } from '../isoconversional/energy-grid.ts'
import type { IsoconversionalResult, LevelLine, MethodId, TaskContext } from '../isoconversional/result.ts'
import { segmentIntegral } from '../isoconversional/segment-integral.ts'
import { timeIntegral } from '../isoconversional/time-integral.ts'
import type { SeriesAtLevels } from '../series/series-at-levels.ts'
import { scaledPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column, type Column } from '../units/quantity.ts'
import { integralForm, type IntegralForm } from './integral-form.ts'
import { hasRebuiltTime, localHeatingRate } from './local-heating-rate.ts'

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
  /** y goes with -s ln T. One entry a run at each level, since p(x) bends from run to run. */
  readonly temperatureExponent: Float64Array
  /** dy/d ln beta and dy/d ln(dα/dt). */
  readonly perLnHeatingRate: number
  readonly perLnReactionRate: number
  /** dy/dt by an error of the time of the level, apart from what T and dα/dt do; 1/t for ln t. In 1/s. */
  readonly perSecond: Float64Array
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

/** The model of a method's result on the series it came from. @throws Cancelled, by `context` */
export function energyModel(
  series: SeriesAtLevels,
  result: IsoconversionalResult,
  context: Pick<TaskContext, 'checkCancelled'> = { checkCancelled: () => undefined },
): EnergyModel {
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
  if (method === 'vyazovkin') return { ...common, form: integralForm(series, result, (run) => timeIntegral(run, largestEa), context) }
  if (method === 'vyazovkin-incremental')
    return { ...common, form: integralForm(series, result, (run) => segmentIntegral(run, largestEa), context) }
  return { ...common, form: lineForm(series, result, method) }
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
    temperatureExponent: new Float64Array(runs * levels),
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
    const exponentOf = temperatureExponentOf(series, method, line, result.Ea[level] ?? Number.NaN)
    line.x_per_K.forEach((x, i) => {
      form.temperatureExponent[level * runs + i] = exponentOf(x)
    })
  })
  return form
}

/** The s of an ordinate that goes with -s ln T, by 1/T. */
function temperatureExponentOf(series: SeriesAtLevels, method: LineMethodId, line: LevelLine, Ea: number): (x: number) => number {
  const [x] = line.x_per_K
  const [y] = line.y
  const [run] = series.runs
  if (x === undefined || y === undefined || Number.isNaN(Ea) || run?.programme.kind !== 'constant-heating-rate') return () => 0
  if (method === 'ofw-corrected') {
    // Its ordinate holds ln p(x) beyond Doyle's line, so that at a given Ea it goes with T as ln beta - ln p(x) does.
    return (inverseT) => {
      const reduced = (Ea / gasConstant_J_per_mol_K) * inverseT
      return reduced / scaledPOfX(reduced) + line.slope_K * inverseT
    }
  }
  if (ordinates[method] !== lnHeatingRate) return () => 0
  const s = (y - Math.log(run.programme.heatingRate)) / Math.log(x)
  return () => (Math.abs(s) < 1e-9 ? 0 : s)
}

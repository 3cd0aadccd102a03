import { lineFit, type LineFit } from '../numerics/line-fit.ts'
import type { RunAtLevels, SeriesAtLevels } from '../series/series-at-levels.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column } from '../units/quantity.ts'
import { resultColumns, type ResultColumns } from './result-columns.ts'
import type { IsoconversionalMethod, LevelLine, LevelStatus, MethodInfo } from './result.ts'
import { checkSeries, countProgrammes } from './series-check.ts'
import { systematicErrorOf, type ApproximateIntegral } from './systematic-error.ts'

/** What tells one straight-line method from another. */
export interface LineMethod {
  readonly info: MethodInfo
  /** Temperature of a run at a level, in K; NaN where the run does not reach it. */
  readonly temperature: (run: RunAtLevels, level: number) => number
  /** Ordinate of a run at a level; not finite where there is none although the level is reached. */
  readonly ordinate: (run: RunAtLevels, level: number) => number
  /** Status of a level where a run has no ordinate. */
  readonly withoutOrdinate: LevelStatus
  /** dy/d(1/T) = slopeFactor·Ea/R. */
  readonly slopeFactor: number
  /** The intercept is ln[A f(alpha)]. */
  readonly interceptIsLnAf: boolean
  /** What the method takes for the temperature integral, by which its systematic error is known; null for a method without one, whose error is 0. */
  readonly integral: ApproximateIntegral | null
  /** Where Ea is not simply slope·R/slopeFactor: what the method makes of the first line. null where it comes to no Ea. */
  readonly refine?: (level: LineAtLevel) => RefinedLine | null
}

/** The first line of one level, and what it was drawn from. Only made where every run has a point. */
export interface LineAtLevel {
  readonly series: SeriesAtLevels
  readonly level: number
  /** 1/T in 1/K and the ordinate, one point a run. */
  readonly x: Float64Array
  readonly y: Float64Array
  readonly fit: LineFit
}

export interface RefinedLine {
  /** In J/mol. */
  readonly Ea: number
  /** The line that is shown and judged; its ordinates. */
  readonly y: Float64Array
  readonly fit: LineFit
  /** dEa/dslope in J/mol per K. */
  readonly energyPerSlope: number
  /** ln A with A in 1/s where the method assumes a model, else NaN. */
  readonly lnA: number
  readonly integral: ApproximateIntegral | null
}

/**
 * Makes a method that fits, at each level, one straight line y = intercept + slope·(1/T) through the runs, and takes Ea = slope·R/slopeFactor.
 *
 * Every used run must reach the level (`level-not-reached`), at least two programmes must be distinct (`too-few-programmes`), and the temperatures must differ
 * (`line-not-determined`). Standard errors are those of the unweighted regression with n - 2 degrees of freedom, n runs. The systematic error is that of the
 * method's temperature integral at the mean 1/T of the level.
 */
export function lineMethod(method: LineMethod): IsoconversionalMethod {
  return (series, context) => {
    checkSeries(method.info, series)
    const lines: LevelLine[] = []
    const columns = resultColumns(method.info, series, lines, [])
    const programmes = countProgrammes(series)
    for (let level = 0; level < series.levels.length; level++) {
      context.checkCancelled()
      const { x, y, status } = pointsAtLevel(method, series, level)
      const fit = status === 'ok' && programmes >= 2 ? lineFit(x, y) : null
      const line = fit?.status === 'ok' ? refined(method, { series, level, x, y, fit }) : null
      lines.push({
        x_per_K: column(x, '1/K'),
        y: line?.y ?? y,
        slope_K: line?.fit.slope ?? Number.NaN,
        intercept: line?.fit.intercept ?? Number.NaN,
      })
      if (programmes >= 2) {
        if (line === null) columns.setStatus(level, status === 'ok' ? 'line-not-determined' : status)
        else setLine(columns, method, level, x, line, programmes >= 3)
      }
      context.progress(level + 1, series.levels.length)
    }
    return columns.result
  }
}

function refined(method: LineMethod, first: LineAtLevel): RefinedLine | null {
  if (method.refine !== undefined) return method.refine(first)
  const energyPerSlope = gasConstant_J_per_mol_K / method.slopeFactor
  const { y, fit } = first
  return { Ea: fit.slope * energyPerSlope, y, fit, energyPerSlope, lnA: Number.NaN, integral: method.integral }
}

function setLine(columns: ResultColumns, method: LineMethod, level: number, x: Float64Array, line: RefinedLine, withErrors: boolean): void {
  const { Ea, y, fit, energyPerSlope, lnA, integral } = line
  const { result } = columns
  columns.setEnergy(level, Ea, fit.slopeStandardError * Math.abs(energyPerSlope), fit.r2)
  columns.setPoints(level, { x_per_K: column(x, '1/K'), residual: residualsOf(x, y, fit), energyPerSlope })
  result.systematicError[level] = integral === null ? 0 : systematicErrorOf(Ea, 1 / fit.xMean, integral)
  result.lnA[level] = lnA
  if (!method.interceptIsLnAf) return
  result.lnAf[level] = fit.intercept
  if (!withErrors) return
  result.lnAfStandardError[level] = fit.interceptStandardError
  result.covarianceEaLnAf[level] = energyPerSlope * fit.covariance
}

/** One point a run, in the order of the runs; NaN for a run that has none. */
function pointsAtLevel(
  method: LineMethod,
  series: SeriesAtLevels,
  level: number,
): { readonly x: Float64Array; readonly y: Float64Array; readonly status: LevelStatus } {
  const x = new Float64Array(series.runs.length).fill(Number.NaN)
  const y = new Float64Array(series.runs.length).fill(Number.NaN)
  let status: LevelStatus = 'ok'
  series.runs.forEach((run, i) => {
    const T = method.temperature(run, level)
    if (!Number.isFinite(T)) {
      status = 'level-not-reached'
      return
    }
    const ordinate = method.ordinate(run, level)
    if (Number.isFinite(ordinate)) {
      x[i] = 1 / T
      y[i] = ordinate
    } else if (status === 'ok') status = method.withoutOrdinate
  })
  return { x, y, status }
}

const residualsOf = (x: Float64Array, y: Float64Array, { valueAtMean, slope, xMean }: LineFit): Float64Array =>
  y.map((value, i) => value - (valueAtMean + slope * ((x[i] ?? Number.NaN) - xMean)))

/** Temperature of a run at a level. */
export const temperatureAtLevel = (run: RunAtLevels, level: number): number => run.temperature_K[level] ?? Number.NaN

/** Heating rate in K/s of a run heated at a constant rate; NaN for any other. */
export const heatingRateOf = (run: RunAtLevels): number =>
  run.programme.kind === 'constant-heating-rate' ? run.programme.heatingRate : Number.NaN

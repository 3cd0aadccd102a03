import { lineFit, type LineFit } from '../numerics/line-fit.ts'
import type { RunAtLevels, SeriesAtLevels } from '../series/series-at-levels.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column } from '../units/quantity.ts'
import { resultColumns } from './result-columns.ts'
import type { IsoconversionalMethod, LevelLine, LevelStatus, MethodInfo } from './result.ts'
import { checkSeries, countProgrammes } from './series-check.ts'

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
}

/**
 * Makes a method that fits, at each level, one straight line y = intercept + slope·(1/T) through the runs, and takes Ea = slope·R/slopeFactor.
 *
 * Every used run must reach the level (`level-not-reached`), at least two programmes must be distinct (`too-few-programmes`), and the temperatures must differ
 * (`line-not-determined`). Standard errors are those of the unweighted regression with n - 2 degrees of freedom, n runs.
 */
export function lineMethod(method: LineMethod): IsoconversionalMethod {
  return (series, context) => {
    checkSeries(method.info, series)
    const lines: LevelLine[] = []
    const columns = resultColumns(method.info, series, lines, [])
    const { lnAf, lnAfStandardError, covarianceEaLnAf } = columns.result
    const programmes = countProgrammes(series)
    for (let level = 0; level < series.levels.length; level++) {
      context.checkCancelled()
      const { x, y, status } = pointsAtLevel(method, series, level)
      const fit = status === 'ok' && programmes >= 2 ? lineFit(x, y) : null
      lines.push({ x_per_K: column(x, '1/K'), y, slope_K: fit?.slope ?? Number.NaN, intercept: fit?.intercept ?? Number.NaN })
      if (programmes < 2) continue
      if (fit === null) columns.setStatus(level, status)
      else if (fit.status !== 'ok') columns.setStatus(level, 'line-not-determined')
      else {
        const perSlope = gasConstant_J_per_mol_K / method.slopeFactor
        columns.setEnergy(level, fit.slope * perSlope, fit.slopeStandardError * Math.abs(perSlope), fit.r2)
        columns.setPoints(level, { x_per_K: column(x, '1/K'), residual: residualsOf(x, y, fit), energyPerSlope: perSlope })
        if (method.interceptIsLnAf) {
          lnAf[level] = fit.intercept
          if (programmes >= 3) {
            lnAfStandardError[level] = fit.interceptStandardError
            covarianceEaLnAf[level] = perSlope * fit.covariance
          }
        }
      }
      context.progress(level + 1, series.levels.length)
    }
    return columns.result
  }
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

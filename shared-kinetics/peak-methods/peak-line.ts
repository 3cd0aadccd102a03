import { KineticsError } from '../errors.ts'
import { lineFit, type LineFit } from '../numerics/line-fit.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import { column, quantity, type Column, type Quantity } from '../units/quantity.ts'

/** The reaction-rate peak of one run heated at a constant rate. */
export interface RatePeak {
  readonly heatingRate: Quantity<'K/s'>
  /** Temperature at which dalpha/dt is highest. */
  readonly temperature: Quantity<'K'>
  /** Runs of one programme (replicates) share this number. */
  readonly programmeGroup: number
}

/**
 * `too-few-programmes`: fewer than two distinct programmes; `line-not-determined`: the peak temperatures do not differ; `energy-not-positive`: the peak does
 * not move to higher temperature with the heating rate, so that Ea and A mean nothing.
 */
export type PeakStatus = 'ok' | 'too-few-programmes' | 'line-not-determined' | 'energy-not-positive'

/** Ea and ln A from the peaks of several runs. Where status is not `ok` every number is NaN. */
export interface PeakEstimate {
  readonly status: PeakStatus
  readonly Ea: Quantity<'J/mol'>
  /** One standard error, n - 2 degrees of freedom, and Ea ± t(0.975; n - 2) of it; NaN with fewer than three distinct programmes. */
  readonly standardError: Quantity<'J/mol'>
  readonly lower95: Quantity<'J/mol'>
  readonly upper95: Quantity<'J/mol'>
  /** ln of A in 1/s; NaN where the method gives none. */
  readonly lnA: number
  readonly lnAStandardError: number
  /** Covariance of Ea and ln A in J/mol; NaN with fewer than three distinct programmes. */
  readonly covarianceEaLnA: number
  readonly r2: number
  /** n - 2 for n peaks, and 0 with fewer than three distinct programmes. */
  readonly dof: number
  /** The method's ordinate (heating rates in K/s) against 1/Tp, one point a peak. */
  readonly line: PeakLine
}

export interface PeakLine {
  readonly x_per_K: Column<'1/K'>
  readonly y: Float64Array
  readonly slope_K: number
  readonly intercept: number
}

/** What a method reads from its line: values, and how Ea and ln A answer to slope and intercept. */
export interface ReadFromLine {
  readonly Ea: number
  /** dEa/dslope. */
  readonly EaBySlope: number
  readonly lnA: number
  /** Variance of ln A and covariance of Ea and ln A, from those of the line. */
  readonly lnAVariance: number
  readonly covarianceEaLnA: number
}

/**
 * The straight line of a peak method, y against 1/Tp, and what the method reads from it. Peaks count one point each, replicates too; distinct programmes decide
 * whether there is an Ea (two) and an interval (three). An Ea that is not above 0 is none. A method that cannot read its line returns null: `energy-not-positive`.
 *
 * @param method - its name, for messages
 * @throws KineticsError `no-heating-rate` or `not-finite` where a heating rate or a peak temperature is not a positive number
 */
export function peakEstimate<Peak extends RatePeak>(
  method: string,
  peaks: readonly Peak[],
  ordinate: (peak: Peak) => number,
  read: (fit: LineFit) => ReadFromLine | null,
): PeakEstimate {
  checkPeaks(method, peaks)
  const programmes = new Set(peaks.map((peak) => peak.programmeGroup)).size
  const x = Float64Array.from(peaks, (peak) => 1 / peak.temperature)
  const y = Float64Array.from(peaks, ordinate)
  const fit = lineFit(x, y)
  const dof = programmes >= 3 ? fit.dof : 0
  const line = { x_per_K: column(x, '1/K'), y, slope_K: fit.slope, intercept: fit.intercept }
  if (programmes < 2) return none('too-few-programmes', dof, line)
  if (fit.status !== 'ok') return none('line-not-determined', dof, line)
  const result = read(fit)
  if (result === null || !(result.Ea > 0)) return none('energy-not-positive', dof, line)
  const withErrors = (value: number): number => (dof > 0 ? value : Number.NaN)
  const standardError = withErrors(Math.abs(result.EaBySlope) * fit.slopeStandardError)
  const halfWidth = dof > 0 ? studentTQuantile(0.975, dof) * standardError : Number.NaN
  return {
    status: 'ok',
    Ea: quantity(result.Ea, 'J/mol'),
    standardError: quantity(standardError, 'J/mol'),
    lower95: quantity(result.Ea - halfWidth, 'J/mol'),
    upper95: quantity(result.Ea + halfWidth, 'J/mol'),
    lnA: result.lnA,
    lnAStandardError: withErrors(Math.sqrt(result.lnAVariance)),
    covarianceEaLnA: withErrors(result.covarianceEaLnA),
    r2: withErrors(fit.r2),
    dof,
    line,
  }
}

function checkPeaks(method: string, peaks: readonly RatePeak[]): void {
  peaks.forEach(({ heatingRate, temperature }, i) => {
    if (!(heatingRate > 0) || !Number.isFinite(heatingRate)) {
      throw new KineticsError('no-heating-rate', `${method} needs a positive heating rate; peak ${i + 1} has ${heatingRate} K/s.`, {
        peak: i,
      })
    }
    if (!(temperature > 0) || !Number.isFinite(temperature)) {
      throw new KineticsError('not-finite', `${method} needs a peak temperature in K; peak ${i + 1} has ${temperature}.`, { peak: i })
    }
  })
}

function none(status: PeakStatus, dof: number, line: PeakLine): PeakEstimate {
  const Ea = quantity(Number.NaN, 'J/mol')
  return {
    status,
    Ea,
    standardError: Ea,
    lower95: Ea,
    upper95: Ea,
    lnA: Number.NaN,
    lnAStandardError: Number.NaN,
    covarianceEaLnA: Number.NaN,
    r2: Number.NaN,
    dof,
    line,
  }
}

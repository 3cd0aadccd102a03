import { KineticsError } from '../errors.ts'
import { lineFit } from '../numerics/line-fit.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import type { SourceKey } from '../sources.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column, quantity, type Column, type Quantity } from '../units/quantity.ts'

export const kissingerSources: readonly SourceKey[] = ['kissinger-1957', 'ictac-2011']

/** The reaction-rate peak of one run heated at a constant rate. */
export interface RatePeak {
  readonly heatingRate: Quantity<'K/s'>
  /** Temperature at which dalpha/dt is highest. */
  readonly temperature: Quantity<'K'>
  /** Runs of one programme (replicates) share this number. */
  readonly programmeGroup: number
}

/** Ea and ln A from the peaks. Where status is not `ok` every number is NaN. */
export interface KissingerEstimate {
  /**
   * `too-few-programmes`: fewer than two distinct programmes; `line-not-determined`: the peak temperatures do not differ; `energy-not-positive`: the peak does
   * not move to higher temperature with the heating rate, so that Ea and A mean nothing.
   */
  readonly status: 'ok' | 'too-few-programmes' | 'line-not-determined' | 'energy-not-positive'
  readonly Ea: Quantity<'J/mol'>
  /** One standard error, n - 2 degrees of freedom, and Ea ± t(0.975; n - 2) of it; NaN with fewer than three distinct programmes. */
  readonly standardError: Quantity<'J/mol'>
  readonly lower95: Quantity<'J/mol'>
  readonly upper95: Quantity<'J/mol'>
  /** ln of A in 1/s, for a first-order reaction. */
  readonly lnA: number
  readonly lnAStandardError: number
  readonly r2: number
  /** n - 2, and 0 with fewer than three distinct programmes. */
  readonly dof: number
  /** ln(beta/Tp²), beta in K/s, against 1/Tp, one point a peak. */
  readonly line: { readonly x_per_K: Column<'1/K'>; readonly y: Float64Array; readonly slope_K: number; readonly intercept: number }
}

/**
 * Kissinger's method: Ea of the reaction whose rate peaks at Tp, from the line
 *
 *   ln(beta/Tp²) = ln(A R/Ea) - Ea/(R Tp)
 *
 * through the runs, beta the heating rate in K/s and Tp in K. Slope -Ea/R; ln A = intercept + ln(Ea/R), A in 1/s. The standard error of ln A takes in that of
 * Ea and their correlation.
 *
 * For a first-order reaction the condition behind it, beta Ea/(R Tp²) = A exp(-Ea/(R Tp)), is exact; for others Ea holds as far as the conversion at the peak does
 * not change with the heating rate, and A is that of first order. One number for a whole reaction: it does not show that Ea varies with conversion. Not to be used
 * for holds, or where peaks overlap.
 *
 * @throws KineticsError `no-heating-rate` or `not-finite` where a heating rate or a peak temperature is not a positive number
 * @source kissinger-1957
 */
export function kissinger(peaks: readonly RatePeak[]): KissingerEstimate {
  peaks.forEach(({ heatingRate, temperature }, i) => {
    if (!(heatingRate > 0) || !Number.isFinite(heatingRate)) {
      throw new KineticsError('no-heating-rate', `Kissinger needs a positive heating rate; peak ${i + 1} has ${heatingRate} K/s.`, {
        peak: i,
      })
    }
    if (!(temperature > 0) || !Number.isFinite(temperature)) {
      throw new KineticsError('not-finite', `Kissinger needs a peak temperature in K; peak ${i + 1} has ${temperature}.`, { peak: i })
    }
  })
  const programmes = new Set(peaks.map((peak) => peak.programmeGroup)).size
  const x = Float64Array.from(peaks, (peak) => 1 / peak.temperature)
  const y = Float64Array.from(peaks, (peak) => Math.log(peak.heatingRate) - 2 * Math.log(peak.temperature))
  const fit = lineFit(x, y)
  const dof = programmes >= 3 ? fit.dof : 0
  const line = { x_per_K: column(x, '1/K'), y, slope_K: fit.slope, intercept: fit.intercept }
  const none = (status: KissingerEstimate['status']): KissingerEstimate => {
    const Ea = quantity(Number.NaN, 'J/mol')
    return {
      status,
      Ea,
      standardError: Ea,
      lower95: Ea,
      upper95: Ea,
      lnA: Number.NaN,
      lnAStandardError: Number.NaN,
      r2: Number.NaN,
      dof,
      line,
    }
  }
  if (programmes < 2) return none('too-few-programmes')
  if (fit.status !== 'ok') return none('line-not-determined')
  const R = gasConstant_J_per_mol_K
  const Ea = -R * fit.slope
  if (!(Ea > 0)) return none('energy-not-positive')
  const standardError = programmes >= 3 ? R * fit.slopeStandardError : Number.NaN
  const halfWidth = programmes >= 3 ? studentTQuantile(0.975, dof) * standardError : Number.NaN
  // ln A = intercept + ln(-slope): d ln A = d intercept + d slope/slope.
  const lnAVariance = fit.interceptStandardError ** 2 + (fit.slopeStandardError / fit.slope) ** 2 + (2 * fit.covariance) / fit.slope
  return {
    status: 'ok',
    Ea: quantity(Ea, 'J/mol'),
    standardError: quantity(standardError, 'J/mol'),
    lower95: quantity(Ea - halfWidth, 'J/mol'),
    upper95: quantity(Ea + halfWidth, 'J/mol'),
    lnA: fit.intercept + Math.log(Ea / R),
    lnAStandardError: programmes >= 3 ? Math.sqrt(lnAVariance) : Number.NaN,
    r2: programmes >= 3 ? fit.r2 : Number.NaN,
    dof,
    line,
  }
}

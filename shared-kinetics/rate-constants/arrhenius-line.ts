import { lineFit, type LineFit } from '../numerics/line-fit.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import type { SourceKey } from '../sources.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity, type Quantity } from '../units/quantity.ts'
import { checkRateConstants, distinctTemperatures, type RateConstantPoint } from './rate-constant-point.ts'
import { weightedLine } from './weighted-line.ts'

export const arrheniusLineSources: readonly SourceKey[] = ['arrhenius-1889', 'iupac-arrhenius']

export type Weighting = 'none' | 'stated-uncertainties'

/** Why there is a line, and whether there is an interval; where status is neither `ok` nor `without-interval` every number is NaN. */
export type ArrheniusStatus =
  | 'ok'
  /** Fewer than three distinct temperatures: Ea and ln A, but nothing that tells how far they can be trusted. */
  | 'without-interval'
  | 'too-few-points'
  | 'temperatures-not-distinct'
  /** Weighted line only: not every point has an uncertainty. */
  | 'uncertainties-missing'

export interface ArrheniusLine {
  readonly status: ArrheniusStatus
  readonly weighting: Weighting
  readonly points: number
  readonly distinctTemperatures: number
  /** n - 2, and 0 without an interval. */
  readonly dof: number
  readonly Ea: Quantity<'J/mol'>
  /** One standard error, and Ea ± t(0.975; n - 2) of it; NaN without an interval. */
  readonly standardError: Quantity<'J/mol'>
  readonly lower95: Quantity<'J/mol'>
  readonly upper95: Quantity<'J/mol'>
  /** ln of A in the unit of k. */
  readonly lnA: number
  readonly lnAStandardError: number
  readonly lnALower95: number
  readonly lnAUpper95: number
  /** Covariance of Ea and ln A, J/mol; the two rise and fall together, so that neither interval stands alone. */
  readonly covarianceEaLnA: Quantity<'J/mol'>
  readonly r2: number
  /** s of ln k; of a point of average weight where weighted. */
  readonly residualStandardDeviation: number
  /** ln k minus the line, in the order of the points. */
  readonly residual: Float64Array
  /** Weighted line: Σ(residual/u)²/(n - 2), about 1 where the stated uncertainties account for the scatter; else NaN. */
  readonly reducedChiSquare: number
  /** The line in x = 1/T and y = ln k that everything else is worked out from. */
  readonly fit: LineFit
}

/**
 * Ea and A from rate constants at several temperatures, from the straight line
 *
 *   ln k = ln A - Ea/(R T)
 *
 * by least squares of ln k on 1/T (centred). Slope -Ea/R, intercept ln A; A has the unit of k, whatever it is, since Ea does not depend on it.
 * Intervals are Student-t with n - 2 degrees of freedom for n points (two parameters are fitted), each for one parameter by itself.
 *
 * Unweighted: the relative error of k is taken to be the same at every temperature, as far as is known. With `stated-uncertainties` each point has the weight
 * (k/u(k))², the inverse variance of ln k; the scatter about the line still sets the size of the errors, and the reduced chi-square tells whether it agrees with
 * what was stated.
 *
 * Not to be used across a change of mechanism or of phase: then the points are not on one line (see `lineCurvature`).
 *
 * @param points - in any order; temperatures in K, all k in one unit
 * @throws KineticsError `not-finite`, naming the row, where k or T is not above 0
 * @source arrhenius-1889
 * @source iupac-arrhenius
 */
export function arrheniusLine(points: readonly RateConstantPoint[], weighting: Weighting = 'none'): ArrheniusLine {
  checkRateConstants(points)
  const distinct = distinctTemperatures(points)
  const x = points.map((point) => 1 / point.temperature)
  const y = points.map((point) => Math.log(point.rateConstant))
  const relative = points.map(({ rateConstant, standardUncertainty }) => (standardUncertainty ?? Number.NaN) / rateConstant)
  const isStated = relative.every(Number.isFinite)
  const useWeights = weighting === 'stated-uncertainties' && isStated
  const weights = relative.map((u) => 1 / u ** 2)
  const fit = useWeights ? weightedLine(x, y, weights) : lineFit(x, y)
  const status = statusOf(fit, distinct, weighting === 'stated-uncertainties' && !isStated)
  const found = status === 'ok' || status === 'without-interval'
  const withInterval = status === 'ok'
  const R = gasConstant_J_per_mol_K
  const Ea = found ? -R * fit.slope : Number.NaN
  const lnA = found ? fit.intercept : Number.NaN
  const standardError = withInterval ? R * fit.slopeStandardError : Number.NaN
  const lnAStandardError = withInterval ? fit.interceptStandardError : Number.NaN
  const t = withInterval ? studentTQuantile(0.975, fit.dof) : Number.NaN
  const residual = Float64Array.from(x, (xi, i) =>
    found ? (y[i] ?? Number.NaN) - fit.valueAtMean - fit.slope * (xi - fit.xMean) : Number.NaN,
  )
  const chiSquare = residual.reduce((sum, r, i) => sum + (r / (relative[i] ?? Number.NaN)) ** 2, 0)
  return {
    status,
    weighting,
    points: points.length,
    distinctTemperatures: distinct,
    dof: withInterval ? fit.dof : 0,
    Ea: quantity(Ea, 'J/mol'),
    standardError: quantity(standardError, 'J/mol'),
    lower95: quantity(Ea - t * standardError, 'J/mol'),
    upper95: quantity(Ea + t * standardError, 'J/mol'),
    lnA,
    lnAStandardError,
    lnALower95: lnA - t * lnAStandardError,
    lnAUpper95: lnA + t * lnAStandardError,
    covarianceEaLnA: quantity(withInterval ? -R * fit.covariance : Number.NaN, 'J/mol'),
    r2: withInterval ? fit.r2 : Number.NaN,
    residualStandardDeviation: withInterval ? fit.residualStandardDeviation : Number.NaN,
    residual,
    reducedChiSquare: useWeights && withInterval ? chiSquare / fit.dof : Number.NaN,
    fit,
  }
}

function statusOf(fit: LineFit, distinct: number, isMissing: boolean): ArrheniusStatus {
  if (isMissing) return 'uncertainties-missing'
  if (fit.status === 'too-few-points') return 'too-few-points'
  if (fit.status === 'x-not-distinct' || distinct < 2) return 'temperatures-not-distinct'
  return distinct < 3 ? 'without-interval' : 'ok'
}

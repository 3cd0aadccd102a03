import { leastSquares, type LeastSquaresProblem } from '../numerics/least-squares.ts'
import { conversionAtIntegral } from '../reaction-models/conversion-at-integral.ts'
import type { ReactionModel } from '../reaction-models/model.ts'
import { quantity, type Quantity } from '../units/quantity.ts'
import { holdRows, type HoldOptions, type HoldRows, type IsothermalConversion } from './hold-rows.ts'
import { linearisedHold, type LinearisedHold } from './linearised-hold.ts'

export interface RateConstantFromHold {
  /**
   * `too-few-rows`, `time-not-distinct`, `not-positive`: as for the line of g (`linearisedHold`), where the fit starts; `not-converged`: the fit found no minimum;
   * `model-does-not-apply`: t₀ is fixed and g of the model is not counted from alpha = 0.
   */
  readonly status: LinearisedHold['status'] | 'not-converged' | 'model-does-not-apply'
  readonly temperature: Quantity<'K'>
  readonly rateConstant: Quantity<'1/s'>
  /**
   * One standard error from the covariance of the fit, rows taken as independent; NaN where none is left over. Neighbouring rows of one run are not independent, so
   * it tells how well the model follows the run rather than how far k can be trusted; the scatter between runs does that.
   */
  readonly standardError: Quantity<'1/s'>
  /** t₀; 0 where fixed. */
  readonly zero_s: Quantity<'s'>
  /** NaN where t₀ is fixed. */
  readonly zeroStandardError_s: Quantity<'s'>
  /** Conversion of the model less that of the run, in the order of time. */
  readonly residuals: Float64Array
  readonly residualSumOfSquares: number
  /** √(sum/dof) of conversion; NaN where dof is 0. */
  readonly residualStandardDeviation: number
  /** Rows less parameters. */
  readonly dof: number
  readonly rows: number
  /** Line of g against t: where the fit began. */
  readonly linearised: LinearisedHold
}

/**
 * The rate constant of an isothermal run under a chosen model: k, and t₀ where it is free, such that alpha(t) = g⁻¹(k (t - t₀)) follows the conversion with the least
 * sum of squared differences. Nonlinear least squares (Levenberg–Marquardt, k as its logarithm, analytic derivatives dalpha/dk = (t - t₀) f, dalpha/dt₀ = -k f) from
 * the line of g on t; standard errors from the covariance.
 *
 * Errors of the measured conversion are about equal along a run, those of g are not: for first order g' = 1/(1 - alpha) makes them ten times as large at 0.9 as at 0.
 * With errors equal in alpha this fit scatters less about the true k than the line does, and its standard error is the scatter; rows are read at given levels as well as at
 * given times, since an error of alpha of either kind is one of alpha(t) - level.
 *
 * The model is assumed, not shown: look at the residuals (`runsTest`) and at what other models leave (`fitsOfHolds`). Ea from such k hardly depends on it, A does.
 *
 * @throws KineticsError `column-length`, `bad-option` where the range is not inside [0, 1] or empty
 * @source ictac-2011
 * @source bates-watts-1988
 */
export function rateConstantFromHold(run: IsothermalConversion, model: ReactionModel, options: HoldOptions): RateConstantFromHold {
  const rows = holdRows(run, options.range)
  const isFree = options.zeroInTime === 'free'
  const linearised = linearisedHold(run, model.g, options)
  const without = (status: Exclude<RateConstantFromHold['status'], 'ok'>): RateConstantFromHold => ({
    status,
    temperature: run.temperature,
    rateConstant: quantity(Number.NaN, '1/s'),
    standardError: quantity(Number.NaN, '1/s'),
    zero_s: quantity(Number.NaN, 's'),
    zeroStandardError_s: quantity(Number.NaN, 's'),
    residuals: new Float64Array(rows.time_s.length).fill(Number.NaN),
    residualSumOfSquares: Number.NaN,
    residualStandardDeviation: Number.NaN,
    dof: Math.max(0, rows.time_s.length - (isFree ? 2 : 1)),
    rows: rows.time_s.length,
    linearised,
  })
  if (!isFree && model.gZeroAt !== 0) return without('model-does-not-apply')
  if (linearised.status !== 'ok') return without(linearised.status)
  const fit = leastSquares(holdProblem(rows, model, linearised, isFree))
  if (fit.status !== 'converged') return without('not-converged')
  const [k = Number.NaN, zero = 0] = fit.parameters
  const [kError = Number.NaN, zeroError = Number.NaN] = fit.standardDeviations
  return {
    status: 'ok',
    temperature: run.temperature,
    rateConstant: quantity(k, '1/s'),
    standardError: quantity(kError, '1/s'),
    zero_s: quantity(zero, 's'),
    zeroStandardError_s: quantity(zeroError, 's'),
    residuals: fit.residuals,
    residualSumOfSquares: fit.residualSumOfSquares,
    residualStandardDeviation: fit.residualStandardDeviation,
    dof: fit.dof,
    rows: rows.time_s.length,
    linearised,
  }
}

function holdProblem({ time_s, conversion }: HoldRows, model: ReactionModel, start: LinearisedHold, isFree: boolean): LeastSquaresProblem {
  const m = time_s.length
  const span_s = (time_s.at(-1) ?? 0) - (time_s[0] ?? 0)
  // Where the model was last, so that the search for g⁻¹ begins beside its end.
  const last = Float64Array.from(conversion)
  const modelAt = (i: number, k: number, zero: number): number => {
    const alpha = conversionAtIntegral(model, k * ((time_s[i] ?? Number.NaN) - zero), last[i])
    last[i] = alpha
    return alpha
  }
  return {
    parameters: [
      { name: 'k', start: start.rateConstant_per_s, scale: 'log' },
      ...(isFree ? [{ name: 't0', start: start.zero_s, ...(span_s > 0 ? { typical: span_s } : {}) }] : []),
    ],
    residualCount: m,
    residuals: ([k = Number.NaN, zero = 0], out) => {
      for (let i = 0; i < m; i++) out[i] = modelAt(i, k, zero) - (conversion[i] ?? Number.NaN)
    },
    jacobian: ([k = Number.NaN, zero = 0], out) => {
      for (let i = 0; i < m; i++) {
        const alpha = modelAt(i, k, zero)
        // Before the start and behind the end of the reaction nothing depends on k or t₀.
        const f = alpha > 0 && alpha < 1 ? model.f(alpha) : 0
        out[i] = f * ((time_s[i] ?? Number.NaN) - zero)
        if (isFree) out[m + i] = -f * k
      }
    },
  }
}

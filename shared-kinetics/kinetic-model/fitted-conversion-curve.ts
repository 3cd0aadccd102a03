import { leastSquares, type LeastSquaresProblem } from '../numerics/least-squares.ts'
import { conversionAtIntegral } from '../reaction-models/conversion-at-integral.ts'
import type { ReactionModel } from '../reaction-models/model.ts'
import { lnPOfX, scaledPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity, type Quantity } from '../units/quantity.ts'
import { singleCurveFit, type ConversionCurve, type SingleCurveFit } from './single-curve-fit.ts'

/** Ea and ln A of one curve under one model, by conversion itself. Where status is not `ok` every number is NaN. */
export interface FittedConversionCurve {
  readonly model: string
  /** As for the line with the exact integral, where the fit starts; `not-converged` also where the fit found no minimum. */
  readonly status: SingleCurveFit['status']
  readonly Ea: Quantity<'J/mol'>
  /** One standard error from the covariance, rows taken as independent: how well the model follows the curve, not whether it is right. */
  readonly standardError: Quantity<'J/mol'>
  /** ln of A in 1/s. */
  readonly lnA: number
  readonly lnAStandardError: number
  readonly covarianceEaLnA: Quantity<'J/mol'>
  /** Conversion of the model less that measured, in the order of the rows used. */
  readonly residuals: Float64Array
  readonly residualSumOfSquares: number
  readonly residualStandardDeviation: number
  /** Rows less two. */
  readonly dof: number
  /** The straight line of the same rows, with the exact integral: where the fit began. */
  readonly line: SingleCurveFit
}

/**
 * Ea and A of ONE curve at a constant heating rate under an assumed model, such that the conversion
 *
 *   alpha(T) = g⁻¹[(A Ea/(beta R)) p(Ea/(R T))]
 *
 * follows the measured one with the least sum of squared differences: nonlinear least squares (Levenberg–Marquardt) in ln Ea and in ln k at the middle of 1/T, which are
 * nearly independent of each other, with analytic derivatives, from the line of ln[g/(T² π)]. Errors of conversion are about equal along a curve, those of ln g are not:
 * at small alpha they are 1/alpha times as large, so that the line gives its foot the most say where least is known. Its statistically honest counterpart is this fit.
 *
 * NOT a way to choose a model or to find Ea (see `singleCurveFit`): on one curve the wrong model fits nearly as well, with another Ea and a small standard error.
 *
 * @param curve - rows in any order; those whose alpha is not inside (0, 1), or whose g is not a positive finite number, are not used
 * @throws KineticsError as `singleCurveFit`
 * @source bates-watts-1988
 * @source ictac-2011 (that it is not acceptable for choosing a model)
 */
export function fittedConversionCurve(curve: ConversionCurve, model: ReactionModel): FittedConversionCurve {
  const line = singleCurveFit(curve, model, 'exact')
  const rows = usedRows(curve, model)
  if (line.status !== 'ok') return withoutNumbers(line, line.status, rows.alpha.length)
  const R = gasConstant_J_per_mol_K
  const middle = rows.inverseT.reduce((sum, value) => sum + value, 0) / rows.inverseT.length
  const fit = leastSquares(curveProblem(rows, curve.heatingRate, model, line, middle))
  if (fit.status !== 'converged') return withoutNumbers(line, 'not-converged', rows.alpha.length)
  const [Ea = Number.NaN, lnK = Number.NaN] = fit.parameters
  const [varEa = Number.NaN, covariance = Number.NaN, , varLnK = Number.NaN] = fit.covariance
  // ln A = ln k + Ea·middle/R
  const slope = middle / R
  return {
    model: model.code,
    status: 'ok',
    Ea: quantity(Ea, 'J/mol'),
    standardError: quantity(Math.sqrt(varEa), 'J/mol'),
    lnA: lnK + Ea * slope,
    lnAStandardError: Math.sqrt(varLnK + 2 * slope * covariance + slope * slope * varEa),
    covarianceEaLnA: quantity(covariance + slope * varEa, 'J/mol'),
    residuals: fit.residuals,
    residualSumOfSquares: fit.residualSumOfSquares,
    residualStandardDeviation: fit.residualStandardDeviation,
    dof: fit.dof,
    line,
  }
}

interface UsedRows {
  readonly inverseT: Float64Array
  readonly alpha: Float64Array
}

function usedRows({ temperature_K, conversion }: ConversionCurve, model: ReactionModel): UsedRows {
  const used = Array.from(conversion, (alpha, i) => ({ alpha, T: temperature_K[i] ?? Number.NaN })).filter(({ alpha }) => {
    const g = alpha > 0 && alpha < 1 ? model.g(alpha) : Number.NaN
    return g > 0 && Number.isFinite(g)
  })
  return { inverseT: Float64Array.from(used, ({ T }) => 1 / T), alpha: Float64Array.from(used, ({ alpha }) => alpha) }
}

function curveProblem(
  { inverseT, alpha }: UsedRows,
  heatingRate: number,
  model: ReactionModel,
  start: SingleCurveFit,
  middle: number,
): LeastSquaresProblem {
  const R = gasConstant_J_per_mol_K
  const m = alpha.length
  const lnBetaR = Math.log(heatingRate * R)
  // Where the model was last, so that the search for g⁻¹ begins beside its end.
  const last = Float64Array.from(alpha)
  const lnG = (i: number, Ea: number, lnK: number): number =>
    lnK + (Ea * middle) / R + Math.log(Ea) - lnBetaR + lnPOfX((Ea / R) * (inverseT[i] ?? Number.NaN))
  const modelAt = (i: number, g: number): number => {
    const found = conversionAtIntegral(model, g, last[i])
    last[i] = found
    return found
  }
  return {
    parameters: [
      { name: 'Ea', start: start.Ea, scale: 'log' },
      { name: 'ln k', start: start.lnA - (start.Ea * middle) / R, typical: 1 },
    ],
    residualCount: m,
    residuals: ([Ea = Number.NaN, lnK = Number.NaN], out) => {
      for (let i = 0; i < m; i++) out[i] = modelAt(i, Math.exp(lnG(i, Ea, lnK))) - (alpha[i] ?? Number.NaN)
    },
    jacobian: ([Ea = Number.NaN, lnK = Number.NaN], out) => {
      for (let i = 0; i < m; i++) {
        const g = Math.exp(lnG(i, Ea, lnK))
        const found = modelAt(i, g)
        // dalpha = f dg = f g d ln g; behind the end of the reaction nothing depends on Ea or A.
        const perLnG = found > 0 && found < 1 ? model.f(found) * g : 0
        const inverse = inverseT[i] ?? Number.NaN
        // d ln p/dx = -1/π(x)
        out[i] = perLnG * (1 / Ea + middle / R - inverse / (R * scaledPOfX((Ea / R) * inverse)))
        out[m + i] = perLnG
      }
    },
  }
}

function withoutNumbers(line: SingleCurveFit, status: SingleCurveFit['status'], rows: number): FittedConversionCurve {
  const none = quantity(Number.NaN, 'J/mol')
  return {
    model: line.model,
    status,
    Ea: none,
    standardError: none,
    lnA: Number.NaN,
    lnAStandardError: Number.NaN,
    covarianceEaLnA: none,
    residuals: new Float64Array(rows).fill(Number.NaN),
    residualSumOfSquares: Number.NaN,
    residualStandardDeviation: Number.NaN,
    dof: line.dof,
    line,
  }
}

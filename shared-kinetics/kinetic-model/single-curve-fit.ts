import { KineticsError } from '../errors.ts'
import { lineFit, type LineFit } from '../numerics/line-fit.ts'
import type { ReactionModel } from '../reaction-models/model.ts'
import { scaledPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column, quantity, type Column, type Quantity } from '../units/quantity.ts'

/** The conversion of one run at a constant heating rate: columns of one length. */
export interface ConversionCurve {
  readonly heatingRate: Quantity<'K/s'>
  readonly temperature_K: ArrayLike<number>
  readonly conversion: ArrayLike<number>
}

/**
 * `coats-redfern`: p(x) ≈ (e⁻ˣ/x²)(1 - 2/x), the bracket taken as constant along the curve, as published. `exact`: p(x) itself, by iteration.
 */
export type IntegralOfOneCurve = 'coats-redfern' | 'exact'

/** Ea and ln A of one curve under one model. Where status is not `ok` every number is NaN. */
export interface SingleCurveFit {
  readonly model: string
  /**
   * `model-does-not-apply`: g of the model is not counted from alpha = 0; `too-few-points`: fewer than two rows with 0 < alpha < 1; `line-not-determined`: the
   * temperatures do not differ; `energy-not-positive`; `energy-too-small`: mean Ea/(RT) at or below 2, where the published form gives no positive integral;
   * `not-converged`: Ea/(RT) so small that the exact integral does not settle.
   */
  readonly status:
    | 'ok'
    | 'model-does-not-apply'
    | 'too-few-points'
    | 'line-not-determined'
    | 'energy-not-positive'
    | 'energy-too-small'
    | 'not-converged'
  readonly Ea: Quantity<'J/mol'>
  /** One standard error of the line, n - 2 degrees of freedom. It tells how straight the line is; whether the model is right it does not tell. */
  readonly standardError: Quantity<'J/mol'>
  /** ln of A in 1/s. */
  readonly lnA: number
  readonly lnAStandardError: number
  readonly r2: number
  /** n - 2. */
  readonly dof: number
  /** ln(g/T²), or ln(g/(T² π)) with the exact integral, against 1/T: the rows used. */
  readonly line: { readonly x_per_K: Column<'1/K'>; readonly y: Float64Array; readonly slope_K: number; readonly intercept: number }
}

/**
 * Straight line of ONE curve under an assumed model, after Coats and Redfern:
 *
 *   ln[g(alpha)/T²] = ln[(A R/(beta Ea))(1 - 2 R T/Ea)] - Ea/(R T)
 *
 * beta the heating rate in K/s, T in K; slope -Ea/R, and ln A from the intercept with 1/T at its mean in the bracket. With the `exact` integral the ordinate is
 * ln[g/(T² π(x))], π(x) = x² eˣ p(x), Ea is put in anew until it no longer changes, and the intercept is ln[A R/(beta Ea)] without a bracket.
 *
 * NOT a way to choose a model or to find Ea: on one curve nearly every model gives nearly a straight line, each with another Ea. First-order data give A2, A3 and A4
 * with r² above 0.999997 at about a half, a third and a fifth of the true Ea. Ea comes from several heating rates (the isoconversional methods); the pairs of Ea and
 * ln A that the wrong models give serve the compensation line (`compensationLine`), which is what this is for. Errors of ln g are far from equal along a curve:
 * `fittedConversionCurve` fits conversion itself, from this line.
 *
 * @param curve - rows in any order; those whose alpha is not inside (0, 1), or whose g is not a positive finite number, are not used
 * @throws KineticsError `no-heating-rate`, `column-length`, `not-finite` where a used temperature is not a positive number
 * @source coats-redfern-1964
 * @source ictac-2011 (that it is not acceptable for choosing a model)
 * @source zhou-grant-2004, vyazovkin-wight-1999 (what wrong models do)
 */
export function singleCurveFit(
  curve: ConversionCurve,
  model: ReactionModel,
  integral: IntegralOfOneCurve = 'coats-redfern',
): SingleCurveFit {
  const { x, lnG } = usableRows(curve, model)
  const outcome = (status: SingleCurveFit['status']): SingleCurveFit => withoutNumbers(model.code, status, x, lnG)
  if (model.gZeroAt !== 0) return outcome('model-does-not-apply')
  if (x.length < 2) return outcome('too-few-points')
  const R = gasConstant_J_per_mol_K
  let y = lnG.map((value, i) => value + 2 * Math.log(x[i] as number))
  let fit = lineFit(x, y)
  if (fit.status !== 'ok') return outcome('line-not-determined')
  let Ea = -R * fit.slope
  if (!(Ea > 0)) return outcome('energy-not-positive')
  if (integral === 'coats-redfern') {
    const bracket = 1 - (2 * R) / (Ea * fit.xMean)
    return bracket > 0 ? numbers(curve, model, fit, y, x, Ea, 1, -Math.log(bracket)) : outcome('energy-too-small')
  }
  for (let k = 0; k < mostIterations; k++) {
    const atEa = Ea
    y = lnG.map((value, i) => value + 2 * Math.log(x[i] as number) - Math.log(scaledPOfX((atEa / R) * (x[i] as number))))
    fit = lineFit(x, y)
    Ea = -R * fit.slope
    if (!(Ea > 0)) return outcome('not-converged')
    if (Math.abs(Ea - atEa) <= 1e-13 * Ea) return numbers(curve, model, fit, y, x, Ea, 1 / (1 - feedback(x, Ea)), 0)
  }
  return outcome('not-converged')
}

const mostIterations = 200

/** How much of a change of Ea comes back through π(x): the standard error of the line grows by 1/(1 - this). */
function feedback(x: Float64Array, Ea: number): number {
  const R = gasConstant_J_per_mol_K
  const change = x.map((inverse) => {
    const u = (Ea / R) * inverse
    // d ln π/dEa = (1 + 2/u - 1/π) du/dEa
    return ((1 + 2 / u - 1 / scaledPOfX(u)) * inverse) / R
  })
  return R * lineFit(x, change).slope
}

function usableRows({ heatingRate, temperature_K, conversion }: ConversionCurve, model: ReactionModel) {
  if (!(heatingRate > 0) || !Number.isFinite(heatingRate)) {
    throw new KineticsError('no-heating-rate', `The line of one curve needs a positive constant heating rate, not ${heatingRate} K/s.`)
  }
  if (temperature_K.length !== conversion.length) {
    throw new KineticsError('column-length', 'A curve needs as many temperatures as conversions.', {
      temperatures: temperature_K.length,
      conversions: conversion.length,
    })
  }
  const x: number[] = []
  const lnG: number[] = []
  for (let i = 0; i < conversion.length; i++) {
    const alpha = conversion[i] ?? Number.NaN
    const g = alpha > 0 && alpha < 1 ? model.g(alpha) : Number.NaN
    if (!(g > 0) || !Number.isFinite(g)) continue
    const T = temperature_K[i] ?? Number.NaN
    if (!(T > 0) || !Number.isFinite(T)) {
      throw new KineticsError('not-finite', `Row ${i + 1} of the curve has no temperature in K: ${T}.`, { row: i })
    }
    x.push(1 / T)
    lnG.push(Math.log(g))
  }
  return { x: Float64Array.from(x), lnG: Float64Array.from(lnG) }
}

function numbers(
  curve: ConversionCurve,
  model: ReactionModel,
  fit: LineFit,
  y: Float64Array,
  x: Float64Array,
  Ea: number,
  errorFactor: number,
  lnBracket: number,
): SingleCurveFit {
  const R = gasConstant_J_per_mol_K
  // ln A = intercept + ln(-slope) + const: d ln A = d intercept + d slope/slope.
  const lnAVariance = fit.interceptStandardError ** 2 + (fit.slopeStandardError / fit.slope) ** 2 + (2 * fit.covariance) / fit.slope
  return {
    model: model.code,
    status: 'ok',
    Ea: quantity(Ea, 'J/mol'),
    standardError: quantity(R * fit.slopeStandardError * errorFactor, 'J/mol'),
    lnA: fit.intercept + Math.log((curve.heatingRate * Ea) / R) + lnBracket,
    lnAStandardError: Math.sqrt(lnAVariance) * errorFactor,
    r2: fit.r2,
    dof: fit.dof,
    line: { x_per_K: column(x, '1/K'), y, slope_K: fit.slope, intercept: fit.intercept },
  }
}

function withoutNumbers(model: string, status: SingleCurveFit['status'], x: Float64Array, lnG: Float64Array): SingleCurveFit {
  const none = quantity(Number.NaN, 'J/mol')
  return {
    model,
    status,
    Ea: none,
    standardError: none,
    lnA: Number.NaN,
    lnAStandardError: Number.NaN,
    r2: Number.NaN,
    dof: Math.max(0, x.length - 2),
    line: {
      x_per_K: column(x, '1/K'),
      y: lnG.map((value, i) => value + 2 * Math.log(x[i] ?? Number.NaN)),
      slope_K: Number.NaN,
      intercept: Number.NaN,
    },
  }
}

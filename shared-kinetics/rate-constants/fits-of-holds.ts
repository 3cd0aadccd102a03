import { fQuantile } from '../numerics/f-distribution.ts'
import { runsTest } from '../numerics/runs-test.ts'
import type { ReactionModel } from '../reaction-models/model.ts'
import { reactionModelCodes, reactionModels } from '../reaction-models/registry.ts'
import { joulesToKilojoules } from '../units/convert.ts'
import { quantity } from '../units/quantity.ts'
import { arrheniusLine } from './arrhenius-line.ts'
import type { HoldOptions } from './hold-rows.ts'
import { rateConstantFromHold, type RateConstantFromHold } from './rate-constant-from-hold.ts'

/** An isothermal run read at levels of conversion; NaN where a level was not reached. */
export interface HoldAtLevels {
  readonly label: string
  readonly temperature_K: number
  /** Time from the start of the hold. */
  readonly time_s: ArrayLike<number>
  readonly conversion: ArrayLike<number>
  /** Conversion lost before the hold began; NaN where it is not known. */
  readonly conversionBeforeHold: number
}

/** How the chosen model follows one hold. What is not to be had is null. */
export interface FitOfHold {
  readonly label: string
  readonly temperature_K: number
  readonly rateConstant_per_s: number
  /** From the covariance of the fit, rows taken as independent. */
  readonly standardError_per_s: number | null
  readonly zero_s: number
  readonly zeroStandardError_s: number | null
  /** Slope of the line of g against t, for comparison. */
  readonly linearisedRateConstant_per_s: number
  readonly linearisedR2: number | null
  /** Of conversion; null where no degree of freedom is left. */
  readonly residualStandardDeviation: number | null
  readonly greatestResidual: number
  readonly rows: number
  readonly dof: number
  /** Stretches of residuals of one sign, and the chance of so few in a random order; null where there are too few rows to tell. */
  readonly signRuns: number
  readonly signRunsProbability: number | null
  /** That chance is below 5 % shared out among the holds. */
  readonly isSystematic: boolean
}

/** What one reaction model leaves of all holds together. */
export interface FitOfModel {
  readonly model: string
  readonly label: string
  /** `not-converged`: on some hold; `model-does-not-apply`: with the zero in time fixed. Numbers are then null. */
  readonly status: 'ok' | 'not-converged' | 'model-does-not-apply'
  readonly residualSumOfSquares: number | null
  readonly residualStandardDeviation: number | null
  /** Residual variance over the least one; null where that is 0. */
  readonly varianceRatio: number | null
  /** The ratio does not exceed the limit. */
  readonly fits: boolean
  /** From the rate constants of this model; null for fewer than two temperatures. */
  readonly Ea_kJ_per_mol: number | null
  readonly lnA_per_s: number | null
}

/** How rate constants were made from holds, how well the chosen model follows them, and what the others leave. */
export interface FitsOfHolds {
  readonly model: string
  /** k is from the fit of alpha(t), not from the line of g. */
  readonly method: 'least-squares-of-conversion'
  readonly zeroInTime: HoldOptions['zeroInTime']
  readonly range: readonly [number, number]
  /** Those that have a rate constant under the chosen model. */
  readonly holds: readonly FitOfHold[]
  /** Rows of all holds less parameters. */
  readonly dof: number
  /** F(0.95; dof, dof); null where dof is 0, and no model is then told from another. */
  readonly varianceRatioLimit: number | null
  /** The closest first; those without a sum of squares last. */
  readonly models: readonly FitOfModel[]
}

/** A hold with its rate constant under the chosen model. */
export interface ReadHold {
  readonly hold: HoldAtLevels
  readonly k: RateConstantFromHold
}

export const readHold = (hold: HoldAtLevels, model: ReactionModel, options: HoldOptions): ReadHold => ({
  hold,
  k: rateConstantFromHold(
    { temperature: quantity(hold.temperature_K, 'K'), time_s: hold.time_s, conversion: hold.conversion },
    model,
    options,
  ),
})

/**
 * How well the chosen model follows the holds, and the reaction models of the common list ranked by the residual sum of squares of conversion they leave, all holds
 * together, each hold with a k (and t₀) of its own.
 *
 * Residuals are looked through for runs of one sign (`runsTest`, 5 % shared out among the holds that can be tested). A model fits as well as the closest one where
 * the ratio of their residual variances does not exceed F(0.95; ν, ν), ν = rows less parameters: the test in use for reaction models. All have equally many
 * parameters, so that information criteria rank them alike. Both tests take rows as independent, which neighbouring levels of one run only nearly are; and a model that fits is not
 * thereby shown to be right.
 *
 * @param read - holds with status `ok` under the chosen model; the other models are fitted to the same rows
 * @throws Cancelled, by `checkCancelled`
 * @source vyazovkin-wight-1999
 * @source wald-wolfowitz-1940
 * @source cook-weisberg-1982 (sharing out)
 */
export function fitsOfHolds(
  read: readonly ReadHold[],
  model: ReactionModel,
  options: HoldOptions,
  checkCancelled: () => void = () => undefined,
): FitsOfHolds {
  const dof = read.reduce((sum, { k }) => sum + k.dof, 0)
  const limit = dof > 0 ? fQuantile(0.95, dof, dof) : null
  const fitted = reactionModelCodes.map((code) =>
    fitOfModel(
      reactionModels[code],
      code === model.code
        ? read
        : read.map(({ hold }) => {
            checkCancelled()
            return readHold(hold, reactionModels[code], options)
          }),
      dof,
    ),
  )
  const least = Math.min(...fitted.flatMap(({ residualSumOfSquares: sum }) => (sum === null ? [] : [sum])))
  return {
    model: model.code,
    method: 'least-squares-of-conversion',
    zeroInTime: options.zeroInTime,
    range: options.range,
    holds: holdFits(read),
    dof,
    varianceRatioLimit: limit,
    models: fitted
      .map((fit) => ({
        ...fit,
        varianceRatio: orNull(fit.residualSumOfSquares === least ? 1 : (fit.residualSumOfSquares ?? Number.NaN) / least),
        fits: fit.residualSumOfSquares !== null && limit !== null && fit.residualSumOfSquares <= limit * least,
      }))
      .toSorted((a, b) => (a.residualSumOfSquares ?? Number.MAX_VALUE) - (b.residualSumOfSquares ?? Number.MAX_VALUE)),
  }
}

const significance = 0.05

function holdFits(read: readonly ReadHold[]): readonly FitOfHold[] {
  const testable = read.filter(({ k }) => runsTest(k.residuals, significance).status === 'tested').length
  const threshold = significance / Math.max(1, testable)
  return read.map(({ hold, k }) => {
    const test = runsTest(k.residuals, threshold)
    return {
      label: hold.label,
      temperature_K: hold.temperature_K,
      rateConstant_per_s: k.rateConstant,
      standardError_per_s: orNull(k.standardError),
      zero_s: k.zero_s,
      zeroStandardError_s: orNull(k.zeroStandardError_s),
      linearisedRateConstant_per_s: k.linearised.rateConstant_per_s,
      linearisedR2: orNull(k.linearised.r2),
      residualStandardDeviation: orNull(k.residualStandardDeviation),
      greatestResidual: k.residuals.reduce((most, value) => Math.max(most, Math.abs(value)), 0),
      rows: k.rows,
      dof: k.dof,
      signRuns: test.runs,
      signRunsProbability: test.status === 'tested' ? test.probability : null,
      isSystematic: test.status === 'tested' && test.probability < threshold,
    }
  })
}

function fitOfModel({ code, label }: ReactionModel, read: readonly ReadHold[], dof: number): Omit<FitOfModel, 'varianceRatio' | 'fits'> {
  const failed = read.find(({ k }) => k.status !== 'ok')
  const sum = read.reduce((total, { k }) => total + k.residualSumOfSquares, 0)
  if (failed !== undefined || read.length === 0) {
    const status = failed?.k.status === 'model-does-not-apply' ? 'model-does-not-apply' : 'not-converged'
    return { model: code, label, status, residualSumOfSquares: null, residualStandardDeviation: null, Ea_kJ_per_mol: null, lnA_per_s: null }
  }
  const line = arrheniusLine(read.map(({ k }) => ({ temperature: k.temperature, rateConstant: k.rateConstant })))
  return {
    model: code,
    label,
    status: 'ok',
    residualSumOfSquares: sum,
    residualStandardDeviation: dof > 0 ? Math.sqrt(sum / dof) : null,
    Ea_kJ_per_mol: orNull(joulesToKilojoules(line.Ea)),
    lnA_per_s: orNull(line.lnA),
  }
}

const orNull = (value: number): number | null => (Number.isFinite(value) ? value : null)

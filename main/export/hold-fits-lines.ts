import type { FitOfModel, FitsOfHolds } from '../../shared-kinetics/contract/study-result.ts'
import type { RateConstantsResult } from '../../shared-kinetics/tasks/rate-constants-result.ts'
import { kelvinToCelsius } from '../../shared-kinetics/units/convert.ts'

type WithFits = Pick<RateConstantsResult, 'holdFits'>

/** The chosen model among the others, in a few lines for a terminal; none where the table was not made from holds. */
export function holdFitsShort({ holdFits }: WithFits): readonly string[] {
  if (holdFits === null) return []
  const { model, models } = holdFits
  const rank = models.findIndex((other) => other.model === model)
  const shown = models.filter((other, i) => other.residualStandardDeviation !== null && (i < 5 || i === rank))
  const fitting = models.filter((other) => other.fits).map((other) => other.model)
  const off = holdFits.holds.filter((hold) => hold.isSystematic).map((hold) => hold.label)
  return [
    `k: conversion of ${holdFits.holds.length} holds fitted against time under ${model} by nonlinear least squares, zero in time ${holdFits.zeroInTime === 'free' ? 'fitted' : 'at the start of the hold'}`,
    ...(off.length === 0 ? [] : [`systematic residuals: ${off.slice(0, 10).join(', ')}${off.length > 10 ? ', …' : ''}`]),
    ...(shown.length === 0
      ? []
      : [
          `standard deviation of conversion by reaction model: ${shown.map((other) => `${other.model} ${small(other.residualStandardDeviation)}`).join(', ')}; ${model} is number ${rank + 1} of ${models.length} over all ${holdFits.holds.length} holds, left out or not`,
          `models that fit the holds (${limitText(holdFits)}): ${fitting.join(', ')}`,
        ]),
  ]
}

/** Each hold under the chosen model. */
export function holdLines({ holdFits }: WithFits): readonly string[] {
  if (holdFits === null) return []
  return [
    `k and the zero in time by nonlinear least squares of conversion against time under ${holdFits.model}, conversion ${holdFits.range[0]} to ${holdFits.range[1]}; the slope of g against time stands beside k for comparison. Standard errors from the covariance, rows taken as independent`,
    ...holdFits.holds.map((hold) => {
      const zero = holdFits.zeroInTime === 'free' ? `, zero in time ${seconds(hold.zero_s)}${errorText(hold.zeroStandardError_s)} s` : ''
      const test =
        hold.signRunsProbability === null
          ? 'too few rows for a runs test'
          : `${hold.signRuns} runs of signs, chance ${small(hold.signRunsProbability)}${hold.isSystematic ? ': systematic' : ''}`
      return `${hold.label}, ${kelvinToCelsius(hold.temperature_K).toFixed(2)} °C: k ${small(hold.rateConstant_per_s)}${errorText(hold.standardError_per_s)} 1/s (line of g: ${small(hold.linearisedRateConstant_per_s)}, r² ${hold.linearisedR2?.toPrecision(5) ?? 'none'})${zero}; conversion: standard deviation ${small(hold.residualStandardDeviation)}, at most ${small(hold.greatestResidual)} off, ${hold.rows} rows; ${test}`
    }),
  ]
}

/** The reaction models, the closest first. */
export function modelLines({ holdFits }: WithFits): readonly string[] {
  if (holdFits === null) return []
  return [
    `residual sums of squares of conversion, all holds together, ${holdFits.dof} degrees of freedom; a model fits as well as the closest one up to a ${limitText(holdFits)}. A fit does not show that a model is right`,
    ...holdFits.models.map((model, i) => `${i + 1}. ${modelText(model, holdFits)}`),
  ]
}

function modelText(fit: FitOfModel, { model }: FitsOfHolds): string {
  const name = `${fit.model} (${fit.label})${fit.model === model ? ', chosen' : ''}`
  if (fit.status !== 'ok')
    return `${name}: ${fit.status === 'not-converged' ? 'the fit found no minimum' : 'does not apply with the zero in time fixed'}`
  const Ea = fit.Ea_kJ_per_mol === null ? '' : `; Ea ${fit.Ea_kJ_per_mol.toFixed(2)} kJ/mol`
  const lnA = fit.lnA_per_s === null ? '' : `, ln A ${fit.lnA_per_s.toFixed(2)} (A in 1/s)`
  return `${name}: sum of squares ${small(fit.residualSumOfSquares)}, standard deviation ${small(fit.residualStandardDeviation)}, ratio of variances ${small(fit.varianceRatio)}${fit.fits ? ', fits' : ''}${Ea}${lnA}`
}

const limitText = ({ varianceRatioLimit: limit, dof }: FitsOfHolds): string =>
  limit === null ? 'no degree of freedom left' : `ratio of variances of ${small(limit)}, F(0.95; ${dof}, ${dof})`

const errorText = (value: number | null): string => (value === null ? '' : ` ± ${small(value)}`)
const seconds = (value: number): string => String(Number(value.toPrecision(4)))

/** Three digits; by a power of ten where zeros would have to be counted. */
function small(value: number | null): string {
  if (value === null) return 'none'
  const size = Math.abs(value)
  return size !== 0 && (size < 1e-3 || size >= 1e6) ? value.toExponential(2).replace('e+', 'e') : String(Number(value.toPrecision(3)))
}

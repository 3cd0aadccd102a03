import type { FitOfHold, FitsOfHolds } from '../../rate-constants/fits-of-holds.ts'
import { holdsInUse, holdsNotFollowed, isVarianceBeyondLimit, misfitOfCaution } from '../../rate-constants/model-of-holds.ts'
import type { Finding } from '../finding.ts'
import { digits } from '../words.ts'
import { aboutTable, type RateConstantReview } from './rate-constant-review.ts'

/** Of the holds that a sentence speaks of, worst first; the table has them all. */
const mostNamed = 2

/**
 * Fires where the chosen model does not follow the holds that rate constants were made from: residuals of conversion that keep one sign in stretches (runs test), and a
 * residual variance above that of the closest model by more than F allows. Where k is to be predicted with such a model, it is a stop: the prediction carries the error of the model whole.
 */
export function holdModelFit({ table, result: { holdFits, predictions } }: RateConstantReview): Finding[] {
  if (holdFits === null) return []
  const used = holdsInUse(table.rows, holdFits)
  const severity = predictions.some((at) => at.lnK !== null) ? 'stop' : 'caution'
  return [...systematicResiduals(used, holdFits, severity), ...closerModels(used, holdFits, severity)]
}

function systematicResiduals(used: readonly FitOfHold[], { model }: FitsOfHolds, severe: 'stop' | 'caution'): Finding[] {
  const off = holdsNotFollowed(used)
  const [worst] = off
  if (worst === undefined) return []
  const named = off.slice(0, mostNamed).map(({ label, signRuns, rows, signRunsProbability, greatestResidual }) => {
    const chance = signRunsProbability === null ? '' : `, chance ${digits(signRunsProbability)}`
    return `${label} (${signRuns} stretches of one sign in ${rows} rows${chance}; up to ${digits(greatestResidual)} of conversion off)`
  })
  return [
    aboutTable({
      code: 'model-fits-badly',
      severity: worst.greatestResidual >= misfitOfCaution ? severe : 'note',
      title: `${model} does not follow ${off.length === 1 ? 'a hold' : `${off.length} of ${used.length} holds`}`,
      message:
        `The conversion differs from the model ${model} systematically: ${named.join('; ')}${off.length > mostNamed ? `; and ${off.length - mostNamed} more` : ''}. k then means little beyond a time scale, and A and conversions predicted with the model are wrong. ` +
        'Choose a model that fits (see the ranking), narrow the range of conversion, let the zero in time be fitted, or look for more than one reaction.',
      evidence: {
        model,
        holds: off.length,
        worst: worst.label,
        greatestResidual: worst.greatestResidual,
        signRuns: worst.signRuns,
        probability: worst.signRunsProbability,
      },
      basis:
        'Runs test of the residuals in the order of time, p < 0.05 shared out among the holds; caution from 0.01 of conversion on, a stop where k is predicted with it (common practice)',
      sources: ['wald-wolfowitz-1940', 'swed-eisenhart-1943', 'cook-weisberg-1982'],
    }),
  ]
}

function closerModels(used: readonly FitOfHold[], fits: FitsOfHolds, severity: 'stop' | 'caution'): Finding[] {
  const { model, models, varianceRatioLimit: limit } = fits
  const chosen = models.find((other) => other.model === model)
  const fitting = models.filter((other) => other.fits)
  if (used.length === 0 || limit === null || chosen === undefined || !isVarianceBeyondLimit(fits)) return []
  const [best] = fitting
  return [
    aboutTable({
      code: 'other-models-fit-better',
      severity,
      title: `${best?.model} fits the holds better than ${model}`,
      message:
        `${model} leaves a standard deviation of conversion of ${digits(chosen.residualStandardDeviation ?? Number.NaN)}, ${best?.model} ${digits(best?.residualStandardDeviation ?? Number.NaN)}` +
        `${chosen.varianceRatio === null ? '' : `; the ratio of variances is ${ratio(chosen.varianceRatio)}, above ${digits(limit)}`}. Within that limit: ${fitting
          .slice(0, 10)
          .map((other) => other.model)
          .join(
            ', ',
          )}${fitting.length > 10 ? ', …' : ''}. Ea hardly depends on the model, A does: take one of these unless the mechanism is known.${severity === 'stop' ? ` k predicted under ${model} is as wrong as its A.` : ''}`,
      evidence: {
        model,
        closest: best?.model ?? null,
        varianceRatio: chosen.varianceRatio,
        limit,
        rank: models.indexOf(chosen) + 1,
        models: models.length,
        fitting: fitting.length,
      },
      basis:
        'Ratio of residual variances above F(0.95; dof, dof); rows taken as independent; a stop where k is predicted (common practice)',
      sources: ['vyazovkin-wight-1999'],
    }),
  ]
}

/** Where the closest model leaves next to nothing, the ratio has no end. */
const ratio = (value: number): string => digits(value, value < 1e6 ? 3 : 1)

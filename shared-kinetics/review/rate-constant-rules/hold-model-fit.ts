import type { FitOfHold, FitsOfHolds } from '../../rate-constants/fits-of-holds.ts'
import type { RateConstantRow } from '../../rate-constants/rate-constant-table.ts'
import type { Finding } from '../finding.ts'
import { digits } from '../words.ts'
import { aboutTable, type RateConstantReview } from './rate-constant-review.ts'

/** Conversion is not measured closer: 1 µg of 10 mg. What a model misses by less is not said. */
const leastSeen = 1e-4
/** A misfit of a hundredth of the reaction moves k by about as much. */
const cautionFrom = 0.01

/**
 * Fires where the chosen model does not follow the holds that rate constants were made from: residuals of conversion that keep one sign in stretches (runs test), and a
 * residual variance above that of the closest model by more than F allows.
 */
export function holdModelFit({ table, result: { holdFits } }: RateConstantReview): Finding[] {
  if (holdFits === null) return []
  const used = holdFits.holds.filter((hold) =>
    table.rows.some((row) => row.use && (isOf(row, hold) || (row.temperature_K === hold.temperature_K && isRenamed(row, holdFits)))),
  )
  return [...systematicResiduals(used, holdFits), ...closerModels(used, holdFits)]
}

type Named = Pick<RateConstantRow, 'label' | 'temperature_K'>

const isOf = (row: Named, hold: Named): boolean => row.label === hold.label && row.temperature_K === hold.temperature_K
const isRenamed = (row: Named, { holds }: FitsOfHolds): boolean => !holds.some((hold) => isOf(row, hold))

function systematicResiduals(used: readonly FitOfHold[], { model }: FitsOfHolds): Finding[] {
  const off = used.filter((hold) => hold.isSystematic && hold.greatestResidual > leastSeen)
  const [worst] = off.toSorted((a, b) => b.greatestResidual - a.greatestResidual)
  if (worst === undefined) return []
  const named = off.slice(0, 10).map(({ label, signRuns, rows, signRunsProbability, greatestResidual }) => {
    const chance = signRunsProbability === null ? '' : `, chance ${digits(signRunsProbability)}`
    return `${label} (${signRuns} stretches of one sign in ${rows} rows${chance}; up to ${digits(greatestResidual)} of conversion off)`
  })
  return [
    aboutTable({
      code: 'model-fits-badly',
      severity: worst.greatestResidual >= cautionFrom ? 'caution' : 'note',
      title: `${model} does not follow ${off.length === 1 ? 'a hold' : `${off.length} of ${used.length} holds`}`,
      message:
        `The conversion differs from the model ${model} systematically: ${named.join('; ')}${off.length > 10 ? '; …' : ''}. k then means little beyond a time scale, and A and conversions predicted with the model are wrong. ` +
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
        'Runs test of the residuals in the order of time, p < 0.05 shared out among the holds; caution from 0.01 of conversion on (common practice)',
      sources: ['wald-wolfowitz-1940', 'swed-eisenhart-1943', 'cook-weisberg-1982'],
    }),
  ]
}

function closerModels(used: readonly FitOfHold[], { model, models, varianceRatioLimit: limit }: FitsOfHolds): Finding[] {
  const chosen = models.find((other) => other.model === model)
  const fitting = models.filter((other) => other.fits)
  if (used.length === 0 || limit === null || chosen === undefined || chosen.fits || fitting.length === 0) return []
  if (!((chosen.residualStandardDeviation ?? 0) > leastSeen)) return []
  const [best] = fitting
  return [
    aboutTable({
      code: 'other-models-fit-better',
      severity: 'caution',
      title: `${best?.model} fits the holds better than ${model}`,
      message:
        `${model} leaves a standard deviation of conversion of ${digits(chosen.residualStandardDeviation ?? Number.NaN)}, ${best?.model} ${digits(best?.residualStandardDeviation ?? Number.NaN)}` +
        `${chosen.varianceRatio === null ? '' : `; the ratio of variances is ${ratio(chosen.varianceRatio)}, above ${digits(limit)}`}. Within that limit: ${fitting
          .slice(0, 10)
          .map((other) => other.model)
          .join(
            ', ',
          )}${fitting.length > 10 ? ', …' : ''}. Ea hardly depends on the model, A does: take one of these unless the mechanism is known.`,
      evidence: {
        model,
        closest: best?.model ?? null,
        varianceRatio: chosen.varianceRatio,
        limit,
        rank: models.indexOf(chosen) + 1,
        models: models.length,
        fitting: fitting.length,
      },
      basis: 'Ratio of residual variances above F(0.95; dof, dof); rows taken as independent',
      sources: ['vyazovkin-wight-1999'],
    }),
  ]
}

/** Where the closest model leaves next to nothing, the ratio has no end. */
const ratio = (value: number): string => (value < 1e6 ? digits(value) : value.toExponential(0).replace('e+', 'e'))

import type { FitOfModel, FitsOfHolds } from '../../../shared-kinetics/contract/study-result.ts'
import { digitsText } from '../../sheet/scientific.ts'
import { modelOf, models, modelWords, type ModelCode } from './hold-models.ts'

/** Up to which ratio of residual variances a model fits as well as the closest one. */
export const limitWords = ({ varianceRatioLimit: limit, dof }: Pick<FitsOfHolds, 'varianceRatioLimit' | 'dof'>): string =>
  limit === null ? 'no degree of freedom left' : `ratio of variances of ${digitsText(limit)}, F(0.95; ${dof}, ${dof})`

/** Why a model has no numbers; empty where it has. */
export const unfittedWords: Readonly<Record<FitOfModel['status'], string>> = {
  ok: '',
  'not-converged': 'the fit found no minimum',
  'model-does-not-apply': 'does not apply with the zero in time fixed',
}

/** The models to choose from: those that were ranked in that order, each with what it leaves; else as the common list has them. */
export function modelOptions(ranked: FitsOfHolds | null): readonly { readonly code: ModelCode; readonly text: string }[] {
  if (ranked === null) return models.map((code) => ({ code, text: modelWords(code) }))
  const rows = ranked.models.flatMap((fit) => {
    const code = modelOf(fit.model)
    return code === undefined ? [] : [{ code, text: `${modelWords(code)}: ${leftBy(fit)}` }]
  })
  return [...rows, ...models.filter((code) => rows.every((row) => row.code !== code)).map((code) => ({ code, text: modelWords(code) }))]
}

function leftBy(fit: FitOfModel): string {
  if (fit.status !== 'ok') return unfittedWords[fit.status]
  if (fit.residualStandardDeviation === null) return 'no degree of freedom left'
  return `standard deviation ${digitsText(fit.residualStandardDeviation)}${fit.fits ? ', fits' : ''}`
}

/** The chosen model among the others, in a sentence. */
export function rankingWords(fits: FitsOfHolds): string {
  const { model, models: ranked } = fits
  const rank = ranked.findIndex((other) => other.model === model)
  const place = rank < 0 ? '' : `${model} is number ${rank + 1} of ${ranked.length} over all ${fits.holds.length} holds, left out or not; `
  const fitting = ranked.filter((other) => other.fits).map((other) => other.model)
  return `${place}models that fit the holds (${limitWords(fits)}): ${fitting.length === 0 ? 'none' : fitting.join(', ')}.`
}

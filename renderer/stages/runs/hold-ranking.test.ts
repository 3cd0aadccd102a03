import { describe, expect, it } from 'vitest'
import type { FitOfModel, FitsOfHolds } from '../../../shared-kinetics/contract/study-result.ts'
import { models } from './hold-models.ts'
import { limitWords, modelOptions, rankingWords } from './hold-ranking.ts'

const fit = (model: string, residualStandardDeviation: number | null, fits: boolean): FitOfModel => ({
  model,
  label: model,
  status: residualStandardDeviation === null ? 'not-converged' : 'ok',
  residualSumOfSquares: residualStandardDeviation,
  residualStandardDeviation,
  varianceRatio: residualStandardDeviation,
  fits,
  Ea_kJ_per_mol: null,
  lnA_per_s: null,
})
const ranked: FitsOfHolds = {
  model: 'A2',
  method: 'least-squares-of-conversion',
  zeroInTime: 'free',
  range: [0.1, 0.9],
  holds: [],
  dof: 60,
  varianceRatioLimit: 1.534,
  models: [fit('F1', 0.0000123, true), fit('A2', 0.0375, false), fit('D1', null, false)],
}

describe('the ranking beside the choice of a model', () => {
  it('lists every model once, as the common list has them before anything is fitted', () => {
    expect(modelOptions(null).map(({ code }) => code)).toEqual(models)
    expect(modelOptions(ranked).map(({ code }) => code)).toEqual([
      'F1',
      'A2',
      'D1',
      ...models.filter((one) => !['F1', 'A2', 'D1'].includes(one)),
    ])
  })

  it('says of each model what it leaves, or why nothing', () => {
    expect(
      modelOptions(ranked)
        .slice(0, 3)
        .map(({ text }) => text),
    ).toEqual([
      'F1 – First order: standard deviation 1.23e−5, fits',
      'A2 – Avrami–Erofeev, n = 2: standard deviation 0.0375',
      'D1 – One-dimensional diffusion: the fit found no minimum',
    ])
  })

  it('places the chosen model, and names those within the limit', () => {
    expect(rankingWords(ranked)).toBe(
      'A2 is number 2 of 3 over all 0 holds, left out or not; models that fit the holds (ratio of variances of 1.53, F(0.95; 60, 60)): F1.',
    )
    expect(limitWords({ varianceRatioLimit: null, dof: 0 })).toBe('no degree of freedom left')
    expect(rankingWords({ ...ranked, varianceRatioLimit: null, dof: 0, models: [fit('A2', 0.1, false)] })).toContain(': none.')
  })
})

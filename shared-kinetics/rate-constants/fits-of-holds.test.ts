import { describe, expect, it } from 'vitest'
import { fQuantile } from '../numerics/f-distribution.ts'
import { randomStream } from '../numerics/random.ts'
import { runsTest } from '../numerics/runs-test.ts'
import { reactionModelCodes, reactionModels, type ReactionModelCode } from '../reaction-models/registry.ts'
import { fitsOfHolds, readHold, type FitsOfHolds, type HoldAtLevels } from './fits-of-holds.ts'
import type { HoldOptions } from './hold-rows.ts'

const levels = Array.from({ length: 19 }, (_, i) => (i + 1) / 20)
const [Ea, lnA] = [110e3, Math.log(2e12)]
const free: HoldOptions = { zeroInTime: 'free', range: [0.1, 0.9] }

/** Holds of one model with errors of conversion of a given size. */
function holdsOf(code: ReactionModelCode, noise: number, seed = 1): readonly HoldAtLevels[] {
  return [390, 400, 410, 420].map((T, h) => {
    const k = Math.exp(lnA - Ea / (8.31446261815324 * T))
    const draws = randomStream(seed, h)
    return {
      label: `hold ${T}`,
      temperature_K: T,
      time_s: levels.map((alpha) => reactionModels[code].g(alpha + noise * draws.normal()) / k),
      conversion: levels,
      conversionBeforeHold: 0,
    }
  })
}

function fitsUnder(chosen: ReactionModelCode, holds: readonly HoldAtLevels[], options = free): FitsOfHolds {
  const model = reactionModels[chosen]
  return fitsOfHolds(
    holds.map((hold) => readHold(hold, model, options)),
    model,
    options,
  )
}
const ranked = ({ models }: FitsOfHolds): string[] => models.map(({ model }) => model)
const fitting = ({ models }: FitsOfHolds): string[] => models.filter(({ fits }) => fits).map(({ model }) => model)

describe('models ranked by what they leave of the holds', () => {
  it.each(['F1', 'A2', 'R3', 'D1', 'D4', 'F2', 'B1', 'L2', 'P2'] as const)(
    '%s: the true model stands first, whichever was chosen',
    (code) => {
      for (const chosen of ['F1', 'R2'] as const) {
        const fits = fitsUnder(chosen, holdsOf(code, 0.001))
        expect(ranked(fits)[0]).toBe(code)
        expect(fitting(fits)).toContain(code)
        expect(fits.models).toHaveLength(reactionModelCodes.length)
        expect(fits.models[0]).toMatchObject({ varianceRatio: 1, status: 'ok' })
        expect((fits.models[0]?.Ea_kJ_per_mol ?? 0) / 110).toBeCloseTo(1, 1)
        expect(Math.abs((fits.models[0]?.lnA_per_s ?? 0) - lnA)).toBeLessThan(0.5)
      }
    },
  )

  it('where noise hides the difference, several models fit, and the true one is among them in about 95 % of cases or more', () => {
    let kept = 0
    for (let seed = 0; seed < 40; seed++) {
      const fits = fitsUnder('F1', holdsOf('R3', 0.03, seed))
      if (fitting(fits).includes('R3')) kept++
      expect(fitting(fits).length).toBeGreaterThan(1)
    }
    expect(kept).toBeGreaterThanOrEqual(38)
  })

  it('the limit is that of F, and the sums are those of all holds', () => {
    const fits = fitsUnder('A2', holdsOf('A2', 0.002))
    expect(fits.dof).toBe(4 * (17 - 2))
    expect(fits.varianceRatioLimit).toBe(fQuantile(0.95, 60, 60))
    const best = fits.models[0]
    const sum = fits.holds.reduce((total, { residualStandardDeviation: s, dof }) => total + dof * (s ?? Number.NaN) ** 2, 0)
    expect((best?.residualSumOfSquares ?? 0) / sum).toBeCloseTo(1, 10)
    for (const model of fits.models) {
      expect(model.fits).toBe((model.varianceRatio ?? Number.POSITIVE_INFINITY) <= (fits.varianceRatioLimit ?? 0))
    }
  })

  it('a model without a zero in time of its own is not ranked where that is fixed', () => {
    const last = fitsUnder('F1', holdsOf('F1', 0.001), { ...free, zeroInTime: 'fixed' }).models.at(-1)
    expect(last).toMatchObject({ model: 'B1', status: 'model-does-not-apply', residualSumOfSquares: null, fits: false })
  })

  it('two rows a hold tell no model from another', () => {
    const fits = fitsUnder('F1', holdsOf('F1', 0), { ...free, range: [0.5, 0.55] })
    expect(fits).toMatchObject({ dof: 0, varianceRatioLimit: null })
    expect(fitting(fits)).toEqual([])
    expect(fits.holds.every((hold) => hold.signRunsProbability === null && !hold.isSystematic)).toBe(true)
  })
})

describe('residuals that keep one sign', () => {
  it('are told of a wrong model on every hold, of the true one on few', () => {
    expect(fitsUnder('R2', holdsOf('D3', 0.001)).holds.every((hold) => hold.isSystematic)).toBe(true)
    let alarms = 0
    for (let seed = 0; seed < 100; seed++) {
      const read = holdsOf('F1', 0.003, seed).map((hold) => readHold(hold, reactionModels.F1, free))
      if (read.some(({ k }) => runsTest(k.residuals, 0.05 / 4).probability < 0.05 / 4)) alarms++
    }
    // 5 % of studies at most, by the sharing out; 100 of them lie within three standard deviations.
    expect(alarms).toBeLessThanOrEqual(11)
  })
})

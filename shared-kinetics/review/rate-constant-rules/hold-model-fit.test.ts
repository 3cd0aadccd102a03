import { describe, expect, it } from 'vitest'
import { randomStream } from '../../numerics/random.ts'
import { rateConstantsOfHolds } from '../../rate-constants/rate-constants-of-holds.ts'
import type { RateConstantTable } from '../../rate-constants/rate-constant-table.ts'
import { reactionModels, type ReactionModelCode } from '../../reaction-models/registry.ts'
import { evaluateRateConstants } from '../../tasks/evaluate-rate-constants.ts'

const levels = Array.from({ length: 19 }, (_, i) => (i + 1) / 20)
const codes = ['model-fits-badly', 'other-models-fit-better']

/** Four holds of one model, conversion off by `noise`, read under another. */
function tableOf(truth: ReactionModelCode, chosen: ReactionModelCode, noise: number): RateConstantTable {
  const holds = [390, 400, 410, 420].map((T, h) => {
    const draws = randomStream(11, h)
    const k = 2e12 * Math.exp(-110e3 / (8.31446261815324 * T))
    return {
      label: `hold ${T}`,
      temperature_K: T,
      time_s: levels.map((alpha) => reactionModels[truth].g(alpha + noise * draws.normal()) / k),
      conversion: levels,
      conversionBeforeHold: 0,
    }
  })
  return rateConstantsOfHolds(holds, reactionModels[chosen], { zeroInTime: 'free', range: [0.1, 0.9] })
}
const found = (table: RateConstantTable) => evaluateRateConstants(table).findings.filter(({ code }) => codes.includes(code))

describe('a model that does not follow the holds', () => {
  it('is warned of, with the holds, the numbers and the models that fit', () => {
    const [badly, better] = found(tableOf('D3', 'R2', 0.002))
    expect(badly).toMatchObject({ code: 'model-fits-badly', severity: 'caution', title: 'R2 does not follow 4 of 4 holds' })
    const worst = badly?.evidence['worst']
    expect(badly?.message).toMatch(new RegExp(`${String(worst)} \\(\\d+ stretches of one sign in 17 rows, chance .*; and 2 more\\.`))
    expect(badly?.sources).toContain('wald-wolfowitz-1940')
    expect(better).toMatchObject({ code: 'other-models-fit-better', severity: 'caution', evidence: { model: 'R2', models: 21 } })
    expect(better?.message).toMatch(/Within that limit: .*D3/)
    expect(better?.sources).toEqual(['vyazovkin-wight-1999'])
  })

  it('leaves A and predicted k without an interval, keeps that of Ea, and stops a prediction', () => {
    const wrong = { ...tableOf('F1', 'D3', 0), predictAt_K: [298.15, 400] }
    const result = evaluateRateConstants(wrong)
    expect(found(wrong).map(({ severity, code }) => `${severity} ${code}`)).toEqual([
      'stop model-fits-badly',
      'stop other-models-fit-better',
    ])
    expect(result.modelFollowsHolds).toBe(false)
    expect(result.line).toMatchObject({
      intervalStatus: 'ok',
      lnAIntervalStatus: 'model-does-not-follow-holds',
      lnAStandardError: null,
      lnALower95: null,
      ALower95: null,
      AUpper95: null,
    })
    // The runs are exact, Ea 110 kJ/mol: a wrong model moves every k by one factor.
    expect(result.line.Ea_kJ_per_mol).toBeCloseTo(110, 3)
    expect(result.line.lower95_kJ_per_mol).not.toBeNull()
    const none = {
      intervalStatus: 'model-does-not-follow-holds',
      lineLower95: null,
      lineUpper95: null,
      newLower95: null,
      lnNewUpper95: null,
    }
    expect(result.predictions).toMatchObject([none, none])
    expect(result.eyring).toMatchObject({ intervalStatus: 'ok', entropyIntervalStatus: 'model-does-not-follow-holds' })
    expect(result.eyring?.gibbs_kJ_per_mol.lower95).toBeNull()
    expect(result.band.lnLineLower95.every((end) => end === null)).toBe(true)
    const right = evaluateRateConstants({ ...tableOf('F1', 'F1', 0.002), predictAt_K: [400] })
    expect(right).toMatchObject({ modelFollowsHolds: true, predictions: [{ intervalStatus: 'ok' }], line: { lnAIntervalStatus: 'ok' } })
    expect(right.predictions[0]?.lineLower95).not.toBeNull()
  })

  it('shows the standard error of each fitted k, and of none that was typed over', () => {
    const table = tableOf('F1', 'F1', 0.002)
    const rows = table.rows.map((row, i) => (i === 1 ? { ...row, rateConstant: row.rateConstant * 2 } : row))
    const result = evaluateRateConstants({ ...table, rows })
    expect(result.rows.map(({ fittedUnder }) => fittedUnder)).toEqual(['F1', null, 'F1', 'F1'])
    expect(result.rows.map(({ fitStandardError }) => fitStandardError)).toEqual(
      table.holdFits?.holds.map((hold, i) => (i === 1 ? null : hold.standardError_per_s)),
    )
    expect(result.weightedLine).toBeNull()
  })

  it('is not, where the model is the true one', () => {
    expect(found(tableOf('D3', 'D3', 0.002))).toEqual([])
    expect(found(tableOf('F1', 'F1', 0))).toEqual([])
  })

  it('speaks of the holds in use only, and of nothing where the table was typed since', () => {
    const table = tableOf('D3', 'R2', 0.002)
    const some = { ...table, rows: table.rows.map((row, i) => ({ ...row, use: i > 1 })) }
    expect(found(some)[0]?.evidence).toMatchObject({ holds: 2 })
    const renamed = { ...table, rows: table.rows.map((row, i) => ({ ...row, label: `sample ${i}`, use: i > 1 })) }
    expect(found(renamed)[0]?.evidence).toMatchObject({ holds: 2 })
    const typed = { ...table, source: { kind: 'typed', name: null, sha256: null } } as const
    expect(found(typed)).toEqual([])
    expect(evaluateRateConstants(typed).holdFits).toBeNull()
  })

  it('is a note where it is systematic but small', () => {
    const base = tableOf('F1', 'F1', 0)
    const small =
      base.holdFits === undefined
        ? []
        : base.holdFits.holds.map((hold) => ({
            ...hold,
            isSystematic: true,
            signRuns: 3,
            signRunsProbability: 1e-4,
            greatestResidual: 0.002,
          }))
    const table: RateConstantTable = base.holdFits === undefined ? base : { ...base, holdFits: { ...base.holdFits, holds: small } }
    expect(found(table)).toMatchObject([{ code: 'model-fits-badly', severity: 'note' }])
  })
})

import { describe, expect, it } from 'vitest'
import type { FitOfHold, RateConstantRow, RateConstantTable } from '../../../shared-kinetics/contract/study-result.ts'
import { rowOfHold } from './row-of-hold.ts'
import { withChoicesKept } from './with-choices-kept.ts'

const row = (label: string | null, temperature_K: number, rateConstant: number, use = true): RateConstantRow => ({
  temperature_K,
  rateConstant,
  standardUncertainty: null,
  label,
  use,
})
const holds = ['a', 'b', 'c'].map(
  (label, i): FitOfHold => ({
    label,
    temperature_K: 390 + 10 * i,
    rateConstant_per_s: 1e-4,
    standardError_per_s: null,
    zero_s: 0,
    zeroStandardError_s: null,
    linearisedRateConstant_per_s: 1e-4,
    linearisedR2: null,
    residualStandardDeviation: null,
    greatestResidual: 0,
    rows: 17,
    dof: 15,
    signRuns: 5,
    signRunsProbability: null,
    isSystematic: false,
  }),
)
const table = (rows: readonly RateConstantRow[], model: string): RateConstantTable => ({
  rows,
  rateUnit: '1/s',
  temperatureUnitShown: 'C',
  predictAt_K: [],
  source: { kind: 'isothermal-runs', name: model, sha256: null },
  notes: [],
  holdFits: {
    model,
    method: 'least-squares-of-conversion',
    zeroInTime: 'free',
    range: [0.1, 0.9],
    holds,
    dof: 45,
    varianceRatioLimit: 1.6,
    models: [],
  },
})
const made = table([row('a', 390, 1), row('b', 400, 2), row('c', 410, 3)], 'A2')

describe('the row of a hold', () => {
  it('has its name and temperature, or its temperature and a name typed since', () => {
    expect(rowOfHold([row('a', 410, 1), row('a', 390, 1)], { label: 'a', temperature_K: 390 }, holds)).toBe(1)
    expect(rowOfHold([row('b', 400, 1), row('sample 7', 390, 1)], { label: 'a', temperature_K: 390 }, holds)).toBe(1)
    expect(rowOfHold([row(null, 390, 1)], { label: 'a', temperature_K: 390 }, holds)).toBe(0)
  })

  it('is none where it was taken out, though another hold has the temperature', () => {
    const replicates = [
      { label: 'a', temperature_K: 390 },
      { label: 'a again', temperature_K: 390 },
    ]
    expect(rowOfHold([row('a again', 390, 1)], { label: 'a', temperature_K: 390 }, replicates)).toBe(-1)
    expect(rowOfHold([], { label: 'a', temperature_K: 390 }, holds)).toBe(-1)
  })
})

describe('a table made anew under another model', () => {
  it('leaves out what was left out, and keeps labels, unit and predictions', () => {
    const before = {
      ...table([row('a', 390, 7, false), row('sample 7', 400, 8)], 'F1'),
      temperatureUnitShown: 'K',
      predictAt_K: [298],
    } as const
    const kept = withChoicesKept(made, before)
    expect(kept.rows).toEqual([row('a', 390, 1, false), row('sample 7', 400, 2), row('c', 410, 3, false)])
    expect(kept).toMatchObject({ temperatureUnitShown: 'K', predictAt_K: [298], source: { name: 'A2' } })
  })

  it('uses a hold that had no rate constant before', () => {
    const before = table([row('a', 390, 7)], 'F1')
    const fits = before.holdFits
    if (fits === undefined) throw new Error('no fits')
    expect(withChoicesKept(made, { ...before, holdFits: { ...fits, holds: holds.slice(0, 1) } }).rows.map(({ use }) => use)).toEqual([
      true,
      true,
      true,
    ])
  })

  it('takes the place of a typed one with nothing kept but predictions', () => {
    const typed = {
      ...table([row('a', 390, 7, false)], ''),
      source: { kind: 'typed', name: null, sha256: null },
      predictAt_K: [298],
    } as const
    expect(withChoicesKept(made, typed)).toEqual({ ...made, predictAt_K: [298] })
    expect(withChoicesKept(made, null)).toEqual(made)
  })
})

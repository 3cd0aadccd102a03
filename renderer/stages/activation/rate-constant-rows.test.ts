import { describe, expect, it } from 'vitest'
import type { ArrheniusResult, FitOfHold, FitsOfHolds } from '../../../shared-kinetics/contract/study-result.ts'
import { copyText } from '../../sheet/data-table.ts'
import { holdCopyColumns, residualWords } from './hold-fit-rows.ts'
import { lineRows, lowerEndWords, modelNotFollowed, parameterCopyColumns } from './rate-constant-rows.ts'

// F. Daniels, E. H. Johnston, J. Am. Chem. Soc. 43 (1921) 53, N2O5, written down from memory and recomputed with NumPy: ln A 31.2730 ± 0.1829, t(0.975; 4) 2.7764.
const line: ArrheniusResult = {
  weighting: 'none',
  status: 'ok',
  points: 6,
  distinctTemperatures: 6,
  interval: { kind: 'student-t', level: 0.95, dof: 4 },
  intervalStatus: 'ok',
  lnAIntervalStatus: 'ok',
  Ea_kJ_per_mol: 102.9,
  standardError_kJ_per_mol: 0.47,
  lower95_kJ_per_mol: 101.59,
  upper95_kJ_per_mol: 104.21,
  lnA: 31.273,
  lnAStandardError: 0.1829,
  lnALower95: 30.7652,
  lnAUpper95: 31.7808,
  A: 3.8163e13,
  ALower95: 2.297e13,
  AUpper95: 6.342e13,
  lnA_per_s: 31.273,
  covarianceEaLnA_kJ_per_mol: null,
  slope_K: null,
  r2: 0.9999,
  residualStandardDeviation: 0.03,
  reducedChiSquare: null,
  sources: [],
}

describe('the numbers of the line', () => {
  it('give A with the ends the result has, unequally far from it', () => {
    const A = lineRows(line, '1/s', '', null).find(({ id }) => id === 'A')
    expect([A?.value, A?.lower, A?.upper]).toEqual([3.8163e13, 2.297e13, 6.342e13])
    const beyond = lineRows({ ...line, ALower95: null, AUpper95: null }, '1/s', '', null).find(({ id }) => id === 'A')
    expect([beyond?.lower, beyond?.upper]).toEqual([null, null])
  })

  it('say of an interval of Ea that reaches below 0 that it bounds nothing from below, and nothing of any other', () => {
    expect(lowerEndWords({ lower95_kJ_per_mol: -0.1 })).toMatch(/^reaches below 0, .* do not bound Ea from below$/)
    for (const lower of [0, 12, null]) expect(lowerEndWords({ lower95_kJ_per_mol: lower })).toBeNull()
    const remarks = lineRows({ ...line, lower95_kJ_per_mol: -3 }, '1/s', '', null).map(({ lowerRemark }) => lowerRemark !== null)
    expect(remarks).toEqual([true, false, false])
  })
})

describe('numbers that rest on a model which does not follow the holds', () => {
  const none = { lnAStandardError: null, lnALower95: null, lnAUpper95: null, ALower95: null, AUpper95: null }
  const rows = lineRows({ ...line, ...none, lnAIntervalStatus: 'model-does-not-follow-holds' }, '1/s', '', 'D3')
  const of = (id: string) => rows.find((row) => row.id === id)

  it('say so beside A and ln A, with the reason why no ends stand there; Ea keeps its own', () => {
    for (const id of ['A', 'lnA']) {
      expect(of(id)?.remark).toBe('under D3, which does not follow the holds')
      expect(of(id)?.noInterval).toBe('no interval: D3 does not follow the holds')
    }
    expect([of('Ea')?.remark, of('Ea')?.noInterval]).toEqual([null, null])
  })

  it('carry it onto the clipboard', () => {
    const copied = copyText(parameterCopyColumns, rows).split('\n')
    expect(copied.map((cells) => cells.split('\t').at(-1))).toEqual([
      'remark',
      '',
      ...Array.from({ length: 2 }, () => 'no interval: D3 does not follow the holds'),
    ])
  })

  it('are told from those of a model that does, and from those of no model', () => {
    expect(modelNotFollowed({ modelFollowsHolds: false, holdFits: { ...fits, zeroInTime: 'free' } })).toBe('D1')
    expect(modelNotFollowed({ modelFollowsHolds: true, holdFits: { ...fits, zeroInTime: 'free' } })).toBeNull()
    expect(modelNotFollowed({ modelFollowsHolds: null, holdFits: null })).toBeNull()
  })
})

const hold: FitOfHold = {
  label: 'hold 120 C',
  temperature_K: 393.15,
  rateConstant_per_s: 5.84e-5,
  standardError_per_s: 1.4e-6,
  zero_s: 640.9,
  zeroStandardError_s: 55.3,
  linearisedRateConstant_per_s: 5.5e-5,
  linearisedR2: 0.99,
  residualStandardDeviation: 0.0255,
  greatestResidual: 0.047,
  rows: 17,
  dof: 15,
  signRuns: 4,
  signRunsProbability: 0.0053,
  isSystematic: true,
}
const fits: Omit<FitsOfHolds, 'zeroInTime'> = {
  model: 'D1',
  method: 'least-squares-of-conversion',
  range: [0.1, 0.9],
  holds: [hold],
  dof: 15,
  varianceRatioLimit: 2.4,
  models: [],
}

describe('fits of holds', () => {
  it('say whether residuals are systematic, or that it cannot be told', () => {
    expect(residualWords(hold)).toBe('systematic')
    expect(residualWords({ ...hold, isSystematic: false })).toBe('not systematic')
    expect(residualWords({ ...hold, isSystematic: false, signRunsProbability: null })).toBe('too few rows for a runs test')
  })

  it('are copied with units and with every number; the zero only where it was fitted', () => {
    const [head = '', cells = ''] = copyText(holdCopyColumns({ ...fits, zeroInTime: 'free' }, 'C'), [hold]).split('\n')
    const at = (heading: string): string | undefined => cells.split('\t')[head.split('\t').indexOf(heading)]
    expect(
      ['T (°C)', 'k, D1 (1/s)', 's.e. of k (1/s)', 'zero in time (s)', 'greatest residual of conversion', 'residuals'].map(at),
    ).toEqual(['120', '0.0000584', '0.0000014', '640.9', '0.047', 'systematic'])
    expect(copyText(holdCopyColumns({ ...fits, zeroInTime: 'fixed' }, 'C'), [hold])).not.toContain('zero')
  })
})

import { describe, expect, it } from 'vitest'
import chain from '../../shared-kinetics/check-values/computed/astm-e1641-chain.json'
import { profileOf, reviewInput } from '../../shared-kinetics/check-values/review-input-of.ts'
import { middleHeatingRate } from '../../shared-kinetics/isoconversional/middle-heating-rate.ts'
import type { ProfileResult, StudyResult } from '../../shared-kinetics/tasks/study-result.ts'
import { doyleA } from '../../shared-kinetics/temperature-integral/doyle-table.ts'
import { preExponentialLines, preExponentialOf } from './pre-exponential.ts'

const base = reviewInput({}).result
const [anyRun] = base.runs
if (anyRun === undefined) throw new Error('there is no run')
const result: StudyResult = {
  ...base,
  levels: [chain.level],
  findings: [],
  runs: chain.heatingRate_K_per_min.map((rate, i) => ({
    ...anyRun,
    label: `Run ${i}`,
    heatingRate_K_per_min: rate,
    temperatureAtLevel_K: [Number(chain.temperature_K[i])],
  })),
}
const Ea = Number(chain.byTable.Ea_kJ_per_mol)
const profile: ProfileResult = {
  ...profileOf('astm-e1641', [Ea]),
  label: 'ASTM E1641',
  standardError_kJ_per_mol: [2],
  lnA_per_s: [Math.log(Number(chain.byTable.A_per_min) / 60)],
}

describe('A by ASTM E1641', () => {
  it('is given by the second and by the minute, with the heating rate nearest the middle', () => {
    const found = preExponentialOf(profile, result)
    // (1 + 10)/2 = 5.5 K/min: 5 is the nearest.
    expect(found).toMatchObject({ heatingRate_K_per_min: 5, run: 'Run 2' })
    expect((found?.A_per_min[0] ?? 0) / 9.6024e17).toBeCloseTo(1, 9)
    expect((found?.A_per_s[0] ?? 0) / 1.6004e16).toBeCloseTo(1, 9)
  })

  it('has the standard error that Ea hands on, as the equation itself differs when Ea is moved', () => {
    const R = 8.314462618
    const lnA = (J: number): number => -Math.log(J) + Math.LN10 * doyleA(J / (R * Number(chain.temperature_K[2])))
    const moved = (lnA(1000 * (Ea + 0.5)) - lnA(1000 * (Ea - 0.5))) * 2
    // a's slope is b of the table, a backward difference, within 0.1 % of its derivative here.
    expect((preExponentialOf(profile, result)?.lnAStandardError[0] ?? 0) / moved).toBeCloseTo(1, 2)
  })

  it('stands in the notes; of ISO 11358-2 these say that it gives none, of other methods nothing', () => {
    const lines = preExponentialLines(profile, result)
    expect(lines[0]).toMatch(/β′ = 5\.000 K\/min \(Run 2/)
    expect(lines[1]).toMatch(/^ {2}conversion 0\.05: A = 1\.600e\+16 1\/s = 9\.602e\+17 1\/min, standard error of ln A 0\.\d\d$/)
    expect(preExponentialLines(profileOf('iso-11358-2', [Ea]), result)).toEqual(['ISO 11358-2 gives no A'])
    expect(preExponentialLines(profileOf('kas', [Ea]), result)).toEqual([])
    expect(preExponentialOf(profileOf('kas', [Ea]), result)).toBeNull()
  })

  it('takes the slower of two equally near rates, in either unit, and the first of replicates', () => {
    expect(middleHeatingRate([8, 2, 6, 4, 4])).toBe(3)
    expect(middleHeatingRate([8, 2, 6, 4, 4].map((rate) => rate / 60))).toBe(3)
    expect(middleHeatingRate([])).toBe(-1)
  })
})

import { describe, expect, it } from 'vitest'
import type { CombinedMean, ProfileResult } from '../../../shared-kinetics/contract/study-result.ts'
import type { ShownKind } from '../../state/view-store.ts'
import { meanShown } from './mean-shown.ts'
import { starink } from './testing/small-result.ts'

const withInterval: ProfileResult = {
  ...starink,
  mean: { ...starink.mean, Ea_kJ_per_mol: 256.2, lower95_kJ_per_mol: 245.2, upper95_kJ_per_mol: 267.2 },
}
const combined: CombinedMean = {
  Ea_kJ_per_mol: 256.2,
  standardUncertainty_kJ_per_mol: 8,
  lower95_kJ_per_mol: 240,
  upper95_kJ_per_mol: 272.4,
  note: '',
}
const of = (kind: ShownKind, mean: CombinedMean | null, profile: ProfileResult = withInterval) =>
  meanShown({ profile, apart: null, offers: [], kind, interval: null, mean })

describe('mean over a range', () => {
  it('stands with the interval that is chosen, the other one in words', () => {
    expect(of('combined', combined)).toEqual({
      text: '256.2 ± 16.2',
      words: '95 % combined; Student-t of the scatter alone ± 11.0',
      remark: null,
    })
    expect(of('student-t', combined)).toMatchObject({ text: '256.2 ± 11.0', words: '95 % Student-t of the scatter; combined ± 16.2' })
  })

  it('keeps Student-t where the chosen one is not worked out yet, or is none of a mean, and says so', () => {
    expect(of('combined', null)).toMatchObject({
      text: '256.2 ± 11.0',
      words: '95 % Student-t of the scatter; combined not worked out yet',
    })
    const untold = { ...combined, lower95_kJ_per_mol: null, upper95_kJ_per_mol: null }
    expect(of('combined', untold)?.words).toBe(
      '95 % Student-t of the scatter; combined not to be had: how uncertain one of the sources is cannot be told',
    )
    expect(of('jackknife', combined)?.words).toBe('95 % Student-t of the scatter; combined ± 16.2; a mean has no jackknife interval')
  })

  it('says that an interval reaches below 0', () => {
    const wide = { ...withInterval.mean, lower95_kJ_per_mol: -12, upper95_kJ_per_mol: 524.4 }
    expect(of('student-t', null, { ...starink, mean: wide })).toMatchObject({
      text: '256.2 ± 268.2',
      remark: expect.stringMatching(/^reaches below 0/) as string,
    })
    expect(of('combined', { ...combined, lower95_kJ_per_mol: -1, upper95_kJ_per_mol: 513.4 })?.remark).toMatch(/^reaches below 0/)
  })

  it('says why an interval is not to be had, and is nothing without a number', () => {
    expect(of('student-t', null, starink)).toEqual({
      text: '150.3',
      words: '',
      remark: 'not to be had with fewer than three distinct programmes',
    })
    expect(of('student-t', null, { ...starink, mean: { ...starink.mean, Ea_kJ_per_mol: null } })).toBeNull()
  })
})

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
    expect(of('combined', combined)).toEqual({ text: '256.2 ± 16.2', words: '95 % combined; Student-t of the scatter alone ± 11.0' })
    expect(of('student-t', combined)).toEqual({ text: '256.2 ± 11.0', words: '95 % Student-t of the scatter; combined ± 16.2' })
  })

  it('keeps Student-t where the chosen one is not worked out yet, or is none of a mean, and says so', () => {
    expect(of('combined', null)).toEqual({ text: '256.2 ± 11.0', words: '95 % Student-t of the scatter; combined not worked out yet' })
    const untold = { ...combined, lower95_kJ_per_mol: null, upper95_kJ_per_mol: null }
    expect(of('combined', untold)?.words).toBe('95 % Student-t of the scatter; combined not to be had')
    expect(of('jackknife', combined)?.words).toBe('95 % Student-t of the scatter; combined ± 16.2; a mean has no jackknife interval')
  })

  it('has no words for an interval that is not to be had, and is nothing without a number', () => {
    expect(of('student-t', null, starink)).toEqual({ text: '150.3', words: '' })
    expect(of('student-t', null, { ...starink, mean: { ...starink.mean, Ea_kJ_per_mol: null } })).toBeNull()
  })
})

import { describe, expect, it } from 'vitest'
import type { RecentStudy } from '../../shared-kinetics/contract/host-api.ts'
import { continuedStudy } from './continued-study.ts'

const study: RecentStudy = { studyId: 'a', name: 'PMMA', runs: 3, rateConstants: 0, changedAt: '2026-11-30T16:00:00.000Z' }
const nextDay = new Date('2026-12-01T08:00:00.000Z')

describe('a study that is gone on with', () => {
  it('is the stored one of the document, with runs or with rate constants', () => {
    expect(continuedStudy([{ ...study, studyId: 'b' }, study], 'a', nextDay)).toBe(study)
    const rates = { ...study, runs: 0, rateConstants: 5 }
    expect(continuedStudy([rates], 'a', nextDay)).toBe(rates)
  })

  it('is none where it is empty, not stored, or was changed a moment ago', () => {
    expect(continuedStudy([{ ...study, runs: 0 }], 'a', nextDay)).toBeNull()
    expect(continuedStudy([study], 'c', nextDay)).toBeNull()
    expect(continuedStudy([study], undefined, nextDay)).toBeNull()
    expect(continuedStudy([study], 'a', new Date('2026-11-30T16:09:00.000Z'))).toBeNull()
  })
})

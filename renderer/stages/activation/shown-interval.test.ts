import { describe, expect, it } from 'vitest'
import type { IntervalResult, ProfileResult, UncertaintyProfile } from '../../../shared-kinetics/contract/study-result.ts'
import type { Uncertain } from '../../state/study-state.ts'
import { intervalFacts } from './method-facts.ts'
import { intervalKinds, intervalOffers, intervalOfKind, intervalWordsAt, shownOf, uncertaintyOf } from './shown-interval.ts'
import { friedman, result, runAt, starink } from './testing/small-result.ts'

const interval = (kind: IntervalResult['kind'], lower: readonly (number | null)[], approximate = true): IntervalResult => ({
  kind,
  label: `the ${kind}`,
  level: 0.95,
  pointwise: true,
  approximate,
  note: `How ${kind} was made.`,
  sources: [],
  standardUncertainty_kJ_per_mol: lower.map(() => 1),
  lower95_kJ_per_mol: lower,
  upper95_kJ_per_mol: lower.map((end) => (end === null ? null : end + 10)),
  status: lower.map((end) => (end === null ? 'no-energy' : 'ok')),
})
const apart: UncertaintyProfile = {
  method: 'starink',
  intervals: [interval('jackknife', [144, 146]), interval('bootstrap', [145, 147]), interval('combined', [140, 142], false)],
  budget: [],
  mean: null,
}
const uncertain: Uncertain = {
  about: { studyId: 'study', revision: 3, result },
  result: { levels: result.levels, seed: 1, draws: 2000, profiles: [apart] },
}
const fiveRuns = [1, 2, 3, 4, 5]
const minimising: ProfileResult = {
  ...starink,
  method: 'vyazovkin',
  evidence: 'minimum',
  otherIntervals: [interval('vyazovkin-wight-f', [143, 144])],
}
const reasonOf = (
  profile: ProfileResult,
  of: UncertaintyProfile | null,
  programmes: readonly number[],
  kind: string,
): string | null | undefined => intervalOffers(profile, of, programmes).find((offer) => offer.kind === kind)?.reason

describe('kinds of interval that are offered', () => {
  it('are all there as long as nothing speaks against them, also before they are worked out', () => {
    expect(intervalOffers(minimising, null, fiveRuns)).toEqual(intervalKinds.map((kind) => ({ kind, reason: null })))
  })

  it('say why a kind is not to be had', () => {
    expect(reasonOf(starink, null, fiveRuns, 'vyazovkin-wight-f')).toContain('minimise Φ')
    expect(reasonOf(starink, null, [1, 2, 3], 'jackknife')).toBe('needs 4 runs, here 3')
    expect(reasonOf(starink, null, [1, 2, 3], 'bootstrap')).toBe('needs 4 distinct programmes, here 3')
    expect(reasonOf(starink, null, [1, 1, 2, 3], 'jackknife')).toContain('fewer than 3 distinct programmes')
    expect(reasonOf(starink, null, [1, 1, 2, 3], 'bootstrap')).toBe('needs 4 distinct programmes, here 3')
    expect(reasonOf(starink, null, [1, 1, 2, 3, 4], 'bootstrap')).toBeNull()
    expect(reasonOf(starink, apart, fiveRuns, 'measured-sources')).toBe('not to be had for these runs')
    const every: IntervalResult = { ...interval('jackknife', [null, null]), status: ['energy-needs-every-run', 'energy-needs-every-run'] }
    expect(reasonOf(starink, { ...apart, intervals: [every] }, fiveRuns, 'jackknife')).toBe(
      'not to be had: without one of the runs there is no Ea',
    )
    const two: ProfileResult = { ...starink, lower95_kJ_per_mol: [null, null], upper95_kJ_per_mol: [null, null] }
    expect(reasonOf(two, null, [1, 2], 'student-t')).toBe('needs 3 distinct programmes, here 2')
    expect(reasonOf(two, null, [1, 2], 'measured-sources')).toBeNull()
  })
})

describe('interval of a kind', () => {
  it('carries its name, its qualities and how it was made', () => {
    expect(intervalOfKind(starink, apart, 'combined')).toMatchObject({
      label: 'the combined',
      approximate: false,
      note: 'How combined was made.',
      lower95_kJ_per_mol: [140, 142],
    })
    expect(intervalOfKind(starink, null, 'student-t')?.note).toContain('n − 2 degrees of freedom (1 here)')
    expect(intervalOfKind(minimising, null, 'vyazovkin-wight-f')?.upper95_kJ_per_mol).toEqual([153, 154])
    expect(intervalOfKind(starink, null, 'jackknife')).toBeNull()
    expect(intervalOfKind(starink, { ...apart, intervals: [interval('jackknife', [null, null])] }, 'jackknife')).toBeNull()
  })

  it('says at each level why an end is not there, or means nothing', () => {
    const wide: ProfileResult = { ...starink, lower95_kJ_per_mol: [-1, 145] }
    expect([0, 1].map((level) => intervalWordsAt(intervalOfKind(wide, null, 'student-t'), level))).toEqual([
      expect.stringMatching(/^reaches below 0/),
      null,
    ])
    const open: IntervalResult = { ...interval('vyazovkin-wight-f', [null, 144]), status: ['end-outside', 'ok'] }
    const drawn: IntervalResult = { ...interval('combined', [140, 142]), status: ['baseline-left-out', 'baseline-left-out'] }
    const facts = (level: number) =>
      intervalFacts({ profile: { ...wide, otherIntervals: [open] }, apart: { ...apart, intervals: [drawn] } }, level)
    expect(facts(0)).toEqual([
      expect.stringMatching(/^Student-t interval: reaches below 0/),
      'F-type interval: an end lies beyond 1 or 1000 kJ/mol and is not given.',
      expect.stringMatching(/^Combined interval: holds nothing of the choice of baseline/),
    ])
    expect(facts(1)).toEqual([expect.stringMatching(/^Combined interval: /)])
    const below: IntervalResult = { ...interval('combined', [-5, 142]), status: ['reaches-below-zero', 'ok'] }
    expect(intervalFacts({ profile: wide, apart: { ...apart, intervals: [below] } }, 0)).toEqual([
      expect.stringMatching(/^Student-t, combined interval: reaches below 0/),
    ])
  })

  it('is the wanted one where the method can have it, else its own, also until the wanted one is worked out', () => {
    const five = { profiles: [starink], runs: fiveRuns.map((rate) => runAt(rate, [473, 523])) }
    const shown = (wanted: 'jackknife' | 'vyazovkin-wight-f') => shownOf(five, 'starink', uncertain, wanted)
    expect(shown('jackknife')?.interval?.lower95_kJ_per_mol).toEqual([144, 146])
    expect(shown('vyazovkin-wight-f')).toMatchObject({ kind: 'student-t', interval: { lower95_kJ_per_mol: [144.5, 145] } })
    expect(shownOf(five, 'starink', null, 'jackknife')).toMatchObject({ kind: 'jackknife', interval: { kind: 'student-t' } })
    expect(shownOf(five, 'kas', uncertain, 'student-t')).toBeNull()
  })
})

describe('mean with what moves all runs alike', () => {
  const mean = { Ea_kJ_per_mol: 150.25, standardUncertainty_kJ_per_mol: 2, lower95_kJ_per_mol: 146, upper95_kJ_per_mol: 154.5, note: '' }
  const known: Uncertain = { ...uncertain, result: { ...uncertain.result, profiles: [{ ...apart, mean }] } }

  it('is there for the range it was worked out for, and for no other', () => {
    expect(shownOf(result, 'starink', known, 'student-t')?.mean).toBe(mean)
    expect(shownOf(result, 'starink', uncertain, 'student-t')?.mean).toBeNull()
    const narrower = { ...result, profiles: [{ ...starink, mean: { ...starink.mean, from: 0.3 } }] }
    expect(shownOf(narrower, 'starink', known, 'student-t')?.mean).toBeNull()
  })
})

describe('what was worked out before', () => {
  it('stays as long as it is about the same Ea, and no longer', () => {
    expect(uncertaintyOf(uncertain, { ...starink, r2: [1, 1] })).toBe(apart)
    expect(uncertaintyOf(uncertain, { ...starink, Ea_kJ_per_mol: [149, 151.5] })).toBeNull()
    expect(uncertaintyOf(uncertain, { ...starink, Ea_kJ_per_mol: [149] })).toBeNull()
    expect(uncertaintyOf(uncertain, friedman)).toBeNull()
    expect(uncertaintyOf(null, starink)).toBeNull()
  })
})

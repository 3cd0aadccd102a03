import { describe, expect, it } from 'vitest'
import { emptyStudy } from '../../../shared-kinetics/contract/study-document.ts'
import type { IntervalResult } from '../../../shared-kinetics/contract/study-result.ts'
import { initialStudyState, isUncertaintyBehind, type Evaluated, type StudyState } from '../../state/study-state.ts'
import { areLevelsBehind } from './levels-behind.ts'
import { intervalsOf } from './shown-interval.ts'
import { result, runAt } from './testing/small-result.ts'

const combined: IntervalResult = {
  kind: 'combined',
  label: 'Combined',
  level: 0.95,
  pointwise: true,
  approximate: true,
  note: '',
  sources: [],
  standardUncertainty_kJ_per_mol: [1, 1],
  lower95_kJ_per_mol: [140, 141],
  upper95_kJ_per_mol: [160, 161],
  status: ['ok', 'ok'],
}
const five = { ...result, runs: [1, 2, 3, 4, 5].map((rate) => runAt(rate, [473, 523])) }
const evaluated = (revision: number): Evaluated => ({ studyId: 'study', revision, result: { ...five } })
/** A stated uncertainty changes no Ea: the same profiles at the next revision. */
function stateAt(about: Evaluated, now: Evaluated, revision: number): StudyState {
  const confirmed = { revision, document: emptyStudy('study'), undo: null, redo: null }
  return {
    ...initialStudyState,
    replica: { confirmed, pending: [], document: confirmed.document },
    evaluated: now,
    uncertain: {
      about,
      result: {
        levels: five.levels,
        seed: 1,
        draws: 2000,
        profiles: [{ method: 'starink', intervals: [combined], budget: [], mean: null }],
      },
    },
  }
}
const behind = (state: StudyState, kind: 'combined' | 'student-t', method: 'starink' | 'friedman' = 'starink'): boolean =>
  areLevelsBehind(state, [method], intervalsOf(five, state.uncertain, kind))

describe('numbers of another state of the study than its settings', () => {
  const first = evaluated(1)
  const second = evaluated(2)

  it('are told from those of the settings of now', () => {
    const settled = stateAt(first, first, 1)
    expect([isUncertaintyBehind(settled), behind(settled, 'combined'), behind(settled, 'student-t')]).toEqual([false, false, false])
    expect(isUncertaintyBehind({ ...settled, uncertain: null })).toBe(false)
  })

  it('are all numbers from the moment of a change until it is evaluated', () => {
    const changed = stateAt(first, first, 2)
    expect([isUncertaintyBehind(changed), behind(changed, 'combined'), behind(changed, 'student-t')]).toEqual([true, true, true])
  })

  it('are then only those worked out apart, until they are there too', () => {
    const waiting = stateAt(first, second, 2)
    expect([isUncertaintyBehind(waiting), behind(waiting, 'combined'), behind(waiting, 'student-t')]).toEqual([true, true, false])
    // Friedman has nothing but its own interval here.
    expect(behind(waiting, 'combined', 'friedman')).toBe(false)
    const there = stateAt(second, second, 2)
    expect([isUncertaintyBehind(there), behind(there, 'combined')]).toEqual([false, false])
  })
})

import { describe, expect, it } from 'vitest'
import { reviewedRun, reviewInput } from '../../check-values/review-input-of.ts'
import { baselineReplaced } from './baseline-replaced.ts'
import { gapInReaction } from './gap-in-reaction.ts'
import { rowsSetAside } from './rows-set-aside.ts'
import { samplingCoarse } from './sampling-coarse.ts'
import { windowCutsReaction } from './window-cuts-reaction.ts'

const runs = [2, 5, 10].map((rate, i) => reviewedRun(String(i), rate, i))
const withThird = (change: Parameters<typeof reviewedRun>[3]) => reviewInput({ runs: [...runs, reviewedRun('3', 20, 3, change)] })

const severity = (sampling: NonNullable<NonNullable<Parameters<typeof reviewedRun>[3]>['sampling']>): string[] =>
  rowsSetAside(withThird({ sampling })).map((finding) => finding.severity)

describe('rules on rows and windows', () => {
  it('are silent where there is nothing to say', () => {
    for (const rule of [baselineReplaced, gapInReaction, rowsSetAside, samplingCoarse, windowCutsReaction])
      expect(rule(reviewInput())).toEqual([])
  })

  it('a hold: running at its start is a note, not over at its end a caution, each in its own words', () => {
    const hold = { programme: 'isothermal' } as const
    const [atStart] = windowCutsReaction(withThird({ result: hold, rateAtEnds: { start: 0.9, end: 0.02 } }))
    expect(atStart?.severity).toBe('note')
    expect(atStart?.message).toMatch(/A hold begins with the reaction running/)
    expect(atStart?.message).not.toMatch(/Widen the window/)
    const [atEnd] = windowCutsReaction(withThird({ result: hold, rateAtEnds: { start: 0.9, end: 0.2 } }))
    expect(atEnd?.severity).toBe('caution')
    expect(atEnd?.message).toMatch(/not over when the hold ends: at the end of the window .* runs at 20 %/)
  })

  it('a ramp: both ends are named with their own rate', () => {
    const [found] = windowCutsReaction(withThird({ rateAtEnds: { start: 0.05, end: 0.2 } }))
    expect(found?.message).toMatch(/At the start of the window .* at 5 % .* at the end of the window .* at 20 %/)
  })

  it('a gap: how much of the reaction is unseen', () => {
    const gap = { from_K: 545, to_K: 565, conversionBefore: 0.25, conversionAfter: 0.65 }
    const [found] = gapInReaction(withThird({ sampling: { gaps: [gap] } }))
    expect(found?.severity).toBe('caution')
    expect(found?.message).toMatch(
      /leave out 40 % of the reaction: from 271.9 °C \(545.0 K\) to 291.9 °C \(565.0 K\) \(conversion 0.25 to 0.65\)/,
    )
  })

  it.each([
    [14, 1],
    [15, 0],
  ])('%d rows in the reaction: %d findings', (rowsInReaction, count) => {
    expect(samplingCoarse(withThird({ sampling: { rowsInReaction } }))).toHaveLength(count)
  })

  it('rows set aside: a caution inside the reaction or where most share a time, else a note', () => {
    expect(severity({ withoutNumber: 3 })).toEqual(['note'])
    expect(severity({ behind: 3 })).toEqual(['note'])
    expect(severity({ behind: 3, behindInReaction: 1 })).toEqual(['caution'])
    expect(severity({ sameTime: 499 })).toEqual(['note'])
    expect(severity({ sameTime: 501 })).toEqual(['caution'])
  })

  it('a replaced baseline is said once for all holds, with the one that was asked for', () => {
    const levelled = reviewInput({
      runs: runs.map((run) => ({ ...run, baselineKind: 'level-at-end' as const })),
      settings: { baseline: 'straight' },
    })
    const found = baselineReplaced(levelled)
    expect(found).toHaveLength(1)
    expect(found[0]?.message).toMatch(/in place of the straight one/)
  })
})

import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { percent } from '../words.ts'

const allowed = 0.03

/** Fires where the reaction still runs with more than 3 % of its largest rate at an end of the window: conversion 0 or 1 is then put where it is not. */
export function windowCutsReaction({ runs }: ReviewInput): Finding[] {
  return runs.flatMap(({ info, result, rateAtEnds }): Finding[] => {
    if (rateAtEnds === null) return []
    const cut = (['start', 'end'] as const).filter((end) => rateAtEnds[end] > allowed)
    if (cut.length === 0) return []
    // A hold begins with the reaction running, unless it takes an induction time: that alone is no mistake of the window.
    const holdOnly = result.programme === 'isothermal' && cut.every((end) => end === 'start')
    return [
      {
        code: 'window-cuts-reaction',
        severity: holdOnly ? 'note' : 'caution',
        stage: 'runs',
        title: `${info.label}: no plateau at the ${cut.join(' and the ')} of the window`,
        message:
          `At the ${cut.map((end) => `${end} of the window the reaction of ${info.label} runs at ${percent(rateAtEnds[end])} of its largest rate`).join(', at the ')}. ` +
          'There conversion 0 or 1 is where the window ends and not where the reaction does, which shifts all levels, the outer ones most. Widen the window to the plateaus, or measure further.',
        run: info.id,
        level: null,
        evidence: { rateAtStart_percent: 100 * rateAtEnds.start, rateAtEnd_percent: 100 * rateAtEnds.end },
        basis: 'Common practice: less than 3 % of the largest rate at either end',
        sources: ['ictac-2011'],
      },
    ]
  })
}

import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { list, percent } from '../words.ts'

const allowed = 0.03

/**
 * Fires where the reaction still runs with more than 3 % of its largest rate at an end of the window: conversion 0 or 1 is then put where it is not. A hold begins
 * with the reaction running, unless it takes an induction time: that alone is a note, and no mistake of the window.
 */
export function windowCutsReaction({ runs }: ReviewInput): Finding[] {
  return runs.flatMap(({ info, result, rateAtEnds }): Finding[] => {
    if (rateAtEnds === null) return []
    const cut = (['start', 'end'] as const).filter((end) => rateAtEnds[end] > allowed)
    if (cut.length === 0) return []
    const isHold = result.programme === 'isothermal'
    // Under a heat flow the rate at an end is 0 by construction: what is told is how high the signal stands there over the line of the other side.
    const runsAt = (share: number): string =>
      result.signal === 'heat-flow'
        ? `the heat flow of ${info.label} stands, or drifts, at ${percent(share)} of the height of its peak`
        : `the reaction of ${info.label} runs at ${percent(share)} of its largest rate`
    const atStart = `at the start of the window ${runsAt(rateAtEnds.start)}`
    const atEnd = `at the end of the window ${runsAt(rateAtEnds.end)}`
    const startOfHold = `A hold begins with the reaction running: ${atStart}. Conversion counts from there; what reacted while the sample was heated up to the hold is not in it. `
    const endOfHold = `The reaction is not over when the hold ends: ${atEnd}. Conversion 1 is then where the measurement stops, which is earlier in cooler holds, and Ea is off at all levels. Measure longer. `
    const ofRamp =
      `${list(cut.map((end) => (end === 'start' ? atStart : atEnd))).replace(/^a/, 'A')}. ` +
      'There conversion 0 or 1 is where the window ends and not where the reaction does, which shifts all levels, the outer ones most. Widen the window to the plateaus, or measure further.'
    const startOnly = !cut.includes('end')
    return [
      {
        code: 'window-cuts-reaction',
        severity: isHold && startOnly ? 'note' : 'caution',
        stage: 'runs',
        title:
          isHold && startOnly
            ? `${info.label}: the reaction runs from the start of the hold`
            : isHold
              ? `${info.label}: the reaction is not over at the end of the hold`
              : `${info.label}: no plateau at the ${cut.join(' and the ')} of the window`,
        message: isHold ? ((cut.includes('end') ? endOfHold : '') + (cut.includes('start') ? startOfHold : '')).trim() : ofRamp,
        run: info.id,
        level: null,
        evidence: { rateAtStart_percent: 100 * rateAtEnds.start, rateAtEnd_percent: 100 * rateAtEnds.end },
        basis: 'Common practice: less than 3 % of the largest rate at either end',
        sources: ['ictac-2011'],
      },
    ]
  })
}

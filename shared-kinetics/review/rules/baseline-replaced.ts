import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { list } from '../words.ts'

/** Fires where runs were levelled at the end of a hold in place of the baseline of the settings: one finding for all of them. */
export function baselineReplaced({ study, runs }: ReviewInput): Finding[] {
  const levelled = runs.filter(({ baselineKind }) => baselineKind === 'level-at-end').map(({ info }) => info.label)
  if (levelled.length === 0) return []
  const asked = study.settings.baseline === 'straight' ? 'straight' : 'area-proportional'
  return [
    {
      code: 'baseline-replaced',
      severity: 'note',
      stage: 'runs',
      title: 'Holds are levelled at their end',
      message:
        `The baseline of ${list(levelled)} is level through the end of the hold, in place of the ${asked} one: a hold may react from its first moment on, ` +
        'so that there is no stretch before the peak to draw a baseline from. It is right where the reaction is over when the hold ends.',
      run: null,
      level: null,
      evidence: { baseline: 'level-at-end', asked, runs: levelled.length },
      basis: 'Common practice for holds',
      sources: ['ictac-2014'],
    },
  ]
}

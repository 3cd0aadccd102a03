import { studentTQuantile } from '../../numerics/student-t.ts'
import type { Finding } from '../finding.ts'
import { halfIntervalOf, wideInterval } from '../half-intervals.ts'
import { leadingProfile } from '../leading-profile.ts'
import type { ReviewInput } from '../review-input.ts'
import { runsAtOdds } from '../runs-at-odds.ts'
import { digits, percent } from '../words.ts'

/**
 * Fires where the median half interval is more than 10 % of Ea, but would not be with the 1.96 of many runs in place of Student's t: the width is for want of runs.
 * Where it would be too, or one run is at odds with the others, `runs-do-not-agree` speaks.
 */
export function intervalWideBecauseFewRuns(input: ReviewInput, checkCancelled: () => void = () => undefined): Finding[] {
  const profile = leadingProfile(input.result.profiles)
  const half = profile === undefined ? null : halfIntervalOf(profile)
  if (profile === undefined || half === null || half.share <= wideInterval || half.shareOfMany > wideInterval) return []
  if (runsAtOdds(input, 0, checkCancelled).length > 0) return []
  const { dof } = profile.interval
  const next = studentTQuantile(0.975, dof + 1)
  return [
    {
      code: 'interval-wide-because-few-runs',
      severity: 'note',
      stage: 'activation',
      title: `95 % interval of ±${percent(half.share)} rests on ${dof + 2} runs`,
      message:
        `Half the interval of Ea (${profile.label}, median level) is ${percent(half.share)} of Ea: with ${dof + 2} runs a standard error is multiplied by ${digits(half.t)}, with one more ` +
        `by ${digits(next)}, with many 1.96. The width is for want of runs: add a heating rate or a replicate.`,
      run: null,
      level: null,
      evidence: { runs: dof + 2, halfInterval_percent: 100 * half.share, t: half.t, tWithOneMore: next },
      basis: "Student's t; 10 % is common practice",
      sources: ['abramowitz-stegun-1964', 'ictac-2011'],
    },
  ]
}

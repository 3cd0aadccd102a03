import type { Finding } from '../finding.ts'
import { halfIntervalOf, wideInterval } from '../half-intervals.ts'
import { leadingProfile } from '../leading-profile.ts'
import type { ReviewInput } from '../review-input.ts'
import { runsAtOdds } from '../runs-at-odds.ts'
import { percent } from '../words.ts'

/**
 * Fires where the median half interval is more than 10 % of Ea, and would be even with the 1.96 of many runs, or one run is at odds with the others: the runs do not agree
 * about Ea. Names that run.
 */
export function runsDoNotAgree(input: ReviewInput, checkCancelled: () => void = () => undefined): Finding[] {
  const profile = leadingProfile(input.result.profiles)
  const half = profile === undefined ? null : halfIntervalOf(profile)
  if (profile === undefined || half === null || half.share <= wideInterval) return []
  const [odd] = runsAtOdds(input, 0, checkCancelled)
  if (half.shareOfMany <= wideInterval && odd === undefined) return []
  const runs = profile.interval.dof + 2
  return [
    {
      code: 'runs-do-not-agree',
      severity: 'caution',
      stage: 'activation',
      title: `The ${runs} runs do not agree: 95 % interval of ±${percent(half.share)}`,
      message:
        `Half the interval of Ea (${profile.label}, median level) is ${percent(half.share)} of Ea, and ${percent(half.shareOfMany)} even with the 1.96 of many runs. ` +
        (odd === undefined
          ? 'Compare their windows, baselines, masses and temperature calibration; more runs alone do not mend it.'
          : `${odd.run.info.label} is at odds with the others: see its window, baseline, mass and calibration, or leave it out.`),
      run: odd?.run.info.id ?? null,
      level: null,
      evidence: { runs, halfInterval_percent: 100 * half.share, halfIntervalOfManyRuns_percent: 100 * half.shareOfMany, t: half.t },
      basis: "Student's t against the normal quantile 1.96; 10 % is common practice",
      sources: ['abramowitz-stegun-1964', 'ictac-2011'],
    },
  ]
}

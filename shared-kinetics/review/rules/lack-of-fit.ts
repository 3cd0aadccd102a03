import type { Finding } from '../finding.ts'
import { leadingProfile } from '../leading-profile.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, percent } from '../words.ts'

const significant = 0.05

/**
 * Fires where programmes with replicates lie off the common line by more than the replicates differ among themselves: p < 0.05 for the residuals averaged over the
 * range of the mean. One test, since levels of one run err alike.
 */
export function lackOfFit({ result }: ReviewInput): Finding[] {
  const profile = leadingProfile(result.profiles)
  const test = profile?.lackOfFit ?? null
  if (profile === undefined || test === null || test.overMeanRange.p === null || !(test.overMeanRange.p < significant)) return []
  const { F, p } = test.overMeanRange
  return [
    {
      code: 'lack-of-fit',
      severity: 'caution',
      stage: 'activation',
      title: `The line through the programmes misses them by more than replicates differ`,
      message:
        `${profile.label}: chance explains a misfit so large with a probability of ${percent(p)}. Either replicates share an error (one calibration, one day), or Ea changes with ` +
        `temperature or heating rate: more than one reaction, or heat and mass transport. Compare programmes in smaller groups.`,
      run: null,
      level: null,
      evidence: { F: F === null ? null : Number(digits(F, 4)), p, dofLackOfFit: test.dofLackOfFit, dofPureError: test.dofPureError },
      basis: 'F test of lack of fit against pure error, 5 %; near replicates by their residuals, averaged over the range of the mean',
      sources: ['draper-smith-1998'],
    },
  ]
}

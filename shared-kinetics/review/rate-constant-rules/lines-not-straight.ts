import type { Finding } from '../finding.ts'
import { digits } from '../words.ts'
import { aboutTable, type RateConstantReview } from './rate-constant-review.ts'

/** Fires where a quadratic term in 1/T differs from 0 at the 5 % level. */
export function linesNotStraight({ result: { curvature } }: RateConstantReview): Finding[] {
  if (curvature === null || !curvature.isCurved) return []
  const rises = curvature.t > 0
  return [
    aboutTable({
      code: 'lines-not-straight',
      severity: 'caution',
      title: 'ln k is not straight against 1/T',
      message:
        `A quadratic term has t = ${digits(curvature.t)} (5 % limit ±${digits(curvature.threshold)}, ${curvature.dof} degrees of freedom): the points lie ${rises ? 'above' : 'below'} their line at both ends, so that Ea ` +
        `${rises ? 'rises' : 'falls'} with temperature. One Ea and the bands then do not hold. Look for a change of mechanism or phase, for transport that limits the rate when hot, or for a wrong point.`,
      evidence: { t: curvature.t, threshold: curvature.threshold, dof: curvature.dof },
      basis: 't test of a quadratic term, p < 0.05',
      sources: ['draper-smith-1998', 'iupac-arrhenius'],
    }),
  ]
}

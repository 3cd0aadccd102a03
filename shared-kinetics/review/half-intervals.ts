import { studentTQuantile } from '../numerics/student-t.ts'
import type { ProfileResult } from '../tasks/study-result.ts'

/** Half a 95 % interval of more than this share of Ea is wide. */
export const wideInterval = 0.1

export interface HalfInterval {
  /** Median over the levels, as a share of Ea. */
  readonly share: number
  /** The same with the quantile that many runs would have, 1.96. */
  readonly shareOfMany: number
  /** Quantile of Student's t that the interval was made with. */
  readonly t: number
}

const quantileOfMany = 1.96

/** Half interval of a profile over its levels of positive Ea; null where it has none. */
export function halfIntervalOf(profile: ProfileResult): HalfInterval | null {
  const shares = profile.Ea_kJ_per_mol.flatMap((Ea, i) => {
    const upper = profile.upper95_kJ_per_mol[i] ?? null
    return Ea === null || upper === null || Ea <= 0 ? [] : [(upper - Ea) / Ea]
  }).sort((a, b) => a - b)
  const share = shares[shares.length >> 1]
  if (share === undefined || profile.interval.dof < 1) return null
  const t = studentTQuantile(0.975, profile.interval.dof)
  return { share, shareOfMany: (share * quantileOfMany) / t, t }
}

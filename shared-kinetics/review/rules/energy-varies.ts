import type { ProfileResult } from '../../tasks/study-result.ts'
import type { Finding } from '../finding.ts'
import { leadingProfile } from '../leading-profile.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, percent } from '../words.ts'

const noticeable = 0.1
const large = 0.2

/**
 * Fires where Ea spreads (largest less smallest, over the range of the mean) by more than 10 % of its mean: a note, beyond 20 % a caution. Where all intervals share a
 * value, so that noise alone may spread Ea like this, it is a note that says so.
 */
export function energyVaries({ result }: ReviewInput): Finding[] {
  const profile = leadingProfile(result.profiles)
  if (profile === undefined) return []
  const { from, to, Ea_kJ_per_mol: meanEa, spread_kJ_per_mol: spread } = profile.mean
  if (meanEa === null || spread === null || meanEa <= 0) return []
  const share = spread / meanEa
  if (share <= noticeable) return []
  const apart = intervalsApart(profile, result.levels)
  const seen = `Between conversion ${digits(from)} and ${digits(to)} Ea (${profile.label}) spreads over ${digits(spread)} kJ/mol around a mean of ${digits(meanEa)}. `
  const within = apart === false
  const texts = within
    ? {
        title: `A spread of Ea of ${percent(share)} lies within its intervals`,
        message: `${seen}All its 95 % intervals overlap: noise may do that, and nothing shows a second step. Narrow the intervals (more runs, cleaner ones) before reading anything into it.`,
      }
    : {
        title: `Ea varies by ${percent(share)} of its mean`,
        message:
          `${seen}The reaction may have more than one step; one Ea may then not describe it. ` +
          `${apart === null ? 'Without intervals noise cannot be ruled out. ' : ''}Use Ea level by level, and do not quote its mean alone.`,
      }
  return [
    {
      code: 'energy-varies',
      severity: share > large && !within ? 'caution' : 'note',
      stage: 'activation',
      ...texts,
      run: null,
      level: null,
      evidence: {
        method: profile.method,
        mean_kJ_per_mol: meanEa,
        spread_kJ_per_mol: spread,
        spread_percent: 100 * share,
        intervals: apart === null ? 'none' : apart ? 'apart' : 'overlap',
      },
      basis: 'A systematic variation of more than 10 to 20 % of the mean Ea tells of several steps; intervals that overlap show none',
      sources: ['ictac-2011'],
    },
  ]
}

const rounding = 1e-9

/** Whether the intervals of some two levels inside the range of the mean have no value in common; null without intervals. */
function intervalsApart({ mean, lower95_kJ_per_mol, upper95_kJ_per_mol }: ProfileResult, levels: readonly number[]): boolean | null {
  let highestLower = Number.NEGATIVE_INFINITY
  let lowestUpper = Number.POSITIVE_INFINITY
  levels.forEach((level, i) => {
    const [lower, upper] = [lower95_kJ_per_mol[i] ?? null, upper95_kJ_per_mol[i] ?? null]
    if (lower === null || upper === null || level < mean.from - rounding || level > mean.to + rounding) return
    highestLower = Math.max(highestLower, lower)
    lowestUpper = Math.min(lowestUpper, upper)
  })
  return Number.isFinite(lowestUpper) ? highestLower > lowestUpper : null
}

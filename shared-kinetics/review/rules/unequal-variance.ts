import { median } from '../../signal/median.ts'
import { gasConstant_J_per_mol_K } from '../../units/constants.ts'
import { perMinuteToPerSecond } from '../../units/convert.ts'
import type { ProfileResult } from '../../tasks/study-result.ts'
import type { Finding } from '../finding.ts'
import { halfIntervalOf } from '../half-intervals.ts'
import { leadingProfile } from '../leading-profile.ts'
import type { ReviewedRun, ReviewInput } from '../review-input.ts'
import { digits } from '../words.ts'

/** Variances farther apart than this, from run to run. */
const unlike = 4
/** Noise makes at least this share of the scatter that the points show. With few runs that scatter is itself known to a factor of two. */
const leastShareOfScatter = 1 / 3
/** An interval narrower than this share of Ea needs no remark on how it was made. */
const leastInterval = 0.01

/**
 * Fires where noise of the signal is what scatters Ea, and is not alike in the runs: the variance that it brings to the points of the line (median level) is more than
 * four times as large in one run as in another, it makes a third of the observed scatter or more, and half the interval is above 1 % of Ea. So it is with noise at a constant
 * sampling time: a fast run has fewer rows over the same conversion. Student's t takes all runs as alike. For constant heating rates.
 *
 * The variance is that of ln J, (σ_t beta Ea/(R T²))², with σ_t what the noise found in the data leaves in the time of the level.
 */
export function unequalVariance({ result, runs }: ReviewInput): Finding[] {
  const profile = leadingProfile(result.profiles)
  const half = profile === undefined ? null : halfIntervalOf(profile)
  if (profile === undefined || half === null || half.share < leastInterval) return []
  if (runs.some((run) => run.result.heatingRate_K_per_min === null)) return []
  const levels = result.levels.flatMap((_, level) => variancesAt(runs, profile, level) ?? [])
  if (levels.length === 0) return []
  // Of each run over the levels: noise of the reaction rate and of single levels is taken out.
  const variances = runs.map((_, i) => median(Float64Array.from(levels, (level) => level.variances[i] ?? Number.NaN)))
  const ratio = Math.max(...variances) / Math.min(...variances)
  const explained = variances.reduce((sum, value) => sum + value / runs.length, 0)
  const share = explained / median(Float64Array.from(levels, ({ scatter }) => scatter))
  if (!(ratio > unlike && share >= leastShareOfScatter)) return []
  const noisiest = runs[variances.indexOf(Math.max(...variances))]
  const quietest = runs[variances.indexOf(Math.min(...variances))]
  if (noisiest === undefined || quietest === undefined) return []
  return [
    {
      code: 'unequal-variance',
      severity: 'note',
      stage: 'activation',
      title: `Signal noise scatters Ea, and not alike in all runs`,
      message:
        `It brings ${digits(ratio, 2)} times the variance to ${noisiest.info.label} that it brings to ${quietest.info.label} (${noisiest.sampling.rowsInReaction} and ` +
        `${quietest.sampling.rowsInReaction} rows while reacting). The interval takes runs as alike: it may hold Ea somewhat less often than in 95 of 100 cases. Sample noisy runs ` +
        'more densely; compare the jackknife.',
      run: noisiest.info.id,
      level: null,
      evidence: {
        varianceRatio: ratio,
        shareOfScatter: share,
        rowsNoisiest: noisiest.sampling.rowsInReaction,
        rowsQuietest: quietest.sampling.rowsInReaction,
      },
      basis: "Student's t assumes equal variances; a ratio of 4 and a third of the scatter are common practice",
      sources: ['draper-smith-1998'],
    },
  ]
}

/** Variance of each run's point by noise of the signal, and s² of the regression; null where the level has none. */
function variancesAt(
  runs: readonly ReviewedRun[],
  profile: ProfileResult,
  level: number,
): { readonly variances: readonly number[]; readonly scatter: number } | null {
  const Ea = profile.Ea_kJ_per_mol[level] ?? null
  const error = profile.standardError_kJ_per_mol[level] ?? null
  if (Ea === null || error === null || !(Ea > 0)) return null
  const R = gasConstant_J_per_mol_K
  const T = runs.map((run) => run.result.temperatureAtLevel_K[level] ?? Number.NaN)
  const variances = runs.map((run, i) => {
    const rate = perMinuteToPerSecond(run.result.heatingRate_K_per_min ?? Number.NaN)
    return (((run.timeNoiseAtLevel_s[level] ?? Number.NaN) * rate * 1000 * Ea) / (R * (T[i] ?? Number.NaN) ** 2)) ** 2
  })
  const x = T.map((value) => 1 / value)
  const mean = x.reduce((sum, value) => sum + value / x.length, 0)
  const spread = x.reduce((sum, value) => sum + (value - mean) ** 2, 0)
  const scatter = ((1000 * error) / R) ** 2 * spread
  return Number.isFinite(scatter) && variances.every((value) => value > 0) ? { variances, scatter } : null
}

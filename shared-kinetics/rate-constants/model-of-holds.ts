import type { FitOfHold, FitsOfHolds } from './fits-of-holds.ts'
import type { RateConstantRow } from './rate-constant-table.ts'

/** Conversion is not measured closer: 1 µg of 10 mg. What a model misses by less is not said. */
export const leastMisfitSeen = 1e-4
/** A misfit of a hundredth of the reaction moves k by about as much. */
export const misfitOfCaution = 0.01

type Named = Pick<RateConstantRow, 'label' | 'temperature_K'>

const isOf = (row: Named, hold: Named): boolean => row.label === hold.label && row.temperature_K === hold.temperature_K
const isRenamed = (row: Named, { holds }: FitsOfHolds): boolean => !holds.some((hold) => isOf(row, hold))

/** The hold that a row was made from, though its label may have been typed over; null where there is none. */
export const holdOfRow = (row: Named, fits: FitsOfHolds): FitOfHold | null =>
  fits.holds.find((hold) => isOf(row, hold)) ??
  (isRenamed(row, fits) ? (fits.holds.find((hold) => row.temperature_K === hold.temperature_K) ?? null) : null)

/** The holds whose rows are used. */
export const holdsInUse = (rows: readonly RateConstantRow[], fits: FitsOfHolds): readonly FitOfHold[] =>
  fits.holds.filter((hold) =>
    rows.some((row) => row.use && (isOf(row, hold) || (row.temperature_K === hold.temperature_K && isRenamed(row, fits)))),
  )

/** Holds whose residuals keep one sign in stretches, by more than can be measured; the farthest off first. */
export const holdsNotFollowed = (used: readonly FitOfHold[]): readonly FitOfHold[] =>
  used
    .filter((hold) => hold.isSystematic && hold.greatestResidual > leastMisfitSeen)
    .toSorted((a, b) => b.greatestResidual - a.greatestResidual)

/** The residual variance of the chosen model is above that of the closest one by more than F allows, and large enough to be measured. */
export function isVarianceBeyondLimit({ model, models, varianceRatioLimit }: FitsOfHolds): boolean {
  const chosen = models.find((other) => other.model === model)
  return (
    varianceRatioLimit !== null &&
    chosen !== undefined &&
    !chosen.fits &&
    models.some((other) => other.fits) &&
    (chosen.residualStandardDeviation ?? 0) > leastMisfitSeen
  )
}

/**
 * Whether the chosen model follows the holds in use well enough for A and predicted k to have an interval: no hold is systematically off by a hundredth of conversion, and
 * the ratio of variances does not exceed its limit. An interval from the scatter of ln k knows nothing of a wrong model: the same error at every temperature leaves no scatter.
 */
export function modelFollowsHolds(rows: readonly RateConstantRow[], fits: FitsOfHolds): boolean {
  const used = holdsInUse(rows, fits)
  if (used.length === 0) return true
  return !isVarianceBeyondLimit(fits) && (holdsNotFollowed(used)[0]?.greatestResidual ?? 0) < misfitOfCaution
}

import { intervalStatuses, type IntervalStatus } from '../isoconversional/result.ts'
import type { Maybe, ProfileResult } from '../tasks/study-result.ts'
import { levelText } from './nice-axis.ts'

/** What a status says beside an interval, as the end of a sentence on some levels; null where there is nothing to say. */
export const intervalStatusWords: Readonly<Record<IntervalStatus, string | null>> = {
  ok: null,
  'no-energy': null,
  'reaches-below-zero': 'reaches below 0, where no activation energy lies: these runs do not bound Ea from below',
  'baseline-left-out': 'holds nothing of the choice of baseline, since what that does cannot be told for these runs',
  'too-few-programmes': 'not to be had with fewer than three distinct programmes',
  'end-outside': 'an end lies beyond 1 or 1000 kJ/mol and is not given',
  'no-minimum': 'not to be had: the variance has no minimum next to Ea',
  'energy-needs-every-run': 'not to be had: without one of the runs there is no Ea',
  'resamples-without-energy': 'not to be had: more than 1 % of the resamples give no Ea',
  'draws-without-energy': 'not to be had: more than 1 % of the draws give no Ea',
  'source-unknown': 'not to be had: how uncertain one of the sources is cannot be told',
}

/**
 * Status of an interval at each level.
 *
 * @param Ea - NaN or null where the level has none
 * @param missing - why an end is not there although the level has an Ea
 * @param given - what is said where both ends are there and above 0
 */
export function intervalStatus(
  Ea: ArrayLike<Maybe>,
  lower: ArrayLike<Maybe>,
  upper: ArrayLike<Maybe>,
  missing: (level: number) => IntervalStatus,
  given: IntervalStatus = 'ok',
): IntervalStatus[] {
  return Array.from(Ea, (value, level) => {
    if (!isThere(value)) return 'no-energy'
    const [from, to] = [lower[level], upper[level]]
    if (!isThere(from) || !isThere(to)) return missing(level)
    return from < 0 ? 'reaches-below-zero' : given
  })
}

/** Status of the Student-t interval that a profile has of itself. */
export const studentStatus = ({
  Ea_kJ_per_mol: Ea,
  lower95_kJ_per_mol: lower,
  upper95_kJ_per_mol: upper,
}: ProfileResult): IntervalStatus[] => intervalStatus(Ea, lower, upper, () => 'too-few-programmes')

/** An Ea that stands by itself, with its interval. */
export interface SingleEnergy {
  readonly Ea_kJ_per_mol: Maybe
  readonly lower95_kJ_per_mol: Maybe
  readonly upper95_kJ_per_mol: Maybe
}

/** What is to be said of the Student-t interval of a mean over levels, or of a line through peaks; null where there is nothing to say. */
export function studentWords({ Ea_kJ_per_mol: Ea, lower95_kJ_per_mol: lower, upper95_kJ_per_mol: upper }: SingleEnergy): string | null {
  const [status = 'no-energy'] = intervalStatus([Ea], [lower], [upper], () => 'too-few-programmes')
  return intervalStatusWords[status]
}

/** What is to be said of an interval at some of its levels. */
export interface IntervalRemark {
  /** Indices of the levels. */
  readonly at: readonly number[]
  /** The levels in words, `0.05 to 0.2, 0.9`. */
  readonly levels: string
  readonly words: string
}

/** At which levels an interval says less than its numbers do, or nothing, and why. */
export const intervalRemarks = (status: readonly IntervalStatus[], levels: readonly number[]): IntervalRemark[] =>
  intervalStatuses.flatMap((one) => {
    const words = intervalStatusWords[one]
    const at = levels.flatMap((_, i) => (status[i] === one ? [i] : []))
    return words === null || at.length === 0 ? [] : [{ at, levels: levelRanges(at, levels), words }]
  })

/** Levels that follow each other as one range. */
function levelRanges(at: readonly number[], levels: readonly number[]): string {
  const text = (i: number | undefined): string => levelText(levels[i ?? -1] ?? Number.NaN)
  const ranges: number[][] = []
  for (const i of at) {
    const last = ranges.at(-1)
    if (last?.at(-1) === i - 1) last.push(i)
    else ranges.push([i])
  }
  return ranges
    .map((range) => (range.length === 1 ? text(range[0]) : `${text(range[0])} ${range.length === 2 ? 'and' : 'to'} ${text(range.at(-1))}`))
    .join(', ')
}

const isThere = (value: Maybe | undefined): value is number => value !== null && value !== undefined && !Number.isNaN(value)

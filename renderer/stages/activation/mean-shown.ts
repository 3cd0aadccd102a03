import { intervalStatusWords, studentWords } from '../../../shared-kinetics/figure/interval-status.ts'
import { decimals, formatWithInterval, halfWidth } from '../../sheet/format.ts'
import { shortKinds, type ShownOfMethod } from './shown-interval.ts'

export interface MeanShown {
  /** Mean and half-width of its interval, `256.2 ± 16.2`. */
  readonly text: string
  /** Of which kind that interval is, and what else there is or is not; empty where the mean has no interval. */
  readonly words: string
  /** Why it has no interval, or one that says less than it seems to; null where there is nothing to say. */
  readonly remark: string | null
}

/**
 * The mean with the interval of the kind that is chosen. A mean has two: Student-t of the scatter, and the combined one. Where the chosen kind is another, or is not
 * worked out yet, Student-t stands there and the words say so.
 *
 * @returns null where no level of the range has a number
 */
export function meanShown({ profile, mean: combined, kind }: ShownOfMethod): MeanShown | null {
  const { Ea_kJ_per_mol: Ea, lower95_kJ_per_mol: lower, upper95_kJ_per_mol: upper } = profile.mean
  if (Ea === null) return null
  const [scatterHalf, combinedHalf] = [halfWidth(lower, upper), halfWidth(combined?.lower95_kJ_per_mol, combined?.upper95_kJ_per_mol)]
  if (kind === 'combined' && combined !== null && combinedHalf !== null) {
    const beside = scatterHalf === null ? '' : `; Student-t of the scatter alone ± ${decimals(scatterHalf, 1)}`
    const text = formatWithInterval(Ea, combined.lower95_kJ_per_mol, combined.upper95_kJ_per_mol, places(combinedHalf))
    return { text, words: `95 % combined${beside}`, remark: studentWords(combined) }
  }
  const text = formatWithInterval(Ea, lower, upper, places(scatterHalf))
  const remark = studentWords(profile.mean)
  if (lower === null) return { text, words: '', remark }
  return { text, words: `95 % Student-t of the scatter${besideScatter(kind, combined, combinedHalf)}`, remark }
}

function besideScatter(kind: ShownOfMethod['kind'], mean: ShownOfMethod['mean'], combinedHalf: number | null): string {
  const combined = combinedHalf === null ? '' : `; combined ± ${decimals(combinedHalf, 1)}`
  if (kind === 'combined') return mean === null ? '; combined not worked out yet' : `; combined ${intervalStatusWords['source-unknown']}`
  return kind === 'student-t' ? combined : `${combined}; a mean has no ${shortKinds[kind]} interval`
}

const places = (half: number | null): number => (half !== null && half < 0.095 ? 2 : 1)

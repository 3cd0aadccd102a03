import { column, type Column } from '../units/quantity.ts'

/** What the draws of one method say at each level. */
export interface DrawInterval {
  /** Standard deviation of the draws. */
  readonly standardUncertainty: Column<'J/mol'>
  readonly lower95: Column<'J/mol'>
  readonly upper95: Column<'J/mol'>
}

/** With fewer draws than this share the level has no interval: the others had no minimum. */
const leastShare = 0.99

/**
 * Standard deviation, and the quantiles 0.025 and 0.975, of the draws at each level; NaN where there is none. The quantile p of M draws stands at place p(M + 1) of them,
 * in ascending order and between two by the straight line, so that one more draw would lie between the two with probability 0.95, however many there are (from 39 on).
 *
 * @param shares - of the draws: each [draw · levels + level], in J/mol
 * @throws Cancelled, by `checkCancelled`
 * @source jcgm-101-2008 7.7 (probabilistically symmetric interval)
 */
export function drawInterval(shares: readonly Float64Array[], levels: number, checkCancelled: () => void = () => undefined): DrawInterval {
  const draws = shares.reduce((sum, share) => sum + share.length, 0) / levels
  const out = { u: new Float64Array(levels), lower: new Float64Array(levels), upper: new Float64Array(levels) }
  const values = new Float64Array(draws)
  for (let level = 0; level < levels; level++) {
    checkCancelled()
    let count = 0
    let mean = 0
    for (const share of shares) {
      for (let k = level; k < share.length; k += levels) {
        const Ea = share[k] as number
        if (Number.isNaN(Ea)) continue
        values[count++] = Ea
        mean += (Ea - mean) / count
      }
    }
    const sorted = values.subarray(0, count).sort()
    const enough = count > 1 && count >= leastShare * draws
    let squares = 0
    for (const Ea of sorted) squares += (Ea - mean) ** 2
    out.u[level] = enough ? Math.sqrt(squares / (count - 1)) : Number.NaN
    out.lower[level] = enough ? quantileOf(sorted, 0.025) : Number.NaN
    out.upper[level] = enough ? quantileOf(sorted, 0.975) : Number.NaN
  }
  return { standardUncertainty: column(out.u, 'J/mol'), lower95: column(out.lower, 'J/mol'), upper95: column(out.upper, 'J/mol') }
}

function quantileOf(sorted: Float64Array, p: number): number {
  const place = Math.min(sorted.length - 1, Math.max(0, p * (sorted.length + 1) - 1))
  const below = Math.floor(place)
  const from = sorted[below] ?? Number.NaN
  return from + (place - below) * ((sorted[below + 1] ?? from) - from)
}

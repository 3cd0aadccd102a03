import type { RowRange } from './main-heating.ts'

/** A hold keeps the temperature within a band of this width. */
export const holdBand_K = 3

/** Whether the temperature keeps within 3 K from `first` to `last`, apart from the outermost 1 % of the samples on either side. */
export function isHold(temperature_K: Float64Array, { first, last }: RowRange): boolean {
  const sorted = temperature_K.slice(first, last + 1).sort()
  const outermost = Math.floor(0.01 * sorted.length)
  return (sorted[sorted.length - 1 - outermost] ?? 0) - (sorted[outermost] ?? 0) <= holdBand_K
}

/** First row from which on the temperature stays within the band around that of the hold (apart from 1 % of the samples); `last` + 1 where it never does. */
export function startOfHold(temperature_K: Float64Array, { first, last }: RowRange, hold_K: number): number {
  let outside = 0
  let start = last + 1
  for (let i = last; i >= first; i--) {
    if (Math.abs((temperature_K[i] ?? Number.NaN) - hold_K) > 0.5 * holdBand_K) outside++
    else if (outside <= 0.01 * (last - i + 1)) start = i
    if (outside > 0.01 * (last - first + 1)) break
  }
  return start
}

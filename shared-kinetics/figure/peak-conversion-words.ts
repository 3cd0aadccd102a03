import type { PeakMethodNumber } from '../tasks/study-result.ts'

/** Conversions at the peaks of runs that differ by no more count as one; as far from that of a first-order reaction counts as first order. */
const alike = 0.1
const near = 0.05

/**
 * What the conversions at the rate peaks say for a peak method that takes first order for its A, as a sentence: whether runs agree, which Ea asks for, and whether they lie where
 * a first-order reaction peaks, which A asks for. null where they are not given.
 *
 * @source kissinger-1957 (Ea holds for any order as long as the conversion at the peak does not change with the heating rate)
 */
export function peakConversionWords(numbers: readonly PeakMethodNumber[]): string | null {
  const of = (key: PeakMethodNumber['key']): number | null => numbers.find((one) => one.key === key)?.value ?? null
  const [lowest, highest, first] = [of('conversion-at-peak-lowest'), of('conversion-at-peak-highest'), of('conversion-at-peak-first-order')]
  if (lowest === null || highest === null || first === null) return null
  const range = lowest.toFixed(2) === highest.toFixed(2) ? lowest.toFixed(2) : `${lowest.toFixed(2)} to ${highest.toFixed(2)}`
  const energy =
    highest - lowest <= alike
      ? 'about alike in all runs, as Ea by the peaks asks for'
      : 'not alike in all runs: Ea by the peaks may mix different steps'
  const isFirstOrder = Math.abs(lowest - first) <= near && Math.abs(highest - first) <= near
  const order = isFirstOrder
    ? `and near ${first.toFixed(2)}, where a first-order reaction peaks, so that A by first order can stand`
    : `a first-order reaction would peak at ${first.toFixed(2)}, so that A, which takes first order, is off`
  return `Peaks at conversion ${range}: ${energy}${isFirstOrder ? ', ' : '; '}${order}.`
}

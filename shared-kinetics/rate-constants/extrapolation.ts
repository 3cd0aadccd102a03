/** Where a temperature lies with respect to those of the data. */
export interface Extrapolation {
  readonly side: 'inside' | 'below' | 'above'
  /** Kelvins beyond the nearest temperature of the data; 0 inside. */
  readonly beyond_K: number
  /** The same in 1/T, as a share of the span of 1/T that the data cover: 1 is as far beyond the data as they reach. NaN for data at one temperature. */
  readonly beyondInSpans: number
}

/** How far beyond the data a temperature lies, in kelvins and, since the line is one in 1/T, in spans of 1/T. All in K. */
export function extrapolationOf(data_K: readonly number[], temperature_K: number): Extrapolation {
  const coldest = Math.min(...data_K)
  const hottest = Math.max(...data_K)
  const span = 1 / coldest - 1 / hottest
  const inSpans = (distance: number): number => (span > 0 ? distance / span : Number.NaN)
  if (temperature_K < coldest)
    return { side: 'below', beyond_K: coldest - temperature_K, beyondInSpans: inSpans(1 / temperature_K - 1 / coldest) }
  if (temperature_K > hottest)
    return { side: 'above', beyond_K: temperature_K - hottest, beyondInSpans: inSpans(1 / hottest - 1 / temperature_K) }
  return { side: 'inside', beyond_K: 0, beyondInSpans: 0 }
}

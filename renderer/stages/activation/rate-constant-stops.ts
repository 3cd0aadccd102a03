import type { Maybe, RateConstantsResult, RateConstantTable } from '../../../shared-kinetics/contract/study-result.ts'
import type { RateConstantPlace } from '../../state/view-store.ts'

/** A temperature that the rail stops at: that of a row or of a prediction. */
export interface RateConstantStop {
  readonly place: RateConstantPlace
  readonly temperature_K: number
}

/** Rows and predictions by temperature; at one temperature the rows come first, in their order. */
export function rateConstantStops({ rows, predictAt_K }: Pick<RateConstantTable, 'rows' | 'predictAt_K'>): readonly RateConstantStop[] {
  const stops: readonly RateConstantStop[] = [
    ...rows.map(({ temperature_K }, index) => ({ place: { kind: 'row', index } as const, temperature_K })),
    ...predictAt_K.map((temperature_K, index) => ({ place: { kind: 'prediction', index } as const, temperature_K })),
  ]
  return stops.toSorted((a, b) => a.temperature_K - b.temperature_K)
}

/** Index of the stop at a place; the first stop where the place is gone. */
export const stopAt = (stops: readonly RateConstantStop[], place: RateConstantPlace): number =>
  Math.max(
    0,
    stops.findIndex((stop) => stop.place.kind === place.kind && stop.place.index === place.index),
  )

/** Index of the stop nearest in 1/T, as a chart lies. */
export function nearestStop(stops: readonly RateConstantStop[], inverse_per_kK: number): number {
  let nearest = 0
  const distance = (i: number): number => Math.abs(1000 / (stops[i]?.temperature_K ?? Number.NaN) - inverse_per_kK)
  for (const [i] of stops.entries()) if (distance(i) < distance(nearest)) nearest = i
  return nearest
}

/** Half the width of the line's 95 % band at a temperature, in ln k; read between the points at which the band was drawn. */
export function bandHalfWidth({ band }: Pick<RateConstantsResult, 'band'>, temperature_K: number): Maybe {
  const { temperature_K: T, lnLineLower95: lower, lnLineUpper95: upper } = band
  const share = (i: number): number => (temperature_K - (T[i] ?? Number.NaN)) / ((T[i + 1] ?? Number.NaN) - (T[i] ?? Number.NaN))
  const before = T.findIndex((_, i) => share(i) > -1e-9 && share(i) < 1 + 1e-9)
  const half = (i: number): Maybe => {
    const [low, high] = [lower[i] ?? null, upper[i] ?? null]
    return low === null || high === null ? null : (high - low) / 2
  }
  const [start, end] = [half(before), half(before + 1)]
  return start === null || end === null ? null : start + share(before) * (end - start)
}

import type { FitParameter } from './fit-parameter.ts'
import { randomStream } from './random.ts'

/** Widths of the draws, as standard deviations of ln(p/start): one third near the start, one third up to some two times, one third over a power of ten. */
const widths = [0.1, 0.7, 2.3] as const

/**
 * Starts drawn around the starts of parameters, for a fit that a single start may lead astray. Each parameter is multiplied by a log-normal factor and keeps its sign, one
 * that starts at 0 is drawn normally about it with its typical size; the width of the draws goes through `widths` in turn. Draws outside the bounds are moved to the
 * bound. The same seed gives the same starts, and start k does not depend on how many there are.
 */
export function startsAround(parameters: readonly FitParameter[], count: number, seed: number): readonly (readonly number[])[] {
  return Array.from({ length: count }, (_, k) => {
    const draws = randomStream(seed, k)
    const width = widths[k % widths.length] ?? 1
    return parameters.map(({ start, lower, upper, typical }) => {
      const draw = width * draws.normal()
      const value = start === 0 ? draw * (typical ?? 1) : start * Math.exp(draw)
      return Math.min(Math.max(value, lower ?? Number.NEGATIVE_INFINITY), upper ?? Number.POSITIVE_INFINITY)
    })
  })
}

import { lineFit } from '../numerics/line-fit.ts'
import { lowerBound } from '../signal/lower-bound.ts'
import type { ConversionCurve } from './smooth-curve.ts'

/** The reaction rate at the ends of the window, as a share of its maximum. */
export interface RateAtEnds {
  readonly start: number
  readonly end: number
}

/** The rate at an end is the slope over so large a part of the reaction's duration: the smallest of these over which noise leaves it certain enough. */
const parts = [0.02, 0.05, 0.1, 0.2]
/** A standard error of a third of the 3 % that is looked for. */
const certain = 0.01
const fewestRows = 9

/** How fast the reaction still (or already) runs where the window cuts it off. Near 0 where a plateau lies inside the window. */
export function rateAtEnds(curve: ConversionCurve): RateAtEnds {
  return { start: rateAt(curve, 'start'), end: rateAt(curve, 'end') }
}

function rateAt({ time_s, conversion, measured, duration_s }: ConversionCurve, end: 'start' | 'end'): number {
  const n = time_s.length
  // Samples as measured: the errors of smoothed ones depend on each other, and their line looks more certain than it is.
  const values = measured.kind === 'extent' ? measured.values : conversion
  let rate = Number.NaN
  for (const part of parts) {
    const reach = part * duration_s
    const [from, to] =
      end === 'start'
        ? [0, Math.max(fewestRows, lowerBound(time_s, (time_s[0] ?? 0) + reach))]
        : [Math.min(n - fewestRows, lowerBound(time_s, (time_s[n - 1] ?? 0) - reach)), n]
    const line = lineFit(time_s.subarray(Math.max(0, from), to), values.subarray(Math.max(0, from), to))
    rate = Math.abs(line.slope) * duration_s
    if (line.slopeStandardError * duration_s < certain) break
  }
  return rate
}

import { lineFit } from '../numerics/line-fit.ts'
import { lineThroughOrigin } from '../numerics/line-through-origin.ts'
import { holdRows, type HoldOptions, type IsothermalConversion } from './hold-rows.ts'

/** Slope and foot of the line of g against t. Where status is not `ok` every number is NaN. */
export interface LinearisedHold {
  /** `too-few-rows`: fewer than two rows (one where t₀ is fixed) in the range; `time-not-distinct`; `not-positive`: g does not rise with time. */
  readonly status: 'ok' | 'too-few-rows' | 'time-not-distinct' | 'not-positive'
  readonly rateConstant_per_s: number
  /** One standard error of the line, as if every g had the same error. */
  readonly standardError_per_s: number
  /** t₀; 0 where fixed. */
  readonly zero_s: number
  readonly r2: number
}

/**
 * The straight line g(alpha) = k (t - t₀) of a hold by unweighted least squares of g on t; with t₀ fixed through the origin, k = Σ t g/Σ t².
 *
 * An error of alpha becomes g' = 1/f(alpha) times as large in g: equal errors of conversion are far from equal here, and where f falls off towards the end the last
 * rows, the worst known, weigh most. It serves as a start and for comparison; k itself is `rateConstantFromHold`'s.
 *
 * @param g - the integral form of the model; rows where it is not finite are not used
 * @throws KineticsError `column-length`, `bad-option` where the range is not inside [0, 1] or empty
 * @source ictac-2011
 */
export function linearisedHold(
  run: IsothermalConversion,
  g: (conversion: number) => number,
  { zeroInTime, range }: HoldOptions,
): LinearisedHold {
  const rows = holdRows(run, range)
  const lined = Array.from(rows.time_s, (t, i) => ({ t, y: g(rows.conversion[i] ?? Number.NaN) })).filter(({ y }) => Number.isFinite(y))
  const t = lined.map((row) => row.t)
  const y = lined.map((row) => row.y)
  const { slope, error, zero, r2, status } = zeroInTime === 'free' ? freeLine(t, y) : throughOrigin(t, y)
  const isUsable = status === 'ok' && slope > 0
  const orNone = (value: number): number => (isUsable ? value : Number.NaN)
  return {
    status: status === 'ok' && !isUsable ? 'not-positive' : status,
    rateConstant_per_s: orNone(slope),
    standardError_per_s: orNone(error),
    zero_s: orNone(zero),
    r2: orNone(r2),
  }
}

interface SlopeOfLine {
  readonly status: 'ok' | 'too-few-rows' | 'time-not-distinct'
  readonly slope: number
  readonly error: number
  readonly zero: number
  readonly r2: number
}

const noSlope = (status: SlopeOfLine['status']): SlopeOfLine => ({
  status,
  slope: Number.NaN,
  error: Number.NaN,
  zero: Number.NaN,
  r2: Number.NaN,
})

function freeLine(t: readonly number[], y: readonly number[]): SlopeOfLine {
  const fit = lineFit(t, y)
  if (fit.status !== 'ok') return noSlope(fit.status === 'too-few-points' ? 'too-few-rows' : 'time-not-distinct')
  return { status: 'ok', slope: fit.slope, error: fit.slopeStandardError, zero: fit.xMean - fit.valueAtMean / fit.slope, r2: fit.r2 }
}

function throughOrigin(t: readonly number[], y: readonly number[]): SlopeOfLine {
  const fit = lineThroughOrigin(t, y)
  if (fit.status !== 'ok') return noSlope(fit.status === 'too-few-points' ? 'too-few-rows' : 'time-not-distinct')
  return { status: 'ok', slope: fit.slope, error: fit.slopeStandardError, zero: 0, r2: fit.r2 }
}

import { KineticsError } from '../errors.ts'
import { lineFit } from '../numerics/line-fit.ts'
import { lineThroughOrigin } from '../numerics/line-through-origin.ts'
import { quantity, type Quantity } from '../units/quantity.ts'

/** The conversion of one isothermal run; time from the start of the hold. */
export interface IsothermalConversion {
  readonly temperature: Quantity<'K'>
  readonly time_s: ArrayLike<number>
  readonly conversion: ArrayLike<number>
}

export interface HoldOptions {
  /** `fixed`: g = k t, the reaction starts at t = 0. `free`: g = k (t - t₀), t₀ fitted: conversion before the hold, or an induction time. */
  readonly zeroInTime: 'fixed' | 'free'
  /** Rows with a conversion inside this range are used, ends included. */
  readonly range: readonly [number, number]
}

export interface RateConstantFromHold {
  /** `too-few-rows`: fewer than two rows (one where t₀ is fixed) in the range; `time-not-distinct`; `not-positive`: g does not rise with time. */
  readonly status: 'ok' | 'too-few-rows' | 'time-not-distinct' | 'not-positive'
  readonly temperature: Quantity<'K'>
  readonly rateConstant: Quantity<'1/s'>
  /**
   * One standard error of the line, rows taken as independent; NaN where none is left over. Neighbouring rows of one run are not independent, so it tells how
   * straight g is rather than how far k can be trusted; the scatter between runs does that.
   */
  readonly standardError: Quantity<'1/s'>
  /** t₀; 0 where fixed. */
  readonly zero_s: Quantity<'s'>
  readonly r2: number
  readonly rows: number
}

/**
 * The rate constant of an isothermal run under a chosen model: g(alpha) = k (t - t₀), a straight line whose slope is k, by unweighted least squares of g on t.
 * With t₀ fixed the line goes through the origin, k = Σ t g/Σ t², s² = Σ r²/(n - 1).
 *
 * The model is assumed, not shown: many give nearly straight lines. Ea from such k hardly depends on it, A does.
 *
 * @param g - the integral form of the model, g(0) = 0; rows where it is not finite are not used
 * @throws KineticsError `column-length`, `bad-option` where the range is not inside [0, 1] or empty
 * @source ictac-2011
 */
export function rateConstantFromHold(
  run: IsothermalConversion,
  g: (conversion: number) => number,
  { zeroInTime, range: [low, high] }: HoldOptions,
): RateConstantFromHold {
  if (run.time_s.length !== run.conversion.length) {
    throw new KineticsError('column-length', 'A hold needs as many times as conversions.', {
      times: run.time_s.length,
      conversions: run.conversion.length,
    })
  }
  if (!(low >= 0 && high <= 1 && low < high))
    throw new KineticsError('bad-option', `A range of conversion lies between 0 and 1, not ${low} to ${high}.`, { low, high })
  const t: number[] = []
  const y: number[] = []
  for (let i = 0; i < run.time_s.length; i++) {
    const [time, alpha] = [run.time_s[i] ?? Number.NaN, run.conversion[i] ?? Number.NaN]
    const value = alpha >= low && alpha <= high ? g(alpha) : Number.NaN
    if (!Number.isFinite(time) || !Number.isFinite(value)) continue
    t.push(time)
    y.push(value)
  }
  const { slope, error, zero, r2, status } = zeroInTime === 'free' ? freeLine(t, y) : throughOrigin(t, y)
  const isUsable = status === 'ok' && slope > 0
  const orNone = (value: number): number => (isUsable ? value : Number.NaN)
  return {
    status: status === 'ok' && !isUsable ? 'not-positive' : status,
    temperature: run.temperature,
    rateConstant: quantity(orNone(slope), '1/s'),
    standardError: quantity(orNone(error), '1/s'),
    zero_s: quantity(orNone(zero), 's'),
    r2: orNone(r2),
    rows: t.length,
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

import { KineticsError } from '../errors.ts'
import type { LineFit } from './line-fit.ts'
import { studentTQuantile } from './student-t.ts'

/** A line, or its slope, at one x with its interval. All but `value` are NaN where the fit leaves no degree of freedom, all where there is no line. */
export interface LineInterval {
  readonly value: number
  /** One standard error (of the line) or standard deviation (of a new point). */
  readonly standardError: number
  readonly lower: number
  readonly upper: number
}

/**
 * Interval of the line itself at x: ŷ ± t(n - 2)·s·√(1/n + (x - x̄)²/Σ(x - x̄)²). Pointwise: each x has its own probability, the band as a whole a lower one.
 *
 * @param level - probability of the interval, 0.95 by default
 * @throws KineticsError `bad-option` for a level outside (0, 1)
 * @source draper-smith-1998 ch. 1 and 3
 */
export function lineConfidenceBand(fit: LineFit, x: number, level = 0.95): LineInterval {
  return intervalAt(fit, x, level, 0)
}

/**
 * Interval for one new point at x: ŷ ± t(n - 2)·s·√(1 + 1/n + (x - x̄)²/Σ(x - x̄)²). Pointwise.
 *
 * @param level - probability of the interval, 0.95 by default
 * @throws KineticsError `bad-option` for a level outside (0, 1)
 * @source draper-smith-1998 ch. 1 and 3
 */
export function linePredictionBand(fit: LineFit, x: number, level = 0.95): LineInterval {
  return intervalAt(fit, x, level, fit.residualStandardDeviation)
}

/**
 * Interval of the slope: slope ± t(n - 2)·se. Two parameters were taken from n points, hence n - 2 degrees of freedom, not n - 1.
 *
 * @param level - probability of the interval, 0.95 by default
 * @throws KineticsError `bad-option` for a level outside (0, 1)
 * @source draper-smith-1998 ch. 1
 */
export function lineSlopeInterval(fit: LineFit, level = 0.95): LineInterval {
  return around(fit.slope, fit.slopeStandardError, fit.dof, level)
}

function intervalAt(fit: LineFit, x: number, level: number, ofNewPoint: number): LineInterval {
  const distance = x - fit.xMean
  const ofLine = Math.hypot(fit.valueAtMeanStandardError, distance * fit.slopeStandardError)
  return around(fit.valueAtMean + distance * fit.slope, Math.hypot(ofLine, ofNewPoint), fit.dof, level)
}

function around(value: number, standardError: number, dof: number, level: number): LineInterval {
  if (!(level > 0 && level < 1))
    throw new KineticsError('bad-option', `An interval needs a probability between 0 and 1, not ${level}.`, { level })
  const half = dof > 0 ? studentTQuantile(0.5 + level / 2, dof) * standardError : Number.NaN
  return { value, standardError, lower: value - half, upper: value + half }
}

import { KineticsError } from '../errors.ts'
import type { Quantity } from '../units/quantity.ts'

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

/** The rows of a hold that are used, in the order of time. */
export interface HoldRows {
  readonly time_s: Float64Array
  readonly conversion: Float64Array
}

/**
 * Rows with a finite time and a conversion inside the range.
 * @throws KineticsError `column-length`, `bad-option` where the range is not inside [0, 1] or empty
 */
export function holdRows(run: IsothermalConversion, [low, high]: HoldOptions['range']): HoldRows {
  if (run.time_s.length !== run.conversion.length) {
    throw new KineticsError('column-length', 'A hold needs as many times as conversions.', {
      times: run.time_s.length,
      conversions: run.conversion.length,
    })
  }
  if (!(low >= 0 && high <= 1 && low < high))
    throw new KineticsError('bad-option', `A range of conversion lies between 0 and 1, not ${low} to ${high}.`, { low, high })
  const rows = Array.from(run.time_s, (time, i) => ({ time, alpha: run.conversion[i] ?? Number.NaN }))
    .filter(({ time, alpha }) => Number.isFinite(time) && alpha >= low && alpha <= high)
    .toSorted((a, b) => a.time - b.time)
  return { time_s: Float64Array.from(rows, ({ time }) => time), conversion: Float64Array.from(rows, ({ alpha }) => alpha) }
}

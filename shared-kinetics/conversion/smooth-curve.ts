import { isotonic } from '../signal/isotonic.ts'
import { localPolynomial, localPolynomialAt, type LocalPolynomialOptions } from '../signal/local-polynomial.ts'
import { lowerBound } from '../signal/lower-bound.ts'
import { correlatedNoiseOf } from '../signal/noise.ts'
import { smoothingHalfWidth } from '../signal/smoothing-width.ts'
import { gapsOfTime } from '../series/gap-free-stretch.ts'
import type { RowRange } from '../series/main-heating.ts'
import { column, type Column } from '../units/quantity.ts'

/**
 * Conversion of one run inside its window as a smooth curve: value and slope at each sample, from which it can be read anywhere. All columns are as long as the
 * window has rows.
 */
export interface ConversionCurve {
  readonly time_s: Column<'s'>
  readonly temperature_K: Column<'K'>
  readonly conversion: Column<'1'>
  readonly reactionRate_per_s: Column<'1/s'>
  /** What was smoothed: conversion itself, or its rate. */
  readonly measured: { readonly kind: 'extent' | 'rate'; readonly values: Float64Array }
  readonly smoothing: LocalPolynomialOptions
  /** Standard deviation of the noise of `measured`. */
  readonly noise: number
  /** Standard errors of the two values of the signal that were taken for conversion 0 and 1, as conversions; 0 where there are none. */
  readonly ends: EndErrors
  /** The baseline that was taken off a heat flow; null where none was. */
  readonly drawn: DrawnBaseline | null
  /** Time the reaction would take at its largest rate. */
  readonly duration_s: number
  /** Rows between conversion 0.02 and 0.98. */
  readonly reaction: RowRange
  /** Gaps in which a notable part of the reaction passed unseen: the row before each and the row after it. */
  readonly gaps: readonly RowRange[]
}

export interface EndErrors {
  readonly start: number
  readonly end: number
}

/** What a baseline was drawn from: lines through rows at the ends of the window, and what it passes from the one to the other with. */
export interface DrawnBaseline {
  readonly passes: 'with-time' | 'with-conversion' | 'level'
  readonly lines: readonly BaselineLine[]
}

/** y = value + slope·(time - x) through the rows from one time to another, over the area of the peak: in 1/s and 1/s². */
export interface BaselineLine {
  readonly end: 'start' | 'end'
  readonly from_s: number
  readonly to_s: number
  readonly x: number
  readonly value: number
  readonly slope: number
  /** Fitted; else the line is level. */
  readonly hasSlope: boolean
  /** Variance of the value for noise of 1, times the number of rows: 1 of a mean. */
  readonly varianceOfMean: number
}

const noEnds: EndErrors = { start: 0, end: 0 }

/**
 * The fewest samples between conversion 0.02 and 0.98 from which levels and rates can be read: with them local cubics shift Ea of exact first-order data by up to
 * 1 %, with fewer by more.
 */
export const fewestRowsInReaction = 15

/** Noise is looked for up to this share of the duration, in which a curve is as good as a cubic. */
const widestNoiseStride = 0.01
/** A cubic and two samples more: wider fits are for noise, and `smoothingHalfWidth` sees to that. */
export const fewestPoints = 6

/**
 * Curve from samples of the conversion itself (from mass, or a conversion column): local cubics, whose slope is the reaction rate.
 *
 * @param conversion - may be noisy, and may pass a little below 0 and above 1
 */
export function curveFromExtent(
  time_s: Column<'s'>,
  temperature_K: Column<'K'>,
  conversion: Float64Array,
  ends: EndErrors = noEnds,
): ConversionCurve {
  const shape = shapeOf(time_s, conversion)
  const noise = correlatedNoiseOf(time_s, conversion, shape.reaction.first, shape.reaction.last, shape.widestStride)
  const smoothing = smoothingFor('extent', noise, shape)
  const { value, slope } = localPolynomial(time_s, conversion, { ...smoothing, closely: shape.closely })
  return {
    time_s,
    temperature_K,
    conversion: column(value, '1'),
    reactionRate_per_s: column(slope, '1/s'),
    measured: { kind: 'extent', values: conversion },
    smoothing,
    noise,
    ends,
    drawn: null,
    duration_s: shape.duration,
    reaction: shape.reaction,
    gaps: shape.gaps,
  }
}

/**
 * Curve from samples of the reaction rate and their integral (from heat flow or heat release): the integral is smooth as it is, the rate is smoothed by local
 * cubics.
 *
 * @param rate - dα/dt, its integral over the window is 1
 * @param conversion - that integral
 * @param drawn - the baseline that was taken off the signal
 */
export function curveFromRate(
  time_s: Column<'s'>,
  temperature_K: Column<'K'>,
  rate: Float64Array,
  conversion: Float64Array,
  drawn: DrawnBaseline | null = null,
): ConversionCurve {
  const shape = shapeOf(time_s, conversion)
  const noise = correlatedNoiseOf(time_s, rate, shape.reaction.first, shape.reaction.last, shape.widestStride)
  const smoothing = smoothingFor('rate', noise * shape.duration, shape)
  return {
    time_s,
    temperature_K,
    conversion: column(conversion, '1'),
    reactionRate_per_s: column(localPolynomial(time_s, rate, { ...smoothing, closely: shape.closely }).value, '1/s'),
    measured: { kind: 'rate', values: rate },
    smoothing,
    noise,
    ends: noEnds,
    drawn,
    duration_s: shape.duration,
    reaction: shape.reaction,
    gaps: shape.gaps,
  }
}

/** dα/dt at any time inside the window. */
export function reactionRateAt(curve: ConversionCurve, time: number): number {
  const fit = localPolynomialAt(curve.time_s, curve.measured.values, time, curve.smoothing)
  return curve.measured.kind === 'extent' ? fit.slope : fit.value
}

interface Shape {
  readonly duration: number
  readonly reaction: RowRange
  /** Rows between conversion 0.005 and 0.995 and a quarter of the duration more on either side: outside, next to nothing happens. */
  readonly closely: RowRange
  readonly gaps: readonly RowRange[]
  readonly samplesPerDuration: number
  readonly widestStride: number
}

function shapeOf(time: Float64Array, conversion: Float64Array): Shape {
  const rising = isotonic(conversion)
  const n = rising.length
  const first = Math.min(lowerBound(rising, 0.02), n - 2)
  const last = Math.min(n - 1, Math.max(first + 1, lowerBound(rising, 0.98)))
  const span = (time[last] ?? 0) - (time[first] ?? 0)
  const duration = Math.min(span, durationAtLargestRate(time, rising))
  const samplesPerDuration = Math.max(1, ((last - first) * duration) / span)
  // A step that is as large as those of a run with the fewest samples is no worse than there.
  const rise = (gap: RowRange): number => (rising[gap.last] ?? 0) - (rising[gap.first] ?? 0)
  return {
    duration,
    reaction: { first, last },
    closely: {
      first: lowerBound(time, (time[Math.min(n - 1, lowerBound(rising, 0.005))] ?? 0) - 0.25 * duration),
      last: Math.min(n - 1, lowerBound(time, (time[Math.min(n - 1, lowerBound(rising, 0.995))] ?? 0) + 0.25 * duration)),
    },
    gaps: gapsOfTime(time, Math.max(0, first - 1), last).filter((gap) => rise(gap) > 0.96 / fewestRowsInReaction),
    samplesPerDuration,
    widestStride: Math.floor(widestNoiseStride * samplesPerDuration),
  }
}

/** Ten times the shortest time in which conversion rises by a tenth. */
function durationAtLargestRate(time: Float64Array, rising: Float64Array): number {
  let shortest = Infinity
  // No tenth ends before the first row that is so much higher than the start, and none that ends beyond the first row of the highest value is the shortest.
  const first = lowerBound(rising, (rising[0] as number) + 0.1)
  const last = Math.min(rising.length - 1, lowerBound(rising, rising[rising.length - 1] as number))
  if (first > last) return shortest
  let from = Math.max(0, lowerBound(rising, (rising[first] as number) - 0.1) - 1)
  for (let to = first; to <= last; to++) {
    const here = rising[to] as number
    while (from + 1 < to && here - (rising[from + 1] as number) >= 0.1) from++
    const rise = here - (rising[from] as number)
    if (rise >= 0.1) shortest = Math.min(shortest, ((time[to] as number) - (time[from] as number)) / rise)
  }
  return shortest
}

function smoothingFor(kind: 'extent' | 'rate', noise: number, shape: Shape): LocalPolynomialOptions {
  const halfWidth = smoothingHalfWidth({ kind, noise, duration: shape.duration, samplesPerDuration: shape.samplesPerDuration })
  return { halfWidth, degree: 3, minimumPoints: fewestPoints }
}

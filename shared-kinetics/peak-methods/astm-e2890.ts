import { median } from '../signal/median.ts'
import type { Quantity } from '../units/quantity.ts'
import { kissinger } from './kissinger.ts'
import { orderFromPeak, type PeakAtHalfHeight, type PeakOrder } from './order-from-peak.ts'
import type { PeakEstimate, RatePeak } from './peak-line.ts'
import type { PeakMethodInfo } from './peak-method-info.ts'

export const astmE2890Info: PeakMethodInfo = {
  id: 'astm-e2890',
  label: 'ASTM E2890',
  ordinate: 'ln(β/Tp²)',
  sources: ['astm-e2890', 'kissinger-1957', 'farjas-roura-2014'],
}

/** A peak with its half heights; NaN where the run does not have them. */
export interface ShapedRatePeak extends RatePeak {
  readonly lowerHalf: Quantity<'K'>
  readonly upperHalf: Quantity<'K'>
}

export const e2890Scope = {
  temperature_K: [300, 900],
  order: { 'nth-order': [0.5, 4], accelerating: [1, 4] },
} as const

/** An order is not known better than to this share, so that one as little outside the scope as that is not called outside. */
const sharpness = 0.02

export interface AstmE2890Estimate extends PeakEstimate {
  /** Median order of the peaks, of the family that most of them have; null where no peak has its half heights. */
  readonly order: PeakOrder | null
  /** How many peaks are of that family. */
  readonly peaksOfFamily: number
  /** What lies outside the standard's scope: a peak temperature (300 to 900 K), the order (0.5 < n < 4; accelerating 1 < p < 4), or nothing. */
  readonly outOfScope: 'temperature' | 'order' | null
}

/**
 * ASTM E2890: Ea and Z by Kissinger's line ln(beta/Tp²) against 1/Tp, and the reaction order from the shape of the peaks (`orderFromPeak`), nth-order (n) or
 * accelerating (p). For both families -f'(alpha_p) is near 1 by the condition of Farjas and Roura, so that Kissinger's Z stands.
 *
 * The standard speaks of DSC of exothermic reactions between 300 and 900 K, 0.5 < n < 4 or 1 < p < 4, by the same runs as E698; it is not for reactions of more
 * steps than one. Its own way from the shape to the order was not at hand; the one here is derived from the exact condition of the peak.
 *
 * Statuses: `too-few-programmes`, `line-not-determined`, `energy-not-positive`.
 *
 * @throws KineticsError `no-heating-rate`, `not-finite`
 * @source astm-e2890 (scope read); kissinger-1957; farjas-roura-2014
 */
export function astmE2890(peaks: readonly ShapedRatePeak[]): AstmE2890Estimate {
  const estimate = kissinger(peaks)
  const { order, peaksOfFamily } = orderOf(estimate, peaks)
  const [coldest, hottest] = e2890Scope.temperature_K
  const temperatures = peaks.every(({ temperature }) => temperature >= coldest && temperature <= hottest)
  const [lowest, highest] = order === null ? [0, Infinity] : e2890Scope.order[order.family]
  const orders = order === null || (order.order > lowest * (1 - sharpness) && order.order < highest * (1 + sharpness))
  return { ...estimate, order, peaksOfFamily, outOfScope: temperatures ? (orders ? null : 'order') : 'temperature' }
}

function orderOf(
  { status, Ea }: PeakEstimate,
  peaks: readonly ShapedRatePeak[],
): { readonly order: PeakOrder | null; readonly peaksOfFamily: number } {
  if (status !== 'ok') return { order: null, peaksOfFamily: 0 }
  const orders = peaks.flatMap(({ temperature, lowerHalf, upperHalf }) => {
    const shape: PeakAtHalfHeight = { peak: temperature, lower: lowerHalf, upper: upperHalf }
    return orderFromPeak(Ea, shape) ?? []
  })
  const accelerating = orders.filter((order) => order.family === 'accelerating')
  const [family, members] =
    2 * accelerating.length > orders.length
      ? (['accelerating', accelerating] as const)
      : (['nth-order', orders.filter((order) => order.family === 'nth-order')] as const)
  if (members.length === 0) return { order: null, peaksOfFamily: 0 }
  return { order: { family, order: median(members.map((member) => member.order)) }, peaksOfFamily: members.length }
}

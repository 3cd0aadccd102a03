import { bracketedRoot } from '../numerics/root.ts'
import { lnPOfX, scaledPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { Quantity } from '../units/quantity.ts'

/** A rate peak and where the rate is half as high on either side of it. */
export interface PeakAtHalfHeight {
  readonly peak: Quantity<'K'>
  readonly lower: Quantity<'K'>
  readonly upper: Quantity<'K'>
}

/** nth order, f = (1 - alpha)^n, or accelerating, f = p (1 - alpha)(-ln(1 - alpha))^(1 - 1/p). */
export interface PeakOrder {
  readonly family: 'nth-order' | 'accelerating'
  readonly order: number
}

/** Distances of the half heights from the peak on a scale of x = Ea/(R T). */
interface HalfWidths {
  readonly below: number
  readonly above: number
}

/** Orders looked for. */
const range = { 'nth-order': [0.05, 12], accelerating: [1, 12] } as const

/**
 * Reaction order from the shape of a rate peak under a constant heating rate, Ea known.
 *
 * A one-step reaction peaks where f'(alpha_p) g(alpha_p) = -π(x_p), x = Ea/(R T), which both families answer in closed form; from there on
 * g(alpha) = g(alpha_p) p(x)/p(x_p) and dalpha/dt ∝ exp(-x) f(alpha). So the full width at half height of either family follows exactly from its order, and the width
 * measured gives n of the one and p of the other (for large x it is 2.446 of first order and 2.446/p of an accelerating reaction). Where both have such a width, the
 * family whose peak is as lopsided as the one measured is taken.
 *
 * Assumes one step and an Ea that is right: the order goes with it in about equal shares. A second reaction under the flank, or a baseline that is off, passes for an order.
 *
 * @returns null where the half heights are not to be had, or neither an order 0.05 < n < 12 nor 1 < p < 12 has them
 * @source farjas-roura-2014 (the condition of the peak; the shape follows from it)
 */
export function orderFromPeak(Ea: Quantity<'J/mol'>, { peak, lower, upper }: PeakAtHalfHeight): PeakOrder | null {
  if (!(Ea > 0 && lower > 0 && lower < peak && peak < upper)) return null
  const x = (T: number): number => Ea / (gasConstant_J_per_mol_K * T)
  const measured = { below: x(lower) - x(peak), above: x(peak) - x(upper) }
  const found = (['nth-order', 'accelerating'] as const).flatMap((family) => {
    const [least, most] = range[family]
    const off = (order: number): number => widthOf(halfWidths(family, order, x(peak))) - widthOf(measured)
    const { status, x: order } = bracketedRoot(off, least, most, { relativeTolerance: 1e-9 })
    if (status !== 'converged') return []
    return [{ family, order, off: Math.abs(lopsided(halfWidths(family, order, x(peak))) - lopsided(measured)) }]
  })
  const [best] = found.sort((a, b) => a.off - b.off)
  return best === undefined ? null : { family: best.family, order: best.order }
}

const widthOf = ({ below, above }: HalfWidths): number => below + above
const lopsided = ({ below, above }: HalfWidths): number => below / (below + above)

/** Farther than any peak reaches at half height: below it the rate falls as exp(-x). */
const farBelow = 50
const smallestX = 1e-3
/** Stands for a reaction that is over. */
const over = -1e3

function halfWidths(family: PeakOrder['family'], order: number, xPeak: number): HalfWidths {
  const { g, lnF } = family === 'nth-order' ? nthOrder(order, scaledPOfX(xPeak)) : accelerating(order, scaledPOfX(xPeak))
  const lnPeak = lnPOfX(xPeak)
  const half = lnF(g) - xPeak - Math.LN2
  const off = (x: number): number => {
    const value = lnF(g * Math.exp(lnPOfX(x) - lnPeak)) - x - half
    return value > over ? value : over
  }
  return {
    below: bracketedRoot(off, xPeak, xPeak + farBelow).x - xPeak,
    above: xPeak - bracketedRoot(off, smallestX, xPeak).x,
  }
}

/** g at the peak, and ln f of a reaction by its g; NaN where it is over. */
interface ModelAtPeak {
  readonly g: number
  readonly lnF: (g: number) => number
}

function nthOrder(n: number, scaled: number): ModelAtPeak {
  if (Math.abs(n - 1) < 1e-9) return { g: scaled, lnF: (g) => -g }
  // (1 - alpha)^(n - 1) at the peak.
  const left = 1 - ((n - 1) / n) * scaled
  return { g: (1 / left - 1) / (n - 1), lnF: (g) => (-n / (n - 1)) * Math.log1p((n - 1) * g) }
}

function accelerating(p: number, scaled: number): ModelAtPeak {
  // -ln(1 - alpha) at the peak.
  const L = scaled / p + 1 - 1 / p
  return { g: L ** (1 / p), lnF: (g) => -(g ** p) + (p - 1) * Math.log(g) }
}

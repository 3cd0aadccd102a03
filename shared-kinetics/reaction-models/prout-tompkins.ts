import { withinRange, type ReactionModel } from './model.ts'

/**
 * Autocatalysis after Prout and Tompkins, B1: f = alpha (1 - alpha), g = ln[alpha/(1 - alpha)] + C.
 *
 * The rate starts from nothing, so that g counted from alpha = 0 is infinite; here C = 0, which counts it from alpha = 0.5. Only differences of g mean something:
 * it is of no use where g itself is asked for (a line through ln g of one curve, a time from the start).
 *
 * @source prout-tompkins-1944
 */
export const proutTompkins: ReactionModel = withinRange({
  code: 'B1',
  label: 'Autocatalysis, Prout–Tompkins',
  equations: { f: 'alpha (1 - alpha)', g: 'ln[alpha/(1 - alpha)]' },
  f: (alpha) => alpha * (1 - alpha),
  dfDalpha: (alpha) => 1 - 2 * alpha,
  // Close to 0.5 the two logarithms cancel.
  g: (alpha) => (Math.abs(alpha - 0.5) < 0.25 ? Math.log1p((2 * alpha - 1) / (1 - alpha)) : Math.log(alpha) - Math.log1p(-alpha)),
  gZeroAt: 0.5,
  normalisation: 'g is counted from alpha = 0.5: a constant may be added to it.',
  sources: ['prout-tompkins-1944', 'khawam-flanagan-2006', 'ictac-2011'],
})

import { KineticsError } from '../errors.ts'
import { lnInverseRest, withinRange, type ReactionModel } from './model.ts'

/**
 * Reaction of order n, RO(n): f = (1 - alpha)^n, g = [(1 - alpha)^(1 - n) - 1]/(n - 1), and L = -ln(1 - alpha) for n = 1. g of an order below 1 ends at a finite
 * value, above it grows without bound.
 *
 * @param n - order, any finite number
 * @param code - name under which it stands in a table
 * @throws KineticsError `bad-option` where n is not finite
 * @source khawam-flanagan-2006
 */
export function reactionOrder(n: number, code = `RO(${n})`, label = `Reaction order ${n}`): ReactionModel {
  if (!Number.isFinite(n)) throw new KineticsError('bad-option', `A reaction order is a number, not ${n}.`, { n })
  return withinRange({
    code,
    label,
    equations: n === 1 ? { f: '1 - alpha', g: 'L' } : { f: '(1 - alpha)^n', g: '[(1 - alpha)^(1 - n) - 1]/(n - 1)' },
    f: (alpha) => (1 - alpha) ** n,
    dfDalpha: (alpha) => (n === 0 ? 0 : -n * (1 - alpha) ** (n - 1)),
    g: (alpha) => (n === 1 ? lnInverseRest(alpha) : Math.expm1((n - 1) * lnInverseRest(alpha)) / (n - 1)),
    gZeroAt: 0,
    normalisation: n > 1 ? `Some tables carry f divided by ${n - 1} and g multiplied by it: A is then ${n - 1} times as large.` : '',
    sources: ['khawam-flanagan-2006', 'ictac-2011'],
  })
}

import { KineticsError } from '../errors.ts'
import { lnInverseRest, withinRange, type ReactionModel } from './model.ts'

/**
 * Nucleation and growth after Avrami and Erofeev, A(n): f = n (1 - alpha) L^(1 - 1/n), g = L^(1/n), L = -ln(1 - alpha). A(1) is first order.
 *
 * @param n - positive
 * @param code - name under which it stands in a table
 * @throws KineticsError `bad-option` where n is not positive
 * @source avrami-1939
 */
export function avramiErofeev(n: number, code = `A(${n})`, label = `Avrami–Erofeev, n = ${n}`): ReactionModel {
  if (!(n > 0) || !Number.isFinite(n)) throw new KineticsError('bad-option', `An Avrami–Erofeev model needs n > 0, not ${n}.`, { n })
  const power = 1 - 1 / n
  return withinRange({
    code,
    label,
    equations: { f: 'n (1 - alpha) L^(1 - 1/n)', g: 'L^(1/n)' },
    // At alpha = 1, where L is infinite, 1 - alpha wins.
    f: (alpha) => (alpha === 1 ? 0 : n * (1 - alpha) * lnInverseRest(alpha) ** power),
    dfDalpha: (alpha) => {
      const L = lnInverseRest(alpha)
      return n === 1 ? -1 : n * L ** (power - 1) * (power - L)
    },
    g: (alpha) => lnInverseRest(alpha) ** (1 / n),
    gZeroAt: 0,
    normalisation: 'Some tables leave n out of f: A is then n times as large.',
    sources: ['avrami-1939', 'khawam-flanagan-2006', 'ictac-2011'],
  })
}

import { KineticsError } from '../errors.ts'
import { withinRange, type ReactionModel } from './model.ts'

/**
 * Power law P(n), nuclei that grow without hindrance: f = n alpha^(1 - 1/n), g = alpha^(1/n). P(1) is zero order (F0, R1), P(2/3) a power law of slow start, P(1/2)
 * has the f and g of one-dimensional diffusion.
 *
 * @param n - positive
 * @param code - name under which it stands in a table
 * @throws KineticsError `bad-option` where n is not positive
 * @source khawam-flanagan-2006
 */
export function powerLaw(n: number, code = `P(${n})`, label = `Power law, n = ${n}`): ReactionModel {
  if (!(n > 0) || !Number.isFinite(n)) throw new KineticsError('bad-option', `A power law needs n > 0, not ${n}.`, { n })
  return withinRange({
    code,
    label,
    equations: { f: 'n alpha^(1 - 1/n)', g: 'alpha^(1/n)' },
    f: (alpha) => n * alpha ** (1 - 1 / n),
    dfDalpha: (alpha) => (n === 1 ? 0 : (n - 1) * alpha ** (-1 / n)),
    g: (alpha) => alpha ** (1 / n),
    gZeroAt: 0,
    normalisation: '',
    sources: ['khawam-flanagan-2006', 'ictac-2011'],
  })
}

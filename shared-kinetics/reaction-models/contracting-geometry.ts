import { KineticsError } from '../errors.ts'
import { restPowerFromOne, withinRange, type ReactionModel } from './model.ts'

/**
 * An interface that moves inward at constant speed, R(n): f = n (1 - alpha)^(1 - 1/n), g = 1 - (1 - alpha)^(1/n); n = 2 for a cylinder or disk, 3 for a sphere or cube.
 *
 * @param n - positive
 * @param code - name under which it stands in a table
 * @throws KineticsError `bad-option` where n is not positive
 * @source khawam-flanagan-2006
 */
export function contractingGeometry(n: number, code = `R(${n})`, label = `Contracting geometry, n = ${n}`): ReactionModel {
  if (!(n > 0) || !Number.isFinite(n)) throw new KineticsError('bad-option', `A contracting geometry needs n > 0, not ${n}.`, { n })
  return withinRange({
    code,
    label,
    equations: { f: 'n (1 - alpha)^(1 - 1/n)', g: '1 - (1 - alpha)^(1/n)' },
    f: (alpha) => n * (1 - alpha) ** (1 - 1 / n),
    dfDalpha: (alpha) => (n === 1 ? 0 : -(n - 1) * (1 - alpha) ** (-1 / n)),
    g: (alpha) => restPowerFromOne(alpha, 1 / n),
    gZeroAt: 0,
    normalisation: 'Written as a reaction of order 1 - 1/n, f lacks the factor n: A is then n times as large.',
    sources: ['khawam-flanagan-2006', 'ictac-2011'],
  })
}

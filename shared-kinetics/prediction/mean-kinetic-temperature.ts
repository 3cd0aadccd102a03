import { KineticsError } from '../errors.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity, type Quantity } from '../units/quantity.ts'

/** Ea by the convention of USP <1160> where no better is known, 83.144 kJ/mol: such that Ea/R is 10,000 K. */
export const conventionalEnergy: Quantity<'J/mol'> = quantity(10_000 * gasConstant_J_per_mol_K, 'J/mol')

/**
 * Mean kinetic temperature: the constant temperature that does as much to a product as the recorded ones,
 *
 *   T_K = (Ea/R)/(-ln[Σ w_i exp(-Ea/(R T_i))/Σ w_i])
 *
 * It lies above the plain mean, the more the wider the temperatures spread. By convention one uses averages over equal times, at least twelve a year, and
 * Ea = 83.144 kJ/mol. Not for frozen goods, nor across a change of phase or of mechanism.
 *
 * A calculated value is an estimate for planning: it does not excuse a temperature outside the labelled range, and does not replace stability tests; codes and the
 * judgement of licensed or otherwise competent people come first.
 *
 * @param temperature_K - one or more, each standing for its share of the time
 * @param Ea - positive
 * @param weights - time that each stands for, in any unit; equal where left out
 * @throws KineticsError `bad-option` where there are no temperatures, Ea is not positive or no weight is; `not-finite` where a temperature is not a positive number or
 * a weight is negative; `column-length`
 * @source usp-1160
 * @source haynes-1971
 */
export function meanKineticTemperature(
  temperature_K: ArrayLike<number>,
  Ea: Quantity<'J/mol'> = conventionalEnergy,
  weights?: ArrayLike<number>,
): Quantity<'K'> {
  const n = temperature_K.length
  if (n === 0) throw new KineticsError('bad-option', 'A mean kinetic temperature needs at least one temperature.')
  if (!(Ea > 0) || !Number.isFinite(Ea)) {
    throw new KineticsError('bad-option', `A mean kinetic temperature needs a positive Ea, not ${Ea} J/mol.`, { Ea })
  }
  if (weights !== undefined && weights.length !== n) {
    throw new KineticsError('column-length', `There are ${n} temperatures and ${weights.length} weights.`, {
      temperatures: n,
      weights: weights.length,
    })
  }
  let hottest = 0
  for (let i = 0; i < n; i++) {
    const T = temperature_K[i] ?? Number.NaN
    if (!(T > 0) || !Number.isFinite(T))
      throw new KineticsError('not-finite', `Temperature ${i + 1} is not a temperature in K: ${T}.`, { row: i })
    hottest = Math.max(hottest, T)
  }
  const energyOverR = Ea / gasConstant_J_per_mol_K
  // Against the hottest one, so that no exponential underflows: 1/T_K = 1/T_hottest - ln(mean of exp(…))·R/Ea.
  let sum = 0
  let total = 0
  for (let i = 0; i < n; i++) {
    const weight = weights === undefined ? 1 : (weights[i] ?? Number.NaN)
    if (!(weight >= 0) || !Number.isFinite(weight))
      throw new KineticsError('not-finite', `Weight ${i + 1} is not a length of time: ${weight}.`, { row: i })
    const T = temperature_K[i] ?? Number.NaN
    sum += weight * Math.exp(energyOverR * (1 / hottest - 1 / T))
    total += weight
  }
  if (!(total > 0)) throw new KineticsError('bad-option', 'A mean kinetic temperature needs a weight above zero.')
  return quantity(1 / (1 / hottest - Math.log(sum / total) / energyOverR), 'K')
}

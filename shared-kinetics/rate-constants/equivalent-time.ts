import { KineticsError } from '../errors.ts'
import { quantity, type Quantity } from '../units/quantity.ts'
import { energyFromRatio, type EnergyFromRatio } from './energy-from-ratio.ts'
import { rateRatio } from './rate-ratio.ts'

/**
 * Ea from two times that do the same at two temperatures ("30 min at 63 °C equals 15 s at 74 °C"). A given extent of reaction is reached when k t has a given
 * value, so k₂/k₁ = t₁/t₂, whatever the reaction model is, as long as it is one and the same.
 *
 * @param time - s, or any other unit as long as both times have it
 * @throws KineticsError `not-finite`
 * @source levenspiel-1999
 */
export function energyFromEquivalentTimes(
  one: { readonly time: number; readonly temperature: Quantity<'K'> },
  other: { readonly time: number; readonly temperature: Quantity<'K'> },
): EnergyFromRatio {
  for (const { time } of [one, other]) {
    if (!(time > 0)) throw new KineticsError('not-finite', `A time must be a number above 0, and is ${time}.`, {})
  }
  return energyFromRatio(one.time / other.time, one.temperature, other.temperature)
}

/** Time at `to` that does what `time` does at `from`: t₂ = t₁ k(T₁)/k(T₂). */
export const equivalentTime = (time: Quantity<'s'>, from: Quantity<'K'>, to: Quantity<'K'>, Ea: Quantity<'J/mol'>): Quantity<'s'> =>
  quantity(time / rateRatio(Ea, from, to), 's')

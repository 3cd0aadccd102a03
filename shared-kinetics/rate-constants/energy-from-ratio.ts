import { KineticsError } from '../errors.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity, type Quantity } from '../units/quantity.ts'
import { isSameTemperature } from './rate-constant-point.ts'

export interface EnergyFromRatio {
  readonly status: 'ok' | 'temperatures-not-distinct'
  readonly Ea: Quantity<'J/mol'>
}

/**
 * Ea from how many times faster a reaction is at `to` than at `from`: Ea = R ln(ratio)/(1/T₁ - 1/T₂). The rate constants themselves are not needed, so neither
 * is their unit; a reaction rate at the same conversion does as well.
 *
 * @param ratio - k(to)/k(from), above 0; "doubles from 25 to 35 °C" is 2
 * @throws KineticsError `not-finite` where the ratio or a temperature is not a finite number above 0
 * @source arrhenius-1889
 */
export function energyFromRatio(ratio: number, from: Quantity<'K'>, to: Quantity<'K'>): EnergyFromRatio {
  for (const [what, value] of [
    ['ratio of rate constants', ratio],
    ['first temperature', from],
    ['second temperature', to],
  ] as const) {
    if (!(value > 0) || !Number.isFinite(value))
      throw new KineticsError('not-finite', `The ${what} must be a number above 0, and is ${value}.`, {})
  }
  return energyFromLnRatio(Math.log(ratio), from, to)
}

/** The same from ln of the ratio, which is there where the ratio itself leaves double precision; temperatures above 0. */
export function energyFromLnRatio(lnRatio: number, from: Quantity<'K'>, to: Quantity<'K'>): EnergyFromRatio {
  if (isSameTemperature(from, to)) return { status: 'temperatures-not-distinct', Ea: quantity(Number.NaN, 'J/mol') }
  // (T₂ - T₁)/(T₁ T₂) instead of 1/T₁ - 1/T₂: close temperatures lose no digits.
  return { status: 'ok', Ea: quantity((gasConstant_J_per_mol_K * lnRatio * from * to) / (to - from), 'J/mol') }
}

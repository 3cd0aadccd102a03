import { quantity, type Quantity } from '../units/quantity.ts'
import { rateRatio } from './rate-ratio.ts'

/**
 * Factor per 10 K (Q10): k(T + 10 K)/k(T). It falls with temperature, so one number without its temperature says little; the way back, Ea from a factor between
 * two temperatures, is `energyFromRatio`.
 *
 * @param from - the colder of the two temperatures: 298.15 K gives the factor from 25 to 35 °C
 * @source arrhenius-1889
 */
export const factorPer10K = (Ea: Quantity<'J/mol'>, from: Quantity<'K'>): number => rateRatio(Ea, from, quantity(from + 10, 'K'))

import { KineticsError } from '../errors.ts'
import type { Quantity } from '../units/quantity.ts'

/** One measured rate constant. Its unit is that of the whole table, whatever it is; A then has the same one. */
export interface RateConstantPoint {
  readonly temperature: Quantity<'K'>
  readonly rateConstant: number
  /** One standard uncertainty of k, in the unit of k; left out where nobody stated one. */
  readonly standardUncertainty?: number
}

/**
 * Refuses what has no logarithm: the message names the row, counted from 1.
 * @throws KineticsError `not-finite` where a temperature or a rate constant is not a finite number above 0, or a stated uncertainty is not one
 */
export function checkRateConstants(points: readonly RateConstantPoint[]): void {
  points.forEach(({ temperature, rateConstant, standardUncertainty }, i) => {
    const refuse = (what: string, value: number): KineticsError =>
      new KineticsError('not-finite', `Row ${i + 1}: ${what} must be a number above 0, and is ${value}. Mend or leave out this row.`, {
        row: i + 1,
        value: Number.isFinite(value) ? value : null,
      })
    if (!isPositive(temperature)) throw refuse('the temperature in kelvin', temperature)
    if (!isPositive(rateConstant)) throw refuse('the rate constant', rateConstant)
    if (standardUncertainty !== undefined && !isPositive(standardUncertainty))
      throw refuse('the uncertainty of the rate constant', standardUncertainty)
  })
}

const isPositive = (value: number): boolean => value > 0 && Number.isFinite(value)

/** Temperatures within a hundredth of a kelvin are one: replicates are set to the same temperature, not measured at it. */
export const isSameTemperature = (one: number, other: number): boolean => Math.abs(other - one) <= 0.01

/** How many there are, with replicates counted once. */
export function distinctTemperatures(points: readonly RateConstantPoint[]): number {
  const ascending = points.map((point) => point.temperature).toSorted((a, b) => a - b)
  let count = 0
  let last = Number.NEGATIVE_INFINITY
  for (const temperature of ascending) {
    if (isSameTemperature(last, temperature)) continue
    count += 1
    last = temperature
  }
  return count
}

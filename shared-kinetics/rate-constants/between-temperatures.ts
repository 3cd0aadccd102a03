import { quantity, type Quantity } from '../units/quantity.ts'
import { checkRateConstants, isSameTemperature, type RateConstantPoint } from './rate-constant-point.ts'
import { twoTemperatures } from './two-temperatures.ts'

/** Ea and ln A (A in the unit of k) of two neighbouring temperatures, the colder one first. */
export interface BetweenTemperatures {
  readonly from: Quantity<'K'>
  readonly to: Quantity<'K'>
  readonly Ea: Quantity<'J/mol'>
  readonly lnA: number
}

/**
 * Ea from each temperature to the next hotter one, by the two-temperature form: a local check on the line through all. Where one mechanism goes on, they scatter
 * about its Ea; a steady rise or fall is a bend, a high one beside a low one a single k or T that is off. Replicates at one temperature enter as the mean of
 * their ln k. There is no interval: two temperatures leave nothing to judge by, and the nearer they are the more an error of k counts.
 *
 * @param points - in any order; temperatures in K, all k in one unit
 * @returns one fewer than there are distinct temperatures
 * @throws KineticsError `not-finite`, naming the row, where k or T is not above 0
 * @source arrhenius-1889
 */
export function betweenTemperatures(points: readonly RateConstantPoint[]): readonly BetweenTemperatures[] {
  checkRateConstants(points)
  const groups: RateConstantPoint[][] = []
  for (const point of points.toSorted((a, b) => a.temperature - b.temperature)) {
    const group = groups.at(-1)
    if (group?.[0] !== undefined && isSameTemperature(group[0].temperature, point.temperature)) group.push(point)
    else groups.push([point])
  }
  const means = groups.map(meanOf)
  return means.slice(1).flatMap((to, i) => {
    const from = means[i] ?? to
    const { status, Ea, lnA } = twoTemperatures(from, to)
    return status === 'ok' ? [{ from: from.temperature, to: to.temperature, Ea, lnA }] : []
  })
}

/** Both on the scales of the line, 1/T and ln k. */
function meanOf(group: readonly RateConstantPoint[]): RateConstantPoint {
  const [only] = group
  if (only !== undefined && group.length === 1) return only
  const mean = (of: (point: RateConstantPoint) => number): number => group.reduce((sum, point) => sum + of(point), 0) / group.length
  return {
    temperature: quantity(1 / mean((point) => 1 / point.temperature), 'K'),
    rateConstant: Math.exp(mean((point) => Math.log(point.rateConstant))),
  }
}

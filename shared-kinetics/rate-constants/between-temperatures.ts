import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity, type Quantity } from '../units/quantity.ts'
import { checkRateConstants, isSameTemperature, type RateConstantPoint } from './rate-constant-point.ts'
import { twoTemperatures } from './two-temperatures.ts'

/** Ea and ln A (A in the unit of k) of two neighbouring temperatures, the colder one first. */
export interface BetweenTemperatures {
  readonly from: Quantity<'K'>
  readonly to: Quantity<'K'>
  readonly Ea: Quantity<'J/mol'>
  readonly lnA: number
  /** One standard uncertainty, from the stated ones of k; NaN unless each row of both temperatures has one. */
  readonly standardUncertainty: Quantity<'J/mol'>
  readonly lnAStandardUncertainty: number
}

/**
 * Ea from each temperature to the next hotter one, by the two-temperature form: a local check on the line through all. Where one mechanism goes on, they scatter
 * about its Ea; a steady rise or fall is a bend, a high one beside a low one a single k or T that is off. Replicates at one temperature enter as the mean of
 * their ln k. Two temperatures leave no scatter to judge by, and the nearer they are the more an error of k counts; stated standard uncertainties of k are carried over,
 * independent of each other, with x = 1/T and u = u(k)/k (of a mean of replicates √Σu²/n):
 *
 *   u(Ea) = R √(u₁² + u₂²)/|x₁ - x₂|,   u(ln A) = √(x₂² u₁² + x₁² u₂²)/|x₁ - x₂|
 *
 * @param points - in any order; temperatures in K, all k in one unit
 * @returns one fewer than there are distinct temperatures
 * @throws KineticsError `not-finite`, naming the row, where k or T is not above 0
 * @source arrhenius-1889
 * @source jcgm-100-2008
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
    if (status !== 'ok') return []
    const [x1, x2] = [1 / from.temperature, 1 / to.temperature]
    const [u1, u2] = [relativeUncertainty(from), relativeUncertainty(to)]
    return [
      {
        from: from.temperature,
        to: to.temperature,
        Ea,
        lnA,
        standardUncertainty: quantity((gasConstant_J_per_mol_K * Math.hypot(u1, u2)) / Math.abs(x1 - x2), 'J/mol'),
        lnAStandardUncertainty: Math.hypot(x2 * u1, x1 * u2) / Math.abs(x1 - x2),
      },
    ]
  })
}

/** Both on the scales of the line, 1/T and ln k. */
function meanOf(group: readonly RateConstantPoint[]): RateConstantPoint {
  const [only] = group
  if (only !== undefined && group.length === 1) return only
  const mean = (of: (point: RateConstantPoint) => number): number => group.reduce((sum, point) => sum + of(point), 0) / group.length
  const rateConstant = Math.exp(mean((point) => Math.log(point.rateConstant)))
  const ofMean = Math.sqrt(group.reduce((sum, point) => sum + relativeUncertainty(point) ** 2, 0)) / group.length
  return {
    temperature: quantity(1 / mean((point) => 1 / point.temperature), 'K'),
    rateConstant,
    ...(Number.isNaN(ofMean) ? {} : { standardUncertainty: ofMean * rateConstant }),
  }
}

const relativeUncertainty = ({ rateConstant, standardUncertainty }: RateConstantPoint): number =>
  (standardUncertainty ?? Number.NaN) / rateConstant

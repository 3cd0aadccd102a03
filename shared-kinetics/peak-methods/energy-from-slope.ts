import { bracketedRoot } from '../numerics/root.ts'
import { scaledPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'

/** Smallest Ea/(RT) that is looked for; reactions have 5 and more. */
const smallestX = 0.01

/**
 * Ea from the slope of ln beta against 1/T at one conversion, without Doyle's straight line for ln p(x): the root of
 *
 *   Ea h(Ea/(R T)) = -R slope,   h(x) = -d ln p/dx = 1/π(x), between 1 and 1.2 for x above 10,
 *
 * where iteration (h from Ea, Ea from h, and so on) ends. The slope is a chord over some 50 K and T stands for its middle.
 *
 * @param steepness_K - the slope with its sign turned, in K
 * @returns Ea in J/mol, h, and dEa/dsteepness in J/(mol K); null where no positive Ea has such a slope
 */
export function energyFromSlope(
  steepness_K: number,
  temperature_K: number,
): { readonly Ea: number; readonly h: number; readonly EaBySteepness: number } | null {
  const ratio = steepness_K / temperature_K
  const off = (x: number): number => x / scaledPOfX(x) - ratio
  if (!(off(smallestX) < 0)) return null
  const { status, x } = bracketedRoot(off, smallestX, ratio)
  if (status !== 'converged') return null
  const h = 1 / scaledPOfX(x)
  const slopeOfH = h * (h - 1 - 2 / x)
  return {
    Ea: gasConstant_J_per_mol_K * temperature_K * x,
    h,
    EaBySteepness: gasConstant_J_per_mol_K / (h + x * slopeOfH),
  }
}

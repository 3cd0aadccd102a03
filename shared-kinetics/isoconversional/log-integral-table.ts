import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { largestEa, smallestEa } from './energy-grid.ts'
import type { TimeIntegral } from './time-integral.ts'

/** Exact values at one Ea, one entry a run. */
export interface IntegralsAt {
  readonly Ea: number
  readonly lnJ: Float64Array
  readonly inverseT: Float64Array
}

/** The cubic through exact values and slopes at two Ea, and its slope: what lies between. */
export function cubicBetween(lower: IntegralsAt, upper: IntegralsAt, Ea: number, lnJ: Float64Array, inverseT: Float64Array): void {
  const width = upper.Ea - lower.Ea
  const s = (Ea - lower.Ea) / width
  const perKelvin = width / gasConstant_J_per_mol_K
  for (let i = 0; i < lnJ.length; i++) {
    const y0 = lower.lnJ[i] as number
    const rise = (upper.lnJ[i] as number) - y0
    const m0 = -perKelvin * (lower.inverseT[i] as number)
    const m1 = -perKelvin * (upper.inverseT[i] as number)
    const c2 = 3 * rise - 2 * m0 - m1
    const c3 = m0 + m1 - 2 * rise
    lnJ[i] = y0 + s * (m0 + s * (c2 + s * c3))
    inverseT[i] = -(m0 + s * (2 * c2 + 3 * s * c3)) / perKelvin
  }
}

/** Places are 2 % of Ea apart. */
const lnStep = Math.log(1.02)

/**
 * ln J and the effective 1/T of every run at one level for any Ea between 1 and 1000 kJ/mol, by the cubic through exact values and slopes at places 2 % apart, which are worked
 * out where they are first asked for: within 1e-8 of ln J on a ramp, and 1e-6 of the effective 1/T. A resample then costs no integral.
 */
export function logIntegralTable(
  integrals: readonly TimeIntegral[],
  level: number,
): (Ea: number, lnJ: Float64Array, inverseT: Float64Array) => void {
  const places = new Map<number, IntegralsAt>()
  const placeAt = (k: number): IntegralsAt => {
    const known = places.get(k)
    if (known !== undefined) return known
    const Ea = smallestEa * Math.exp(k * lnStep)
    const values = integrals.map((integral) => integral.atLevel(Ea, level))
    const made = {
      Ea,
      lnJ: Float64Array.from(values, (value) => value.lnJ),
      inverseT: Float64Array.from(values, (value) => value.inverseT),
    }
    places.set(k, made)
    return made
  }
  return (Ea, lnJ, inverseT) => {
    const k = Math.floor(Math.log(Math.min(largestEa, Math.max(smallestEa, Ea)) / smallestEa) / lnStep)
    cubicBetween(placeAt(k), placeAt(k + 1), Ea, lnJ, inverseT)
  }
}

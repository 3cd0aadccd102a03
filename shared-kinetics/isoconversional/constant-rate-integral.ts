import { scaledPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { Column, Quantity } from '../units/quantity.ts'
import type { IntegralValue, TimeIntegral } from './time-integral.ts'

/**
 * J(Ea) = (Ea/(R beta)) p(Ea/(R T)): the integral of exp(-Ea/RT) dt under a constant heating rate beta in K/s from T = 0 to the temperature of each level. What lies
 * below the start of a measured ramp is part of it, and does not count where the reaction starts above that.
 */
export function constantRateIntegral(heatingRate: Quantity<'K/s'>, temperature_K: Column<'K'>): TimeIntegral {
  const lnRate = Math.log(heatingRate)
  const reaches = (level: number): boolean => (temperature_K[level] ?? 0) > 0
  const atLevel = (Ea: number, level: number): IntegralValue => {
    const T = temperature_K[level] ?? Number.NaN
    const scaled = scaledPOfX(Ea / (gasConstant_J_per_mol_K * T))
    // (E/(R beta)) p(x) = (T/beta) e⁻ˣ π(x)/x, and its logarithm's slope is (1/E - 1/(π R T)).
    const thermal = gasConstant_J_per_mol_K * T
    return { lnJ: Math.log((T * thermal * scaled) / Ea) - lnRate - Ea / thermal, inverseT: 1 / (scaled * T) - gasConstant_J_per_mol_K / Ea }
  }
  return {
    reaches,
    atLevel,
    passes: (level) => [0, temperature_K[level] ?? Number.NaN],
    atAllLevels(Ea, lnJ, inverseT) {
      // What `atLevel` gives, without an object for each level.
      const perEa = gasConstant_J_per_mol_K / Ea
      for (let level = 0; level < temperature_K.length; level++) {
        const T = temperature_K[level] as number
        if (!(T > 0)) continue
        const thermal = gasConstant_J_per_mol_K * T
        const scaled = scaledPOfX(Ea / thermal)
        lnJ[level] = Math.log((T * thermal * scaled) / Ea) - lnRate - Ea / thermal
        inverseT[level] = 1 / (scaled * T) - perEa
      }
    },
  }
}

import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { TaskContext } from './result.ts'
import type { TimeIntegral } from './time-integral.ts'

/** Range of Ea in J/mol that is searched: 1 to 1000 kJ/mol, beyond any reaction that thermal analysis measures. */
export const smallestEa = 1_000
export const largestEa = 1_000_000

/** Steps of 10 %. */
const steps = 72

const stepsPerLog = steps / Math.log(largestEa / smallestEa)

/** Grid of Ea in J/mol, evenly spaced in its logarithm, ends exact. */
export const energies: Float64Array = Float64Array.from({ length: steps + 1 }, (_, g) =>
  g === steps ? largestEa : smallestEa * (largestEa / smallestEa) ** (g / steps),
)

/** ln J and effective 1/T of every run at every level over the grid. */
export interface EnergyGrid {
  /** Exact values at grid point g, written into one entry a run. */
  readonly read: (g: number, level: number, lnJ: Float64Array, inverseT: Float64Array) => void
  /**
   * ln J at any Ea of the range by the cubic through values and slopes of the two grid points around it: within about 3e-6 for a ramp, where most of that is the same
   * for all runs and cancels in Phi, and the effective 1/T that is the cubic's slope. For drawing and to start a search from, never for a result.
   */
  readonly between: (Ea: number, level: number, lnJ: Float64Array, inverseT?: Float64Array) => void
}

/** One pass over each run for each grid point serves all levels. */
export function energyGrid(integrals: readonly TimeIntegral[], levels: number, context: TaskContext): EnergyGrid {
  const rows = integrals.map((integral) => {
    // One row of levels after the other, one row a grid point.
    const row = { lnJ: new Float64Array(energies.length * levels), inverseT: new Float64Array(energies.length * levels) }
    energies.forEach((Ea, g) => {
      context.checkCancelled()
      const [from, to] = [g * levels, (g + 1) * levels]
      integral.atAllLevels(Ea, row.lnJ.subarray(from, to), row.inverseT.subarray(from, to))
    })
    return row
  })
  return {
    read(g, level, lnJ, inverseT) {
      for (let i = 0; i < rows.length; i++) {
        const row = rows[i] as (typeof rows)[number]
        lnJ[i] = row.lnJ[g * levels + level] as number
        inverseT[i] = row.inverseT[g * levels + level] as number
      }
    },
    between(Ea, level, lnJ, inverseT) {
      const place = stepsPerLog * Math.log(Ea / smallestEa)
      const g = Math.min(steps - 1, Math.max(0, Math.floor(place)))
      const lower = energies[g] as number
      const width = (energies[g + 1] as number) - lower
      const s = (Ea - lower) / width
      const a = g * levels + level
      const b = a + levels
      for (let i = 0; i < rows.length; i++) {
        const row = rows[i] as (typeof rows)[number]
        const y0 = row.lnJ[a] as number
        const rise = (row.lnJ[b] as number) - y0
        const m0 = (-width * (row.inverseT[a] as number)) / gasConstant_J_per_mol_K
        const m1 = (-width * (row.inverseT[b] as number)) / gasConstant_J_per_mol_K
        const c2 = 3 * rise - 2 * m0 - m1
        const c3 = m0 + m1 - 2 * rise
        lnJ[i] = y0 + s * (m0 + s * (c2 + s * c3))
        if (inverseT !== undefined) inverseT[i] = (-gasConstant_J_per_mol_K * (m0 + s * (2 * c2 + 3 * s * c3))) / width
      }
    },
  }
}

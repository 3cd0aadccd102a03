import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { TaskContext } from './result.ts'
import type { TimeIntegral } from './time-integral.ts'

/** Range of Ea in J/mol that is searched: 1 to 1000 kJ/mol, beyond any reaction that thermal analysis measures. */
export const smallestEa = 1_000
export const largestEa = 1_000_000

/** Steps of 10 %. */
const steps = 72

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
   * for all runs and cancels in Phi. For drawing, never for a result.
   */
  readonly between: (Ea: number, level: number, lnJ: Float64Array) => void
}

/** One pass over each run for each grid point serves all levels. */
export function energyGrid(integrals: readonly TimeIntegral[], levels: number, context: TaskContext): EnergyGrid {
  const rows = integrals.map((integral) =>
    Array.from(energies, (Ea) => {
      context.checkCancelled()
      const row = { lnJ: new Float64Array(levels).fill(Number.NaN), inverseT: new Float64Array(levels).fill(Number.NaN) }
      integral.atAllLevels(Ea, row.lnJ, row.inverseT)
      return row
    }),
  )
  return {
    read(g, level, lnJ, inverseT) {
      rows.forEach((ofRun, i) => {
        lnJ[i] = ofRun[g]?.lnJ[level] ?? Number.NaN
        inverseT[i] = ofRun[g]?.inverseT[level] ?? Number.NaN
      })
    },
    between(Ea, level, lnJ) {
      const place = (steps * Math.log(Ea / smallestEa)) / Math.log(largestEa / smallestEa)
      const g = Math.min(steps - 1, Math.max(0, Math.floor(place)))
      const lower = energies[g] as number
      const width = (energies[g + 1] as number) - lower
      const s = (Ea - lower) / width
      rows.forEach((ofRun, i) => {
        const a = ofRun[g] as (typeof ofRun)[number]
        const b = ofRun[g + 1] as (typeof ofRun)[number]
        const [y0, y1] = [a.lnJ[level] as number, b.lnJ[level] as number]
        const m0 = (-width * (a.inverseT[level] as number)) / gasConstant_J_per_mol_K
        const m1 = (-width * (b.inverseT[level] as number)) / gasConstant_J_per_mol_K
        lnJ[i] = y0 + s * (m0 + s * (3 * (y1 - y0) - 2 * m0 - m1 + s * (2 * (y0 - y1) + m0 + m1)))
      })
    },
  }
}

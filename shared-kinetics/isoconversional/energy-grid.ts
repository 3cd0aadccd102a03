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

/** The grid point at or next below an Ea. */
export const gridPointBelow = (Ea: number): number => Math.min(steps - 1, Math.max(0, Math.floor(stepsPerLog * Math.log(Ea / smallestEa))))

/** ln J and effective 1/T of every run at every level over the grid: one column a run, one row of levels after the other, one row a grid point. Read by the functions below. */
export interface EnergyGrid {
  readonly levels: number
  readonly lnJ: readonly Float64Array[]
  readonly inverseT: readonly Float64Array[]
}

/** One pass over each run for each grid point serves all levels. */
export function energyGrid(integrals: readonly TimeIntegral[], levels: number, context: TaskContext): EnergyGrid {
  const column = (): Float64Array => new Float64Array(energies.length * levels)
  const grid = { levels, lnJ: integrals.map(column), inverseT: integrals.map(column) }
  integrals.forEach((integral, i) => {
    for (let g = 0; g < energies.length; g++) {
      context.checkCancelled()
      const [from, to] = [g * levels, (g + 1) * levels]
      integral.atAllLevels(
        energies[g] as number,
        (grid.lnJ[i] as Float64Array).subarray(from, to),
        (grid.inverseT[i] as Float64Array).subarray(from, to),
      )
    }
  })
  return grid
}

/** Exact values at grid point g, written into one entry a run. */
export function readGrid(grid: EnergyGrid, g: number, level: number, lnJ: Float64Array, inverseT: Float64Array): void {
  const place = g * grid.levels + level
  for (let i = 0; i < lnJ.length; i++) {
    lnJ[i] = (grid.lnJ[i] as Float64Array)[place] as number
    inverseT[i] = (grid.inverseT[i] as Float64Array)[place] as number
  }
}

/**
 * ln J at any Ea of the range by the cubic through values and slopes of the two grid points around it: within about 3e-6 for a ramp, where most of that is the same
 * for all runs and cancels in Phi, and the effective 1/T that is the cubic's slope. For drawing and to start a search from, never for a result.
 */
export function readBetween(grid: EnergyGrid, Ea: number, level: number, lnJ: Float64Array, inverseT: Float64Array): void {
  const g = gridPointBelow(Ea)
  const lower = energies[g] as number
  const width = (energies[g + 1] as number) - lower
  const s = (Ea - lower) / width
  const a = g * grid.levels + level
  const b = a + grid.levels
  const perKelvin = width / gasConstant_J_per_mol_K
  for (let i = 0; i < lnJ.length; i++) {
    const values = grid.lnJ[i] as Float64Array
    const slopes = grid.inverseT[i] as Float64Array
    const y0 = values[a] as number
    const rise = (values[b] as number) - y0
    const m0 = -perKelvin * (slopes[a] as number)
    const m1 = -perKelvin * (slopes[b] as number)
    const c2 = 3 * rise - 2 * m0 - m1
    const c3 = m0 + m1 - 2 * rise
    lnJ[i] = y0 + s * (m0 + s * (c2 + s * c3))
    inverseT[i] = -(m0 + s * (2 * c2 + 3 * s * c3)) / perKelvin
  }
}

import { energies, readGrid, type EnergyGrid } from './energy-grid.ts'
import { phi, phiSlope } from './phi.ts'
import type { TimeIntegral } from './time-integral.ts'

/** dPhi/dEa over the grid of Ea at one level. */
export interface SlopeScan {
  /** A number of the sign of dPhi/dEa at each grid point. */
  readonly signs: Float64Array
  /** dPhi/dEa up to a positive factor, and Phi, at grid point g. */
  readonly slopeAt: (g: number) => number
  readonly phiAt: (g: number) => number
}

/** Effective temperatures that differ by less than this share are one temperature. */
export const sameTemperature = 1e-9

/** ln J that differ by less are told apart by the slope itself. */
const clearlyApart = 1e-6

/**
 * The scan from J at every grid point, for any integrals; null where the effective temperatures are one temperature throughout. Where the runs stand in one order by
 * ln J and by the effective 1/T, or in opposite orders, every term of dPhi/dEa has the same sign, and no exponential is needed to tell it: so it is away from the minima.
 */
export function scanOverGrid(grid: EnergyGrid, level: number, runs: number): SlopeScan | null {
  const lnJ = new Float64Array(runs)
  const inverseT = new Float64Array(runs)
  const signs = new Float64Array(energies.length)
  let alike = true
  for (let g = 0; g < energies.length; g++) {
    readGrid(grid, g, level, lnJ, inverseT)
    sortTogether(inverseT, lnJ)
    const coolest = inverseT[runs - 1] as number
    const hottest = inverseT[0] as number
    alike &&= (coolest - hottest) / coolest < sameTemperature
    const order = coolest > hottest ? orderOf(lnJ) : 0
    signs[g] = order === 0 ? phiSlope(lnJ, inverseT) : -order
  }
  if (alike) return null
  const read = (g: number): void => readGrid(grid, g, level, lnJ, inverseT)
  return {
    signs,
    slopeAt: (g) => {
      read(g)
      return phiSlope(lnJ, inverseT)
    },
    phiAt: (g) => {
      read(g)
      return phi(lnJ)
    },
  }
}

/**
 * The same from J at a few grid points, for runs that each pass a range of temperatures at one heating rate (`passes`), both ends of it in one order from run to run; null
 * for others. A hotter range has the smaller effective 1/T whatever Ea is, and d(ln Jᵢ - ln Jⱼ)/dEa = (uⱼ - uᵢ)/R: the differences of ln J change one way only. So where
 * the runs once stand in the order of their 1/T they do so for every smaller Ea, and where in the opposite order, for every larger one; only between must the slope
 * itself be worked out.
 *
 * @param near - grid point at which the minimum is expected
 */
export function scanInOrder(integrals: readonly TimeIntegral[], level: number, near: number): SlopeScan | null {
  const inOrder = hottestFirst(integrals, level)
  if (inOrder === null) return null
  const n = inOrder.length
  const last = energies.length - 1
  const known = new Map<number, { readonly lnJ: Float64Array; readonly inverseT: Float64Array; readonly order: number }>()
  const at = (g: number) => {
    const before = known.get(g)
    if (before !== undefined) return before
    const lnJ = new Float64Array(n)
    const inverseT = new Float64Array(n)
    for (let i = 0; i < n; i++) {
      const value = (inOrder[i] as TimeIntegral).atLevel(energies[g] as number, level)
      lnJ[i] = value.lnJ
      inverseT[i] = value.inverseT
    }
    const made = { lnJ, inverseT, order: orderOf(lnJ) }
    known.set(g, made)
    return made
  }
  /** The largest g of which `holds` is true, -1 where there is none; it is true up to somewhere and false from there on. */
  const lastOf = (holds: (g: number) => boolean): number => {
    let yes = -1
    let no = last + 1
    for (const probe of [near - 1, near + 2]) {
      if (probe <= yes || probe >= no) continue
      if (holds(probe)) yes = probe
      else no = probe
    }
    while (no - yes > 1) {
      const middle = (yes + no) >> 1
      if (holds(middle)) yes = middle
      else no = middle
    }
    return yes
  }
  const below = lastOf((g) => at(g).order === 1)
  const above = lastOf((g) => at(g).order !== -1) + 1
  const slopeAt = (g: number): number => phiSlope(at(g).lnJ, at(g).inverseT)
  const signs = new Float64Array(last + 1)
  for (let g = 0; g <= last; g++) signs[g] = g <= below ? -1 : g >= above ? 1 : slopeAt(g)
  return { signs, slopeAt, phiAt: (g) => phi(at(g).lnJ) }
}

/** The integrals by the temperatures they pass, hottest first; null where these are not known, two of them are one, or their two ends stand in different orders. */
function hottestFirst(integrals: readonly TimeIntegral[], level: number): TimeIntegral[] | null {
  const passed: { readonly integral: TimeIntegral; readonly from: number; readonly to: number }[] = []
  for (const integral of integrals) {
    const range = integral.passes?.(level)
    if (range === undefined) return null
    passed.push({ integral, from: Math.min(...range), to: Math.max(...range) })
  }
  passed.sort((a, b) => b.to - a.to)
  for (let i = 1; i < passed.length; i++) {
    const [hotter, cooler] = [passed[i - 1] as (typeof passed)[number], passed[i] as (typeof passed)[number]]
    if (!(hotter.to - cooler.to > sameTemperature * hotter.to) || !(hotter.from >= cooler.from)) return null
  }
  return passed.map(({ integral }) => integral)
}

/** 1 where the values ascend, -1 where they descend, 0 where they do neither or lie too close to tell. */
function orderOf(values: Float64Array): number {
  const first = values[0] as number
  const last = values[values.length - 1] as number
  if (Math.abs(last - first) <= clearlyApart) return 0
  const order = last > first ? 1 : -1
  for (let i = 1; i < values.length; i++) if (((values[i] as number) - (values[i - 1] as number)) * order < 0) return 0
  return order
}

/** Sorts the first column in ascending order, and the other with it. Few runs, nearly always in order already. */
function sortTogether(keys: Float64Array, values: Float64Array): void {
  for (let i = 1; i < keys.length; i++) {
    const key = keys[i] as number
    const value = values[i] as number
    let to = i
    for (; to > 0 && (keys[to - 1] as number) > key; to--) {
      keys[to] = keys[to - 1] as number
      values[to] = values[to - 1] as number
    }
    keys[to] = key
    values[to] = value
  }
}

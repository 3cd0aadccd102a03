import { energies, gridPointBelow, readBetween, readGrid, type EnergyGrid } from './energy-grid.ts'
import { cubicBetween, type IntegralsAt } from './log-integral-table.ts'
import { phi, phiSlope } from './phi.ts'
import type { ReadIntegrals } from './phi-curve.ts'
import type { TimeIntegral } from './time-integral.ts'

/** dPhi/dEa over the grid of Ea at one level. */
export interface SlopeScan {
  /** A number of the sign of dPhi/dEa at each grid point. */
  readonly signs: Float64Array
  /** dPhi/dEa up to a positive factor, and Phi, at grid point g. */
  readonly slopeAt: (g: number) => number
  readonly phiAt: (g: number) => number
  /** ln J and the effective 1/T between grid points, in any order of the runs: to start a search from, never for a result. */
  readonly readBetween: ReadIntegrals
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
    readBetween: (Ea, lnJs, inverseTs) => {
      readBetween(grid, Ea, level, lnJs, inverseTs)
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
  const known = new Map<number, IntegralsInOrder>()
  const at = (g: number): IntegralsInOrder => {
    const before = known.get(g)
    if (before !== undefined) return before
    const lnJ = new Float64Array(n)
    const inverseT = new Float64Array(n)
    const Ea = energies[g] as number
    for (let i = 0; i < n; i++) {
      const value = (inOrder[i] as TimeIntegral).atLevel(Ea, level)
      lnJ[i] = value.lnJ
      inverseT[i] = value.inverseT
    }
    const made = { Ea, lnJ, inverseT, order: orderOf(lnJ) }
    known.set(g, made)
    return made
  }
  /** The largest g of which `holds` is true, -1 where there is none; it is true up to somewhere and false from there on. */
  const lastOf = (holds: (g: number) => boolean): number => {
    let yes = -1
    let no = last + 1
    for (const probe of [near, near + 1]) {
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
  return {
    signs,
    slopeAt,
    phiAt: (g) => phi(at(g).lnJ),
    readBetween: (Ea, lnJ, inverseT) => {
      const g = gridPointBelow(Ea)
      cubicBetween(at(g), at(g + 1), Ea, lnJ, inverseT)
    },
  }
}

interface IntegralsInOrder extends IntegralsAt {
  readonly order: number
}

/** The integrals by the temperatures they pass, hottest first; null where these are not known, two of them are one, or their two ends stand in different orders. */
function hottestFirst(integrals: readonly TimeIntegral[], level: number): readonly TimeIntegral[] | null {
  const inOrder: TimeIntegral[] = []
  const tos: number[] = []
  const froms: number[] = []
  for (const integral of integrals) {
    const range = integral.passes?.(level)
    if (range === undefined) return null
    const to = Math.max(range[0], range[1])
    // Few runs, slow to fast and so cool to hot as a rule: each goes before those there are.
    let place = 0
    while (place < tos.length && (tos[place] as number) > to) place++
    inOrder.splice(place, 0, integral)
    tos.splice(place, 0, to)
    froms.splice(place, 0, Math.min(range[0], range[1]))
  }
  for (let i = 1; i < tos.length; i++) {
    const [hotter, cooler] = [tos[i - 1] as number, tos[i] as number]
    if (!(hotter - cooler > sameTemperature * hotter) || !((froms[i - 1] as number) >= (froms[i] as number))) return null
  }
  return inOrder
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

import { column } from '../units/quantity.ts'
import { largestEa, smallestEa } from './energy-grid.ts'
import { phi } from './phi.ts'
import type { LevelPhi } from './result.ts'

/** Writes ln J and the effective 1/T of every run at one level for an Ea, exact enough for drawing. */
export type ReadIntegrals = (Ea: number, lnJ: Float64Array, inverseT: Float64Array) => void

/** Points on each side of the middle. */
const side = 40

/**
 * Phi over two and a half half-widths of the interval on each side of its minimum, where it is some six times as high above the minimum as the threshold is; at least
 * 0.02 % of Ea, below which the curve would be rounding, and at most to the ends of the range searched. Over ±20 % where there is no interval. 81 points, the middle one the minimum itself; the others exact enough for drawing.
 */
export function phiAround(
  read: ReadIntegrals,
  runs: number,
  { Ea, phiMinimum, phiThreshold }: { readonly Ea: number; readonly phiMinimum: number; readonly phiThreshold: number },
  halfWidth: number,
): LevelPhi {
  const reach = Number.isNaN(halfWidth) ? 0.2 * Ea : Math.max(2.5 * halfWidth, 2e-4 * Ea)
  const from = Math.max(smallestEa, Ea - reach)
  const to = Math.min(largestEa, Ea + reach)
  const at = new Float64Array(2 * side + 1)
  for (let i = 0; i < at.length; i++) at[i] = i < side ? from + ((Ea - from) * i) / side : Ea + ((to - Ea) * (i - side)) / side
  return { ...curve(read, runs, at, phiMinimum), phiMinimum, phiThreshold }
}

/** Phi over the whole range searched, evenly in ln Ea, where it has no single minimum to look at closely. */
export function phiOverRange(read: ReadIntegrals, runs: number): LevelPhi {
  const at = Float64Array.from({ length: 2 * side + 1 }, (_, i) => smallestEa * (largestEa / smallestEa) ** (i / (2 * side)))
  return { ...curve(read, runs, at, null), phiMinimum: Number.NaN, phiThreshold: Number.NaN }
}

/** Phi at the given Ea; at the middle one it is `exact`, where there is such a value. */
function curve(read: ReadIntegrals, runs: number, at: Float64Array, exact: number | null): Pick<LevelPhi, 'Ea_J_per_mol' | 'phi'> {
  const lnJ = new Float64Array(runs)
  const inverseT = new Float64Array(runs)
  const values = new Float64Array(at.length)
  let drawn = 0
  for (let i = 0; i < at.length; i++) {
    const Ea = at[i] as number
    read(Math.min(largestEa, Math.max(smallestEa, Ea)), lnJ, inverseT)
    const value = exact !== null && i === side ? exact : phi(lnJ)
    // Far from its minimum Phi leaves double precision; such points cannot be drawn.
    if (!(value < Infinity)) continue
    at[drawn] = Ea
    values[drawn] = value
    drawn++
  }
  return { Ea_J_per_mol: column(at.slice(0, drawn), 'J/mol'), phi: values.slice(0, drawn) }
}

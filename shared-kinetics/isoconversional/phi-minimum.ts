import { bracketedRoot, type RootOptions } from '../numerics/root.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column } from '../units/quantity.ts'
import { energies } from './energy-grid.ts'
import { phi, phiSlope } from './phi.ts'
import type { LevelPoints, LevelStatus } from './result.ts'
import { sameTemperature, type SlopeScan } from './slope-scan.ts'
import type { TimeIntegral } from './time-integral.ts'

/** A minimum of Phi at one level, with what is read from the integrals there. */
export interface PhiMinimum {
  readonly Ea: number
  readonly phiMinimum: number
  /** Phi at the ends of the interval; NaN without one. */
  readonly phiThreshold: number
  readonly standardError: number
  readonly r2: number
  readonly points: LevelPoints
  /** The effective temperatures are one, so that the minimum says nothing about Ea. */
  readonly flat: boolean
}

/** Without an interval, a minimum whose Phi is within this factor of the lowest might be the one meant: the J then differ by as much as an error of some K explains. */
const mightBeMeant = 1.1

/**
 * The minimum of Phi at a level, or why there is none: the root of dPhi/dEa, whose sign is scanned over the grid, inside the bracket of two grid points. Serves any
 * kind of integral, from zero or from level to level.
 *
 * @param scan - of the same integrals at this level; null: `minimum-flat`
 * @param t - quantile of Student's t for the interval, NaN without one
 */
export function findPhiMinimum(
  integrals: readonly TimeIntegral[],
  scan: SlopeScan | null,
  level: number,
  t: number,
): PhiMinimum | Exclude<LevelStatus, 'ok'> {
  if (scan === null) return 'minimum-flat'
  const { signs: slopes, slopeAt, phiAt } = scan
  const minima: PhiMinimum[] = []
  for (let g = 1; g < energies.length; g++) {
    if ((slopes[g - 1] as number) < 0 && (slopes[g] as number) >= 0) {
      const ends = { fLower: slopeAt(g - 1), fUpper: slopeAt(g) }
      minima.push(minimumBetween(integrals, level, energies[g - 1] as number, energies[g] as number, ends, t))
    }
  }
  minima.sort((a, b) => a.phiMinimum - b.phiMinimum)
  const [lowest, ...others] = minima
  if (lowest === undefined) return 'minimum-at-bound'

  const last = energies.length - 1
  const atBounds = [...((slopes[0] as number) > 0 ? [phiAt(0)] : []), ...((slopes[last] as number) < 0 ? [phiAt(last)] : [])]
  if (atBounds.some((value) => value < lowest.phiMinimum)) return 'minimum-at-bound'
  const limit = Number.isNaN(lowest.phiThreshold) ? mightBeMeant * lowest.phiMinimum : lowest.phiThreshold
  if (others.some((other) => other.phiMinimum <= limit) || atBounds.some((value) => value <= lowest.phiThreshold)) return 'several-minima'
  return lowest.flat ? 'minimum-flat' : lowest
}

function minimumBetween(
  integrals: readonly TimeIntegral[],
  level: number,
  lower: number,
  upper: number,
  ends: RootOptions,
  t: number,
): PhiMinimum {
  const n = integrals.length
  const lnJ = new Float64Array(n)
  const inverseT = new Float64Array(n)
  const integrate = (Ea: number): void => {
    for (let i = 0; i < n; i++) {
      const value = (integrals[i] as TimeIntegral).atLevel(Ea, level)
      lnJ[i] = value.lnJ
      inverseT[i] = value.inverseT
    }
  }
  const slope = (Ea: number): number => {
    integrate(Ea)
    return phiSlope(lnJ, inverseT)
  }
  const { x: Ea } = bracketedRoot(slope, lower, upper, { ...ends, relativeTolerance: 1e-12 })
  integrate(Ea)
  const { standardError, s, r2 } = linearised(Ea, lnJ, inverseT)
  const phiMinimum = phi(lnJ)
  return {
    Ea,
    phiMinimum,
    phiThreshold: phiMinimum + n * (t * s) ** 2,
    standardError,
    r2,
    points: {
      x_per_K: column(inverseT, '1/K'),
      residual: lnJ.map((value) => value - meanOf(lnJ)),
      energyPerSlope: -gasConstant_J_per_mol_K,
    },
    flat: !(relativeSpread(inverseT) >= sameTemperature),
  }
}

/** Standard error in J/mol, residual standard deviation and r2 of the linearised regression, ln J + Ea u/R against u; not finite with two runs. */
export function linearised(
  Ea: number,
  lnJ: Float64Array,
  inverseT: Float64Array,
): { readonly standardError: number; readonly s: number; readonly r2: number } {
  const n = lnJ.length
  const meanY = meanOf(lnJ)
  const meanU = meanOf(inverseT)
  let residual = 0
  let spread = 0
  let total = 0
  for (let i = 0; i < n; i++) {
    const dy = (lnJ[i] as number) - meanY
    const du = (inverseT[i] as number) - meanU
    residual += dy * dy
    spread += du * du
    total += (dy + (Ea * du) / gasConstant_J_per_mol_K) ** 2
  }
  const s = n > 2 ? Math.sqrt(residual / (n - 2)) : Number.NaN
  return { s, standardError: (gasConstant_J_per_mol_K * s) / Math.sqrt(spread), r2: 1 - residual / total }
}

const meanOf = (values: Float64Array): number => values.reduce((sum, value) => sum + value / values.length, 0)

function relativeSpread(values: Float64Array): number {
  const highest = values.reduce((a, b) => Math.max(a, b), Number.NEGATIVE_INFINITY)
  const lowest = values.reduce((a, b) => Math.min(a, b), Number.POSITIVE_INFINITY)
  return (highest - lowest) / highest
}

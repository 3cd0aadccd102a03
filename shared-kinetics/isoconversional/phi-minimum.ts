import { guardedNewton } from '../numerics/guarded-newton.ts'
import { bracketedRoot } from '../numerics/root.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column } from '../units/quantity.ts'
import { energies } from './energy-grid.ts'
import { phi, phiSlope } from './phi.ts'
import type { ReadIntegrals } from './phi-curve.ts'
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
  const { signs: slopes, slopeAt, phiAt, readBetween } = scan
  const minima: PhiMinimum[] = []
  for (let g = 1; g < energies.length; g++) {
    if ((slopes[g - 1] as number) < 0 && (slopes[g] as number) >= 0) {
      const bracket = { lower: energies[g - 1] as number, upper: energies[g] as number, fLower: slopeAt(g - 1), fUpper: slopeAt(g) }
      minima.push(minimumBetween(integrals, level, bracket, readBetween, t))
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

function minimumBetween(integrals: readonly TimeIntegral[], level: number, bracket: Bracket, nearly: ReadIntegrals, t: number): PhiMinimum {
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
  const Ea = rootOf(slope, bracket, (energy) => {
    nearly(energy, lnJ, inverseT)
    return phiSlope(lnJ, inverseT)
  })
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
      residual: lessTheirMean(lnJ),
      energyPerSlope: -gasConstant_J_per_mol_K,
    },
    flat: !(relativeSpread(inverseT) >= sameTemperature),
  }
}

/** Two Ea with the values of dPhi/dEa there, of unlike sign. */
interface Bracket {
  readonly lower: number
  readonly upper: number
  readonly fLower: number
  readonly fUpper: number
}

/** Share of Ea: a slope by differences over it is good to some 1e-4, and a step of Newton's method that is smaller than `lastStep` leaves an error of 1e-4 of itself. */
const difference = 1e-4
const lastStep = 1e-8

/**
 * The root of f inside its bracket. Each value of f costs an integral a run, those of `nearly` next to nothing: its root is where the search starts, its slope the one that
 * steps are taken by, so that two or three values do. Where that does not arrive, Brent's method does.
 */
function rootOf(f: (Ea: number) => number, { lower, upper, fLower, fUpper }: Bracket, nearly: (Ea: number) => number): number {
  const { x: start } = bracketedRoot(nearly, lower, upper, { fLower, fUpper, relativeTolerance: difference })
  if (!Number.isNaN(start)) {
    const h = difference * start
    const slope = (nearly(start + h) - nearly(start - h)) / (2 * h)
    const { x } = guardedNewton((Ea) => ({ value: f(Ea), slope }), start, { lower, upper, relativeTolerance: lastStep })
    if (!Number.isNaN(x)) return x
  }
  return bracketedRoot(f, lower, upper, { fLower, fUpper, relativeTolerance: 1e-12 }).x
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

function meanOf(values: Float64Array): number {
  let mean = 0
  for (let i = 0; i < values.length; i++) mean += (values[i] as number) / values.length
  return mean
}

function lessTheirMean(values: Float64Array): Float64Array {
  const mean = meanOf(values)
  const rest = new Float64Array(values.length)
  for (let i = 0; i < rest.length; i++) rest[i] = (values[i] as number) - mean
  return rest
}

function relativeSpread(values: Float64Array): number {
  let highest = Number.NEGATIVE_INFINITY
  let lowest = Number.POSITIVE_INFINITY
  for (let i = 0; i < values.length; i++) {
    highest = Math.max(highest, values[i] as number)
    lowest = Math.min(lowest, values[i] as number)
  }
  return (highest - lowest) / highest
}

import { bracketedRoot, type RootOptions } from '../numerics/root.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column } from '../units/quantity.ts'
import { energies, energyGrid, largestEa, type EnergyGrid } from './energy-grid.ts'
import { phi, phiSlope } from './phi.ts'
import { phiAround, phiOverRange } from './phi-curve.ts'
import { resultColumns } from './result-columns.ts'
import type { IsoconversionalMethod, LevelPhi, LevelPoints, LevelStatus, MethodInfo } from './result.ts'
import { checkSeries, countProgrammes } from './series-check.ts'
import { timeIntegral, type TimeIntegral } from './time-integral.ts'

export const vyazovkinInfo: MethodInfo = {
  id: 'vyazovkin',
  label: 'Vyazovkin',
  sources: ['vyazovkin-dollimore-1996', 'vyazovkin-1997', 'ictac-2011'],
  appliesTo: ['constant-heating-rate', 'isothermal', 'general'],
  evidence: 'minimum',
  byDefault: true,
}

/**
 * Vyazovkin's integral isoconversional method, integrated from zero: at each level the Ea that minimises
 *
 *   Phi(Ea) = Σᵢ Σ_{j≠i} Jᵢ(Ea)/Jⱼ(Ea),   J(Ea) = ∫ exp(-Ea/(R T(t))) dt from alpha = 0 to the level,
 *
 * over the runs i, j. At one conversion A·J = g(alpha) is the same for every run, so that all J are equal and Phi is n(n - 1) for error-free data.
 *
 * J is taken in closed form, (Ea/(R beta)) p(Ea/(R T)), for runs whose heating rate is constant within 1 % or was not measured, and over the measured T(t) from the
 * first sample of the history for all others; a series may mix them. The minimum is found as the root of dPhi/dEa inside a bracket of 1 to 1000 kJ/mol, whose sign is scanned in steps of 10 %.
 *
 * Standard error, by linearising ln Jᵢ in Ea at the root: with yᵢ = ln Jᵢ, uᵢ = -R dyᵢ/dEa (an effective 1/T) and s² = Σ(yᵢ - ȳ)²/(n - 2),
 * se(Ea) = R s/√Σ(uᵢ - ū)². r2 is that of the same linearised regression, yᵢ + Ea uᵢ/R against uᵢ. Since Phi ≈ n(n - 1) + n Σ(yᵢ - ȳ)² near its minimum, the interval
 * Ea ± t·se ends where Phi reaches phiThreshold = phiMinimum + n t² s²; Phi itself passes a little beside these ends, the more so the wider the interval.
 *
 * Assumes Ea constant from alpha = 0 to the level, and for histories that no reaction took place before their first sample. No approximation of the temperature
 * integral and no systematic error of its own; but where Ea varies with conversion it lags behind the differential value, as every integral taken from zero does.
 *
 * Statuses: `level-not-reached` (also where a level lies outside a run's history); `too-few-programmes`; `minimum-at-bound`: Phi is lowest at an end of the bracket;
 * `minimum-flat`: the runs' effective temperatures are the same, so that Phi does not depend on Ea; `several-minima`: another minimum lies below phiThreshold (without
 * an interval, one inside the bracket below 1.1 phiMinimum). Unlike programmes taken together can give Phi further minima high above the lowest; these are passed over.
 *
 * @source vyazovkin-dollimore-1996
 * @source vyazovkin-1997
 */
export const vyazovkin: IsoconversionalMethod = (series, context) => {
  checkSeries(vyazovkinInfo, series)
  const levels = series.levels.length
  const curves: LevelPhi[] = []
  const columns = resultColumns(vyazovkinInfo, series, [], curves)
  const integrals = series.runs.map((run) => timeIntegral(run, largestEa))
  const enough = countProgrammes(series) >= 2
  const grid = enough ? energyGrid(integrals, levels, context) : null
  for (let level = 0; level < levels; level++) {
    context.checkCancelled()
    if (grid === null) curves.push(noCurve)
    else if (!integrals.every((integral) => integral.reaches(level))) {
      columns.setStatus(level, 'level-not-reached')
      curves.push(noCurve)
    } else {
      const minimum = findMinimum(integrals, grid, level, columns.t)
      if (typeof minimum === 'string') {
        columns.setStatus(level, minimum)
        curves.push(phiOverRange(grid, level, integrals.length))
      } else {
        columns.setEnergy(level, minimum.Ea, minimum.standardError, minimum.r2)
        columns.setPoints(level, minimum.points)
        curves.push(phiAround(grid, level, integrals.length, minimum, columns.t * minimum.standardError))
      }
    }
    context.progress(level + 1, levels)
  }
  return columns.result
}

const noCurve: LevelPhi = {
  Ea_J_per_mol: column(new Float64Array(0), 'J/mol'),
  phi: new Float64Array(0),
  phiMinimum: Number.NaN,
  phiThreshold: Number.NaN,
}

/** A minimum of Phi at one level, with what is read from the integrals there. */
interface Minimum {
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

/** Effective temperatures that differ by less than this share are one temperature. */
const sameTemperature = 1e-9

/** Without an interval, a minimum whose Phi is within this factor of the lowest might be the one meant: the J then differ by as much as an error of some K explains. */
const mightBeMeant = 1.1

/** The minimum at a level, or why there is none. `t` is the quantile of the interval, NaN without one. */
function findMinimum(integrals: readonly TimeIntegral[], grid: EnergyGrid, level: number, t: number): Minimum | Exclude<LevelStatus, 'ok'> {
  const lnJ = new Float64Array(integrals.length)
  const inverseT = new Float64Array(integrals.length)
  let alike = true
  const slopes = energies.map((_, g) => {
    grid.read(g, level, lnJ, inverseT)
    alike &&= relativeSpread(inverseT) < sameTemperature
    return phiSlope(lnJ, inverseT)
  })
  if (alike) return 'minimum-flat'

  const minima: Minimum[] = []
  for (let g = 1; g < energies.length; g++) {
    const [fLower, fUpper] = [slopes[g - 1] as number, slopes[g] as number]
    if (fLower < 0 && fUpper >= 0)
      minima.push(minimumBetween(integrals, level, energies[g - 1] as number, energies[g] as number, { fLower, fUpper }, t))
  }
  minima.sort((a, b) => a.phiMinimum - b.phiMinimum)
  const [lowest, ...others] = minima
  if (lowest === undefined) return 'minimum-at-bound'

  const phiAt = (g: number): number => {
    grid.read(g, level, lnJ, inverseT)
    return phi(lnJ)
  }
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
): Minimum {
  const n = integrals.length
  const lnJ = new Float64Array(n)
  const inverseT = new Float64Array(n)
  const integrate = (Ea: number): void => {
    integrals.forEach((integral, i) => {
      const value = integral.atLevel(Ea, level)
      lnJ[i] = value.lnJ
      inverseT[i] = value.inverseT
    })
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

/** Standard error in J/mol, residual standard deviation and r2 of ln J + Ea u/R against u; not finite with two runs. */
function linearised(
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

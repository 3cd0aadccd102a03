import { guardedNewton } from '../numerics/guarded-newton.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { largestEa, smallestEa } from './energy-grid.ts'

/** The F-type interval of one level. */
export interface VarianceRatioInterval {
  /**
   * `end-outside`: Psi stays below its quantile down to 1 or up to 1000 kJ/mol on one side at least, whose end is then NaN; `no-minimum`: S² has no minimum
   * next to Ea, and all numbers are NaN.
   */
  readonly status: 'ok' | 'end-outside' | 'no-minimum'
  /** In J/mol; where S² is least. It lies a little beside the minimum of Phi. */
  readonly minimumEa: number
  /** S² there. */
  readonly minimumVariance: number
  readonly lower95: number
  readonly upper95: number
}

/** Writes ln J and the effective 1/T (u, in 1/K) of every run at an Ea in J/mol. */
export type LogIntegralReader = (Ea: number, lnJ: Float64Array, inverseT: Float64Array) => void

/** A step of Newton's method that is smaller than this leaves an error of its square. */
const lastStepAtMinimum = 1e-9
const lastStepAtEnd = 1e-5

/**
 * The interval of Vyazovkin and Wight for the Ea of a minimising method at one level: with the time integrals J (under constant heating rates beta, J_i/J_j is
 * I_i beta_j/(I_j beta_i) of their paper, I the temperature integral),
 *
 *   S²(Ea) = 1/(n(n - 1)) Σᵢ Σ_{j≠i} [Jᵢ(Ea)/Jⱼ(Ea) - 1]²,   Psi(Ea) = S²(Ea)/S²min,
 *
 * it holds every Ea with Psi < F(0.95; n - 1, n - 1), n the number of runs, replicates counted each. S²min is found as the root of dS²/dEa next to the minimum of
 * Phi, the ends as roots of √(Psi - 1) - √(F - 1), which is almost a straight line on either side; both with d ln J/dEa = -u/R.
 *
 * Approximate: the terms of S² are not independent, and Psi at the true Ea does not follow F(n - 1, n - 1). For independent errors of ln J it holds the true value in
 * about 86 % of cases for n = 3, 94 % for 4, 97 % for 5 and 98 % for 6 (simulation). Of error-free data the interval is Ea itself within rounding.
 *
 * @param n - runs
 * @param Ea - minimum of Phi, in J/mol
 * @param fQuantile - F(0.95; n - 1, n - 1)
 * @param read - exact values
 * @param nearly - values good enough to start from, where exact ones are dear; the result rests on exact ones all the same
 * @source vyazovkin-wight-2000
 */
export function vyazovkinWight(
  n: number,
  Ea: number,
  fQuantile: number,
  read: LogIntegralReader,
  nearly: LogIntegralReader = read,
): VarianceRatioInterval {
  const lnJ = new Float64Array(n)
  const inverseT = new Float64Array(n)
  const excess = new Float64Array(n)

  /** The minimum next to a start. */
  const leastVariance = (
    from: LogIntegralReader,
    start: number,
  ): { readonly Ea: number; readonly value: number; readonly curvature: number } => {
    let last: Variance = { value: Number.NaN, slope: Number.NaN, curvature: Number.NaN }
    const { x } = guardedNewton(
      (energy) => {
        from(energy, lnJ, inverseT)
        last = varianceOf(lnJ, inverseT, excess)
        return { value: last.slope, slope: last.curvature }
      },
      start,
      { lower: smallestEa, upper: largestEa, relativeTolerance: lastStepAtMinimum },
    )
    // S² at the root, from where the last step set out.
    const value = Math.max(0, last.value - (0.5 * last.slope ** 2) / last.curvature)
    return { Ea: x, value: Number.isNaN(x) ? x : value, curvature: last.curvature }
  }
  /** The end next to a start. */
  const end = (from: LogIntegralReader, minimum: { readonly Ea: number; readonly value: number }, side: -1 | 1, start: number): number =>
    guardedNewton(
      (energy) => {
        from(energy, lnJ, inverseT)
        const variance = varianceOf(lnJ, inverseT, excess)
        const distance = Math.sqrt(Math.max(0, variance.value / minimum.value - 1))
        return { value: distance - Math.sqrt(fQuantile - 1), slope: variance.slope / (2 * minimum.value * distance) }
      },
      start,
      { lower: side < 0 ? smallestEa : minimum.Ea, upper: side < 0 ? minimum.Ea : largestEa, relativeTolerance: lastStepAtEnd },
    ).x

  const about = leastVariance(nearly, Ea)
  const minimum = leastVariance(read, Number.isNaN(about.Ea) ? Ea : about.Ea)
  // S² ≈ S²min + curvature (Ea - Ea_min)²/2 near its minimum.
  const reach = Math.sqrt((2 * (fQuantile - 1) * minimum.value) / minimum.curvature)
  if (!Number.isFinite(reach)) {
    return { status: 'no-minimum', minimumEa: Number.NaN, minimumVariance: Number.NaN, lower95: Number.NaN, upper95: Number.NaN }
  }
  const found = { minimumEa: minimum.Ea, minimumVariance: minimum.value }
  // Where S²min is but rounding, so is what is near it; the parabola then is all there is.
  if (reach <= roundingShare * minimum.Ea) return { status: 'ok', ...found, lower95: minimum.Ea - reach, upper95: minimum.Ea + reach }

  const exactEnd = (side: -1 | 1): number => {
    const parabola = minimum.Ea + side * reach
    const start = end(nearly, minimum, side, parabola)
    return end(read, minimum, side, Number.isNaN(start) ? parabola : start)
  }
  const lower95 = exactEnd(-1)
  const upper95 = exactEnd(1)
  return { status: Number.isNaN(lower95) || Number.isNaN(upper95) ? 'end-outside' : 'ok', ...found, lower95, upper95 }
}

/** ln J carries some 14 digits, Ea therefore some 12. */
const roundingShare = 1e-9

interface Variance {
  readonly value: number
  /** dS²/dEa. */
  readonly slope: number
  /** d²S²/dEa² but for the change of u with Ea, which hardly differs from run to run. */
  readonly curvature: number
}

/** @param excess - room for one number a run */
function varianceOf(lnJ: Float64Array, inverseT: Float64Array, excess: Float64Array): Variance {
  const n = lnJ.length
  let mean = 0
  for (let i = 0; i < n; i++) mean += (lnJ[i] as number) / n
  // Jᵢ over the geometric mean of all J, less 1: Jᵢ/Jⱼ - 1 then costs no exponential, and its digits count from the spread of the J.
  for (let i = 0; i < n; i++) excess[i] = Math.expm1((lnJ[i] as number) - mean)
  let value = 0
  let slope = 0
  let curvature = 0
  for (let i = 1; i < n; i++) {
    for (let j = 0; j < i; j++) {
      // d ln(Jᵢ/Jⱼ)/dEa, and Jᵢ/Jⱼ - 1 both ways.
      const change = ((inverseT[j] as number) - (inverseT[i] as number)) / gasConstant_J_per_mol_K
      const difference = (excess[i] as number) - (excess[j] as number)
      const up = difference / (1 + (excess[j] as number))
      const down = -difference / (1 + (excess[i] as number))
      value += up * up + down * down
      slope += change * (up * (1 + up) - down * (1 + down))
      curvature += change * change * ((1 + up) * (1 + 2 * up) + (1 + down) * (1 + 2 * down))
    }
  }
  const pairs = n * (n - 1)
  return { value: value / pairs, slope: (2 * slope) / pairs, curvature: (2 * curvature) / pairs }
}

import { largestEa, smallestEa } from '../isoconversional/energy-grid.ts'
import { guardedNewton } from '../numerics/guarded-newton.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'

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

/** Digits beyond these say nothing about an interval. */
const relativeTolerance = 1e-10

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
 * @param read - writes ln J and the effective 1/T (u, in 1/K) of every run at an Ea in J/mol
 * @param n - runs
 * @param Ea - minimum of Phi, in J/mol
 * @param fQuantile - F(0.95; n - 1, n - 1)
 * @source vyazovkin-wight-2000
 */
export function vyazovkinWight(
  read: (Ea: number, lnJ: Float64Array, inverseT: Float64Array) => void,
  n: number,
  Ea: number,
  fQuantile: number,
): VarianceRatioInterval {
  const lnJ = new Float64Array(n)
  const inverseT = new Float64Array(n)
  let curvature = Number.NaN
  const at = (energy: number): Variance => {
    read(energy, lnJ, inverseT)
    return varianceOf(lnJ, inverseT)
  }
  const range = { lower: smallestEa, upper: largestEa, relativeTolerance }

  const minimum = guardedNewton(
    (energy) => {
      const variance = at(energy)
      curvature = variance.curvature
      return { value: variance.slope, slope: variance.curvature }
    },
    Ea,
    range,
  )
  const minimumEa = minimum.x
  const { value: minimumVariance } = minimum.status === 'converged' ? at(minimumEa) : { value: Number.NaN }
  // S² ≈ S²min + curvature (Ea - Ea_min)²/2 near its minimum.
  const reach = Math.sqrt((2 * (fQuantile - 1) * minimumVariance) / curvature)
  if (!Number.isFinite(reach)) {
    return { status: 'no-minimum', minimumEa: Number.NaN, minimumVariance: Number.NaN, lower95: Number.NaN, upper95: Number.NaN }
  }
  // Where S²min is but rounding, so is what is near it; the parabola then is all there is.
  if (reach <= roundingShare * minimumEa) {
    return { status: 'ok', minimumEa, minimumVariance, lower95: minimumEa - reach, upper95: minimumEa + reach }
  }

  const target = Math.sqrt(fQuantile - 1)
  const end = (start: number, side: -1 | 1): number =>
    guardedNewton(
      (energy) => {
        const variance = at(energy)
        const distance = Math.sqrt(Math.max(0, variance.value / minimumVariance - 1))
        return { value: distance - target, slope: variance.slope / (2 * minimumVariance * distance) }
      },
      start,
      { ...range, ...(side < 0 ? { upper: minimumEa } : { lower: minimumEa }) },
    ).x
  const lower95 = end(minimumEa - reach, -1)
  const upper95 = end(minimumEa + reach, 1)
  const status = Number.isNaN(lower95) || Number.isNaN(upper95) ? 'end-outside' : 'ok'
  return { status, minimumEa, minimumVariance, lower95, upper95 }
}

/** ln J carries some 14 digits, Ea therefore some 12. */
const roundingShare = 1e-10

interface Variance {
  readonly value: number
  /** dS²/dEa. */
  readonly slope: number
  /** d²S²/dEa² but for the change of u with Ea, which hardly differs from run to run. */
  readonly curvature: number
}

function varianceOf(lnJ: Float64Array, inverseT: Float64Array): Variance {
  const n = lnJ.length
  let value = 0
  let slope = 0
  let curvature = 0
  for (let i = 1; i < n; i++) {
    for (let j = 0; j < i; j++) {
      // d ln(Jᵢ/Jⱼ)/dEa, and Jᵢ/Jⱼ - 1 both ways.
      const change = ((inverseT[j] as number) - (inverseT[i] as number)) / gasConstant_J_per_mol_K
      const up = Math.expm1((lnJ[i] as number) - (lnJ[j] as number))
      const down = Math.expm1((lnJ[j] as number) - (lnJ[i] as number))
      value += up * up + down * down
      slope += change * (up * (1 + up) - down * (1 + down))
      curvature += change * change * ((1 + up) * (1 + 2 * up) + (1 + down) * (1 + 2 * down))
    }
  }
  const pairs = n * (n - 1)
  return { value: value / pairs, slope: (2 * slope) / pairs, curvature: (2 * curvature) / pairs }
}

import type { ParameterSpace } from './fit-parameter.ts'
import type { JudgedEnd } from './judge-fit.ts'
import { solveUpperTransposed } from './qr.ts'

/** Spread of the parameters at a minimum. */
export interface FitSpread {
  readonly covariance: Float64Array
  readonly standardDeviations: Float64Array
  readonly atBound: readonly ('no' | 'lower' | 'upper' | 'held')[]
}

/**
 * Covariance s²(JᵀJ)⁻¹ of the free parameters at a minimum, from R of the Jacobian with its columns at unit length: R⁻¹R⁻ᵀ, so that nothing is squared before it is inverted.
 * Rows and columns of parameters that are held or at a bound are NaN; those of log-scaled ones are carried over to the parameter itself to first order.
 *
 * @param noise - standard deviation of a residual
 */
export function fitCovariance({ linear, end }: JudgedEnd, space: ParameterSpace, noise: number): FitSpread {
  const { free, order, columnNorms, r } = linear
  const n = free.length
  const slopes = space.slopes(end.point)
  // Column k of R⁻ᵀ, whose rows are in the order of R: element (k, position) of R⁻¹.
  const inverse = Array.from({ length: n }, (_, k) => {
    const unit = new Float64Array(n)
    unit[k] = 1
    return solveUpperTransposed(r, r.length / n, n, unit)
  })
  const position = new Int32Array(n)
  order.forEach((k, place) => {
    position[k] = place
  })
  const rowOf = (k: number): Float64Array => inverse[position[k] ?? 0] ?? new Float64Array(n)
  const covariance = new Float64Array(space.n * space.n).fill(Number.NaN)
  const scale = free.map((j, k) => (noise * (slopes[j] ?? Number.NaN)) / (columnNorms[k] ?? Number.NaN))
  free.forEach((j, k) => {
    free.forEach((other, l) => {
      const b = rowOf(l)
      const dot = rowOf(k).reduce((sum, value, i) => sum + value * (b[i] ?? 0), 0)
      covariance[j * space.n + other] = (scale[k] ?? Number.NaN) * (scale[l] ?? Number.NaN) * dot
    })
  })
  return {
    covariance,
    standardDeviations: Float64Array.from({ length: space.n }, (_, j) => Math.sqrt(covariance[j * space.n + j] ?? Number.NaN)),
    atBound: Array.from({ length: space.n }, (_, j) => {
      if (space.held[j]) return 'held'
      if (free.includes(j)) return 'no'
      return (end.point[j] ?? 0) <= (space.lower[j] ?? 0) ? 'lower' : 'upper'
    }),
  }
}

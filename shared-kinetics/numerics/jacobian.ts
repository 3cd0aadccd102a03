/** Writes the residuals at a point into `out`, which it fills wholly. A value that is not finite says that the point is out of reach. */
export type ResidualFunction = (point: Float64Array, out: Float64Array) => void

/** What a numeric Jacobian needs to know of the point it is taken at. */
export interface DifferencePoint {
  readonly point: Float64Array
  /** Residuals there. */
  readonly residuals: Float64Array
  /** Size of each coordinate, above 0, in whose parts the steps are counted. */
  readonly size: Float64Array
  readonly lower: Float64Array
  readonly upper: Float64Array
}

/**
 * Jacobian of a residual function by central differences: column j at `out[j·m …]`, d r_i / d x_j.
 *
 * `quick`: (r(x + h) - r(x - h))/2h with h = ε^(1/3)·size, error of order h². `fine`: one Richardson extrapolation from steps h and h/2, h = 2e-4·size, error of
 * order h⁴: some eleven digits, for the last steps and the covariance; h is cut while the two disagree by more than 1e-6. Beside a bound both sides are taken on the inner side, to the same order or one lower.
 *
 * @source dennis-schnabel-1983 5.4
 */
export function differenceJacobian(residuals: ResidualFunction, at: DifferencePoint, accuracy: 'quick' | 'fine', out: Float64Array): void {
  const { point } = at
  const m = at.residuals.length
  const probe = Float64Array.from(point)
  const plus = new Float64Array(m)
  const minus = new Float64Array(m)
  const coarse = new Float64Array(m)
  const halved = new Float64Array(m)

  const difference = (j: number, step: number, into: Float64Array): void => {
    const x = value(point, j)
    if (x + step <= value(at.upper, j) && x - step >= value(at.lower, j)) {
      const above = x + step
      const below = x - step
      probe[j] = above
      residuals(probe, plus)
      probe[j] = below
      residuals(probe, minus)
      // The steps as they came out in double precision, not as they were meant.
      const width = above - below
      for (let i = 0; i < m; i++) into[i] = (value(plus, i) - value(minus, i)) / width
    } else {
      const inward = x + 2 * step <= value(at.upper, j) ? step : -step
      probe[j] = x + inward
      residuals(probe, plus)
      probe[j] = x + 2 * inward
      residuals(probe, minus)
      for (let i = 0; i < m; i++) into[i] = (4 * value(plus, i) - 3 * value(at.residuals, i) - value(minus, i)) / (2 * inward)
    }
    probe[j] = x
  }

  for (let j = 0; j < point.length; j++) {
    const column = out.subarray(j * m, (j + 1) * m)
    if (accuracy === 'quick') {
      difference(j, quickStep * value(at.size, j), column)
      continue
    }
    let step = fineStep * value(at.size, j)
    let leastDisagreement = Number.POSITIVE_INFINITY
    for (let k = 0; k < 6; k++) {
      difference(j, step, coarse)
      difference(j, step / 2, halved)
      let disagreement = 0
      let largest = 0
      for (let i = 0; i < m; i++) {
        disagreement = Math.max(disagreement, Math.abs(value(halved, i) - value(coarse, i)))
        largest = Math.max(largest, Math.abs(value(halved, i)))
      }
      // Rounding rules below some step: the better of two disagreements stands.
      if (!(disagreement < leastDisagreement)) break
      leastDisagreement = disagreement
      for (let i = 0; i < m; i++) column[i] = value(halved, i) + (value(halved, i) - value(coarse, i)) / 3
      if (disagreement <= agreement * largest) break
      step /= 8
    }
    if (leastDisagreement === Number.POSITIVE_INFINITY) column.fill(Number.NaN)
  }
}

const quickStep = Number.EPSILON ** (1 / 3)
const fineStep = 2e-4
/** Two steps that agree to this leave an error of about its square times 20 after extrapolation. */
const agreement = 1e-6

const value = (values: Float64Array, i: number): number => values[i] ?? Number.NaN

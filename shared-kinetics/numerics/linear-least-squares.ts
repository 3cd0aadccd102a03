import { KineticsError } from '../errors.ts'
import { normOf, qrInPlace, solveUpper } from './qr.ts'

/** Coefficients of y = Σ c_j x_j through n points by unweighted linear least squares. */
export interface LinearLeastSquares {
  /** `too-few-points`: fewer points than coefficients; `columns-not-independent`: one column is a sum of the others as far as double precision can tell. Numbers are then NaN. */
  readonly status: 'ok' | 'too-few-points' | 'columns-not-independent'
  readonly n: number
  /** n less the number of coefficients. */
  readonly dof: number
  /** One for each column. */
  readonly coefficients: Float64Array
  /** One standard error each, `dof` degrees of freedom; NaN where dof is 0. */
  readonly standardErrors: Float64Array
  /** Of the coefficients, indexed [row][column]; NaN where dof is 0. */
  readonly covariance: readonly Float64Array[]
  readonly residualSumOfSquares: number
  /** s = sqrt(residual sum of squares / dof); NaN where dof is 0. */
  readonly residualStandardDeviation: number
}

/**
 * Fits y[i] = Σ c_j columns[j][i] over n points. A column of ones makes the intercept.
 *
 * Columns are scaled to unit length and decomposed, A = QR, so that R c = Qᵀy; covariance = s² R⁻¹R⁻ᵀ. Nothing is squared on the way
 * (normal equations lose twice the digits). Residuals are taken from the coefficients, and the fit is made once more on them, which takes back rounding.
 *
 * @param columns - at least one, each as long as y, all values finite
 * @throws KineticsError `column-length`, `not-finite`
 * @source nist-strd (certified data sets it is tested with)
 */
export function linearLeastSquares(columns: readonly ArrayLike<number>[], y: ArrayLike<number>): LinearLeastSquares {
  const n = y.length
  const p = columns.length
  checkInput(columns, y)
  if (p === 0 || n < p) return undetermined('too-few-points', n, p)
  const scale = columns.map((values) => normOf(values))
  if (scale.includes(0)) return undetermined('columns-not-independent', n, p)
  const matrix = new Float64Array(n * p)
  columns.forEach((values, j) =>
    matrix.set(
      Float64Array.from(values, (value) => value / at(scale, j)),
      j * n,
    ),
  )

  const coefficients = new Float64Array(p)
  const residual = Float64Array.from(y)
  let upper = matrix
  for (let pass = 0; pass < 2; pass++) {
    upper = matrix.slice()
    const rotated = residual.slice()
    qrInPlace(upper, rotated, n, p, false)
    // Columns have unit length, so that a diagonal of R is the sine of the angle to the columns before.
    for (let j = 0; j < p; j++)
      if (!(Math.abs(at(upper, j * n + j)) > 16 * n * Number.EPSILON)) return undetermined('columns-not-independent', n, p)
    solveUpper(upper, n, p, rotated).forEach((step, j) => {
      coefficients[j] = at(coefficients, j) + step / at(scale, j)
    })
    for (let i = 0; i < n; i++) residual[i] = at(y, i) - columns.reduce((sum, values, j) => sum + at(coefficients, j) * at(values, i), 0)
  }
  const residualSumOfSquares = residual.reduce((sum, r) => sum + r * r, 0)
  const dof = n - p
  const s = dof > 0 ? Math.sqrt(residualSumOfSquares / dof) : Number.NaN
  const covariance = covarianceOf(upper, n, scale, s * s)
  return {
    status: 'ok',
    n,
    dof,
    coefficients,
    standardErrors: Float64Array.from(covariance, (row, j) => Math.sqrt(at(row, j))),
    covariance,
    residualSumOfSquares,
    residualStandardDeviation: s,
  }
}

const at = (values: ArrayLike<number>, i: number): number => values[i] ?? Number.NaN

const finite = (values: ArrayLike<number>): boolean => Array.from(values).every(Number.isFinite)

function checkInput(columns: readonly ArrayLike<number>[], y: ArrayLike<number>): void {
  const n = y.length
  columns.forEach((values, j) => {
    if (values.length !== n) {
      throw new KineticsError('column-length', `Column ${j + 1} of a linear fit has ${values.length} values for ${n} of y.`, {
        column: j,
        y: n,
      })
    }
    if (!finite(values))
      throw new KineticsError('not-finite', `Column ${j + 1} of a linear fit holds a value that is no finite number.`, { column: j })
  })
  if (!finite(y)) throw new KineticsError('not-finite', 'A linear fit needs finite y; leave out the points that have none.', { y: n })
}

/** s² R⁻¹R⁻ᵀ, brought back to the columns as they were given. */
function covarianceOf(upper: Float64Array, n: number, scale: readonly number[], variance: number): Float64Array[] {
  const p = scale.length
  const inverse = scale.map((_, k) =>
    solveUpper(
      upper,
      n,
      p,
      Float64Array.from({ length: p }, (__, i) => (i === k ? 1 : 0)),
    ),
  )
  return scale.map((_, a) =>
    Float64Array.from({ length: p }, (__, b) => {
      const sum = inverse.reduce((total, column) => total + at(column, a) * at(column, b), 0)
      return (variance * sum) / at(scale, a) / at(scale, b)
    }),
  )
}

function undetermined(status: LinearLeastSquares['status'], n: number, p: number): LinearLeastSquares {
  const none = (): Float64Array => new Float64Array(p).fill(Number.NaN)
  return {
    status,
    n,
    dof: n - p,
    coefficients: none(),
    standardErrors: none(),
    covariance: Array.from({ length: p }, none),
    residualSumOfSquares: Number.NaN,
    residualStandardDeviation: Number.NaN,
  }
}

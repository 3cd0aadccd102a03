import { KineticsError } from '../errors.ts'

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
 * Columns are scaled to unit length and decomposed by Householder reflections, A = QR, so that R c = Qᵀy; covariance = s² R⁻¹R⁻ᵀ. Nothing is squared on the way
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
  const scale = columns.map(lengthOf)
  const matrix = columns.map((values, j) => Float64Array.from(values, (value) => value / at(scale, j)))
  if (scale.some((length) => length === 0)) return undetermined('columns-not-independent', n, p)
  const { vectors, upper } = decompose(matrix, n)
  // Columns have unit length, so that a diagonal of R is the sine of the angle to the columns before.
  for (let j = 0; j < p; j++)
    if (!(Math.abs(at(upper[j], j)) > 16 * n * Number.EPSILON)) return undetermined('columns-not-independent', n, p)

  const coefficients = new Float64Array(p)
  const residual = Float64Array.from(y)
  for (let pass = 0; pass < 2; pass++) {
    const step = solveUpper(upper, reflect(vectors, residual))
    for (let j = 0; j < p; j++) {
      const change = at(step, j) / at(scale, j)
      coefficients[j] = at(coefficients, j) + change
    }
    for (let i = 0; i < n; i++) residual[i] = at(y, i) - columns.reduce((sum, values, j) => sum + at(coefficients, j) * at(values, i), 0)
  }
  const residualSumOfSquares = residual.reduce((sum, r) => sum + r * r, 0)
  const dof = n - p
  const s = dof > 0 ? Math.sqrt(residualSumOfSquares / dof) : Number.NaN
  const covariance = covarianceOf(upper, scale, s * s)
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

const at = (values: ArrayLike<number> | undefined, i: number): number => values?.[i] ?? Number.NaN

function lengthOf(values: ArrayLike<number>): number {
  let sum = 0
  for (let i = 0; i < values.length; i++) sum += at(values, i) ** 2
  return Math.sqrt(sum)
}

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

/** Householder vectors, and R by columns: upper[j][k] is row k of column j. */
function decompose(
  matrix: readonly Float64Array[],
  n: number,
): { readonly vectors: readonly Float64Array[]; readonly upper: readonly Float64Array[] } {
  const vectors: Float64Array[] = []
  const upper: Float64Array[] = []
  matrix.forEach((values, j) => {
    const column = reflect(vectors, values)
    const vector = new Float64Array(n)
    vector.set(column.subarray(j), j)
    const length = lengthOf(vector)
    const sign = at(vector, j) < 0 ? -1 : 1
    vector[j] = at(vector, j) + sign * length
    const norm = lengthOf(vector)
    vectors.push(norm > 0 ? vector.map((value) => value / norm) : vector)
    const r = column.slice(0, matrix.length)
    r[j] = -sign * length
    upper.push(r)
  })
  return { vectors, upper }
}

/** Qᵀ times a column: each reflection I - 2vvᵀ in turn. */
function reflect(vectors: readonly Float64Array[], values: Float64Array): Float64Array {
  const result = Float64Array.from(values)
  for (const vector of vectors) {
    let dot = 0
    for (let i = 0; i < result.length; i++) dot += at(vector, i) * at(result, i)
    for (let i = 0; i < result.length; i++) result[i] = at(result, i) - 2 * dot * at(vector, i)
  }
  return result
}

/** c of R c = b from the last row up. */
function solveUpper(upper: readonly Float64Array[], b: Float64Array): Float64Array {
  const p = upper.length
  const c = new Float64Array(p)
  for (let k = p - 1; k >= 0; k--) {
    let rest = at(b, k)
    for (let j = k + 1; j < p; j++) rest -= at(upper[j], k) * at(c, j)
    c[k] = rest / at(upper[k], k)
  }
  return c
}

/** s² R⁻¹R⁻ᵀ, brought back to the columns as they were given. */
function covarianceOf(upper: readonly Float64Array[], scale: readonly number[], variance: number): Float64Array[] {
  const p = upper.length
  const inverse = upper.map((_, k) =>
    solveUpper(
      upper,
      Float64Array.from({ length: p }, (__, i) => (i === k ? 1 : 0)),
    ),
  )
  return upper.map((_, a) =>
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

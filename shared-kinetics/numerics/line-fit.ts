import { KineticsError } from '../errors.ts'

/** A straight line y = intercept + slope·x through n points by unweighted least squares. */
export interface LineFit {
  /** `x-not-distinct`: the points share one x as far as double precision can tell; `too-few-points`: n < 2. Numbers are then NaN. */
  readonly status: 'ok' | 'too-few-points' | 'x-not-distinct'
  readonly n: number
  /** n - 2. */
  readonly dof: number
  readonly slope: number
  /** y of the line at x = 0. */
  readonly intercept: number
  readonly xMean: number
  /** y of the line at `xMean`, the mean of y. Slope and this value are uncorrelated. */
  readonly valueAtMean: number
  /** One standard error each, n - 2 degrees of freedom; NaN for n = 2. */
  readonly slopeStandardError: number
  readonly interceptStandardError: number
  readonly valueAtMeanStandardError: number
  /** Covariance of slope and intercept; NaN for n = 2. */
  readonly covariance: number
  /** s = sqrt(residual sum of squares / (n - 2)); NaN for n = 2. */
  readonly residualStandardDeviation: number
  readonly residualSumOfSquares: number
  /** Share of the variance of y that the line explains; NaN where y does not vary. */
  readonly r2: number
}

/**
 * Fits a straight line to n points (x[i], y[i]), all finite, in any order.
 *
 * slope = Σ(x - x̄)(y - ȳ) / Σ(x - x̄)², intercept = ȳ - slope·x̄, s² = Σr²/(n - 2), se(slope) = s/√Σ(x - x̄)².
 * Sums are of centred values: x = 1/T differs little from run to run, and raw sums then lose up to eight digits.
 *
 * @throws KineticsError `column-length` where the arrays differ in length; `not-finite` where a value is not a finite number
 * @source nist-strd (certified data sets it is tested with)
 */
export function lineFit(x: ArrayLike<number>, y: ArrayLike<number>): LineFit {
  const n = x.length
  if (y.length !== n) {
    throw new KineticsError('column-length', `A line fit needs as many y as x; there are ${y.length} and ${n}.`, { x: n, y: y.length })
  }
  const xMean = mean(x)
  const yMean = mean(y)
  if (!Number.isFinite(xMean) || !Number.isFinite(yMean)) {
    if (n > 0) throw new KineticsError('not-finite', 'A line fit needs finite x and y; leave out the points that have none.', { points: n })
    return undetermined('too-few-points', n)
  }
  if (n < 2) return undetermined('too-few-points', n)

  let xx = 0
  let xy = 0
  let yy = 0
  let largest = 0
  for (let i = 0; i < n; i++) {
    const dx = at(x, i) - xMean
    const dy = at(y, i) - yMean
    xx += dx * dx
    xy += dx * dy
    yy += dy * dy
    largest = Math.max(largest, Math.abs(at(x, i)))
  }
  // A spread of a few units in the last place of x is rounding, not a spread.
  if (xx <= n * (8 * Number.EPSILON * largest) ** 2) return undetermined('x-not-distinct', n)

  const slope = xy / xx
  let residualSumOfSquares = 0
  for (let i = 0; i < n; i++) residualSumOfSquares += (at(y, i) - yMean - slope * (at(x, i) - xMean)) ** 2

  return fittedLine({ n, xMean, yMean, slope, xx, yy, residualSumOfSquares })
}

/** What a line is known by: means, slope, and sums of squares about the means and about the line, weighted or not. */
export interface LineSums {
  readonly n: number
  readonly xMean: number
  readonly yMean: number
  readonly slope: number
  readonly xx: number
  readonly yy: number
  readonly residualSumOfSquares: number
}

/** The line with its standard errors from its sums; weights then add up to n. */
export function fittedLine({ n, xMean, yMean, slope, xx, yy, residualSumOfSquares }: LineSums): LineFit {
  const dof = n - 2
  const s = dof > 0 ? Math.sqrt(residualSumOfSquares / dof) : Number.NaN
  return {
    status: 'ok',
    n,
    dof,
    slope,
    intercept: yMean - slope * xMean,
    xMean,
    valueAtMean: yMean,
    slopeStandardError: s / Math.sqrt(xx),
    interceptStandardError: s * Math.sqrt(1 / n + (xMean * xMean) / xx),
    valueAtMeanStandardError: s / Math.sqrt(n),
    covariance: (-xMean * s * s) / xx,
    residualStandardDeviation: s,
    residualSumOfSquares,
    r2: yy > 0 ? 1 - residualSumOfSquares / yy : Number.NaN,
  }
}

const at = (values: ArrayLike<number>, i: number): number => values[i] ?? Number.NaN

/** Mean with a second pass over the deviations, which takes back the rounding of the first. */
function mean(values: ArrayLike<number>): number {
  const n = values.length
  let sum = 0
  for (let i = 0; i < n; i++) sum += at(values, i)
  const first = sum / n
  let rest = 0
  for (let i = 0; i < n; i++) rest += at(values, i) - first
  return first + rest / n
}

function undetermined(status: LineFit['status'], n: number): LineFit {
  return {
    status,
    n,
    dof: n - 2,
    slope: Number.NaN,
    intercept: Number.NaN,
    xMean: Number.NaN,
    valueAtMean: Number.NaN,
    slopeStandardError: Number.NaN,
    interceptStandardError: Number.NaN,
    valueAtMeanStandardError: Number.NaN,
    covariance: Number.NaN,
    residualStandardDeviation: Number.NaN,
    residualSumOfSquares: Number.NaN,
    r2: Number.NaN,
  }
}

import { KineticsError } from '../errors.ts'

/** A straight line y = slope·x through the origin by unweighted least squares. */
export interface LineThroughOrigin {
  /** `x-all-zero`: no x tells the slope; `too-few-points`: there are none. Numbers are then NaN. */
  readonly status: 'ok' | 'too-few-points' | 'x-all-zero'
  readonly n: number
  /** n - 1: one parameter. */
  readonly dof: number
  readonly slope: number
  /** NaN for n = 1. */
  readonly slopeStandardError: number
  readonly residualSumOfSquares: number
  /** √(Σr²/(n - 1)); NaN for n = 1. */
  readonly residualStandardDeviation: number
  /** 1 - Σr²/Σy²: share of the squares of y, not of their variance about the mean, which a line without intercept need not lower. NaN where all y are 0. */
  readonly r2: number
}

/**
 * Fits a straight line through the origin: slope = Σxy/Σx², s² = Σr²/(n - 1), se(slope) = s/√Σx².
 *
 * @throws KineticsError `column-length` where the arrays differ in length; `not-finite` where a value is not a finite number
 * @source nist-strd (certified data sets it is tested with)
 */
export function lineThroughOrigin(x: ArrayLike<number>, y: ArrayLike<number>): LineThroughOrigin {
  const n = x.length
  if (y.length !== n) {
    throw new KineticsError('column-length', `A line fit needs as many y as x; there are ${y.length} and ${n}.`, { x: n, y: y.length })
  }
  let xx = 0
  let xy = 0
  let yy = 0
  for (let i = 0; i < n; i++) {
    xx += at(x, i) ** 2
    xy += at(x, i) * at(y, i)
    yy += at(y, i) ** 2
  }
  if (!Number.isFinite(xx) || !Number.isFinite(yy)) {
    throw new KineticsError('not-finite', 'A line fit needs finite x and y; leave out the points that have none.', { points: n })
  }
  if (!(xx > 0)) return undetermined(n === 0 ? 'too-few-points' : 'x-all-zero', n)
  const slope = xy / xx
  let residualSumOfSquares = 0
  for (let i = 0; i < n; i++) residualSumOfSquares += (at(y, i) - slope * at(x, i)) ** 2
  const s = n > 1 ? Math.sqrt(residualSumOfSquares / (n - 1)) : Number.NaN
  return {
    status: 'ok',
    n,
    dof: n - 1,
    slope,
    slopeStandardError: s / Math.sqrt(xx),
    residualSumOfSquares,
    residualStandardDeviation: s,
    r2: yy > 0 ? 1 - residualSumOfSquares / yy : Number.NaN,
  }
}

const at = (values: ArrayLike<number>, i: number): number => values[i] ?? Number.NaN

function undetermined(status: LineThroughOrigin['status'], n: number): LineThroughOrigin {
  return {
    status,
    n,
    dof: Math.max(0, n - 1),
    slope: Number.NaN,
    slopeStandardError: Number.NaN,
    residualSumOfSquares: Number.NaN,
    residualStandardDeviation: Number.NaN,
    r2: Number.NaN,
  }
}

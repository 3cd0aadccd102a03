import { KineticsError } from '../errors.ts'
import { fittedLine, lineFit, type LineFit } from '../numerics/line-fit.ts'

/**
 * A straight line through n points whose errors differ: least Σ w (y - intercept - slope·x)², with weights taken relative to their mean.
 *
 *   slope = Σ w (x - x̄)(y - ȳ)/Σ w (x - x̄)²,   s² = Σ w r²/(n - 2),   se(slope) = s/√(Σ w (x - x̄)²)
 *
 * with x̄ and ȳ the weighted means. s² comes from the residuals, so that only the ratios of the weights count: s is the standard deviation of a point of average
 * weight. Equal weights give `lineFit`, digit for digit.
 *
 * @returns the fields of a line fit; `xMean` and `valueAtMean` are the weighted means, `residualSumOfSquares` and `r2` are weighted
 * @throws KineticsError `column-length`, `not-finite` (a weight must be a finite number above 0)
 */
export function weightedLine(x: ArrayLike<number>, y: ArrayLike<number>, weights: ArrayLike<number>): LineFit {
  const n = x.length
  if (weights.length !== n)
    throw new KineticsError('column-length', 'A weighted line needs one weight a point.', { x: n, w: weights.length })
  const raw = Array.from(weights)
  if (raw.some((w) => !(w > 0) || !Number.isFinite(w))) throw new KineticsError('not-finite', 'A weight is a finite number above 0.')
  const plain = lineFit(x, y)
  if (plain.status !== 'ok' || raw.every((w) => w === raw[0])) return plain

  // Scaled by the largest first, so that their sum stays in range.
  const largest = Math.max(...raw)
  const scale = n / raw.reduce((sum, w) => sum + w / largest, 0)
  const w = raw.map((weight) => (weight / largest) * scale)
  const weightedSum = (term: (i: number) => number): number => w.reduce((sum, weight, i) => sum + weight * term(i), 0)
  // The mean is taken about the plain one: 1/T differs little from point to point.
  const xMean = plain.xMean + weightedSum((i) => at(x, i) - plain.xMean) / n
  const yMean = plain.valueAtMean + weightedSum((i) => at(y, i) - plain.valueAtMean) / n
  const xx = weightedSum((i) => (at(x, i) - xMean) ** 2)
  const yy = weightedSum((i) => (at(y, i) - yMean) ** 2)
  const slope = weightedSum((i) => (at(x, i) - xMean) * (at(y, i) - yMean)) / xx
  const residualSumOfSquares = weightedSum((i) => (at(y, i) - yMean - slope * (at(x, i) - xMean)) ** 2)
  return fittedLine({ n, xMean, yMean, slope, xx, yy, residualSumOfSquares })
}

const at = (values: ArrayLike<number>, i: number): number => values[i] ?? Number.NaN

import { lineFit } from './line-fit.ts'

/** What the line through all the other points says of one point. */
export interface LeftOutPoint {
  /**
   * The point's distance from that line over the standard deviation of this distance, s being that of the other points: Student's t with n - 3 degrees of freedom where
   * the point is like the others. NaN where n < 4 or the others determine no line; infinite where they lie on one and the point does not.
   */
  readonly studentised: number
  /** Slope of the line through the others. */
  readonly slope: number
}

/**
 * Externally studentised residuals of a straight line: for each of n points, fit the line to the others, and take
 *
 *   t = (y - ŷ)/(s √(1 + 1/(n - 1) + (x - x̄)²/Σ(x - x̄)²)),   all of the right side from the other n - 1 points.
 *
 * A point cannot hide in the scatter that it makes itself, as it can in ordinary residuals.
 *
 * @throws KineticsError as `lineFit`
 * @source cook-weisberg-1982 section 2.2
 */
export function leaveOneOut(x: ArrayLike<number>, y: ArrayLike<number>): LeftOutPoint[] {
  const points = Array.from(x, (value, i) => ({ x: value, y: y[i] ?? Number.NaN }))
  return points.map((point, i) => {
    const others = points.filter((_, k) => k !== i)
    const fit = lineFit(
      others.map((other) => other.x),
      others.map((other) => other.y),
    )
    const spread = others.reduce((sum, other) => sum + (other.x - fit.xMean) ** 2, 0)
    const distance = point.y - (fit.valueAtMean + fit.slope * (point.x - fit.xMean))
    const share = Math.sqrt(1 + 1 / others.length + (point.x - fit.xMean) ** 2 / spread)
    return { studentised: distance / (fit.residualStandardDeviation * share), slope: fit.slope }
  })
}

/** Two ends of one stretch of a curve, with value and slope at each. */
export interface HermiteEnds {
  readonly x0: number
  readonly x1: number
  readonly y0: number
  readonly y1: number
  readonly slope0: number
  readonly slope1: number
}

/** Cubic through both ends with the slopes there; errs by (x1 - x0)⁴ y''''/384 at most. */
export function hermiteValue({ x0, x1, y0, y1, slope0, slope1 }: HermiteEnds, x: number): number {
  const h = x1 - x0
  const u = (x - x0) / h
  const v = 1 - u
  return v * v * ((1 + 2 * u) * y0 + u * h * slope0) + u * u * ((1 + 2 * v) * y1 - v * h * slope1)
}

/**
 * The same ends with their slopes limited so that the cubic between them rises nowhere but from y0 to y1: no slope against the chord, none steeper than three
 * chords. Slopes that keep to this already stay as they are.
 *
 * @source fritsch-carlson-1980
 */
export function monotoneEnds(ends: HermiteEnds): HermiteEnds {
  const chord = (ends.y1 - ends.y0) / (ends.x1 - ends.x0)
  const limit = (slope: number): number => (slope * chord <= 0 ? 0 : Math.abs(slope) > 3 * Math.abs(chord) ? 3 * chord : slope)
  return { ...ends, slope0: limit(ends.slope0), slope1: limit(ends.slope1) }
}

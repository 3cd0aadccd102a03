/** Two abscissas and their weights; one abscissa of the whole weight, given twice with half of it each, where the points coincide. */
export interface TwoPointRule {
  readonly x: readonly [number, number]
  readonly weight: readonly [number, number]
}

/**
 * The two-point Gauss rule of a discrete measure: the two weighted points that have the same total weight, mean, variance and third moment as the points given, so that
 * Σ w f(x) is kept exactly for cubic f and to fourth order in their spread for any other. All weights positive.
 *
 * In standard units the points are z = γ/2 ± √(1 + γ²/4), γ the skewness, with shares 1/(1 + z²).
 */
export function twoPointRule(x: readonly number[], weight: readonly number[]): TwoPointRule {
  const origin = x[0] ?? Number.NaN
  let total = 0
  let first = 0
  x.forEach((value, i) => {
    total += weight[i] as number
    first += (weight[i] as number) * (value - origin)
  })
  const mean = first / total
  let second = 0
  let third = 0
  x.forEach((value, i) => {
    const offset = value - origin - mean
    second += (weight[i] as number) * offset * offset
    third += (weight[i] as number) * offset * offset * offset
  })
  const deviation = Math.sqrt(second / total)
  // Below some units in the last place of x, variance and skewness are rounding.
  if (!(deviation > 1e-14 * Math.abs(origin))) return { x: [origin + mean, origin + mean], weight: [total / 2, total / 2] }
  const skewness = third / total / deviation ** 3
  // z₊ z₋ = -1; the larger of the two in size is formed first, without cancellation.
  const far = skewness / 2 + (skewness < 0 ? -1 : 1) * Math.sqrt(1 + (skewness * skewness) / 4)
  const near = -1 / far
  const share = 1 / (1 + far * far)
  return { x: [origin + mean + deviation * far, origin + mean + deviation * near], weight: [total * share, total * (1 - share)] }
}

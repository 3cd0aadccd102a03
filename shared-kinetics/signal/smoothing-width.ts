export interface SmoothingWidthInput {
  /** `extent`: the rate is the slope of the signal; `rate`: the rate is its value. */
  readonly kind: 'extent' | 'rate'
  /** Standard deviation of the noise: of conversion for an extent, as a share of the largest rate for a rate. */
  readonly noise: number
  /** Time the reaction would take at its largest rate, in units of x. */
  readonly duration: number
  /** Samples within one such duration. */
  readonly samplesPerDuration: number
}

/**
 * Variance of a local cubic with tricube weights w(u) on evenly spread points, in units of σ²/(ρ h^p) with ρ points per unit of x: ∫K(u)² du, where K is the
 * kernel that the regression amounts to. p = 3 for the slope and 1 for the value. (Integrals by quadrature.)
 */
export const slopeVariance = 17.15733
export const valueVariance = 1.425221
/** Bias of the same, in units of h⁴ and the fourth derivative of the rate: ∫K(u) u⁵ du/5! for the slope of the extent, ∫K(u) u⁴ du/4! for the value of the rate. */
const slopeBias = 7.891188e-4
const valueBias = 1.186724e-3
/**
 * Fourth derivative of a bell-shaped rate (normal curve) at its top, in units of the top over the fourth power of its area/height: 3·(2π)². The bell is taken
 * half as long as the whole reaction, as if two like steps followed each other: a real rate has more structure than one bell.
 */
const fourthDerivative = 3 * (2 * Math.PI) ** 2 * 2 ** 4
/** Noise that may be left in the rate, as a share of its maximum: about 0.1 kJ/mol of a differential Ea. */
const noiseLeft = 0.001
/** Never wider than this share of the duration. */
const widest = 0.25

/**
 * Half-width for smoothing by a local cubic, in units of x: just so wide that the noise left in the rate is 0.1 % of its maximum, but no wider than where the
 * bias expected at the top of the rate peak equals the noise left there, and never wider than a quarter of the duration. The smoother itself sees to it that
 * there are never fewer than a handful of points.
 */
export function smoothingHalfWidth({ kind, noise, duration, samplesPerDuration }: SmoothingWidthInput): number {
  const [variance, bias, power] = kind === 'extent' ? [slopeVariance, slopeBias, 1.5] : [valueVariance, valueBias, 0.5]
  if (!(noise > 0)) return 0
  const atDuration = noise * Math.sqrt(variance / samplesPerDuration)
  const forNoise = (atDuration / noiseLeft) ** (1 / power)
  const balanced = (atDuration / (bias * fourthDerivative)) ** (1 / (4 + power))
  return duration * Math.min(forNoise, balanced, widest)
}

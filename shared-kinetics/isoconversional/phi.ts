/**
 * Phi = Σᵢ Σ_{j≠i} Jᵢ/Jⱼ from lnJ, one entry a run; its ideal minimum is n(n - 1), where all J are equal. Infinity where it leaves double precision.
 *
 * @source vyazovkin-dollimore-1996
 */
export function phi(lnJ: Float64Array): number {
  const { highest, lowest } = extremes(lnJ)
  if (highest - lowest > 700) return Number.POSITIVE_INFINITY
  let up = 0
  let down = 0
  for (let i = 0; i < lnJ.length; i++) {
    const share = Math.exp((lnJ[i] as number) - highest)
    up += share
    down += 1 / share
  }
  return up * down - lnJ.length
}

/**
 * A number of the sign of dPhi/dEa, continuous in Ea, which never overflows: with uᵢ = -R d ln Jᵢ/dEa,
 *
 *   dPhi/dEa = -(1/R) Σᵢ Σⱼ (uᵢ - uⱼ) Jᵢ/Jⱼ,
 *
 * times a positive factor that holds it in range where the J differ by more than e³⁰⁰. In 1/K.
 */
export function phiSlope(lnJ: Float64Array, inverseT: Float64Array): number {
  const { highest, lowest } = extremes(lnJ)
  const n = lnJ.length
  let mean = 0
  for (let i = 0; i < n; i++) mean += (inverseT[i] as number) / n
  let up = 0
  let upMoment = 0
  let down = 0
  let downMoment = 0
  for (let i = 0; i < n; i++) {
    const value = lnJ[i] as number
    const offset = (inverseT[i] as number) - mean
    const above = Math.exp(value - highest)
    const below = Math.exp(lowest - value)
    up += above
    upMoment += above * offset
    down += below
    downMoment += below * offset
  }
  return Math.exp(Math.min(highest - lowest, 300)) * (up * downMoment - upMoment * down)
}

function extremes(values: Float64Array): { readonly highest: number; readonly lowest: number } {
  let highest = Number.NEGATIVE_INFINITY
  let lowest = Number.POSITIVE_INFINITY
  for (let i = 0; i < values.length; i++) {
    const value = values[i] as number
    if (!(value <= highest)) highest = value
    if (!(value >= lowest)) lowest = value
  }
  return { highest, lowest }
}

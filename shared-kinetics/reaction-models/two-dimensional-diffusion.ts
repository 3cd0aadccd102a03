import { lnInverseRest, withinRange, type ReactionModel } from './model.ts'

/**
 * Diffusion into a cylinder, D2: f = 1/L, g = (1 - alpha) ln(1 - alpha) + alpha, L = -ln(1 - alpha).
 *
 * @source khawam-flanagan-2006
 */
export const twoDimensionalDiffusion: ReactionModel = withinRange({
  code: 'D2',
  label: 'Two-dimensional diffusion',
  equations: { f: '1/L', g: '(1 - alpha) ln(1 - alpha) + alpha' },
  f: (alpha) => 1 / lnInverseRest(alpha),
  dfDalpha: (alpha) => -1 / (lnInverseRest(alpha) ** 2 * (1 - alpha)),
  g: (alpha) => (alpha < 0.25 ? series(alpha) : alpha === 1 ? 1 : alpha - (1 - alpha) * lnInverseRest(alpha)),
  gZeroAt: 0,
  normalisation: '',
  sources: ['khawam-flanagan-2006', 'ictac-2011'],
})

/** Σ alphaᵏ/(k (k - 1)) from k = 2: the closed form loses digits as alpha² where alpha is small. */
function series(alpha: number): number {
  let sum = 0
  let power = alpha
  for (let k = 2; k < 40; k++) {
    power *= alpha
    const term = power / (k * (k - 1))
    sum += term
    if (term < 0.1 * Number.EPSILON * sum) break
  }
  return sum
}

import { withinRange, type ReactionModel } from './model.ts'

/**
 * Diffusion through a layer that grows in one dimension, D1: f = 1/(2 alpha), g = alpha².
 *
 * @source khawam-flanagan-2006
 */
export const oneDimensionalDiffusion: ReactionModel = withinRange({
  code: 'D1',
  label: 'One-dimensional diffusion',
  equations: { f: '1/(2 alpha)', g: 'alpha²' },
  f: (alpha) => 0.5 / alpha,
  dfDalpha: (alpha) => -0.5 / (alpha * alpha),
  g: (alpha) => alpha * alpha,
  gZeroAt: 0,
  normalisation: '',
  sources: ['khawam-flanagan-2006', 'ictac-2011'],
})

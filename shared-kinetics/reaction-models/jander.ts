import { restPowerFromOne, withinRange, type ReactionModel } from './model.ts'

/**
 * Three-dimensional diffusion after Jander, D3: f = (3/2)(1 - alpha)^(2/3)/[1 - (1 - alpha)^(1/3)], g = [1 - (1 - alpha)^(1/3)]².
 *
 * @source jander-1927
 */
export const jander: ReactionModel = withinRange({
  code: 'D3',
  label: 'Three-dimensional diffusion, Jander',
  equations: { f: '(3/2) (1 - alpha)^(2/3)/[1 - (1 - alpha)^(1/3)]', g: '[1 - (1 - alpha)^(1/3)]²' },
  f: (alpha) => (1.5 * (1 - alpha) ** (2 / 3)) / restPowerFromOne(alpha, 1 / 3),
  dfDalpha: (alpha) => {
    const root = Math.cbrt(1 - alpha)
    return (-0.5 * (2 - root)) / (root * restPowerFromOne(alpha, 1 / 3) ** 2)
  },
  g: (alpha) => restPowerFromOne(alpha, 1 / 3) ** 2,
  gZeroAt: 0,
  normalisation: '',
  sources: ['jander-1927', 'khawam-flanagan-2006', 'ictac-2011'],
})

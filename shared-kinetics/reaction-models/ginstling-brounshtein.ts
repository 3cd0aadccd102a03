import { lnInverseRest, restPowerFromOne, withinRange, type ReactionModel } from './model.ts'

/**
 * Three-dimensional diffusion after Ginstling and Brounshtein, D4: f = (3/2)/[(1 - alpha)^(-1/3) - 1], g = 1 - 2 alpha/3 - (1 - alpha)^(2/3).
 *
 * With u = 1 - (1 - alpha)^(1/3), g = u²(1 - 2u/3): the form as printed loses digits as alpha² where alpha is small.
 *
 * @source ginstling-brounshtein-1950
 */
export const ginstlingBrounshtein: ReactionModel = withinRange({
  code: 'D4',
  label: 'Three-dimensional diffusion, Ginstling–Brounshtein',
  equations: { f: '(3/2)/[(1 - alpha)^(-1/3) - 1]', g: '1 - 2 alpha/3 - (1 - alpha)^(2/3)' },
  f: (alpha) => 1.5 / Math.expm1(lnInverseRest(alpha) / 3),
  dfDalpha: (alpha) => -0.5 / (Math.cbrt(1 - alpha) * restPowerFromOne(alpha, 1 / 3)) ** 2,
  g: (alpha) => {
    const u = restPowerFromOne(alpha, 1 / 3)
    return u * u * (1 - (2 * u) / 3)
  },
  gZeroAt: 0,
  normalisation: '',
  sources: ['ginstling-brounshtein-1950', 'khawam-flanagan-2006', 'ictac-2011'],
})

import { withinRange, type ReactionModel } from './model.ts'

/**
 * Random scission of long chains, of which pieces of fewer than L = 2 units escape, L2: f = 2(√alpha - alpha), g = -ln(1 - √alpha).
 *
 * @source sanchez-jimenez-2010
 */
export const randomScission: ReactionModel = withinRange({
  code: 'L2',
  label: 'Random scission, L = 2',
  equations: { f: '2 (alpha^(1/2) - alpha)', g: '-ln(1 - alpha^(1/2))' },
  // 1 - √alpha = (1 - alpha)/(1 + √alpha), which keeps its digits near alpha = 1.
  f: (alpha) => (2 * Math.sqrt(alpha) * (1 - alpha)) / (1 + Math.sqrt(alpha)),
  dfDalpha: (alpha) => 1 / Math.sqrt(alpha) - 2,
  g: (alpha) => Math.log1p(Math.sqrt(alpha)) - Math.log1p(-alpha),
  gZeroAt: 0,
  normalisation: 'Other L have no closed form.',
  sources: ['sanchez-jimenez-2010'],
})

import type { ReactionModelCode } from '../reaction-models/registry.ts'

/** The names of the reaction models, by code in the order of the common list, for who must not load the models themselves; a test holds them to the registry. */
export const reactionModelLabels: Readonly<Record<ReactionModelCode, string>> = {
  'P2/3': 'Power law, n = 2/3',
  F0: 'Zero order',
  P2: 'Power law, n = 2',
  P3: 'Power law, n = 3',
  P4: 'Power law, n = 4',
  D1: 'One-dimensional diffusion',
  D2: 'Two-dimensional diffusion',
  D3: 'Three-dimensional diffusion, Jander',
  D4: 'Three-dimensional diffusion, Ginstling–Brounshtein',
  F1: 'First order',
  'F3/2': 'Order 3/2',
  F2: 'Second order',
  F3: 'Third order',
  'A3/2': 'Avrami–Erofeev, n = 3/2',
  A2: 'Avrami–Erofeev, n = 2',
  A3: 'Avrami–Erofeev, n = 3',
  A4: 'Avrami–Erofeev, n = 4',
  R2: 'Contracting cylinder',
  R3: 'Contracting sphere',
  B1: 'Autocatalysis, Prout–Tompkins',
  L2: 'Random scission, L = 2',
}

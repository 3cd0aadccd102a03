import type { SourceKey } from '../sources.ts'
import { avramiErofeev } from './avrami-erofeev.ts'
import { contractingGeometry } from './contracting-geometry.ts'
import { extendedProutTompkins } from './extended-prout-tompkins.ts'
import { ginstlingBrounshtein } from './ginstling-brounshtein.ts'
import { jander } from './jander.ts'
import type { ReactionModel } from './model.ts'
import { oneDimensionalDiffusion } from './one-dimensional-diffusion.ts'
import { powerLaw } from './power-law.ts'
import { proutTompkins } from './prout-tompkins.ts'
import { randomScission } from './random-scission.ts'
import { reactionOrder } from './reaction-order.ts'
import { sestakBerggren } from './sestak-berggren.ts'
import { twoDimensionalDiffusion } from './two-dimensional-diffusion.ts'

/** Codes of the reaction models without free parameters, in the order in which they are listed everywhere. */
export const reactionModelCodes = [
  'P2/3',
  'F0',
  'P2',
  'P3',
  'P4',
  'D1',
  'D2',
  'D3',
  'D4',
  'F1',
  'F3/2',
  'F2',
  'F3',
  'A3/2',
  'A2',
  'A3',
  'A4',
  'R2',
  'R3',
  'B1',
  'L2',
] as const
export type ReactionModelCode = (typeof reactionModelCodes)[number]

/** The reaction models of the common list, without free parameters. */
export const reactionModels: Readonly<Record<ReactionModelCode, ReactionModel>> = {
  'P2/3': powerLaw(2 / 3, 'P2/3', 'Power law, n = 2/3'),
  F0: powerLaw(1, 'F0', 'Zero order'),
  P2: powerLaw(2, 'P2', 'Power law, n = 2'),
  P3: powerLaw(3, 'P3', 'Power law, n = 3'),
  P4: powerLaw(4, 'P4', 'Power law, n = 4'),
  D1: oneDimensionalDiffusion,
  D2: twoDimensionalDiffusion,
  D3: jander,
  D4: ginstlingBrounshtein,
  F1: reactionOrder(1, 'F1', 'First order'),
  'F3/2': reactionOrder(1.5, 'F3/2', 'Order 3/2'),
  F2: reactionOrder(2, 'F2', 'Second order'),
  F3: reactionOrder(3, 'F3', 'Third order'),
  'A3/2': avramiErofeev(1.5, 'A3/2', 'Avrami–Erofeev, n = 3/2'),
  A2: avramiErofeev(2, 'A2', 'Avrami–Erofeev, n = 2'),
  A3: avramiErofeev(3, 'A3', 'Avrami–Erofeev, n = 3'),
  A4: avramiErofeev(4, 'A4', 'Avrami–Erofeev, n = 4'),
  R2: contractingGeometry(2, 'R2', 'Contracting cylinder'),
  R3: contractingGeometry(3, 'R3', 'Contracting sphere'),
  B1: proutTompkins,
  L2: randomScission,
}

/** Other names under which the same models stand in tables. */
export const reactionModelAliases: Readonly<Record<'R1' | 'P1', ReactionModelCode>> = { R1: 'F0', P1: 'F0' }

/** A parameter of a family of models, and the range in which a value of it is met in practice. */
export interface ModelParameter {
  readonly name: string
  readonly lower: number
  readonly upper: number
  readonly start: number
}

/** A family of models with exponents to be fitted. */
export interface ReactionModelFamily {
  readonly label: string
  readonly parameters: readonly ModelParameter[]
  /** Values in the order of `parameters`; throws `bad-option` where a value cannot be meant. */
  readonly make: (values: readonly number[]) => ReactionModel
  readonly sources: readonly SourceKey[]
}

export const reactionModelFamilyIds = ['RO', 'A', 'SB', 'ePT'] as const
export type ReactionModelFamilyId = (typeof reactionModelFamilyIds)[number]

const valueAt = (values: readonly number[], i: number): number => values[i] ?? Number.NaN

/** The families of models with free exponents. */
export const reactionModelFamilies: Readonly<Record<ReactionModelFamilyId, ReactionModelFamily>> = {
  RO: {
    label: 'Reaction order n',
    parameters: [{ name: 'n', lower: 0, upper: 4, start: 1 }],
    make: (values) => reactionOrder(valueAt(values, 0)),
    sources: ['khawam-flanagan-2006'],
  },
  A: {
    label: 'Avrami–Erofeev, n free',
    parameters: [{ name: 'n', lower: 0.5, upper: 4, start: 2 }],
    make: (values) => avramiErofeev(valueAt(values, 0)),
    sources: ['avrami-1939'],
  },
  SB: {
    label: 'Šesták–Berggren, truncated',
    parameters: [
      { name: 'm', lower: -1, upper: 2, start: 0.5 },
      { name: 'n', lower: 0, upper: 4, start: 1 },
    ],
    make: (values) => sestakBerggren(valueAt(values, 0), valueAt(values, 1)),
    sources: ['sestak-berggren-1971'],
  },
  ePT: {
    label: 'Extended Prout–Tompkins',
    parameters: [
      { name: 'n', lower: 0, upper: 4, start: 1 },
      { name: 'm', lower: 0, upper: 2, start: 0.5 },
    ],
    make: (values) => extendedProutTompkins(valueAt(values, 0), valueAt(values, 1)),
    sources: ['burnham-braun-1999'],
  },
}

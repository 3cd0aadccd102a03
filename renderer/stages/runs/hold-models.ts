import type { RequestInput } from '../../../shared-kinetics/contract/host-api.ts'

/** A reaction model by its code in the common list. */
export type ModelCode = RequestInput<'rate-constants.from-holds'>['model']

/** Models in the order of the common list, with their whole names. */
export const modelWords: Readonly<Record<ModelCode, string>> = {
  F1: 'F1, first order',
  'F3/2': 'F3/2, order 3/2',
  F2: 'F2, second order',
  F3: 'F3, third order',
  F0: 'F0, zero order',
  'A3/2': 'A3/2, Avrami–Erofeev, n = 3/2',
  A2: 'A2, Avrami–Erofeev, n = 2',
  A3: 'A3, Avrami–Erofeev, n = 3',
  A4: 'A4, Avrami–Erofeev, n = 4',
  R2: 'R2, contracting area',
  R3: 'R3, contracting volume',
  D1: 'D1, one-dimensional diffusion',
  D2: 'D2, two-dimensional diffusion',
  D3: 'D3, Jander',
  D4: 'D4, Ginstling–Brounshtein',
  'P2/3': 'P2/3, power law, n = 2/3',
  P2: 'P2, power law, n = 2',
  P3: 'P3, power law, n = 3',
  P4: 'P4, power law, n = 4',
  B1: 'B1, Prout–Tompkins',
  L2: 'L2, random scission',
}
export const models = Object.keys(modelWords) as readonly ModelCode[]

/** The code, where the list has it. */
export const modelOf = (code: string): ModelCode | undefined => models.find((one) => one === code)

import type { RequestInput } from '../../../shared-kinetics/contract/host-api.ts'
import { reactionModelLabels } from '../../../shared-kinetics/contract/reaction-model-labels.ts'

/** A reaction model by its code in the common list. */
export type ModelCode = RequestInput<'rate-constants.from-holds'>['model']

/** Models in the order of the common list. */
export const models = Object.keys(reactionModelLabels) as readonly ModelCode[]

/** Code and name, as every table has them: `R2 – Contracting cylinder`. */
export const modelWords = (code: ModelCode): string => `${code} – ${reactionModelLabels[code]}`

/** The code, where the list has it. */
export const modelOf = (code: string): ModelCode | undefined => models.find((one) => one === code)

import { describe, expect, it } from 'vitest'
import { reactionModelCodes, reactionModels } from '../reaction-models/registry.ts'
import { reactionModelLabels } from './reaction-model-labels.ts'

describe('names of the reaction models', () => {
  it('are those of the models themselves, in their order', () => {
    expect(Object.entries(reactionModelLabels)).toEqual(reactionModelCodes.map((code) => [code, reactionModels[code].label]))
  })
})

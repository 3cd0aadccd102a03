import { expect, it } from 'vitest'
import { defaultUncertainty } from '../../shared-kinetics/contract/study-document.ts'
import { parseWords } from './parse-words.ts'
import { uncertaintyFrom, uncertaintyOptionKinds } from './uncertainty-options.ts'

const changesOf = (...words: readonly string[]) => uncertaintyFrom(parseWords('activation', words, uncertaintyOptionKinds)).changes

it('what is named on the command line is stated, be it the very number that is assumed otherwise', () => {
  expect(changesOf('--lag', '1s', '--temperature-run', '0.5K')).toEqual([
    { kind: 'set-uncertainty', uncertainty: { ...defaultUncertainty, stated: ['temperatureRun_K', 'lag_s'] } },
  ])
  expect(changesOf('--seed', '3')).toEqual([{ kind: 'set-uncertainty', uncertainty: { ...defaultUncertainty, seed: 3 } }])
  expect(changesOf('--uncertainty')).toEqual([])
})

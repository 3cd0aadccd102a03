import { describe, expect, it } from 'vitest'
import { firstOrderPeakConversion } from '../peak-methods/first-order-peak.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { PeakMethodNumber } from '../tasks/study-result.ts'
import { peakConversionWords } from './peak-conversion-words.ts'

const number = (key: PeakMethodNumber['key'], value: number | null): PeakMethodNumber => ({
  key,
  label: key,
  value,
  standardError: null,
  unit: '1',
})
// 150 kJ/mol at 600 K, exact for first order: about 0.62.
const first = firstOrderPeakConversion(150_000 / (gasConstant_J_per_mol_K * 600))
const wordsOf = (lowest: number | null, highest: number): string | null =>
  peakConversionWords([
    number('conversion-at-peak-lowest', lowest),
    number('conversion-at-peak-highest', highest),
    number('conversion-at-peak-first-order', first),
  ])

describe('words on the conversion at rate peaks', () => {
  it('say that all is well where runs agree and lie where first order peaks', () => {
    expect(wordsOf(first, first)).toMatch(
      /about alike .* and near 0\.6\d, where a first-order reaction peaks, so that A by first order can stand/,
    )
  })

  it('say that Ea can stand and A cannot where runs agree elsewhere', () => {
    expect(wordsOf(0.48, 0.55)).toMatch(
      /^Peaks at conversion 0\.48 to 0\.55: about alike .*; a first-order reaction would peak at 0\.6\d, so that A, .* is off\.$/,
    )
  })

  it('say that Ea may mix steps where runs do not agree', () => {
    expect(wordsOf(0.4, first)).toMatch(/not alike in all runs: Ea by the peaks may mix different steps/)
  })

  it('are none without such numbers', () => {
    expect(wordsOf(null, 0.6)).toBeNull()
    expect(peakConversionWords([])).toBeNull()
  })
})

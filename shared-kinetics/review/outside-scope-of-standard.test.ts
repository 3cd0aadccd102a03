import { describe, expect, it } from 'vitest'
import { profileOf, reviewedRun, reviewInput, type RunToReview } from '../check-values/review-input-of.ts'
import { countRateMaxima } from './rate-maxima.ts'
import { outsideScopeOfStandard } from './rules/outside-scope-of-standard.ts'

const atRates = (rates: readonly number[], change: RunToReview = {}) => rates.map((rate, i) => reviewedRun(String(i), rate, i, change))
const standards = (Ea = 200) => ({ profiles: [profileOf('astm-e1641', [Ea, Ea, Ea]), profileOf('iso-11358-2', [Ea, Ea, Ea])] })
const messages = (...input: Parameters<typeof reviewInput>): readonly string[] =>
  outsideScopeOfStandard(reviewInput(...input)).map(({ message }) => message)
const curve = reviewedRun('0', 5, 0).result.curve

/** Two peaks of a rate, their dip a share of the lower. */
const twoPeaks = (second: number, dip: number): Float64Array => Float64Array.of(0, 0.5, 1, 0.5, dip, 0.5 * (dip + second), second, 0.1, 0)

describe('outside-scope-of-standard', () => {
  it('is silent where a standard was not asked for, or applies', () => {
    expect(messages({ runs: atRates([5]) })).toEqual([])
    expect(messages({ runs: atRates([1, 2, 5, 10]), result: standards() })).toEqual([])
  })

  it('says what lies outside, for each standard by its own scope', () => {
    const [e1641, iso, ...rest] = messages({ runs: atRates([2, 5, 10]), result: standards() })
    expect(rest).toEqual([])
    expect(e1641).toMatch(/3 distinct heating rates, fewer than 4/)
    expect(iso).toBeUndefined()
    const cold = { result: { temperatureAtLevel_K: [380, 390, 420] } }
    expect(messages({ runs: atRates([1, 2, 5, 10], cold), result: standards(150) })).toEqual([
      expect.stringMatching(/reached at 380 to 420 K/),
    ])
    const heat = messages({ runs: atRates([1, 2, 5, 10]), result: { ...standards(), signal: 'heat-flow' } })
    expect(heat).toEqual([expect.stringMatching(/signal is a heat flow/), expect.stringMatching(/signal is a heat flow/)])
  })

  it('holds Ea/(RT) against the range its constants are made for', () => {
    // 80 kJ/mol at 600 to 640 K: 15 to 16.
    expect(messages({ runs: atRates([1, 2, 5, 10]), result: standards(80) })).toEqual([
      expect.stringMatching(/Ea\/\(RT\) is 15 to 16, and its constants are made for 20 to 60/),
    ])
    expect(messages({ runs: atRates([1, 2, 5, 10]), result: standards(30) })).toHaveLength(2)
  })

  it('keeps several reasons apart', () => {
    const [e1641] = messages({ runs: atRates([2, 5, 10]), result: standards(30) })
    expect(e1641).toMatch(
      /Here there are 3 distinct heating rates, fewer than 4; Ea\/\(RT\) is [\d.]+ to [\d.]+, and its constants are made for 8 to 60\. Its Ea/,
    )
  })

  it('tells a second maximum of the rate', () => {
    const conversion = Float64Array.of(0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.7, 0.94, 1)
    const run = { result: { curve: { ...curve, conversion, reactionRate_per_s: twoPeaks(0.6, 0.3) } } }
    for (const message of messages({ runs: atRates([1, 2, 5, 10], run), result: standards() }))
      expect(message).toMatch(/more than one maximum in Run 0/)
    expect(messages({ runs: atRates([1, 2, 5, 10], run), result: standards() })).toHaveLength(2)
    // The same where the reaction is over: a step of the balance.
    const late = { result: { curve: { ...run.result.curve, conversion: Float64Array.of(0, 0.1, 0.5, 0.9, 0.96, 0.97, 0.98, 0.99, 1) } } }
    expect(messages({ runs: atRates([1, 2, 5, 10], late), result: standards() })).toEqual([])
  })
})

describe('maxima of a rate', () => {
  it('count where they stand out by the share asked for', () => {
    expect(countRateMaxima(twoPeaks(0.6, 0.3), 0.2)).toBe(2)
    expect(countRateMaxima(twoPeaks(0.6, 0.45), 0.2)).toBe(1)
    expect(countRateMaxima(twoPeaks(0.15, 0), 0.2)).toBe(1)
    expect(countRateMaxima(Float64Array.of(Number.NaN, 0, 1, Number.NaN, 2, 1), 0.2)).toBe(1)
    // Already falling at the start of the window: no maximum inside.
    expect(countRateMaxima(Float64Array.of(1, 0.6, 0.2, 0), 0.2)).toBe(0)
    expect(countRateMaxima(new Float64Array(0), 0.2)).toBe(0)
  })
})

import { describe, expect, it } from 'vitest'
import { parseDraws, parseLag, parseSeed, parseShare, parseTemperatureUncertainty } from './parse-uncertainty.ts'

describe('stated uncertainties as typed', () => {
  it('take their units, point or comma, and the unit of the field where none stands', () => {
    expect(parseTemperatureUncertainty('0,5 K')).toEqual({ ok: true, value: 0.5 })
    expect(parseTemperatureUncertainty('0.9 °F')).toEqual({ ok: true, value: 0.5 })
    expect(parseTemperatureUncertainty('1')).toEqual({ ok: true, value: 1 })
    expect(parseLag('2')).toEqual({ ok: true, value: 2 })
    expect(parseLag('0,5 min')).toEqual({ ok: true, value: 30 })
    expect(parseShare('2 %')).toEqual({ ok: true, value: 0.02 })
    expect(parseShare('0')).toEqual({ ok: true, value: 0 })
    expect(parseDraws('5 000')).toEqual({ ok: true, value: 5000 })
    expect(parseSeed('0')).toEqual({ ok: true, value: 0 })
  })

  it('are standard uncertainties: an expanded one is divided by the k that stands with it', () => {
    expect(parseTemperatureUncertainty('0.3 K (k=2)')).toEqual({ ok: true, value: 0.15 })
    expect(parseTemperatureUncertainty('0,3 (k = 2)')).toEqual({ ok: true, value: 0.15 })
    expect(parseLag('3 s, k=2')).toEqual({ ok: true, value: 1.5 })
    expect(parseLag('3 (k=2)')).toEqual({ ok: true, value: 1.5 })
    expect(parseShare('5 % (k=2.5)')).toEqual({ ok: true, value: 0.02 })
    for (const text of ['0.3 K (k=0)', '0.3 K (k=)', '0.3 K (k=two)', '0.3 K (k=-2)']) {
      const parsed = parseTemperatureUncertainty(text)
      expect(parsed.ok ? '' : parsed.reason).toContain('coverage factor')
    }
    expect(parseTemperatureUncertainty('(k=2)').ok).toBe(false)
  })

  it('are refused with a reason where they cannot be meant', () => {
    const refused = [
      parseTemperatureUncertainty('-0.5 K'),
      parseTemperatureUncertainty('0.5 s'),
      parseLag('−1 s'),
      parseLag('1 K'),
      parseShare('100 %'),
      parseShare('2 K'),
      parseDraws('99'),
      parseDraws('1e4'),
      parseDraws('20001'),
      parseSeed('1.5'),
      parseSeed('-1'),
    ]
    expect(refused.map((one) => (one.ok ? '' : one.reason)).every((reason) => /\w/.test(reason))).toBe(true)
  })
})

import { describe, expect, it } from 'vitest'
import { parseConversion } from './parse-conversion.ts'
import { parseWindow } from './parse-window.ts'

describe('a window as typed', () => {
  it('takes temperatures in any unit, °C where none stands', () => {
    const parsed = parseWindow('226.85', '426,85 C')
    const window = parsed.ok && parsed.value.kind === 'temperature' ? parsed.value : null
    expect(window?.start_K).toBeCloseTo(500, 9)
    expect(window?.end_K).toBeCloseTo(700, 9)
    expect(parseWindow('500 K', '700 K')).toEqual({ ok: true, value: { kind: 'temperature', start_K: 500, end_K: 700 } })
  })

  it('takes times for holds', () => {
    expect(parseWindow('90 s', '1,5 h')).toEqual({ ok: true, value: { kind: 'time', start_s: 90, end_s: 5400 } })
  })

  it.each([
    ['700 K', '500 K', /above the start/],
    ['10 min', '500 K', /both/],
    ['soon', '500 K', /"soon"/],
    ['500 K', '900 bar', /no unit of temperature/],
  ])('refuses %s to %s in words', (start, end, reason) => {
    const parsed = parseWindow(start, end)
    expect(parsed.ok ? '' : parsed.reason).toMatch(reason)
  })
})

describe('a conversion as typed', () => {
  it('takes a fraction or per cent', () => {
    expect([parseConversion('0,1'), parseConversion('90 %'), parseConversion('1')]).toEqual([
      { ok: true, value: 0.1 },
      { ok: true, value: 0.9 },
      { ok: true, value: 1 },
    ])
  })

  it.each(['1.2', '120 %', '-0.1', 'half', ''])('refuses %j', (text) => {
    expect(parseConversion(text).ok).toBe(false)
  })
})

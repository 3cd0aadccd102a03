import type { Parsed } from '../../shared-kinetics/units/parse-quantity.ts'

/** A conversion as typed: `0.1`, `0,1` or `10 %`. */
export function parseConversion(text: string): Parsed<number> {
  const match = /^\s*(\d*[.,]?\d+|\d+[.,])\s*(%?)\s*$/.exec(text)
  if (match === null) return { ok: false, reason: `"${text.trim()}" is no conversion; write it as 0.1 or 10 %` }
  const number = Number((match[1] ?? '').replace(',', '.'))
  const value = match[2] === '%' ? number / 100 : number
  return value <= 1 ? { ok: true, value } : { ok: false, reason: 'a conversion lies between 0 and 1' }
}

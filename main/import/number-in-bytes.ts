import type { DecimalSignWord } from '../../shared-kinetics/contract/import-options.ts'
import { largestExact, parseNumber, powersOfTen } from './parse-number.ts'

const minus = 45
const plus = 43
export const isDigit = (byte: number): boolean => byte >= 48 && byte <= 57

/**
 * The number written in UTF-8 bytes from `from` up to `to`: the same as `parseNumber` gives for their text, NaN where they are no number.
 * Plain decimals are worked out from the bytes; what is not plain (grouped digits, other signs, more digits than double precision
 * holds) is handed on to `parseNumber` as text.
 *
 * A mantissa below 2^53 with a power of ten up to 22 is one exact division or multiplication (W. D. Clinger, Proc. PLDI (1990) 92).
 */
export function numberInBytes(bytes: Buffer, from: number, to: number, decimal: DecimalSignWord): number {
  const sign = decimal === 'point' ? 46 : 44
  let at = from
  let byte = bytes[at] ?? 0
  const negative = byte === minus
  if (negative || byte === plus) at++
  // Once the digits exceed 2^53 the rounded sum does so too: it only grows.
  let mantissa = 0
  let scale = 0
  const whole = at
  for (; at < to; at++) {
    byte = bytes[at] ?? 0
    if (!isDigit(byte)) break
    mantissa = mantissa * 10 + (byte - 48)
  }
  let digits = at - whole
  if (at < to && byte === sign) {
    at++
    const behind = at
    for (; at < to; at++) {
      byte = bytes[at] ?? 0
      if (!isDigit(byte)) break
      mantissa = mantissa * 10 + (byte - 48)
    }
    scale = behind - at
    digits -= scale
    if (scale === 0 && decimal === 'comma') return Number.NaN
  }
  if (digits === 0) return byte < 0x80 ? Number.NaN : asText(bytes, from, to, decimal)
  if (at < to) {
    if (byte !== 69 && byte !== 101) return mayBeGrouped(bytes, at, to) ? asText(bytes, from, to, decimal) : Number.NaN
    const exponent = exponentInBytes(bytes, at + 1, to)
    if (Number.isNaN(exponent)) return bytes[at + 1] === 0xe2 ? asText(bytes, from, to, decimal) : Number.NaN
    scale += exponent
  }
  if (mantissa >= largestExact || scale < -22 || scale > 22) return asText(bytes, from, to, decimal)
  const value = scale < 0 ? mantissa / (powersOfTen[-scale] ?? 1) : mantissa * (powersOfTen[scale] ?? 1)
  return negative ? -value : value
}

const asText = (bytes: Buffer, from: number, to: number, decimal: DecimalSignWord): number => {
  const text = bytes.toString('utf8', from, to)
  return parseNumber(text, 0, text.length, decimal)
}

function exponentInBytes(bytes: Buffer, from: number, to: number): number {
  const first = bytes[from] ?? 0
  const start = first === minus || first === plus ? from + 1 : from
  if (start >= to || to - start > 4) return Number.NaN
  let value = 0
  for (let at = start; at < to; at++) {
    const byte = bytes[at] ?? 0
    if (!isDigit(byte)) return Number.NaN
    value = value * 10 + (byte - 48)
  }
  return first === minus ? -value : value
}

/** Whether what breaks the digits off at `at` can divide thousands: a sign, three digits; or a character beyond ASCII. */
function mayBeGrouped(bytes: Buffer, at: number, to: number): boolean {
  const byte = bytes[at] ?? 0
  if (byte >= 0x80) return true
  if (byte !== 32 && byte !== 39 && byte !== 44 && byte !== 46) return false
  return to - at >= 4 && isDigit(bytes[at + 1] ?? 0) && isDigit(bytes[at + 2] ?? 0) && isDigit(bytes[at + 3] ?? 0)
}

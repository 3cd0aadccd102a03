import type { DecimalSignWord } from '../../shared-kinetics/contract/import-options.ts'

const decimalCode: Readonly<Record<DecimalSignWord, number>> = { point: 46, comma: 44 }

// 10^0 to 10^22 are exact in double precision, and so is every whole number up to 2^53.
export const powersOfTen = Float64Array.from({ length: 23 }, (_, i) => Number(`1e${i}`))
export const largestExact = 2 ** 53

/**
 * The number written in `text` from `from` up to `to` (blanks around it trimmed by the caller), rounded as `Number()` rounds;
 * NaN where the characters are no number. A decimal comma needs a digit behind it. Digits may be grouped in threes by thin or
 * no-break blanks, blanks, apostrophes, or the sign that is not the decimal one (`1.234,5`).
 *
 * Up to 15 digits with a power of ten up to 22 are one exact division or multiplication (W. D. Clinger, Proc. PLDI (1990) 92);
 * the rest goes through `Number()`.
 */
export function parseNumber(text: string, from: number, to: number, decimal: DecimalSignWord): number {
  const sign = decimalCode[decimal]
  let at = from
  let code = text.charCodeAt(at)
  const negative = code === 45 || code === 0x2212
  if (negative || code === 43) at++
  let mantissa = 0
  let digits = 0
  let scale = 0
  let seenDecimal = false
  let digitsBehind = 0
  for (; at < to; at++) {
    code = text.charCodeAt(at)
    if (code >= 48 && code <= 57) {
      mantissa = mantissa * 10 + (code - 48)
      digits++
      if (seenDecimal) {
        scale--
        digitsBehind++
      }
    } else if (code === sign && !seenDecimal) seenDecimal = true
    else break
  }
  if (digits === 0) return Number.NaN
  if (at < to && (code === 69 || code === 101)) {
    const exponent = parseExponent(text, at + 1, to)
    if (Number.isNaN(exponent)) return Number.NaN
    scale += exponent
    at = to
  }
  if (at < to) return parseGrouped(text.slice(from, to), decimal)
  if (seenDecimal && digitsBehind === 0 && decimal === 'comma') return Number.NaN
  if (digits <= 15 && mantissa < largestExact && scale >= -22 && scale <= 22) {
    const value = scale < 0 ? mantissa / (powersOfTen[-scale] ?? 1) : mantissa * (powersOfTen[scale] ?? 1)
    return negative ? -value : value
  }
  return finite(text.slice(from, to), decimal)
}

/** A value beyond the range of double precision is not a number here: no instrument measures it. */
function finite(written: string, decimal: DecimalSignWord): number {
  const plain = written.replace('\u2212', '-')
  const value = Number(decimal === 'comma' ? plain.replace(',', '.') : plain)
  return Number.isFinite(value) ? value : Number.NaN
}

function parseExponent(text: string, from: number, to: number): number {
  let at = from
  const first = text.charCodeAt(at)
  const negative = first === 45 || first === 0x2212
  if (negative || first === 43) at++
  if (at >= to || to - at > 4) return Number.NaN
  let value = 0
  for (; at < to; at++) {
    const code = text.charCodeAt(at)
    if (code < 48 || code > 57) return Number.NaN
    value = value * 10 + (code - 48)
  }
  return negative ? -value : value
}

const grouped = {
  point: /^[-+\u2212]?[1-9]\d{0,2}([\u2009\u202f\u00a0 '\u2019,])\d{3}(?:\1\d{3})*(?:\.\d*)?$/,
  comma: /^[-+\u2212]?[1-9]\d{0,2}([\u2009\u202f\u00a0 '\u2019.])\d{3}(?:\1\d{3})*(?:,\d+)?$/,
} as const

function parseGrouped(cell: string, decimal: DecimalSignWord): number {
  const match = cell.length > 60 ? null : grouped[decimal].exec(cell)
  if (match === null) return Number.NaN
  return finite(cell.replaceAll(match[1] ?? '', ''), decimal)
}

/** Whether a cell is a number under the decimal sign; blanks around it are allowed. */
export function isNumber(cell: string, decimal: DecimalSignWord): boolean {
  const trimmed = cell.trim()
  return trimmed !== '' && !Number.isNaN(parseNumber(trimmed, 0, trimmed.length, decimal))
}

/** A mark that stands for a number that was not to be had. It is no number, but a row that holds it is still a row of numbers. */
export const isMissingMark = (cell: string): boolean => /^(?:nan|n\/?a|#n\/a|null|[+-]?inf(?:inity)?|-{1,3})$/i.test(cell)

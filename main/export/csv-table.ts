import type { TableStyle } from '../../shared-kinetics/contract/host-api.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'

export const defaultTableStyle: TableStyle = { decimal: '.', separator: ',' }

/**
 * The style asked for; a decimal comma takes the semicolon where no separator is named.
 * @throws KineticsError `bad-option` when decimal sign and separator would be the same sign
 */
export function tableStyle(decimal: TableStyle['decimal'] = '.', separator?: TableStyle['separator']): TableStyle {
  const chosen = separator ?? (decimal === ',' ? ';' : ',')
  if (chosen === decimal) {
    throw new KineticsError('bad-option', 'Decimal sign and separator cannot both be a comma: choose a semicolon or a tab as separator.')
  }
  return { decimal, separator: chosen }
}

/** Text of one table: rows of cells, a number or text each; null is an empty cell. Lines end as RFC 4180 says. */
export function csvTable(rows: readonly (readonly (number | string | null)[])[], style: TableStyle): string {
  return rows.map((row) => `${row.map((cell) => cellText(cell, style)).join(style.separator)}\r\n`).join('')
}

function cellText(cell: number | string | null, style: TableStyle): string {
  if (cell === null) return ''
  if (typeof cell === 'string') return quoted(withoutFormula(cell), style)
  return Number.isFinite(cell) ? plainNumber(cell).replace('.', style.decimal) : ''
}

/** Seven significant digits, never in a form that a spreadsheet could take for text. */
function plainNumber(value: number): string {
  const rounded = Number(value.toPrecision(7))
  const text = String(rounded)
  return text.includes('e') ? rounded.toFixed(12).replace(/\.?0+$/, '') : text
}

/** A spreadsheet runs text that begins like a formula; an apostrophe makes it text again. Numbers keep their sign. */
const withoutFormula = (text: string): string => (/^[=+\-@\t\r\n＝＋－＠]/.test(text) ? `'${text}` : text)

const quoted = (text: string, style: TableStyle): string =>
  text.includes(style.separator) || /["\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text

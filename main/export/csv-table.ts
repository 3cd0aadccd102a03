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

/** A number, a text, or a number written with a power of ten (`-4.393726e-9`), which keeps its digits however small it is; null is an empty cell. */
export type CsvCell = number | string | null | { readonly withPower: number }

/** Text of one table. Lines end as RFC 4180 says. */
export function csvTable(rows: readonly (readonly CsvCell[])[], style: TableStyle): string {
  return rows.map((row) => `${row.map((cell) => cellText(cell, style)).join(style.separator)}\r\n`).join('')
}

function cellText(cell: CsvCell, style: TableStyle): string {
  if (cell === null) return ''
  if (typeof cell === 'object') {
    const { withPower: value } = cell
    return Number.isFinite(value) ? value.toExponential(6).replace('.', style.decimal).replace('e+', 'e') : ''
  }
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

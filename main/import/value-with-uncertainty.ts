import type { DecimalSignWord } from '../../shared-kinetics/contract/import-options.ts'
import { cellWithPlainPowers, withPlainPowers } from '../../shared-kinetics/units/plain-powers.ts'

/** A number and its uncertainty as they stand in one cell, each as a text of its own. */
export interface WrittenWithUncertainty {
  readonly number: string
  readonly uncertainty: string
  /** `brackets`: a standard uncertainty by convention (JCGM 100, 7.2.2); `plus-minus` does not say what it is. */
  readonly form: 'plus-minus' | 'brackets'
  readonly isPercent: boolean
}

/** A longer cell is a remark. */
const mostCharacters = 100
const plusMinus = /±|\+\/-/
const inBrackets = /^\(([^()±]+)(?:±|\+\/-)([^()±]+)\)(.*)$/
const concise = /^([-+−]?[\d.,]*\d) ?\(([\d.,]*\d)\)(.*)$/

/**
 * `7.87 × 10−7 ± 0.3 × 10−7`, `(7.87 ± 0.30) × 10^-7`, `7.87e-7 ± 5 %`, `2.94(8) × 10−6`, `2.94(0.08)e-6`. null for anything else, and where one of both has a power
 * of ten and the other none: `7.87 ± 0.3 × 10−7` may mean either.
 */
export function writtenWithUncertainty(cell: string, decimal: DecimalSignWord): WrittenWithUncertainty | null {
  if (cell.length > mostCharacters) return null
  const around = inBrackets.exec(cell)
  if (around !== null) {
    const [, number = '', uncertainty = '', rest = ''] = around
    return { ...both(number.trim() + rest, uncertainty.trim() + rest), form: 'plus-minus', isPercent: false }
  }
  const digits = concise.exec(cell)
  if (digits !== null) {
    const [, number = '', inside = '', rest = ''] = digits
    const uncertainty = lastDigits(number, inside, decimal)
    return uncertainty === null ? null : { ...both(number + rest, uncertainty + rest), form: 'brackets', isPercent: false }
  }
  const [number, uncertainty, ...more] = cell.split(plusMinus)
  if (number === undefined || uncertainty === undefined || more.length > 0) return null
  if (/%\s*$/.test(uncertainty))
    return { ...both(number.trim(), uncertainty.replace(/%\s*$/, '').trim()), form: 'plus-minus', isPercent: true }
  return isPowerUnclear(cell) ? null : { ...both(number.trim(), uncertainty.trim()), form: 'plus-minus', isPercent: false }
}

/** `7.87 ± 0.3 × 10−7`: whether the power belongs to both cannot be told. */
export function isPowerUnclear(cell: string): boolean {
  if (cell.length > mostCharacters || inBrackets.test(cell)) return false
  const [number, uncertainty] = cell.split(plusMinus)
  return uncertainty !== undefined && !uncertainty.includes('%') && hasPower(number ?? '') !== hasPower(uncertainty)
}

/** What is said of it, behind the text that holds it, and the way out. */
export const powerUnclear = {
  reason: 'only one of the number and its uncertainty has a power of ten.',
  remedy: 'Write the power behind both, 7.9e-7 ± 3e-8, or behind brackets around both, (7.9 ± 0.3)e-7.',
} as const

const plain = (text: string): string => cellWithPlainPowers(withPlainPowers(text))
const hasPower = (text: string): boolean => /\de[-+−]?\d/i.test(plain(text.trim()))
const both = (number: string, uncertainty: string) => ({ number: plain(number), uncertainty: plain(uncertainty) })

/** `2.94(8)`: the digits in brackets are those of the last places; with a decimal sign of their own they are the uncertainty itself. */
function lastDigits(number: string, inside: string, decimal: DecimalSignWord): string | null {
  const [sign, other] = decimal === 'comma' ? [',', '.'] : ['.', ',']
  if (number.includes(other) || inside.includes(other)) return null
  if (inside.includes(sign)) return inside
  const places = number.includes(sign) ? number.length - number.indexOf(sign) - 1 : 0
  if (places === 0) return inside
  const padded = inside.padStart(places + 1, '0')
  return `${padded.slice(0, -places)}${sign}${padded.slice(-places)}`
}

import { plainSuperscripts } from './plain-superscripts.ts'

// A blank here is any but a tab, which parts cells.
const times = '[×✕✖x·⋅∙•∗*]'
const minus = '[-−–‐‑+]'
const raisedDigits = '[⁻⁺]?[⁰¹²³⁴⁵⁶⁷⁸⁹]{1,3}'
const written = String.raw`(?:\^|\*\*)[^\S\t]*(?:[({][^\S\t]*)?(${minus}?[^\S\t]?\d{1,3})(?:[^\S\t]*[)}])?|(${raisedDigits})`

const certain = new RegExp(String.raw`(\d)[^\S\t]*${times}[^\S\t]*10[^\S\t]*(?:${written})`, 'gi')
const lowered = String.raw`(\d)[^\S\t]?${times}[^\S\t]?10`
const behind = String.raw`(?![.,]?\d)`
const loweredCell = new RegExp(String.raw`^([-+−]?[\d.,]*)${lowered}[^\S\t]?(${minus}[^\S\t]?\d{1,3})${behind}`, 'i')
const loweredWord = new RegExp(String.raw`(?<![\p{L}\d.,])([-+−]?[\d.,]*)${lowered}(${minus}\d{1,3})${behind}`, 'giu')
const bare = new RegExp(String.raw`^([-+−]?)10(?:${written})(?=$|\s)`, 'i')
const withoutSign = new RegExp(String.raw`${lowered}[^\S\t]?\d{1,2}(?![\d.,])`, 'i')

const exponent = (plain: string | undefined, raised = ''): string =>
  (plain ?? plainSuperscripts(raised).slice(1)).replaceAll(/\s/g, '').replace(/^[−–‐‑]/, '-')

/** Powers of ten as papers print them, wherever they stand in a line: `2.1×10⁻⁵`, `2.1 x 10^-5`, `2.1·10^{−5}`, `2.1*10**-5` become `2.1e-5`. */
export const withPlainPowers = (line: string): string =>
  line.replaceAll(certain, (_, digit: string, plain?: string, raised?: string) => `${digit}e${exponent(plain, raised)}`)

/**
 * The same for one cell, and what only a cell makes certain: a power that lost its height (`7.87 × 10−7`, as copied from a printed page; a sign is needed, since `× 107`
 * may be a hundred and seven), and a power alone (`10⁻⁵`).
 */
export const cellWithPlainPowers = (cell: string): string =>
  cell
    .replace(loweredCell, (_, before: string, digit: string, power: string) => `${before}${digit}e${exponent(power)}`)
    .replace(bare, (_, sign: string, plain?: string, raised?: string) => `${sign}1e${exponent(plain, raised)}`)

/**
 * Powers that lost their height in a line whose cells blanks part. The sign must stand at the 10: in `298 x 10 -7` a sample x, a count and a logarithm may stand beside
 * each other.
 */
export const lineWithLoweredPowers = (line: string): string =>
  line.replaceAll(loweredWord, (_, before: string, digit: string, power: string) => `${before}${digit}e${exponent(power)}`)

/** `7.87 × 107`: a power without height and sign, or a product. */
export const hasPowerWithoutSign = (line: string): boolean => withoutSign.test(line)

/** What is said of it, behind the text that holds it, and the way out. */
export const powerWithoutSign = {
  reason: 'holds a power of ten whose raised digits were lost: “× 107” may be 10^7 or a hundred and seven.',
  remedy: 'Write it as 7.87e7 or 7.87 × 10^7.',
} as const

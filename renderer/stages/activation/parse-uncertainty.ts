import { studyLimits } from '../../../shared-kinetics/contract/study-document.ts'
import { parsePercent, parseTemperatureDifference, parseTime, type Parsed } from '../../../shared-kinetics/units/parse-quantity.ts'

const notNegative = <T extends number>(parsed: Parsed<T>): Parsed<number> =>
  parsed.ok && parsed.value < 0 ? { ok: false, reason: 'a standard uncertainty is never below zero' } : parsed

/** A standard uncertainty of temperatures: "0.5 K", "0,5", "1 °F". */
export const parseTemperatureUncertainty = (text: string): Parsed<number> => notNegative(parseTemperatureDifference(text))

/** That of a thermal lag: "1 s", "0,02 min"; a bare number is in seconds. */
export const parseLag = (text: string): Parsed<number> => notNegative(parseTime(/\d\s*$/.test(text) ? `${text} s` : text))

/** That of a heating rate, as a share: "2 %", "2". */
export function parseShare(text: string): Parsed<number> {
  const parsed = notNegative(parsePercent(text))
  return parsed.ok && parsed.value >= 1 ? { ok: false, reason: 'an uncertainty of a heating rate is below 100 %' } : parsed
}

function parseWhole(text: string): number | null {
  const digits = text.trim().replaceAll(/(?<=\d)[\s\u00a0\u202f](?=\d{3})/g, '')
  return /^\d{1,15}$/.test(digits) ? Number(digits) : null
}

/** How many draws are made: "2000". */
export function parseDraws(text: string): Parsed<number> {
  const value = parseWhole(text)
  return value !== null && value >= 100 && value <= studyLimits.draws
    ? { ok: true, value }
    : { ok: false, reason: `draws are a whole number from 100 to ${studyLimits.draws}` }
}

/** Where the random numbers begin: "1". */
export function parseSeed(text: string): Parsed<number> {
  const value = parseWhole(text)
  return value === null ? { ok: false, reason: 'a seed is a whole number, 0 or above' } : { ok: true, value }
}

import { studyLimits } from '../../../shared-kinetics/contract/study-document.ts'
import { parsePercent, parseTemperatureDifference, parseTime, type Parsed } from '../../../shared-kinetics/units/parse-quantity.ts'

const notNegative = <T extends number>(parsed: Parsed<T>): Parsed<number> =>
  parsed.ok && parsed.value < 0 ? { ok: false, reason: 'a standard uncertainty is never below zero' } : parsed

const coverage = /[,;]?\s*(?:\(\s*k\s*=\s*(?<inside>[^()]*)\)|k\s*=\s*(?<bare>\S+))\s*$/i

/** Reads an expanded uncertainty as the standard one that it is: "0.3 K (k=2)" is 0.15 K. Without a k what stands there is a standard uncertainty already. */
const asStandard =
  (parse: (text: string) => Parsed<number>) =>
  (text: string): Parsed<number> => {
    const found = coverage.exec(text)
    if (found === null) return parse(text)
    const k = Number((found.groups?.['inside'] ?? found.groups?.['bare'] ?? '').trim().replace(',', '.'))
    if (!(k > 0) || !Number.isFinite(k)) return { ok: false, reason: 'the coverage factor k is a number above zero, as in 0.3 K (k=2)' }
    const parsed = parse(text.slice(0, found.index))
    return parsed.ok ? { ok: true, value: parsed.value / k } : parsed
  }

/** A standard uncertainty of temperatures: "0.5 K", "0,5", "1 °F"; an expanded one with its k, "0.3 K (k=2)". */
export const parseTemperatureUncertainty = asStandard((text) => notNegative(parseTemperatureDifference(text)))

/** That of a thermal lag: "1 s", "0,02 min"; a bare number is in seconds. */
export const parseLag = asStandard((text) => notNegative(parseTime(/\d\s*$/.test(text) ? `${text} s` : text)))

/** That of a heating rate, as a share: "2 %", "2". */
export const parseShare = asStandard((text) => {
  const parsed = notNegative(parsePercent(text))
  return parsed.ok && parsed.value >= 1 ? { ok: false, reason: 'an uncertainty of a heating rate is below 100 %' } : parsed
})

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

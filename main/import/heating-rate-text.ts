/** A heating rate read from words, and the words. */
export interface HeatingRateText {
  readonly heatingRate_K_per_s: number
  readonly text: string
}

const secondsPer = { s: 1, min: 60, h: 3600 } as const

const inWords =
  /(?<![\d.,])(?<!(?:^|[\s(:;])[-\u2212])(\d+(?:[.,]\d+)?)\s*(K|k|\u00b0\s?[CFcf]|deg\.?\s?[CKFckf]|[CF]|oC)\s*(?:(\/|per(?=[\s_]))[\s_]*(min(?:utes?)?|s(?:ec(?:onds?)?)?|h(?:ours?|r)?)(?![A-Za-z])|[\s\u00b7*-]?(min)(?![A-Za-z])(?:\s*\^?\s*-\s*1)?)/g

/**
 * Every heating rate in a piece of text: `10 K/min`, `9,0 °C/min`, `5 K per min`, `4 K min⁻¹`. A falling one (`-10 K/min`) is none.
 * `1,000 K/min` could be a thousand or one and is passed over.
 */
export function heatingRatesIn(text: string): readonly HeatingRateText[] {
  const plain = text
    .replace(/[\u00ba\u02da]/g, '\u00b0')
    .normalize('NFKC')
    .replace(/\u2212/g, '-')
  const found: HeatingRateText[] = []
  for (const match of plain.matchAll(inWords)) {
    const [whole, number = '', unit = '', , long, short] = match
    if (/^[1-9]\d{0,2},\d{3}$/.test(number)) continue
    const perTime = (long ?? short ?? 'min').charAt(0)
    const seconds = perTime === 's' ? secondsPer.s : perTime === 'h' ? secondsPer.h : secondsPer.min
    const kelvin = Number(number.replace(',', '.')) / (/f$/i.test(unit) ? 1.8 : 1)
    if (kelvin > 0) found.push({ heatingRate_K_per_s: kelvin / seconds, text: whole.trim() })
  }
  return found
}

/** The one heating rate of a text; null where it names none or several different ones. */
export function heatingRateIn(text: string): HeatingRateText | null {
  return theOnly(heatingRatesIn(text))
}

const spelled = /(?<!\d|\d[.,p])(\d+(?:[.,p]\d+)?)[\s_-]*(K|k|\u00b0?C|degC|oC)[\s_-]*(?:per|p)?[\s_-]*min(?:ute)?s?(?![A-Za-z])/g
const bare = /(?<!\d|\d[.,p])(\d+(?:[.,p]\d+)?) ?K(?![A-Za-z0-9])/g
const holds = /hold|iso(?:therm|[\s_-]|$)/i
// `300K` alone is a temperature more often than a heating rate.
const largestBare_K_per_min = 200

/**
 * The one heating rate in a file's name: `lk3_9Kmin`, `cure 2.5 K per min`, `2p5Kmin`, `5 C-min`, `10K_R2`. A bare number, a number of
 * degrees (`hold 120 C`) and a bare `K` in the name of a hold are none.
 */
export function heatingRateOfName(baseName: string): HeatingRateText | null {
  const found = [...baseName.matchAll(spelled)]
  const matches = found.length > 0 ? found : holds.test(baseName) ? [] : [...baseName.matchAll(bare)]
  return theOnly(
    matches
      .map(([whole, number = '']) => ({ number: Number(number.replace(/[,p]/, '.')), text: whole.trim() }))
      .filter(({ number }) => number > 0 && (found.length > 0 || number <= largestBare_K_per_min))
      .map(({ number, text }) => ({ heatingRate_K_per_s: number / 60, text })),
  )
}

function theOnly(rates: readonly HeatingRateText[]): HeatingRateText | null {
  const [first] = rates
  return first !== undefined && rates.every((rate) => rate.heatingRate_K_per_s === first.heatingRate_K_per_s) ? first : null
}

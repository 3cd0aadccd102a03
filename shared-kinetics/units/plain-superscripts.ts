const digits = '⁰¹²³⁴⁵⁶⁷⁸⁹'

/** Raised digits as a caret and plain ones: `s⁻¹` becomes `s^-1`, `10⁵` becomes `10^5`. */
export const plainSuperscripts = (text: string): string =>
  text.replaceAll(/[⁻⁺]?[⁰¹²³⁴⁵⁶⁷⁸⁹]+/g, (power) => `^${Array.from(power, plainSign).join('')}`)

const plainSign = (sign: string): string => (sign === '⁻' ? '-' : sign === '⁺' ? '' : String(digits.indexOf(sign)))

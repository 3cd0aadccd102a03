/** Half a unit of the last printed digit of a decimal number, which may have an exponent: 0.005 for "1.23", 5e-6 for "-9.8e-4". */
export function halfUnit(printed: string): number {
  const [mantissa = '', exponent = '0'] = printed.split('e')
  return 0.5 * 10 ** (Number(exponent) - (mantissa.split('.')[1] ?? '').length)
}

/** How far a value lies from a printed one, in units of what the printed digits leave open: at most 1 where the value rounds to them. */
export function inHalfUnits(value: number, printed: string): number {
  return Math.abs(value - Number(printed)) / halfUnit(printed)
}

/** What `inHalfUnits` may come to in tables that were rounded twice, first to one digit more: 1.9745 to 1.975 and that to 1.98. */
export const roundedTwice = 1.1

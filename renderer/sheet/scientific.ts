import type { Maybe } from '../../shared-kinetics/contract/study-result.ts'

/** A number to so many digits: plain where it is of ordinary size, else with a power of ten as `3.46e-5`; empty where it is not to be had. */
export function scientific(value: Maybe | undefined, digits = 3): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return ''
  const size = Math.abs(value)
  if (size !== 0 && (size < 1e-2 || size >= 1e5)) return value.toExponential(digits - 1).replace('e+', 'e')
  return Number(value.toPrecision(digits)).toFixed(Math.max(0, digits - 1 - Math.floor(Math.log10(size || 1))))
}

/** A number to three digits in a text, where no power can be raised: by `e` where zeros would have to be counted. */
export function digitsText(value: number, digits = 3): string {
  const size = Math.abs(value)
  const text =
    size !== 0 && (size < 1e-3 || size >= 1e6)
      ? value.toExponential(digits - 1).replace('e+', 'e')
      : String(Number(value.toPrecision(digits)))
  return text.replaceAll('-', '−')
}

/** A number and its power of ten, apart; the power is empty where there is none. */
export function mantissaAndPower(text: string): readonly [string, string] {
  const [mantissa = '', power = ''] = text.split('e')
  return [mantissa.replace('-', '−'), power.replace('-', '−')]
}

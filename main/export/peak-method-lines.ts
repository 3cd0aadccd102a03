import { peakConversionWords } from '../../shared-kinetics/figure/peak-conversion-words.ts'
import type { PeakMethodNumber, PeakMethodResult } from '../../shared-kinetics/tasks/study-result.ts'
import { kelvinToCelsius } from '../../shared-kinetics/units/convert.ts'

/** One method as lines of text: what it gives, or why it does not apply; then its numbers, remarks and source. */
export function peakMethodLines(result: PeakMethodResult): string[] {
  const name = result.runLabel === null ? result.label : `${result.label}, ${result.runLabel}`
  if (!result.applies) return [`${name}: does not apply. ${result.reason ?? ''}`]
  return [
    `${name}: ${[energyText(result), lnAText(result), ...result.numbers.flatMap(numberText)].join(', ')}. Method: ${result.sources.join('; ')}`,
    ...[peakConversionWords(result.numbers) ?? [], result.remarks].flat().map((remark) => `  ${remark}`),
  ]
}

function energyText({
  Ea_kJ_per_mol: Ea,
  standardError_kJ_per_mol: error,
  lower95_kJ_per_mol: lower,
  upper95_kJ_per_mol: upper,
  dof,
}: PeakMethodResult): string {
  if (Ea === null) return 'no Ea'
  if (error === null || lower === null || upper === null) return `Ea ${Ea.toFixed(2)} kJ/mol, no interval`
  return `Ea ${Ea.toFixed(2)} kJ/mol, standard error ${error.toFixed(2)} (95 % Student-t, ${dof} degrees of freedom: ${lower.toFixed(1)} to ${upper.toFixed(1)})`
}

function lnAText({ lnA_per_s: lnA, lnAStandardError: error }: PeakMethodResult): string {
  if (lnA === null) return 'no A'
  return `ln A ${lnA.toFixed(2)}${error === null ? '' : `, standard error ${error.toFixed(2)}`} (A in 1/s)`
}

function numberText({ label, value, standardError, unit }: PeakMethodNumber): string[] {
  if (value === null) return []
  const error = (digits: number): string => (standardError === null ? '' : `, standard error ${standardError.toFixed(digits)}`)
  switch (unit) {
    case 'K':
      return [`${label} ${value.toFixed(2)} K (${kelvinToCelsius(value).toFixed(2)} °C)${standardError === null ? '' : `${error(2)} K`}`]
    case 'kJ/mol':
      return [`${label} ${value.toFixed(2)} kJ/mol${error(2)}`]
    case '1':
      return [`${label} ${value.toFixed(3)}${error(3)}`]
  }
}

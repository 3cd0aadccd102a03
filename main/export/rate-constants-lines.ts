import type {
  ArrheniusResult,
  EstimateResult,
  RateConstantPrediction,
  RateConstantsResult,
} from '../../shared-kinetics/tasks/rate-constants-result.ts'
import { kelvinToCelsius } from '../../shared-kinetics/units/convert.ts'

/** What follows from a table of rate constants, in a few lines for a terminal and for the text beside a table. */
export function rateConstantLines(result: RateConstantsResult): readonly string[] {
  const { line, weightedLine, eyring, rateUnit } = result
  if (line.Ea_kJ_per_mol === null) return ['Ea: none']
  return [
    ...arrheniusLines(line, rateUnit, ''),
    ...(weightedLine === null ? [] : arrheniusLines(weightedLine, rateUnit, ', weighted by stated uncertainties')),
    ...result.factorsPer10K.flatMap(({ from_K, factor, lower95, upper95 }) =>
      factor === null ? [] : [`factor per 10 K from ${celsius(from_K)}: ${digits(factor)}${range(lower95, upper95, digits)}`],
    ),
    ...(eyring === null ? [] : eyringLines(eyring)),
    ...result.predictions.flatMap((row) => predictionLine(row, rateUnit)),
  ]
}

/** The same with the 95 % named once, as a terminal shows it. */
export const rateConstantsShortTable = (result: RateConstantsResult): string =>
  [
    `${result.line.points} rate constants at ${result.line.distinctTemperatures} temperatures${result.rateUnit === '' ? '' : `, in ${result.rateUnit}`}; in brackets 95 % intervals (Student-t, each by itself)`,
    ...rateConstantLines(result),
    '',
  ].join('\n')

function arrheniusLines(line: ArrheniusResult, unit: string, which: string): readonly string[] {
  const { Ea_kJ_per_mol: Ea, lnA } = line
  if (Ea === null || lnA === null) return []
  const fixed = (value: number): string => value.toFixed(2)
  const A = line.A === null ? '' : `, A ${digits(line.A)}${unit === '' ? '' : ` ${unit}`}`
  return [
    `Ea${which}: ${fixed(Ea)} kJ/mol${error(line.standardError_kJ_per_mol, fixed)}${range(line.lower95_kJ_per_mol, line.upper95_kJ_per_mol, fixed)}`,
    `ln A${which}: ${fixed(lnA)}${error(line.lnAStandardError, fixed)}${range(line.lnALower95, line.lnAUpper95, fixed)}${A}`,
  ]
}

function eyringLines(eyring: NonNullable<RateConstantsResult['eyring']>): readonly string[] {
  const fixed = (value: number): string => value.toFixed(2)
  const one = (name: string, estimate: EstimateResult, unit: string): string[] =>
    estimate.value === null
      ? []
      : [
          `${name}: ${fixed(estimate.value)} ${unit}${error(estimate.standardError, fixed)}${range(estimate.lower95, estimate.upper95, fixed)}`,
        ]
  const state = eyring.standardStateOf === null ? '' : `, standard state of ${eyring.standardStateOf}`
  return [
    ...one('enthalpy of activation', eyring.enthalpy_kJ_per_mol, 'kJ/mol'),
    ...one(`entropy of activation${state}`, eyring.entropy_J_per_mol_K, 'J/(mol K)'),
    ...one(`Gibbs energy of activation at ${celsius(eyring.gibbsAt_K)}${state}`, eyring.gibbs_kJ_per_mol, 'kJ/mol'),
  ]
}

function predictionLine(row: RateConstantPrediction, unit: string): readonly string[] {
  if (row.rateConstant === null) return []
  const { side, beyond_K } = row.extrapolation
  const beyond = side === 'inside' ? '' : `; ${digits(beyond_K)} K ${side} the data`
  const ends =
    row.lineLower95 === null || row.newLower95 === null
      ? ''
      : ` (line ${range(row.lineLower95, row.lineUpper95, digits).slice(2, -1)}, new measurement ${range(row.newLower95, row.newUpper95, digits).slice(2, -1)})`
  return [`k at ${celsius(row.temperature_K)}: ${digits(row.rateConstant)}${unit === '' ? '' : ` ${unit}`}${ends}${beyond}`]
}

const range = (lower: number | null, upper: number | null, text: (value: number) => string): string =>
  lower === null || upper === null ? '' : ` (${text(lower)} to ${text(upper)})`
const error = (value: number | null, text: (value: number) => string): string =>
  value === null ? '' : `, standard error ${value < 0.005 ? '<0.01' : text(value)}`
const digits = (value: number): string => String(Number(value.toPrecision(4)))
const celsius = (kelvin: number): string => `${Number(kelvinToCelsius(kelvin).toFixed(2))} °C`

import { holdFitsShort } from './hold-fits-lines.ts'
import type {
  ArrheniusResult,
  EstimateResult,
  RateConstantPrediction,
  RateConstantsResult,
} from '../../shared-kinetics/tasks/rate-constants-result.ts'
import { noIntervalWords, scatterOnlyWords, type RateIntervalStatus } from '../../shared-kinetics/rate-constants/interval-status.ts'
import type { TemperatureUnit } from '../../shared-kinetics/rate-constants/rate-constant-table.ts'
import { kelvinToCelsius } from '../../shared-kinetics/units/convert.ts'

/** Pairs of neighbouring temperatures that a terminal shows; the text beside a table holds all. */
const shortPairs = 12

/** The unit that a temperature of a prediction was asked in, by kelvin; the unit of the table where it is not known. */
export type AskedIn = ReadonlyMap<number, TemperatureUnit>

/** What follows from a table of rate constants, in a few lines for a terminal and for the text beside a table. */
export function rateConstantLines(
  result: RateConstantsResult,
  mostPairs = Number.POSITIVE_INFINITY,
  askedIn: AskedIn = new Map(),
): readonly string[] {
  const { line, weightedLine, eyring, rateUnit } = result
  if (line.Ea_kJ_per_mol === null) return ['Ea: none']
  return [
    ...arrheniusLines(line, result, ''),
    ...(weightedLine === null ? [] : arrheniusLines(weightedLine, result, ', weighted by stated uncertainties')),
    ...result.factorsPer10K.flatMap(({ from_K, isWithinData, factor, lower95, upper95 }) =>
      factor === null
        ? []
        : [
            `factor per 10 K from ${temperature(from_K, result.temperatureUnitShown)}${isWithinData ? '' : ', not within the data'}: ${digits(factor)}${range(lower95, upper95, digits) || whyNone(line.intervalStatus)}`,
          ],
    ),
    ...(eyring === null ? [] : eyringLines(eyring, result)),
    ...betweenLines(result, mostPairs),
    ...result.predictions.flatMap((row) => predictionLine(row, rateUnit, askedIn.get(row.temperature_K) ?? result.temperatureUnitShown)),
  ]
}

/** The same with the 95 % named once, as a terminal shows it. */
export const rateConstantsShortTable = (result: RateConstantsResult, askedIn?: AskedIn): string =>
  [
    `${result.line.points} rate constants at ${result.line.distinctTemperatures} temperatures${result.rateUnit === '' ? '' : `, in ${result.rateUnit}`}; in brackets 95 % intervals (Student-t, each by itself)`,
    ...rateConstantLines(result, shortPairs, askedIn),
    ...holdFitsShort(result),
    '',
  ].join('\n')

function arrheniusLines(line: ArrheniusResult, result: RateConstantsResult, which: string): readonly string[] {
  const unit = result.rateUnit
  const { Ea_kJ_per_mol: Ea, lnA } = line
  if (Ea === null || lnA === null) return []
  const A = line.A === null ? '' : `, A ${digits(line.A)}${unit === '' ? '' : ` ${unit}`}${range(line.ALower95, line.AUpper95, digits)}`
  const none = whyNone(line.lnAIntervalStatus)
  return [
    `Ea${which}: ${fixed(Ea)} kJ/mol${error(line.standardError_kJ_per_mol, fixed)}${range(line.lower95_kJ_per_mol, line.upper95_kJ_per_mol, fixed)}${whyNone(line.intervalStatus) || scatterOnly(result)}`,
    `ln A${which}: ${fixed(lnA)}${error(line.lnAStandardError, fixed)}${range(line.lnALower95, line.lnAUpper95, fixed)}${A}${none}`,
  ]
}

/** Two temperatures leave no interval but that of stated uncertainties. */
function betweenLines({ betweenTemperatures: pairs, temperatureUnitShown: unit }: RateConstantsResult, most: number): readonly string[] {
  const shown = pairs
    .slice(0, most)
    .flatMap(({ from_K, to_K, Ea_kJ_per_mol: Ea, lnA, ...pair }) =>
      Ea === null
        ? []
        : [
            `Ea between ${temperature(from_K, unit)} and ${temperature(to_K, unit)}: ${fixed(Ea)} kJ/mol${pair.intervalStatus === 'ok' ? `${error(pair.standardUncertainty_kJ_per_mol, fixed, 'standard uncertainty')}${range(pair.lower95_kJ_per_mol, pair.upper95_kJ_per_mol, fixed)} by the stated uncertainties` : ''}${lnA === null ? '' : `, ln A ${fixed(lnA)}`}`,
          ],
    )
  return pairs.length > most ? [...shown, `and between ${pairs.length - most} further pairs of neighbouring temperatures`] : shown
}

const estimateLine = (name: string, estimate: EstimateResult, unit: string, remark: string): string[] =>
  estimate.value === null
    ? []
    : [
        `${name}: ${fixed(estimate.value)} ${unit}${error(estimate.standardError, fixed)}${range(estimate.lower95, estimate.upper95, fixed)}${remark}`,
      ]

function eyringLines(eyring: NonNullable<RateConstantsResult['eyring']>, result: RateConstantsResult): readonly string[] {
  const unit = result.temperatureUnitShown
  const none = whyNone(eyring.entropyIntervalStatus)
  const state = eyring.standardStateOf === null ? '' : `, standard state of ${eyring.standardStateOf}`
  return [
    ...estimateLine('enthalpy of activation', eyring.enthalpy_kJ_per_mol, 'kJ/mol', whyNone(eyring.intervalStatus) || scatterOnly(result)),
    ...estimateLine(`entropy of activation${state}`, eyring.entropy_J_per_mol_K, 'J/(mol K)', none),
    ...estimateLine(
      `Gibbs energy of activation at ${temperature(eyring.gibbsAt_K, unit)}${state}`,
      eyring.gibbs_kJ_per_mol,
      'kJ/mol',
      none,
    ),
  ]
}

function predictionLine(row: RateConstantPrediction, unit: string, shown: TemperatureUnit): readonly string[] {
  if (row.lnK === null) return []
  const { side, beyond_K, beyondInSpans } = row.extrapolation
  const spans = beyondInSpans === null || beyondInSpans < 1 ? '' : `, ${digits(Number(beyondInSpans.toPrecision(2)))} of their span in 1/T`
  const beyond = `${whyNone(row.intervalStatus)}${side === 'inside' ? '' : `; ${digits(beyond_K)} K ${side} the data${spans}`}`
  if (row.rateConstant === null) {
    const ofLine = row.lnLineLower95 === null ? '' : ` (line ${range(row.lnLineLower95, row.lnLineUpper95, fixed).slice(2, -1)})`
    return [`ln k at ${temperature(row.temperature_K, shown)}: ${fixed(row.lnK)}, k is beyond the range of numbers${ofLine}${beyond}`]
  }
  const ends =
    row.lineLower95 === null || row.newLower95 === null
      ? ''
      : ` (line ${range(row.lineLower95, row.lineUpper95, digits).slice(2, -1)}, new measurement ${range(row.newLower95, row.newUpper95, digits).slice(2, -1)})`
  return [`k at ${temperature(row.temperature_K, shown)}: ${digits(row.rateConstant)}${unit === '' ? '' : ` ${unit}`}${ends}${beyond}`]
}

const whyNone = (status: RateIntervalStatus): string => {
  const words = noIntervalWords(status)
  return words === null ? '' : `; ${words}`
}

const scatterOnly = ({ modelFollowsHolds }: RateConstantsResult): string => (modelFollowsHolds === false ? `, ${scatterOnlyWords}` : '')

const range = (lower: number | null, upper: number | null, text: (value: number) => string): string =>
  lower === null || upper === null ? '' : ` (${text(lower)} to ${text(upper)})`
const error = (value: number | null, text: (value: number) => string, name = 'standard error'): string =>
  value === null ? '' : `, ${name} ${value < 0.005 ? '<0.01' : text(value)}`
const fixed = (value: number): string => value.toFixed(2)

/** Four digits; by a power of ten where zeros would have to be counted. */
function digits(value: number): string {
  const size = Math.abs(value)
  return size !== 0 && (size < 1e-3 || size >= 1e6) ? value.toExponential(3).replace('e+', 'e') : String(Number(value.toPrecision(4)))
}

/** As the table gives temperatures, or as they were asked for; kelvins with °C behind them. */
function temperature(kelvin: number, unit: TemperatureUnit): string {
  const celsius = kelvinToCelsius(kelvin)
  if (unit === 'F') return `${Number((celsius * 1.8 + 32).toFixed(2))} °F`
  return unit === 'C' ? `${Number(celsius.toFixed(2))} °C` : `${Number(kelvin.toFixed(2))} K (${Number(celsius.toFixed(2))} °C)`
}

import type { TableStyle } from '../../shared-kinetics/contract/host-api.ts'
import type {
  ArrheniusResult,
  EstimateResult,
  FactorPer10KResult,
  RateConstantPrediction,
  RateConstantRowResult,
  RateConstantsResult,
} from '../../shared-kinetics/tasks/rate-constants-result.ts'
import { noIntervalWords, scatterOnlyWords } from '../../shared-kinetics/rate-constants/interval-status.ts'
import { kelvinToCelsius } from '../../shared-kinetics/units/convert.ts'
import { csvTable, type CsvCell } from './csv-table.ts'

/** A quantity in one row of the table. */
interface QuantityRow {
  readonly quantity: string
  readonly label?: string | null
  readonly temperature_K?: number
  readonly unit: string
  readonly value: number | null
  readonly standardError?: number | null
  readonly lower?: number | null
  readonly upper?: number | null
  readonly intervalOf?: string
  readonly residual?: number | null
  /** Why there is no interval, what it does not cover, or what k was fitted under. */
  readonly remark?: string | null
}

const headings = [
  'quantity',
  'label',
  'temperature (K)',
  'temperature (degC)',
  'unit',
  'value',
  'standard error',
  'lower 95 %',
  'upper 95 %',
  'interval of',
  'residual of ln k',
  'remark',
]

/**
 * The text of `rate-constants.csv`: one heading row and one row a quantity: Ea, ln A and A, transition-state parameters, Ea and ln A between neighbouring temperatures, factors per 10 K, then each measured and
 * each predicted k with its temperature. What is not to be had is an empty cell, and the remark says why.
 */
export function rateConstantsCsv(result: RateConstantsResult, style: TableStyle): string {
  const rows = [
    ...lineRows(result.line, result, ''),
    ...(result.weightedLine === null ? [] : lineRows(result.weightedLine, result, ', weighted by stated uncertainties')),
    ...eyringRows(result),
    ...betweenRows(result),
    ...result.factorsPer10K.map((factor) => factorRow(factor, result)),
    ...measuredRows(result),
    ...result.predictions.flatMap((row) => predictionRows(row, result)),
  ]
  return csvTable([headings, ...rows.map(cells)], style)
}

function cells(row: QuantityRow): readonly CsvCell[] {
  const T = row.temperature_K
  return [
    row.quantity,
    row.label ?? null,
    T === undefined ? null : numberCell(T),
    T === undefined ? null : numberCell(Number(kelvinToCelsius(T).toFixed(6))),
    row.unit === '' ? null : row.unit,
    numberCell(row.value),
    numberCell(row.standardError),
    numberCell(row.lower),
    numberCell(row.upper),
    // Nothing is the interval of anything where there are no ends.
    row.lower === null && row.upper === null ? null : (row.intervalOf ?? null),
    numberCell(row.residual),
    row.remark ?? null,
  ]
}

/** Very small and very large numbers keep their digits by a power of ten, which spreadsheets read as a number. */
function numberCell(value: number | null | undefined): CsvCell {
  if (value === null || value === undefined || !Number.isFinite(value)) return null
  const size = Math.abs(value)
  return size !== 0 && (size < 1e-4 || size >= 1e9) ? { withPower: value } : value
}

const parameter = 'the parameter, Student-t'
const statedUncertainties = 'the parameter, from stated uncertainties of k'

/** The interval of Ea, and of what follows from Ea alone, knows only the scatter of ln k. */
const scatterOnly = ({ modelFollowsHolds }: RateConstantsResult): string | null => (modelFollowsHolds === false ? scatterOnlyWords : null)

function lineRows(line: ArrheniusResult, result: RateConstantsResult, which: string): readonly QuantityRow[] {
  const unit = result.rateUnit
  const inUnit = unit === '' ? 'unit of k, not stated' : unit
  return [
    {
      quantity: `Ea${which}`,
      unit: 'kJ/mol',
      value: line.Ea_kJ_per_mol,
      standardError: line.standardError_kJ_per_mol,
      lower: line.lower95_kJ_per_mol,
      upper: line.upper95_kJ_per_mol,
      intervalOf: parameter,
      remark: noIntervalWords(line.intervalStatus) ?? scatterOnly(result),
    },
    {
      quantity: `ln A${which}`,
      unit: `A in ${inUnit}`,
      value: line.lnA,
      standardError: line.lnAStandardError,
      lower: line.lnALower95,
      upper: line.lnAUpper95,
      intervalOf: parameter,
      remark: noIntervalWords(line.lnAIntervalStatus),
    },
    {
      quantity: `A${which}`,
      unit: inUnit,
      value: line.A,
      lower: line.ALower95,
      upper: line.AUpper95,
      intervalOf: parameter,
      remark: noIntervalWords(line.lnAIntervalStatus),
    },
  ]
}

const estimateRow = (quantity: string, unit: string, estimate: EstimateResult, temperature_K?: number): QuantityRow => ({
  quantity,
  unit,
  value: estimate.value,
  standardError: estimate.standardError,
  lower: estimate.lower95,
  upper: estimate.upper95,
  intervalOf: parameter,
  ...(temperature_K === undefined ? {} : { temperature_K }),
})

function eyringRows(result: RateConstantsResult): readonly QuantityRow[] {
  const { eyring } = result
  if (eyring === null) return []
  const remark = noIntervalWords(eyring.entropyIntervalStatus)
  const state = eyring.standardStateOf === null ? '' : ` (standard state of ${eyring.standardStateOf})`
  return [
    {
      ...estimateRow('enthalpy of activation', 'kJ/mol', eyring.enthalpy_kJ_per_mol),
      remark: noIntervalWords(eyring.intervalStatus) ?? scatterOnly(result),
    },
    { ...estimateRow(`entropy of activation${state}`, 'J/(mol K)', eyring.entropy_J_per_mol_K), remark },
    { ...estimateRow(`Gibbs energy of activation${state}`, 'kJ/mol', eyring.gibbs_kJ_per_mol, eyring.gibbsAt_K), remark },
  ]
}

/** The temperature is the colder of the two; the label names both. Two temperatures leave no interval but that of the stated uncertainties. */
const betweenRows = ({ betweenTemperatures, rateUnit, modelFollowsHolds }: RateConstantsResult): readonly QuantityRow[] =>
  betweenTemperatures.flatMap((pair) => {
    const { from_K, to_K } = pair
    const isOf = pair.intervalStatus === 'ok' ? { intervalOf: statedUncertainties } : {}
    const remark = noIntervalWords(pair.intervalStatus)
    const place = { label: `${Number(from_K.toFixed(3))} K to ${Number(to_K.toFixed(3))} K`, temperature_K: from_K }
    return [
      {
        ...place,
        quantity: 'Ea between two temperatures',
        unit: 'kJ/mol',
        value: pair.Ea_kJ_per_mol,
        standardError: pair.standardUncertainty_kJ_per_mol,
        lower: pair.lower95_kJ_per_mol,
        upper: pair.upper95_kJ_per_mol,
        ...isOf,
        remark,
      },
      {
        ...place,
        quantity: 'ln A between two temperatures',
        unit: `A in ${rateUnit === '' ? 'unit of k, not stated' : rateUnit}`,
        value: pair.lnA,
        standardError: pair.lnAStandardUncertainty,
        lower: pair.lnALower95,
        upper: pair.lnAUpper95,
        ...(pair.lnALower95 === null ? {} : isOf),
        remark: modelFollowsHolds === false ? noIntervalWords('model-does-not-follow-holds') : remark,
      },
    ]
  })

/** The 10 K from a temperature may lie beyond the data though the temperature does not. */
const factorRow = ({ from_K, isWithinData, factor, lower95, upper95 }: FactorPer10KResult, result: RateConstantsResult): QuantityRow => ({
  label: isWithinData ? 'inside the data' : 'not within the data',
  remark: noIntervalWords(result.line.intervalStatus) ?? scatterOnly(result),
  quantity: 'factor per 10 K, from this temperature',
  temperature_K: from_K,
  unit: '',
  value: factor,
  lower: lower95,
  upper: upper95,
  intervalOf: 'the factor, from that of Ea',
})

function measuredRows({ rows, rateUnit }: RateConstantsResult): readonly QuantityRow[] {
  return rows.map((row) => ({
    quantity: quantityOf(row),
    label: row.label,
    temperature_K: row.temperature_K,
    unit: rateUnit,
    value: row.rateConstant,
    standardError: row.standardUncertainty ?? row.fitStandardError,
    residual: row.residual,
    remark:
      row.fittedUnder !== null && row.standardUncertainty === null && row.fitStandardError !== null
        ? 'standard error of the fit to the hold'
        : null,
  }))
}

/** k of a hold is fitted under a model, which is part of what it is. */
const quantityOf = ({ use, fittedUnder }: RateConstantRowResult): string =>
  fittedUnder === null ? (use ? 'k, measured' : 'k, not used') : `k, fitted under ${fittedUnder}${use ? '' : ', not used'}`

function predictionRows(row: RateConstantPrediction, result: RateConstantsResult): readonly QuantityRow[] {
  const unit = result.rateUnit
  const remark = noIntervalWords(row.intervalStatus)
  const { side, beyond_K } = row.extrapolation
  const label = side === 'inside' ? 'inside the data' : `${Number(beyond_K.toFixed(2))} K ${side} the data`
  const base = { label, temperature_K: row.temperature_K, unit, value: row.rateConstant, remark }
  const k: readonly QuantityRow[] =
    remark === null
      ? [
          { ...base, quantity: 'k, predicted', lower: row.lineLower95, upper: row.lineUpper95, intervalOf: 'the line at this temperature' },
          { ...base, quantity: 'k, predicted', lower: row.newLower95, upper: row.newUpper95, intervalOf: 'a new measurement' },
        ]
      : [{ ...base, quantity: 'k, predicted' }]
  return [
    ...k,
    {
      quantity: 'ln k, predicted',
      label,
      temperature_K: row.temperature_K,
      unit: `k in ${unit === '' ? 'unit of k, not stated' : unit}`,
      value: row.lnK,
      lower: row.lnLineLower95,
      upper: row.lnLineUpper95,
      ...(remark === null ? { intervalOf: 'the line at this temperature' } : {}),
      remark,
    },
    { quantity: 'exp(-Ea/RT)', label, temperature_K: row.temperature_K, unit: '', value: row.exponentialFactor },
    factorRow(row.factorPer10K, result),
  ]
}

import type {
  ArrheniusResult,
  BetweenTemperaturesResult,
  EstimateResult,
  FactorPer10KResult,
  Maybe,
  RateConstantPrediction,
  RateConstantRowResult,
  RateConstantsResult,
  RateIntervalStatus,
  TemperatureUnit,
} from '../../../shared-kinetics/contract/study-result.ts'
import { noIntervalWords, safetyCaution } from '../../../shared-kinetics/figure/result-words.ts'
import { decimals } from '../../sheet/format.ts'
import { scientific } from '../../sheet/scientific.ts'
import { copyText, numberColumn, wordColumn, type DataColumn } from '../../sheet/data-table.ts'
import { inUnit, temperatureUnitWords } from '../runs/rate-constant-edits.ts'
import { holdCopyColumns, modelCopyColumns } from './hold-fit-rows.ts'

/** A quantity that follows from the line, as it stands in the table of results; its texts may hold powers of ten as `1e-5`. */
export interface ParameterRow {
  readonly id: string
  readonly quantity: string
  readonly unit: string
  readonly value: Maybe
  readonly standardError: Maybe
  readonly lower: Maybe
  readonly upper: Maybe
  /** What must be known of the lower end; null where there is nothing. */
  readonly lowerRemark: string | null
  /** What must be known of the value, beside its name; null where there is nothing. */
  readonly remark: string | null
  /** Why no ends stand here; null where they do. */
  readonly noInterval: string | null
  readonly format: (value: Maybe) => string
  readonly formatError: (value: Maybe) => string
}

/** Ea, ln A, A, the transition-state parameters and the factors per 10 K; then, where there is one, the weighted line. */
export function parameterRows(result: RateConstantsResult): readonly ParameterRow[] {
  const { line, weightedLine, eyring, factorsPer10K, temperatureUnitShown: shown } = result
  const model = modelNotFollowed(result)
  return [
    ...lineRows(line, result.rateUnit, '', model),
    ...(weightedLine === null ? [] : lineRows(weightedLine, result.rateUnit, ', weighted', model)),
    ...(eyring === null
      ? []
      : [
          withReason(estimateRow('enthalpy', 'ΔH‡', 'kJ/mol', eyring.enthalpy_kJ_per_mol), eyring.intervalStatus, null),
          withReason(estimateRow('entropy', 'ΔS‡', 'J/(mol K)', eyring.entropy_J_per_mol_K), eyring.entropyIntervalStatus, model),
          withReason(
            estimateRow('gibbs', `ΔG‡ at ${temperatureIn(eyring.gibbsAt_K, shown)}`, 'kJ/mol', eyring.gibbs_kJ_per_mol),
            eyring.entropyIntervalStatus,
            model,
          ),
        ].filter((row) => row.value !== null)),
    ...distinct(factorsPer10K)
      .map((factor, i) => factorRow(factor, i, shown))
      .filter((row) => row.value !== null),
  ]
}

const threeDigits = (value: Maybe): string => scientific(value, 3)

/** @param model - the reaction model under which A was made, where it does not follow the holds; else null */
export function lineRows(line: ArrheniusResult, rateUnit: string, which: string, model: string | null): readonly ParameterRow[] {
  const unit = rateUnit === '' ? 'unit of k' : rateUnit
  const { intervalStatus, lnAIntervalStatus } = line
  return [
    {
      ...withReason(
        measured(`Ea${which}`, `Ea${which}`, 'kJ/mol', {
          value: line.Ea_kJ_per_mol,
          standardError: line.standardError_kJ_per_mol,
          lower95: line.lower95_kJ_per_mol,
          upper95: line.upper95_kJ_per_mol,
        }),
        intervalStatus,
        null,
      ),
      lowerRemark: lowerEndWords(line),
    },
    withReason(
      measured(`lnA${which}`, `ln A${which}`, `(A in ${unit})`, {
        value: line.lnA,
        standardError: line.lnAStandardError,
        lower95: line.lnALower95,
        upper95: line.lnAUpper95,
      }),
      lnAIntervalStatus,
      model,
    ),
    {
      id: `A${which}`,
      quantity: `A${which}`,
      unit,
      value: line.A,
      standardError: null,
      lower: line.ALower95,
      upper: line.AUpper95,
      lowerRemark: null,
      remark: model === null ? null : underModel(model),
      noInterval: line.A === null ? null : reasonWords(lnAIntervalStatus, model),
      format: threeDigits,
      formatError: threeDigits,
    },
  ]
}

/** The reaction model that does not follow the holds that k was made from; null where it does, or k was not made from holds. */
export const modelNotFollowed = ({
  modelFollowsHolds,
  holdFits,
}: Pick<RateConstantsResult, 'modelFollowsHolds' | 'holdFits'>): string | null =>
  modelFollowsHolds === false ? (holdFits?.model ?? 'a reaction model') : null

/** Said beside every number that is as wrong as the model that it rests on. */
export const underModel = (model: string): string => `under ${model}, which does not follow the holds`

/** The same of a result; null where the model follows the holds. */
export function modelRemark(result: Pick<RateConstantsResult, 'modelFollowsHolds' | 'holdFits'>): string | null {
  const model = modelNotFollowed(result)
  return model === null ? null : underModel(model)
}

/** Why there is no interval, with the name of the reaction model where it is because of that; null where there is one. */
export const reasonWords = (status: RateIntervalStatus, model: string | null): string | null =>
  status === 'model-does-not-follow-holds' && model !== null ? `no interval: ${model} does not follow the holds` : noIntervalWords(status)

const joinedWords = (...words: readonly (string | null)[]): string => words.filter((one) => one !== null).join('; ')

const withReason = (row: ParameterRow, status: RateIntervalStatus, model: string | null): ParameterRow => ({
  ...row,
  remark: model === null ? row.remark : underModel(model),
  noInterval: row.value === null ? null : reasonWords(status, model),
})

const estimateRow = (id: string, quantity: string, unit: string, estimate: EstimateResult): ParameterRow =>
  measured(id, quantity, unit, estimate)

/** What is to be said of an interval of Ea that reaches below 0; null of any other. */
export const lowerEndWords = ({ lower95_kJ_per_mol: lower }: Pick<ArrheniusResult, 'lower95_kJ_per_mol'>): string | null =>
  lower !== null && lower < 0 ? 'reaches below 0, where no activation energy lies: these rate constants do not bound Ea from below' : null

/** With as many decimals as leave two digits of the standard error, one at least and three at most. */
function measured(id: string, quantity: string, unit: string, { value, standardError, lower95, upper95 }: EstimateResult): ParameterRow {
  const places = placesOf(standardError)
  const format = (number: Maybe): string => decimals(number, places)
  const formatError = (error: Maybe): string => errorText(error, places)
  return {
    id,
    quantity,
    unit,
    value,
    standardError,
    lower: lower95,
    upper: upper95,
    lowerRemark: null,
    remark: null,
    noInterval: null,
    format,
    formatError,
  }
}

export const placesOf = (standardError: Maybe): number =>
  standardError === null || !(standardError > 0) ? 1 : Math.min(3, Math.max(1, 1 - Math.floor(Math.log10(standardError))))

/** A standard error that is there but too small to be shown is said to be so, never 0. */
export const errorText = (error: Maybe, places: number): string =>
  error !== null && error > 0 && error < 0.5 * 10 ** -places ? `<\u00a0${(10 ** -places).toFixed(places)}` : decimals(error, places)

/** The factor over the middle of the data says nothing new where that begins at the same temperature. */
const distinct = (factors: readonly FactorPer10KResult[]): readonly FactorPer10KResult[] =>
  factors.filter(({ from_K }, i) => factors.findIndex((other) => Math.abs(other.from_K - from_K) < 0.5) === i)

/** Said of a factor per 10 K whose 10 K reach beyond the temperatures used. */
export const notWithinData = 'not within the data'

function factorRow(
  { from_K, isWithinData, factor, lower95, upper95 }: FactorPer10KResult,
  i: number,
  shown: TemperatureUnit,
): ParameterRow {
  return {
    id: `factor-${i}`,
    quantity: `Factor per 10 K from ${temperatureIn(from_K, shown)}`,
    unit: '',
    value: factor,
    standardError: null,
    lower: lower95,
    upper: upper95,
    lowerRemark: null,
    remark: isWithinData ? null : notWithinData,
    noInterval: null,
    format: threeDigits,
    formatError: threeDigits,
  }
}

/** A temperature with its unit, to so many decimals of it at most. */
export const temperatureIn = (temperature_K: number, unit: TemperatureUnit, places = 2): string =>
  `${String(Number(inUnit(temperature_K, unit).toFixed(places))).replace('-', '−')} ${temperatureUnitWords[unit]}`

/** Where a prediction stands to the data: `inside`, `14 K below`. */
export const placeWords = ({ extrapolation: { side, beyond_K } }: RateConstantPrediction): string =>
  side === 'inside' ? 'inside' : `${decimals(beyond_K, beyond_K < 10 ? 1 : 0)} K ${side}`

/** ln k beyond the line, with its sign. */
export function residualText(residual: Maybe): string {
  const text = decimals(residual, 3)
  if (/^−?0\.000$/.test(text)) return '0.000'
  return text === '' || text.startsWith('−') ? text : `+${text}`
}

/** The table of predictions as tab-separated text, with what is to be said wherever a prediction may be used. */
export const copiedPredictions = (result: RateConstantsResult): string =>
  [copyText(predictionCopyColumns(result), result.predictions), safetyCaution].join('\n\n')

/** All tables of the stage, one below the other, as tab-separated text. */
export function copiedTables(result: RateConstantsResult): string {
  return [
    copyText(parameterCopyColumns, parameterRows(result)),
    ...(result.betweenTemperatures.length === 0 ? [] : [copyText(betweenCopyColumns(result), result.betweenTemperatures)]),
    ...(result.predictions.length === 0 ? [] : [copyText(predictionCopyColumns(result), result.predictions)]),
    copyText(rowCopyColumns(result), result.rows),
    ...(result.holdFits === null
      ? []
      : [
          copyText(holdCopyColumns(result.holdFits, result.temperatureUnitShown), result.holdFits.holds),
          copyText(modelCopyColumns(result.holdFits), result.holdFits.models),
        ]),
    ...(result.predictions.length === 0 ? [] : [safetyCaution]),
  ].join('\n\n')
}

export const parameterCopyColumns: readonly DataColumn<ParameterRow>[] = [
  wordColumn('quantity', 'quantity', (row) => row.quantity),
  wordColumn('unit', 'unit', (row) => row.unit),
  numberColumn('value', 'value', '', (row) => row.value),
  numberColumn('error', 'standard error', '', (row) => row.standardError),
  numberColumn('lower', 'lower 95 %', '', (row) => row.lower),
  numberColumn('upper', 'upper 95 %', '', (row) => row.upper),
  wordColumn('remark', 'remark', (row) => joinedWords(row.noInterval ?? row.remark, row.lowerRemark)),
]

const temperatureColumn = <Row extends { readonly temperature_K: number }>({
  temperatureUnitShown: shown,
}: RateConstantsResult): DataColumn<Row> =>
  numberColumn('temperature', 'T', temperatureUnitWords[shown], (row) => Number(inUnit(row.temperature_K, shown).toFixed(6)))

export const betweenCopyColumns = ({
  temperatureUnitShown: shown,
  rateUnit,
}: RateConstantsResult): readonly DataColumn<BetweenTemperaturesResult>[] => [
  numberColumn('from', 'from T', temperatureUnitWords[shown], (row) => Number(inUnit(row.from_K, shown).toFixed(6))),
  numberColumn('to', 'to T', temperatureUnitWords[shown], (row) => Number(inUnit(row.to_K, shown).toFixed(6))),
  numberColumn('Ea', 'Ea', 'kJ/mol', (row) => row.Ea_kJ_per_mol),
  numberColumn('lnA', 'ln A', `A in ${rateUnit === '' ? 'unit of k' : rateUnit}`, (row) => row.lnA),
]

export const predictionCopyColumns = (result: RateConstantsResult): readonly DataColumn<RateConstantPrediction>[] => [
  temperatureColumn(result),
  numberColumn('k', 'k predicted', result.rateUnit, (row) => row.rateConstant),
  numberColumn('lnK', 'ln k predicted', '', (row) => row.lnK),
  numberColumn('line-lower', 'lower 95 %, line', result.rateUnit, (row) => row.lineLower95),
  numberColumn('line-upper', 'upper 95 %, line', result.rateUnit, (row) => row.lineUpper95),
  numberColumn('new-lower', 'lower 95 %, new measurement', result.rateUnit, (row) => row.newLower95),
  numberColumn('new-upper', 'upper 95 %, new measurement', result.rateUnit, (row) => row.newUpper95),
  numberColumn('exponential', 'exp(-Ea/RT)', '', (row) => row.exponentialFactor),
  numberColumn('factor', 'factor per 10 K from T', '', (row) => row.factorPer10K.factor),
  wordColumn('where', 'to the data', placeWords),
  wordColumn('remark', 'remark', (row) =>
    row.lnK === null ? '' : (reasonWords(row.intervalStatus, modelNotFollowed(result)) ?? modelRemark(result) ?? ''),
  ),
]

export const rowCopyColumns = (result: RateConstantsResult): readonly DataColumn<RateConstantRowResult>[] => [
  temperatureColumn(result),
  numberColumn('k', 'k measured', result.rateUnit, (row) => row.rateConstant),
  numberColumn('uncertainty', 'u(k)', result.rateUnit, (row) => row.standardUncertainty),
  numberColumn('fitted', 'k of the line', result.rateUnit, (row) => row.fittedRateConstant),
  numberColumn('residual', 'ln k - line', '', (row) => row.residual),
  numberColumn('exponential', 'exp(-Ea/RT)', '', (row) => row.exponentialFactor),
  wordColumn('use', 'use', (row) => (row.use ? 'yes' : 'no')),
  wordColumn('label', 'label', (row) => row.label ?? ''),
]

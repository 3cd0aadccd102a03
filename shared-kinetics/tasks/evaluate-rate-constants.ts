import { arrheniusLine, arrheniusLineSources, type ArrheniusLine, type Weighting } from '../rate-constants/arrhenius-line.ts'
import { betweenTemperatures, type BetweenTemperatures } from '../rate-constants/between-temperatures.ts'
import { exponentialFactor } from '../rate-constants/exponential-factor.ts'
import { eyringLine, eyringLineSources, type Estimate } from '../rate-constants/eyring-line.ts'
import { expOrNone } from '../rate-constants/exp-or-none.ts'
import type { RateIntervalStatus } from '../rate-constants/interval-status.ts'
import { holdOfRow, modelFollowsHolds } from '../rate-constants/model-of-holds.ts'
import { normalQuantile } from '../numerics/normal.ts'
import { factorPer10K } from '../rate-constants/factor-per-10-k.ts'
import { lineCurvature } from '../rate-constants/line-curvature.ts'
import { predictRateConstant } from '../rate-constants/predict-rate-constant.ts'
import type { RateConstantPoint } from '../rate-constants/rate-constant-point.ts'
import type { FitsOfHolds } from '../rate-constants/fits-of-holds.ts'
import type { RateConstantRow, RateConstantTable } from '../rate-constants/rate-constant-table.ts'
import { reviewRateConstants } from '../review/review-rate-constants.ts'
import { sources } from '../sources.ts'
import { celsiusToKelvin, joulesToKilojoules } from '../units/convert.ts'
import { quantity, type Quantity } from '../units/quantity.ts'
import { parseRateUnit, type RateUnit } from '../units/rate-unit.ts'
import { maybe } from './maybe.ts'
import type {
  ArrheniusResult,
  BetweenTemperaturesResult,
  EstimateResult,
  EyringResult,
  FactorPer10KResult,
  RateConstantBand,
  RateConstantPrediction,
  RateConstantRowResult,
  RateConstantsResult,
} from './rate-constants-result.ts'

const bandPoints = 81

/**
 * A table of rate constants to Ea, A, predictions and findings. Rows not used have a residual and enter nothing.
 *
 * @throws KineticsError `not-finite`, naming the row among those used, where k or T is not above 0
 */
export function evaluateRateConstants(table: RateConstantTable): RateConstantsResult {
  const used = table.rows.filter((row) => row.use)
  const points = used.map(pointOf)
  const data_K = used.map((row) => row.temperature_K)
  const unit = parseRateUnit(table.rateUnit)
  const rateUnit = unit.ok ? unit.value : null
  const line = arrheniusLine(points)
  const holdFits = table.source.kind === 'isothermal-runs' ? (table.holdFits ?? null) : null
  const follows = holdFits === null ? null : modelFollowsHolds(table.rows, holdFits)
  // The scatter of ln k shows nothing of a wrong model: it moves all k alike.
  const isWithheld = follows === false
  const isStated = used.length > 0 && used.every((row) => row.standardUncertainty !== null)
  const curvature = lineCurvature(points)
  const result = {
    rateUnit: rateUnit?.text ?? '',
    temperatureUnitShown: table.temperatureUnitShown,
    source: table.source,
    rows: table.rows.map((row) => rowResult(row, line, holdFits)),
    span: used.length === 0 ? null : { coldest_K: Math.min(...data_K), hottest_K: Math.max(...data_K) },
    line: lineResult(line, 'none', rateUnit, isWithheld),
    weightedLine: isStated ? lineResult(arrheniusLine(points, 'stated-uncertainties'), 'stated-uncertainties', rateUnit, isWithheld) : null,
    eyring: eyringResult(points, rateUnit, isWithheld),
    betweenTemperatures: betweenTemperatures(points).map((pair) => betweenResult(pair, isWithheld)),
    factorsPer10K: factorTemperatures(data_K).map((from) => factorResult(line, data_K, from)),
    predictions: table.predictAt_K.map((at) => predictionResult(line, data_K, quantity(at, 'K'), isWithheld)),
    band: bandOf(line, data_K, table.predictAt_K, isWithheld),
    curvature:
      curvature.status === 'tested'
        ? { t: curvature.t, threshold: curvature.threshold, dof: curvature.dof, isCurved: curvature.isCurved }
        : null,
    holdFits,
    modelFollowsHolds: follows,
  }
  return { ...result, findings: reviewRateConstants({ table, result }) }
}

const pointOf = ({ temperature_K, rateConstant, standardUncertainty }: RateConstantRow): RateConstantPoint => ({
  temperature: quantity(temperature_K, 'K'),
  rateConstant,
  ...(standardUncertainty === null ? {} : { standardUncertainty }),
})

/** A k that was typed over is no longer that of its hold. */
function fitOfRow(row: RateConstantRow, fits: FitsOfHolds | null): Pick<RateConstantRowResult, 'fitStandardError' | 'fittedUnder'> {
  const hold = fits === null ? null : holdOfRow(row, fits)
  if (fits === null || hold === null || hold.rateConstant_per_s !== row.rateConstant) return { fitStandardError: null, fittedUnder: null }
  return { fitStandardError: hold.standardError_per_s, fittedUnder: fits.model }
}

/** Where the line has none, nothing that follows from it has; A and k have none under a reaction model that does not follow the holds. */
function intervalStatusOf(status: ArrheniusLine['status'], isWithheld = false): RateIntervalStatus {
  if (status === 'without-interval') return 'two-temperatures'
  if (status !== 'ok') return 'no-line'
  return isWithheld ? 'model-does-not-follow-holds' : 'ok'
}

const kilojoules = (value: number): number | null => maybe(joulesToKilojoules(quantity(value, 'J/mol')))

function betweenResult(pair: BetweenTemperatures, isWithheld: boolean): BetweenTemperaturesResult {
  const z = normalQuantile(0.975)
  const lnAError = isWithheld ? Number.NaN : pair.lnAStandardUncertainty
  return {
    from_K: pair.from,
    to_K: pair.to,
    Ea_kJ_per_mol: kilojoules(pair.Ea),
    lnA: maybe(pair.lnA),
    intervalStatus: Number.isNaN(pair.standardUncertainty) ? 'two-temperatures' : 'ok',
    standardUncertainty_kJ_per_mol: kilojoules(pair.standardUncertainty),
    lower95_kJ_per_mol: kilojoules(pair.Ea - z * pair.standardUncertainty),
    upper95_kJ_per_mol: kilojoules(pair.Ea + z * pair.standardUncertainty),
    lnAStandardUncertainty: maybe(lnAError),
    lnALower95: maybe(pair.lnA - z * lnAError),
    lnAUpper95: maybe(pair.lnA + z * lnAError),
  }
}

function rowResult(row: RateConstantRow, line: ArrheniusLine, fits: FitsOfHolds | null): RateConstantsResult['rows'][number] {
  const temperature = quantity(row.temperature_K, 'K')
  const { lnK, rateConstant } = predictRateConstant(line, [row.temperature_K], temperature)
  return {
    ...row,
    ...fitOfRow(row, fits),
    lnK: Math.log(row.rateConstant),
    fittedRateConstant: maybe(rateConstant),
    residual: maybe(Math.log(row.rateConstant) - lnK),
    exponentialFactor: maybe(exponentialFactor(line.Ea, temperature)),
  }
}

function lineResult(whole: ArrheniusLine, weighting: Weighting, unit: RateUnit | null, isWithheld: boolean): ArrheniusResult {
  const none = Number.NaN
  const line = isWithheld
    ? { ...whole, lnAStandardError: none, lnALower95: none, lnAUpper95: none, covarianceEaLnA: quantity(none, 'J/mol') }
    : whole
  return {
    weighting,
    status: line.status,
    points: line.points,
    distinctTemperatures: line.distinctTemperatures,
    interval: { kind: 'student-t', level: 0.95, dof: line.dof },
    intervalStatus: intervalStatusOf(line.status),
    lnAIntervalStatus: intervalStatusOf(line.status, isWithheld),
    Ea_kJ_per_mol: maybe(joulesToKilojoules(line.Ea)),
    standardError_kJ_per_mol: maybe(joulesToKilojoules(line.standardError)),
    lower95_kJ_per_mol: maybe(joulesToKilojoules(line.lower95)),
    upper95_kJ_per_mol: maybe(joulesToKilojoules(line.upper95)),
    lnA: maybe(line.lnA),
    lnAStandardError: maybe(line.lnAStandardError),
    lnALower95: maybe(line.lnALower95),
    lnAUpper95: maybe(line.lnAUpper95),
    A: maybe(expOrNone(line.lnA)),
    ALower95: maybe(expOrNone(line.lnALower95)),
    AUpper95: maybe(expOrNone(line.lnAUpper95)),
    lnA_per_s: unit?.isPerTimeOnly === true ? maybe(line.lnA + Math.log(unit.perSecond)) : null,
    covarianceEaLnA_kJ_per_mol: maybe(joulesToKilojoules(line.covarianceEaLnA)),
    slope_K: Number.isNaN(line.Ea) ? null : maybe(line.fit.slope),
    r2: maybe(line.r2),
    residualStandardDeviation: maybe(line.residualStandardDeviation),
    reducedChiSquare: maybe(line.reducedChiSquare),
    sources: arrheniusLineSources.map((key) => sources[key]),
  }
}

function eyringResult(points: readonly RateConstantPoint[], unit: RateUnit | null, isWithheld: boolean): EyringResult | null {
  const line = eyringLine(points, unit?.perSecond ?? null)
  const gibbsAt = gibbsTemperature(points.map((point) => point.temperature))
  if (line.status !== 'ok' && line.status !== 'without-interval') return null
  return {
    status: line.status,
    dof: line.dof,
    intervalStatus: intervalStatusOf(line.status),
    entropyIntervalStatus: intervalStatusOf(line.status, isWithheld),
    enthalpy_kJ_per_mol: estimateResult(line.enthalpy_J_per_mol, joulesToKilojoules),
    entropy_J_per_mol_K: withheldIf(
      isWithheld,
      estimateResult(line.entropy_J_per_mol_K, (value) => value),
    ),
    gibbs_kJ_per_mol: withheldIf(isWithheld, estimateResult(line.gibbsAt(gibbsAt), joulesToKilojoules)),
    gibbsAt_K: gibbsAt,
    standardStateOf: unit === null || unit.isPerTimeOnly ? null : perSecondText(unit.text),
    r2: maybe(line.r2),
    sources: eyringLineSources.map((key) => sources[key]),
  }
}

/** 25 °C where the data reach it, else the middle of 1/T: far from the data the Gibbs energy would say nothing of them. */
function gibbsTemperature(data_K: readonly number[]): Quantity<'K'> {
  const room = celsiusToKelvin(25)
  return room >= Math.min(...data_K) && room <= Math.max(...data_K) ? room : middleOf(data_K)
}

const middleOf = (data_K: readonly number[]): Quantity<'K'> => quantity(data_K.length / data_K.reduce((sum, T) => sum + 1 / T, 0), 'K')

/** `L/(mol min)` counted per second is `L/(mol s)`; the time stands last. */
const perSecondText = (text: string): string => text.replace(/[a-z]+(?=\)?$)/, 's')

const estimateResult = (estimate: Estimate, convert: (value: number) => number): EstimateResult => ({
  value: maybe(convert(estimate.value)),
  standardError: maybe(convert(estimate.standardError)),
  lower95: maybe(convert(estimate.lower95)),
  upper95: maybe(convert(estimate.upper95)),
})

const withheldIf = (isWithheld: boolean, estimate: EstimateResult): EstimateResult =>
  isWithheld ? { ...estimate, standardError: null, lower95: null, upper95: null } : estimate

/** 25 °C, and the 10 K around the middle of 1/T. */
function factorTemperatures(data_K: readonly number[]): readonly Quantity<'K'>[] {
  return data_K.length === 0 ? [celsiusToKelvin(25)] : [celsiusToKelvin(25), quantity(middleOf(data_K) - 5, 'K')]
}

const factorResult = (line: ArrheniusLine, data_K: readonly number[], from: Quantity<'K'>): FactorPer10KResult => ({
  from_K: from,
  isWithinData: from >= Math.min(...data_K) && from + 10 <= Math.max(...data_K),
  factor: maybe(factorPer10K(line.Ea, from)),
  // The factor rises with Ea, so the ends of the one are those of the other.
  lower95: maybe(factorPer10K(line.lower95, from)),
  upper95: maybe(factorPer10K(line.upper95, from)),
})

function predictionResult(line: ArrheniusLine, data_K: readonly number[], at: Quantity<'K'>, isWithheld: boolean): RateConstantPrediction {
  const whole = predictRateConstant(line, data_K, at)
  const predicted = isWithheld ? { ...whole, ...noBands } : whole
  return {
    temperature_K: at,
    rateConstant: maybe(predicted.rateConstant),
    lnK: maybe(predicted.lnK),
    intervalStatus: intervalStatusOf(line.status, isWithheld),
    lineLower95: maybe(predicted.lineLower95),
    lineUpper95: maybe(predicted.lineUpper95),
    newLower95: maybe(predicted.newLower95),
    newUpper95: maybe(predicted.newUpper95),
    lnLineLower95: maybe(predicted.lnLineLower95),
    lnLineUpper95: maybe(predicted.lnLineUpper95),
    lnNewLower95: maybe(predicted.lnNewLower95),
    lnNewUpper95: maybe(predicted.lnNewUpper95),
    exponentialFactor: maybe(exponentialFactor(line.Ea, at)),
    factorPer10K: factorResult(line, data_K, at),
    extrapolation: {
      side: predicted.extrapolation.side,
      beyond_K: maybe(predicted.extrapolation.beyond_K) ?? 0,
      beyondInSpans: maybe(predicted.extrapolation.beyondInSpans),
    },
  }
}

const noBands = {
  lineLower95: Number.NaN,
  lineUpper95: Number.NaN,
  newLower95: Number.NaN,
  newUpper95: Number.NaN,
  lnLineLower95: Number.NaN,
  lnLineUpper95: Number.NaN,
  lnNewLower95: Number.NaN,
  lnNewUpper95: Number.NaN,
} as const

function bandOf(line: ArrheniusLine, data_K: readonly number[], predictAt_K: readonly number[], isWithheld: boolean): RateConstantBand {
  const inverse = [...data_K, ...predictAt_K].map((T) => 1 / T)
  const isDrawn = data_K.length > 0 && !Number.isNaN(line.Ea)
  const [low, high] = isDrawn ? [Math.min(...inverse), Math.max(...inverse)] : [0, 0]
  const overhang = (high - low) * 0.04
  // Far hotter predictions stretch 1/T so much that the overhang would pass 1/T = 0.
  const [from, to] = [Math.max(low - overhang, low / 2), high + overhang]
  const temperature_K = isDrawn ? Array.from({ length: bandPoints }, (_, i) => 1 / (from + ((to - from) * i) / (bandPoints - 1))) : []
  const at = temperature_K.map((T) => ({ ...predictRateConstant(line, data_K, quantity(T, 'K')), ...(isWithheld ? noBands : {}) }))
  return {
    temperature_K,
    lnK: at.map((point) => maybe(point.lnK)),
    lnLineLower95: at.map((point) => maybe(point.lnLineLower95)),
    lnLineUpper95: at.map((point) => maybe(point.lnLineUpper95)),
    lnNewLower95: at.map((point) => maybe(point.lnNewLower95)),
    lnNewUpper95: at.map((point) => maybe(point.lnNewUpper95)),
  }
}

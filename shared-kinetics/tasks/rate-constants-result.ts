import type { ArrheniusStatus, Weighting } from '../rate-constants/arrhenius-line.ts'
import type { FitsOfHolds } from '../rate-constants/fits-of-holds.ts'
import type { RateIntervalStatus } from '../rate-constants/interval-status.ts'
import type { RateConstantSource, TemperatureUnit } from '../rate-constants/rate-constant-table.ts'
import type { Finding } from '../review/finding.ts'
import type { Maybe } from './study-result.ts'

/** A number with its standard error and 95 % Student-t interval; null ends where there is none. */
export interface EstimateResult {
  readonly value: Maybe
  readonly standardError: Maybe
  readonly lower95: Maybe
  readonly upper95: Maybe
}

/** ln k = ln A - Ea/(R T). ln A and A are in the unit of k. */
export interface ArrheniusResult {
  readonly weighting: Weighting
  readonly status: ArrheniusStatus
  readonly points: number
  readonly distinctTemperatures: number
  /** Each parameter by itself. `dof` is n - 2, and 0 where fewer than three distinct temperatures leave no interval. */
  readonly interval: { readonly kind: 'student-t'; readonly level: 0.95; readonly dof: number }
  /** Whether Ea has an interval; where the model does not follow the holds it is of the scatter only (see `lnAIntervalStatus`). */
  readonly intervalStatus: RateIntervalStatus
  /** Whether ln A and A have one: a reaction model that does not follow the holds leaves them none, nor a standard error. */
  readonly lnAIntervalStatus: RateIntervalStatus
  readonly Ea_kJ_per_mol: Maybe
  readonly standardError_kJ_per_mol: Maybe
  readonly lower95_kJ_per_mol: Maybe
  readonly upper95_kJ_per_mol: Maybe
  readonly lnA: Maybe
  readonly lnAStandardError: Maybe
  readonly lnALower95: Maybe
  readonly lnAUpper95: Maybe
  /** null where ln A leaves double precision. */
  readonly A: Maybe
  /** exp of the ends of ln A, so that they lie unequally far from A; null without an interval, or where they leave double precision. */
  readonly ALower95: Maybe
  readonly AUpper95: Maybe
  /** ln of A in 1/s; null where k is not per time only, or its unit was not stated. */
  readonly lnA_per_s: Maybe
  readonly covarianceEaLnA_kJ_per_mol: Maybe
  readonly slope_K: Maybe
  readonly r2: Maybe
  /** Of ln k. */
  readonly residualStandardDeviation: Maybe
  /** Weighted line only: about 1 where the stated uncertainties account for the scatter. */
  readonly reducedChiSquare: Maybe
  readonly sources: readonly string[]
}

/** ln(k/T) = ln(k_B/h) + ΔS‡/R - ΔH‡/(R T). */
export interface EyringResult {
  readonly status: 'ok' | 'without-interval'
  readonly dof: number
  /** Of the enthalpy. */
  readonly intervalStatus: RateIntervalStatus
  /** Of entropy and Gibbs energy, which rest on A. */
  readonly entropyIntervalStatus: RateIntervalStatus
  readonly enthalpy_kJ_per_mol: EstimateResult
  /** null where the unit of k was not stated. */
  readonly entropy_J_per_mol_K: EstimateResult
  readonly gibbs_kJ_per_mol: EstimateResult
  readonly gibbsAt_K: number
  /** The unit of k per second that entropy and Gibbs energy refer to; null for k per time only, which needs no standard state. */
  readonly standardStateOf: string | null
  readonly r2: Maybe
  readonly sources: readonly string[]
}

export interface RateConstantRowResult {
  readonly temperature_K: number
  readonly rateConstant: number
  /** As stated; it is what may weight the line. */
  readonly standardUncertainty: Maybe
  /** Of a k fitted to a hold: from the covariance of that fit, rows taken as independent; it weights nothing. null elsewhere. */
  readonly fitStandardError: Maybe
  /** The reaction model that k was fitted under; null for a k that was not fitted here. */
  readonly fittedUnder: string | null
  readonly label: string | null
  readonly use: boolean
  readonly lnK: number
  /** k of the line at this temperature. */
  readonly fittedRateConstant: Maybe
  /** ln k minus the line; for rows not used as well. */
  readonly residual: Maybe
  /** exp(-Ea/(R T)). */
  readonly exponentialFactor: Maybe
}

export interface FactorPer10KResult {
  /** k(from + 10 K)/k(from). */
  readonly from_K: number
  /** Both ends of the 10 K lie between the coldest and the hottest temperature used. */
  readonly isWithinData: boolean
  readonly factor: Maybe
  readonly lower95: Maybe
  readonly upper95: Maybe
}

/** Ea = R ln(k₂/k₁)/(1/T₁ - 1/T₂) from one temperature to the next hotter one; two points leave no interval but that of the stated uncertainties of k. ln A is in the unit of k. */
export interface BetweenTemperaturesResult {
  readonly from_K: number
  readonly to_K: number
  readonly Ea_kJ_per_mol: Maybe
  readonly lnA: Maybe
  /** `ok` where u(k) was stated for each row of both temperatures; the ends are then ± 1.96 standard uncertainties. */
  readonly intervalStatus: RateIntervalStatus
  readonly standardUncertainty_kJ_per_mol: Maybe
  readonly lower95_kJ_per_mol: Maybe
  readonly upper95_kJ_per_mol: Maybe
  readonly lnAStandardUncertainty: Maybe
  readonly lnALower95: Maybe
  readonly lnAUpper95: Maybe
}

export interface RateConstantPrediction {
  readonly temperature_K: number
  /** null where it leaves double precision as well; `lnK` is then there. */
  readonly rateConstant: Maybe
  readonly lnK: Maybe
  readonly intervalStatus: RateIntervalStatus
  /** 95 % band of the line, and of one more measured k; each temperature by itself. */
  readonly lineLower95: Maybe
  readonly lineUpper95: Maybe
  readonly newLower95: Maybe
  readonly newUpper95: Maybe
  /** ln of these ends. */
  readonly lnLineLower95: Maybe
  readonly lnLineUpper95: Maybe
  readonly lnNewLower95: Maybe
  readonly lnNewUpper95: Maybe
  readonly exponentialFactor: Maybe
  readonly factorPer10K: FactorPer10KResult
  readonly extrapolation: { readonly side: 'inside' | 'below' | 'above'; readonly beyond_K: number; readonly beyondInSpans: Maybe }
}

/** Line and bands from the coldest to the hottest temperature drawn, for figures; natural logarithms of k in the table's unit. */
export interface RateConstantBand {
  readonly temperature_K: readonly number[]
  readonly lnK: readonly Maybe[]
  readonly lnLineLower95: readonly Maybe[]
  readonly lnLineUpper95: readonly Maybe[]
  readonly lnNewLower95: readonly Maybe[]
  readonly lnNewUpper95: readonly Maybe[]
}

/** What follows from a table of rate constants. Everything but `weightedLine` rests on the unweighted line through the rows used. */
export interface RateConstantsResult {
  /** Empty where nobody stated it. */
  readonly rateUnit: string
  readonly temperatureUnitShown: TemperatureUnit
  readonly source: { readonly kind: RateConstantSource; readonly name: string | null; readonly sha256: string | null }
  /** As many as the table has, in its order. */
  readonly rows: readonly RateConstantRowResult[]
  /** Coldest and hottest temperature of the rows used; null without one. */
  readonly span: { readonly coldest_K: number; readonly hottest_K: number } | null
  readonly line: ArrheniusResult
  /** Where every row used has a stated uncertainty. */
  readonly weightedLine: ArrheniusResult | null
  /** null where there is no line. */
  readonly eyring: EyringResult | null
  /** From the coldest temperature used to the hottest, each to its neighbour; replicates by the mean of their ln k. Empty for one temperature. */
  readonly betweenTemperatures: readonly BetweenTemperaturesResult[]
  /** From 25 to 35 °C, and over the middle of the data. */
  readonly factorsPer10K: readonly FactorPer10KResult[]
  /** In the order of `predictAt_K`. */
  readonly predictions: readonly RateConstantPrediction[]
  readonly band: RateConstantBand
  /** t test of a quadratic term in 1/T; null where it cannot be tested. */
  readonly curvature: { readonly t: number; readonly threshold: number; readonly dof: number; readonly isCurved: boolean } | null
  /** Where the table was made from isothermal runs: the fit of each hold under the chosen model, and the models ranked; else null. */
  readonly holdFits: FitsOfHolds | null
  /** null where the table was not made from holds; false withholds the intervals of A and of predicted k. */
  readonly modelFollowsHolds: boolean | null
  readonly findings: readonly Finding[]
}

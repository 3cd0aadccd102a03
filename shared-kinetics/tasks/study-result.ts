import type { UncertaintySource } from '../uncertainty/measured-sources.ts'
import type { IntervalKind, IntervalStatus, LevelStatus, MethodId } from '../isoconversional/result.ts'
import type { PeakMethodId } from '../peak-methods/peak-method-info.ts'
import type { Finding } from '../review/finding.ts'
import type { Window } from '../series/run.ts'
import type { SignalQuantity, SignalUnit } from '../series/signal-quantity.ts'

/** A number, or null where it is not to be had. */
export type Maybe = number | null

/** One run as evaluated. Field names carry their units, since this crosses processes. */
export interface RunResult {
  readonly runId: string
  readonly label: string
  readonly fileName: string
  readonly column: string
  readonly sha256: string
  readonly signal: SignalQuantity
  readonly signalUnit: SignalUnit
  readonly programme: 'constant-heating-rate' | 'isothermal' | 'general'
  /** Replicates of one programme share this number. */
  readonly programmeGroup: number
  readonly nominalHeatingRate_K_per_min: Maybe
  readonly heatingRate_K_per_min: Maybe
  /** Of the line through T(t), rows taken as independent of each other: how well the line is drawn, not how steady the heating rate is. */
  readonly heatingRateStandardError_K_per_min: Maybe
  readonly heatingRateSource: 'measured' | 'option' | 'nominal' | null
  /** Mean temperature over the window of an isothermal run. */
  readonly holdTemperature_K: Maybe
  /** Where the hold begins on the run's own clock, which is where the isothermal integral method counts time from; null for other programmes. */
  readonly holdStart_s: Maybe
  /** What had reacted by then, while the sample was heated up to the hold. */
  readonly conversionBeforeHold: Maybe
  readonly rows: number
  readonly initialMass_kg: Maybe
  /** In temperature for constant heating rates, in time for the rest; the window that was used. */
  readonly window: Window
  readonly peak_K: Maybe
  /** Exothermic negative; null where the run is no heat, its sample's mass or the direction of its exothermic events is not known. */
  readonly enthalpy_J_per_g: Maybe
  /** Without its sign, so also where the direction is not known. */
  readonly enthalpyMagnitude_J_per_g: Maybe
  /** At each level: where the run stands. null where it does not reach the level. */
  readonly temperatureAtLevel_K: readonly Maybe[]
  readonly timeAtLevel_s: readonly Maybe[]
  readonly reactionRateAtLevel_per_s: readonly Maybe[]
  readonly signalAtLevel: readonly Maybe[]
  /** For drawing only: thinned to at most about 1,000 points that keep every local extreme, columns of one length. Whole run, window or not. */
  readonly curve: {
    readonly time_s: Float64Array
    readonly temperature_K: Float64Array
    /** In `signalUnit`. */
    readonly signal: Float64Array
    /** NaN outside the window. */
    readonly conversion: Float64Array
    readonly reactionRate_per_s: Float64Array
    /** The baseline under a heat-flow signal, in `signalUnit`; NaN outside the window, empty for other signals. */
    readonly baseline: Float64Array
  }
}

export interface LineResult {
  readonly x_per_K: readonly Maybe[]
  readonly y: readonly Maybe[]
  readonly slope_K: Maybe
  readonly intercept: Maybe
}

export interface PhiResult {
  readonly Ea_kJ_per_mol: readonly number[]
  readonly phi: readonly number[]
  readonly phiMinimum: Maybe
  readonly phiThreshold: Maybe
}

/** Another interval of the same Ea, named by its kind; arrays as long as the levels. Every one is pointwise. */
export interface IntervalResult {
  readonly kind: IntervalKind
  readonly label: string
  readonly level: 0.95
  readonly pointwise: true
  /** Resampling few runs gives an approximate interval, and is called so. */
  readonly approximate: boolean
  /** How it was made, in a sentence: degrees of freedom, resamples dropped, draws and seed. */
  readonly note: string
  readonly sources: readonly string[]
  readonly standardUncertainty_kJ_per_mol: readonly Maybe[]
  readonly lower95_kJ_per_mol: readonly Maybe[]
  readonly upper95_kJ_per_mol: readonly Maybe[]
  /** Why a level has no ends, or only one, and where the lower one means nothing. */
  readonly status: readonly IntervalStatus[]
}

/** Lack of fit against pure error at each level, where replicates exist: F = (lack-of-fit mean square)/(pure-error mean square) and its p-value. */
export interface LackOfFitResult {
  readonly dofLackOfFit: number
  readonly dofPureError: number
  readonly F: readonly Maybe[]
  readonly p: readonly Maybe[]
  /** Of the runs' residuals averaged over the range of the mean: levels of one run err alike, so that the many tests above are hardly more than one. */
  readonly overMeanRange: { readonly F: Maybe; readonly p: Maybe }
}

export interface BudgetEntry {
  readonly source: UncertaintySource
  readonly label: string
  /** What was assumed or measured, with its unit, e.g. `0.5 K in each run`. */
  readonly magnitude: string
  /** The magnitude is the one taken where nobody has stated anything. */
  readonly assumed: boolean
  /** Standard uncertainty of Ea that this source alone brings. */
  readonly standardUncertainty_kJ_per_mol: readonly Maybe[]
  /** The scatter of the points shows it already, so that it is not added to the regression's own standard error. */
  readonly shownByScatter: boolean
  /** Why it cannot be told at any level, as a sentence; null where it can. */
  readonly reason: string | null
}

/** What follows from resampling and from measured sources for one method; made apart from the evaluation, since it takes longer. */
export interface UncertaintyProfile {
  readonly method: MethodId
  readonly intervals: readonly IntervalResult[]
  readonly budget: readonly BudgetEntry[]
  /** The mean over `settings.meanRange` with all that is known of its uncertainty; null without a mean, or with fewer than three distinct programmes. */
  readonly mean: CombinedMean | null
}

/** Mean of Ea over levels with an interval that holds the scatter of the runs and what moves all runs alike. */
export interface CombinedMean {
  readonly Ea_kJ_per_mol: number
  /** null, as the ends are, where a source cannot be told at one of the levels; `note` then says which. */
  readonly standardUncertainty_kJ_per_mol: Maybe
  readonly lower95_kJ_per_mol: Maybe
  readonly upper95_kJ_per_mol: Maybe
  /** What it holds and how it was made. */
  readonly note: string
}

export interface UncertaintyResult {
  readonly levels: readonly number[]
  readonly seed: number
  readonly draws: number
  readonly profiles: readonly UncertaintyProfile[]
}

/** Ea against conversion by one method: every array as long as `StudyResult.levels`, null where status is not `ok`. */
export interface ProfileResult {
  readonly method: MethodId
  readonly label: string
  readonly sources: readonly string[]
  readonly evidence: 'line' | 'minimum'
  /** `dof` is 0 where there is no interval. */
  readonly interval: { readonly kind: 'student-t'; readonly level: 0.95; readonly dof: number; readonly pointwise: true }
  readonly Ea_kJ_per_mol: readonly Maybe[]
  readonly standardError_kJ_per_mol: readonly Maybe[]
  readonly lower95_kJ_per_mol: readonly Maybe[]
  readonly upper95_kJ_per_mol: readonly Maybe[]
  readonly lnAf_per_s: readonly Maybe[]
  readonly lnAfStandardError: readonly Maybe[]
  /** Covariance of Ea and ln[A f(alpha)], A in 1/s. */
  readonly covarianceEaLnAf_kJ_per_mol: readonly Maybe[]
  /** ln A by a model that the method itself assumes; null elsewhere. */
  readonly lnA_per_s: readonly Maybe[]
  readonly otherIntervals: readonly IntervalResult[]
  /** In percent of Ea; 0 for a method without an error of its own. */
  readonly systematicError_percent: readonly Maybe[]
  /** null without replicates. */
  readonly lackOfFit: LackOfFitResult | null
  readonly r2: readonly Maybe[]
  readonly status: readonly LevelStatus[]
  /** Indexed by level; empty where the method has the other kind of evidence. `x`/`y` are in the order of `StudyResult.runs`. */
  readonly lines: readonly LineResult[]
  readonly phi: readonly PhiResult[]
  readonly mean: MeanEnergy
}

/** Mean of Ea over the levels of `settings.meanRange` that are `ok` and above 0, and the spread (max - min) there. */
export interface MeanEnergy {
  /** The range asked for. */
  readonly from: number
  readonly to: number
  readonly Ea_kJ_per_mol: Maybe
  readonly spread_kJ_per_mol: Maybe
  /** Of the mean, from the runs' residuals and how they go together over the levels: errors of one run go through all its levels. null without an interval. */
  readonly standardError_kJ_per_mol: Maybe
  readonly lower95_kJ_per_mol: Maybe
  readonly upper95_kJ_per_mol: Maybe
  /** Levels that went into it, of those in the range, and where they begin and end. */
  readonly levelsUsed: number
  readonly levelsInRange: number
  readonly firstLevel: Maybe
  readonly lastLevel: Maybe
  /** What its interval does not hold. */
  readonly note: string
}

export interface KissingerResult {
  readonly Ea_kJ_per_mol: number
  readonly standardError_kJ_per_mol: Maybe
  readonly lower95_kJ_per_mol: Maybe
  readonly upper95_kJ_per_mol: Maybe
  readonly lnA_per_s: number
  /** In the order of `StudyResult.runs`, as are the conversions reached at them. */
  readonly peaks_K: readonly number[]
  readonly conversionAtPeak: readonly Maybe[]
  readonly sources: readonly string[]
}

/** A number that belongs to one method: a reaction order, a temperature. */
export interface PeakMethodNumber {
  readonly key: PeakMethodNumberKey
  readonly label: string
  readonly value: Maybe
  readonly standardError: Maybe
  /** Temperatures are in K here, and turned where they are shown. */
  readonly unit: 'K' | 'kJ/mol' | '1'
}

export type PeakMethodNumberKey =
  | 'conversion-at-peak-lowest'
  | 'conversion-at-peak-highest'
  | 'conversion-at-peak-first-order'
  | 'first-estimate'
  | 'D'
  | 'peak-at-middle-rate'
  | 'confirmation-temperature'
  | 'order'
  | 'avrami-exponent-lowest'
  | 'avrami-exponent'
  | 'avrami-exponent-highest'

/** Ea and A from rate peaks, or from one run alone. Where `applies` is false every number is null and `reason` says why. */
export interface PeakMethodResult {
  readonly method: PeakMethodId
  readonly label: string
  readonly sources: readonly string[]
  /** The run that a single-run method was used on; null for a method that compares the peaks of all runs. */
  readonly runId: string | null
  readonly runLabel: string | null
  readonly applies: boolean
  /** Why not, in a sentence; null where it applies. */
  readonly reason: string | null
  readonly Ea_kJ_per_mol: Maybe
  readonly standardError_kJ_per_mol: Maybe
  /** Student-t, 95 %, with `dof` degrees of freedom; null, and `dof` 0, with fewer than three distinct programmes. */
  readonly lower95_kJ_per_mol: Maybe
  readonly upper95_kJ_per_mol: Maybe
  readonly dof: number
  /** Where the method gives an A; by the model it assumes, first order unless `remarks` say otherwise. */
  readonly lnA_per_s: Maybe
  readonly lnAStandardError: Maybe
  readonly covarianceEaLnA_kJ_per_mol: Maybe
  /**
   * Covariances of Ea and of ln A with the reaction order where all three come out of one fit (Borchardt–Daniels); null elsewhere. With the standard errors they are the whole matrix,
   * which the error of a rate at some temperature and conversion needs.
   */
  readonly covarianceWithOrder: { readonly Ea_kJ_per_mol: Maybe; readonly lnA: Maybe } | null
  readonly r2: Maybe
  readonly numbers: readonly PeakMethodNumber[]
  /** What to know before relying on it, in sentences: scope, assumptions, how to confirm it. */
  readonly remarks: readonly string[]
  /** The line through the peaks, points in the order of `StudyResult.runs`, heating rates in K/s, with the name of its ordinate; null for single-run methods. */
  readonly line: (LineResult & { readonly ordinate: string }) | null
}

/** Everything that follows from a study's runs and settings. Derived, never edited. */
export interface StudyResult {
  readonly levels: readonly number[]
  /** The signal that was analysed. */
  readonly signal: SignalQuantity | null
  /** Signals present in every used run: what a person may choose from. */
  readonly signalsToChooseFrom: readonly SignalQuantity[]
  /** Used runs that could be evaluated, slowest programme first. */
  readonly runs: readonly RunResult[]
  readonly profiles: readonly ProfileResult[]
  readonly kissinger: KissingerResult | null
  /** In the order of `peakMethodIds`, Kissinger among them; a single-run method once for every run. Empty without runs. */
  readonly peakMethods: readonly PeakMethodResult[]
  readonly findings: readonly Finding[]
}

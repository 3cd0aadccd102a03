import type { SeriesAtLevels } from '../series/series-at-levels.ts'
import type { Column } from '../units/quantity.ts'
import type { SourceKey } from '../sources.ts'

/** Ids of the methods this version can run, in the order in which they are listed everywhere. */
export const methodIds = [
  'friedman',
  'ofw',
  'ofw-corrected',
  'kas',
  'starink',
  'vyazovkin',
  'vyazovkin-incremental',
  'isothermal-integral',
  'starink-1996',
  'tang',
  'astm-e1641',
  'iso-11358-2',
] as const
export type MethodId = (typeof methodIds)[number]

/** Why a level has a number, or why it has none. */
export const levelStatuses = [
  'ok',
  'level-not-reached',
  'too-few-programmes',
  'rate-not-positive',
  'line-not-determined',
  'minimum-at-bound',
  'minimum-flat',
  'several-minima',
] as const
export type LevelStatus = (typeof levelStatuses)[number]

export interface MethodInfo {
  readonly id: MethodId
  readonly label: string
  /** Author, year, journal: what is printed beside a result. */
  readonly sources: readonly SourceKey[]
  /** Programmes the method is made for. */
  readonly appliesTo: readonly ('constant-heating-rate' | 'isothermal' | 'general')[]
  /** `line`: a straight line through the runs at each level; `minimum`: the minimum of Phi(Ea) at each level. */
  readonly evidence: 'line' | 'minimum'
  /** Runs where no methods were named; the rest are forms of the same method, or standards, that a person asks for. */
  readonly byDefault: boolean
}

/** The straight line of one level: y against x = 1/T, one point a run. */
export interface LevelLine {
  readonly x_per_K: Column<'1/K'>
  readonly y: Float64Array
  /** dy/dx in K, and y at x = 0; NaN where the line is not determined. */
  readonly slope_K: number
  readonly intercept: number
}

/**
 * The regression that Ea rests on at one level, one point a run; for minimising methods the one linearised at the minimum, x then being the effective 1/T
 * (-R d ln J/dEa) and the residual that of ln J from its mean. What resampling, lack of fit and the interval of a mean work on. NaN where the level has no Ea.
 */
export interface LevelPoints {
  readonly x_per_K: Column<'1/K'>
  /** Residuals from the line, in units of ln. */
  readonly residual: Float64Array
  /** dEa/dslope in J/mol per K: Ea's standard error is |this| times that of the slope. */
  readonly energyPerSlope: number
}

/** Kinds of interval besides the Student-t one that every method has. */
export const intervalKinds = ['vyazovkin-wight-f', 'jackknife', 'bootstrap', 'measured-sources', 'combined'] as const
export type IntervalKind = (typeof intervalKinds)[number]

/** Why an interval has its ends at a level, or has none. */
export const intervalStatuses = [
  'ok',
  /** Both ends are given, the lower one below 0: Ea is not bounded from below by these runs. */
  'reaches-below-zero',
  /** Both ends are given, without what the choice of baseline does: that cannot be told for these runs. */
  'baseline-left-out',
  /** The level has no Ea; its own status says why. */
  'no-energy',
  'too-few-programmes',
  /** One end or both lie outside of 1 to 1000 kJ/mol; such an end is not given. */
  'end-outside',
  /** The variance has no minimum next to Ea. */
  'no-minimum',
  /** Without one of the runs there is no Ea. */
  'energy-needs-every-run',
  /** More than 1 % of the resamples, or of the draws, give no Ea. */
  'resamples-without-energy',
  'draws-without-energy',
  /** How uncertain one of the sources is cannot be told there. */
  'source-unknown',
] as const
export type IntervalStatus = (typeof intervalStatuses)[number]

/** Another 95 % interval of the same Ea, pointwise, as long as the levels; NaN where it is not to be had. */
export interface EnergyInterval {
  readonly kind: IntervalKind
  readonly lower95: Column<'J/mol'>
  readonly upper95: Column<'J/mol'>
  /** `no-energy` without Ea; `end-outside` where one end or both are NaN for lying too far out; `no-minimum`. */
  readonly status: readonly IntervalStatus[]
}

/** Phi(Ea) sampled around its minimum at one level, for drawing. */
export interface LevelPhi {
  readonly Ea_J_per_mol: Column<'J/mol'>
  readonly phi: Float64Array
  readonly phiMinimum: number
  /** Phi at the ends of the interval; NaN without an interval. */
  readonly phiThreshold: number
}

/** Ea against conversion by one method. All columns are as long as the levels; where status is not `ok` the numbers are NaN. */
export interface IsoconversionalResult {
  readonly method: MethodId
  /** `dof` is n - 2 for n runs, and 0 where fewer than three distinct programmes leave no interval. */
  readonly interval: { readonly kind: 'student-t'; readonly level: 0.95; readonly dof: number; readonly pointwise: true }
  readonly Ea: Column<'J/mol'>
  /** One standard error of the regression, n - 2 degrees of freedom; NaN with fewer than three distinct programmes. */
  readonly standardError: Column<'J/mol'>
  readonly lower95: Column<'J/mol'>
  readonly upper95: Column<'J/mol'>
  /**
   * ln[A f(alpha)] with A in 1/s where the method gives it (Friedman's intercept), else NaN: integral methods give A/g(alpha), or for steps A/Δg, from which neither A nor
   * f(alpha) follows without a model.
   */
  readonly lnAf: Float64Array
  readonly lnAfStandardError: Float64Array
  readonly r2: Float64Array
  readonly status: readonly LevelStatus[]
  /** Indexed by level. */
  readonly points: readonly LevelPoints[]
  /** Covariance of Ea and ln[A f(alpha)] in J/mol where the method gives both, else NaN. */
  readonly covarianceEaLnAf: Column<'J/mol'>
  /** ln A (A in 1/s) where the method itself assumes a model (ASTM E1641: first order), else NaN. */
  readonly lnA: Float64Array
  /** Intervals of other kinds that come with the method. */
  readonly otherIntervals: readonly EnergyInterval[]
  /** Error of Ea by the method's own temperature integral, as a share of Ea: exact formula for one reaction at close heating rates; 0 for methods without one. NaN without Ea. */
  readonly systematicError: Float64Array
  /** Evidence at each level: one of the two is empty. */
  readonly lines: readonly LevelLine[]
  readonly phi: readonly LevelPhi[]
}

/** Called by long loops; throws `Cancelled` when the work is no longer wanted. */
export interface TaskContext {
  readonly checkCancelled: () => void
  readonly progress: (done: number, total: number) => void
}

export type IsoconversionalMethod = (series: SeriesAtLevels, context: TaskContext) => IsoconversionalResult

/** What a screen or a file needs to know of results; types only, so that nothing of the numerics comes with them. */
export type { LevelStatus, MethodId } from '../isoconversional/result.ts'
export type { Finding, FindingCode, Severity } from '../review/finding.ts'
export type { NominalSource, RunInfo, SignalInfo, Window } from '../series/run.ts'
export type { SignalQuantity, SignalUnit } from '../series/signal-quantity.ts'
export type { AnalysisSettings, BaselineKind } from '../tasks/study-input.ts'
export type {
  BudgetEntry,
  CombinedMean,
  IntervalResult,
  KissingerResult,
  LackOfFitResult,
  LineResult,
  Maybe,
  MeanEnergy,
  PeakMethodNumber,
  PeakMethodResult,
  PhiResult,
  ProfileResult,
  RunResult,
  StudyResult,
  UncertaintyProfile,
  UncertaintyResult,
} from '../tasks/study-result.ts'
export type { IntervalKind, IntervalStatus } from '../isoconversional/result.ts'
export type { UncertaintySettings, UncertaintySource } from '../uncertainty/measured-sources.ts'
export type { FitOfHold, FitOfModel, FitsOfHolds } from '../rate-constants/fits-of-holds.ts'
export type { RateIntervalStatus } from '../rate-constants/interval-status.ts'
export type { RateConstantNote, RateConstantRow, RateConstantTable, TemperatureUnit } from '../rate-constants/rate-constant-table.ts'
export type {
  ArrheniusResult,
  EstimateResult,
  EyringResult,
  FactorPer10KResult,
  BetweenTemperaturesResult,
  RateConstantPrediction,
  RateConstantRowResult,
  RateConstantsResult,
} from '../tasks/rate-constants-result.ts'

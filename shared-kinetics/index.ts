/** The kinetics core for those who use it without the program around it: pure functions, SI units, no DOM, no Node. */
export { Cancelled, KineticsError, type KineticsErrorCode } from './errors.ts'
export { methods } from './isoconversional/registry.ts'
export {
  methodIds,
  type IsoconversionalResult,
  type LevelStatus,
  type MethodId,
  type MethodInfo,
  type TaskContext,
} from './isoconversional/result.ts'
export { kissinger } from './peak-methods/kissinger.ts'
export type { Finding, FindingCode, Severity } from './review/finding.ts'
export type { Programme, TemperatureHistory } from './series/programme.ts'
export type { RunColumns, RunInfo, Window } from './series/run.ts'
export type { RunAtLevels, SeriesAtLevels } from './series/series-at-levels.ts'
export { sources, type SourceKey } from './sources.ts'
export { evaluateStudy } from './tasks/evaluate-study.ts'
export type { AnalysisSettings, StudyInput } from './tasks/study-input.ts'
export type { StudyResult } from './tasks/study-result.ts'
export { lnPOfX, pOfX, scaledPOfX } from './temperature-integral/p-of-x.ts'
export { column, quantity, type Column, type Quantity, type Unit } from './units/quantity.ts'

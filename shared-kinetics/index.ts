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
export { astmE2890 } from './peak-methods/astm-e2890.ts'
export { astmE698 } from './peak-methods/astm-e698.ts'
export { augisBennett, augisBennettWithoutStart, avramiExponent } from './peak-methods/augis-bennett.ts'
export { borchardtDaniels } from './peak-methods/borchardt-daniels.ts'
export { firstOrderPeakConversion, firstOrderPeakTemperature } from './peak-methods/first-order-peak.ts'
export { halfLifeTemperature } from './peak-methods/half-life-temperature.ts'
export { kissinger } from './peak-methods/kissinger.ts'
export { kissingerForModel } from './peak-methods/kissinger-for-model.ts'
export { ozawaPeak, ozawaPeakCorrected } from './peak-methods/ozawa-peak.ts'
export type { PeakEstimate, RatePeak } from './peak-methods/peak-line.ts'
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

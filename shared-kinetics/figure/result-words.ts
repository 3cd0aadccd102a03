/** Sentences that every medium says alike of a result. */
export { noIntervalWords, scatterOnlyWords } from '../rate-constants/interval-status.ts'
export { safetyCaution } from '../tasks/safety-caution.ts'

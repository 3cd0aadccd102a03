import type { StudyDocument } from '../../../shared-kinetics/contract/study-document.ts'
import type { RunInfo, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'

/** Used runs whose export has no time and states no heating rate: nothing can be made of them before somebody says it. */
export const runsWithoutHeatingRate = (document: StudyDocument): readonly RunInfo[] =>
  document.runs.filter((run) => run.use && !run.hasTime && run.nominalHeatingRate === null)

/** Used runs whose heat flow is to be analysed but whose file does not say which way exothermic events point. */
export function runsWithoutDirection(document: StudyDocument, result: StudyResult | null): readonly RunInfo[] {
  const signal = document.settings.signal ?? result?.signal ?? null
  return document.runs.filter((run) => {
    const onlyHeatFlow = run.signals.every((one) => one.quantity === 'heat-flow')
    return run.use && run.exothermic === null && (signal === null ? onlyHeatFlow : signal === 'heat-flow')
  })
}

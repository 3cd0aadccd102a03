import type { StudyDocument } from '../../../shared-kinetics/contract/study-document.ts'
import type { RunInfo, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'

/** Used runs whose export has no time and states no heating rate: nothing can be made of them before somebody says it. */
export const runsWithoutHeatingRate = (document: StudyDocument): readonly RunInfo[] =>
  document.runs.filter((run) => run.use && !run.hasTime && run.nominalHeatingRate === null)

/** Used runs whose heat flow is to be analysed but whose file does not say which way exothermic events point. */
export const runsWithoutDirection = (document: StudyDocument, result: StudyResult | null): readonly RunInfo[] =>
  runsOfHeatFlow(document, result).filter((run) => run.exothermic === null)

/** Which way exothermic events point in the used runs whose heat flow is analysed, as their files or a person said; `mixed` where runs differ, null where none says it. */
export function directionSaid(document: StudyDocument, result: StudyResult | null): 'up' | 'down' | 'mixed' | null {
  const said = new Set(runsOfHeatFlow(document, result).flatMap((run) => (run.exothermic === null ? [] : [run.exothermic])))
  const [first = null] = said
  return said.size > 1 ? 'mixed' : first
}

function runsOfHeatFlow(document: StudyDocument, result: StudyResult | null): readonly RunInfo[] {
  const signal = document.settings.signal ?? result?.signal ?? null
  return document.runs.filter((run) => {
    const onlyHeatFlow = run.signals.every((one) => one.quantity === 'heat-flow')
    return run.use && (signal === null ? onlyHeatFlow : signal === 'heat-flow')
  })
}

import { Button } from 'react-aria-components'
import type { StudyChange } from '../../../shared-kinetics/contract/study-change.ts'
import type { StudyDocument } from '../../../shared-kinetics/contract/study-document.ts'
import type { StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { parseHeatingRate } from '../../../shared-kinetics/units/parse-quantity.ts'
import { count } from '../../sheet/format.ts'
import { TypedField } from '../../sheet/TypedField.tsx'
import { runsWithoutDirection, runsWithoutHeatingRate } from './questions.ts'

/** What the files do not say and only a person can: asked where it is missing, never guessed. */
export function RunQuestions({
  document,
  result,
  onChange,
}: {
  readonly document: StudyDocument
  readonly result: StudyResult | null
  readonly onChange: (change: StudyChange) => void
}) {
  const withoutRate = runsWithoutHeatingRate(document)
  const withoutDirection = runsWithoutDirection(document, result)
  const settle = (exothermic: 'up' | 'down'): void => {
    if (withoutDirection.length === document.runs.length) onChange({ kind: 'set-exothermic', runId: null, exothermic })
    else for (const run of withoutDirection) onChange({ kind: 'set-exothermic', runId: run.id, exothermic })
  }
  if (withoutRate.length === 0 && withoutDirection.length === 0) return null
  return (
    <section className="questions" aria-label="Missing in the files">
      {withoutDirection.length > 0 && (
        <div className="question">
          <p>
            {withoutDirection.length === 1
              ? `${withoutDirection[0]?.label ?? 'One run'} does not say`
              : `${count(withoutDirection.length, 'run')} do not say`}{' '}
            which way an exothermic event points. In the heat flow of {withoutDirection.length === 1 ? 'this file' : 'these files'},
            exothermic is:
          </p>
          <div className="question-answers">
            <Button className="button" onPress={() => settle('up')}>
              Up
            </Button>
            <Button className="button" onPress={() => settle('down')}>
              Down
            </Button>
          </div>
        </div>
      )}
      {withoutRate.map((run) => (
        <div className="question" key={run.id}>
          <p>{run.label} has no time column and states no heating rate. At which heating rate was it measured?</p>
          <TypedField
            label={`Heating rate of ${run.label}`}
            hideLabel
            text=""
            placeholder="10 K/min"
            parse={parseHeatingRate}
            onCommit={(heatingRate_K_per_s) => onChange({ kind: 'set-run-heating-rate', runId: run.id, heatingRate_K_per_s })}
          />
        </div>
      ))}
    </section>
  )
}

import { Button } from 'react-aria-components'
import type { StudyChange } from '../../../shared-kinetics/contract/study-change.ts'
import type { StudyDocument } from '../../../shared-kinetics/contract/study-document.ts'
import type { StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { parseHeatingRate } from '../../../shared-kinetics/units/parse-quantity.ts'
import { count } from '../../sheet/format.ts'
import { TypedField } from '../../sheet/TypedField.tsx'
import { directionSaid, runsWithoutDirection, runsWithoutHeatingRate } from './questions.ts'

interface RunQuestionsProps {
  readonly document: StudyDocument
  readonly result: StudyResult | null
  readonly onChange: (change: StudyChange) => void
}

/** What the files do not say and only a person can: asked where it is missing, never guessed. */
export function RunQuestions({ document, result, onChange }: RunQuestionsProps) {
  const withoutRate = runsWithoutHeatingRate(document)
  return (
    <>
      {withoutRate.length > 0 && (
        <section className="questions" aria-label="Missing in the files">
          {withoutRate.map((run) => (
            <div className="question" key={run.id}>
              <p>{run.label} has no time column and states no heating rate. At which heating rate was it measured?</p>
              <TypedField
                label={`Heating rate of ${run.label}`}
                hideLabel
                text=""
                placeholder="e.g. 10 K/min"
                parse={parseHeatingRate}
                onCommit={(heatingRate_K_per_s) => onChange({ kind: 'set-run-heating-rate', runId: run.id, heatingRate_K_per_s })}
              />
            </div>
          ))}
        </section>
      )}
      <DirectionQuestion document={document} result={result} onChange={onChange} />
    </>
  )
}

/** What was answered stays in sight, and can be changed for all runs at once. */
function DirectionSaid({ document, result, onChange }: RunQuestionsProps) {
  const said = directionSaid(document, result)
  if (said === null) return null
  const ways = said === 'mixed' ? (['up', 'down'] as const) : ([said === 'up' ? 'down' : 'up'] as const)
  return (
    <p className="quiet-question">
      Exothermic: {said === 'mixed' ? 'up in some runs, down in others' : said}{' '}
      {ways.map((way) => (
        <Button
          key={way}
          className="link-button"
          aria-label={`Change exothermic to ${way}${said === 'mixed' ? ' in every run' : ''}`}
          onPress={() => onChange({ kind: 'set-exothermic', runId: null, exothermic: way })}
        >
          {said === 'mixed' ? `all ${way}` : `change to ${way}`}
        </Button>
      ))}
    </p>
  )
}

/** No warning: nothing but the sign of the enthalpy waits for the answer. */
function DirectionQuestion({ document, result, onChange }: RunQuestionsProps) {
  const runs = runsWithoutDirection(document, result)
  const [first] = runs
  if (first === undefined) return <DirectionSaid document={document} result={result} onChange={onChange} />
  const settle = (exothermic: 'up' | 'down'): void => {
    if (runs.length === document.runs.length) onChange({ kind: 'set-exothermic', runId: null, exothermic })
    else for (const run of runs) onChange({ kind: 'set-exothermic', runId: run.id, exothermic })
  }
  return (
    <p className="quiet-question">
      {runs.length === 1 ? `${first.label} does not say` : `${count(runs.length, 'run')} do not say`} which way exothermic points:{' '}
      <Button className="link-button" aria-label="Exothermic points up" onPress={() => settle('up')}>
        up
      </Button>{' '}
      or{' '}
      <Button className="link-button" aria-label="Exothermic points down" onPress={() => settle('down')}>
        down
      </Button>
      ? It settles the sign of the enthalpy; Ea does not depend on it.
    </p>
  )
}

import { Button } from 'react-aria-components'
import type { StudyChange } from '../../../shared-kinetics/contract/study-change.ts'
import type { StudyDocument } from '../../../shared-kinetics/contract/study-document.ts'
import { count, signalWords } from '../../sheet/format.ts'
import { keepOnly, mixedSignals } from './mixed-signals.ts'

/** Runs that have no signal in common cannot be compared: who holds which, and the ways out. */
export function MixedSignals({
  document,
  onChange,
}: {
  readonly document: StudyDocument
  readonly onChange: (change: StudyChange) => void
}) {
  const holders = mixedSignals(document)
  if (holders.length === 0) return null
  return (
    <section className="questions" aria-label="No signal in common">
      <p>No signal is in all runs in use, and only runs with the same signal can be compared. Choose which to keep:</p>
      <ul>
        {holders.map((holder) => (
          <li className="question" key={holder.signal}>
            <p>
              <strong>{signalWords[holder.signal]}</strong>: {holder.having.map((run) => run.label).join(', ')}
            </p>
            <Button className="button" onPress={() => keepOnly(holder, document.settings.signal).forEach(onChange)}>
              Use {count(holder.having.length, 'run')} with {signalWords[holder.signal].toLowerCase()}, leave out {holder.lacking.length}
            </Button>
          </li>
        ))}
      </ul>
    </section>
  )
}

import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { list } from '../words.ts'

/** Fires where the runs hold several signals and none was named. */
export function signalChosen({ study, result }: ReviewInput): Finding[] {
  const { signal, signalsToChooseFrom } = result
  if (study.settings.signal !== null || signal === null || signalsToChooseFrom.length < 2) return []
  const words = signalsToChooseFrom.map((quantity) => quantity.replace('-', ' '))
  const chosen = signal.replace('-', ' ')
  return [
    {
      code: 'signal-chosen',
      severity: 'note',
      stage: 'runs',
      title: `Signal: ${chosen}, one of ${words.length}`,
      message:
        `The runs hold ${words.length} signals (${list(words)}). None was named, so ${chosen} is analysed. They can differ, since each follows its own part of the reaction; ` +
        'name the signal to settle the choice, and compare with the others.',
      run: null,
      level: null,
      evidence: { chosen: signal, signals: signalsToChooseFrom.join(', '), count: words.length },
      basis: 'Common practice: mass, conversion, heat release, heat flow, in this order',
      sources: [],
    },
  ]
}

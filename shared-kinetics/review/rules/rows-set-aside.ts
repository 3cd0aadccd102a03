import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { list } from '../words.ts'

/** Fires for each run with rows that could not be used with the chosen signal. A caution where time goes back while the sample reacts or most rows share a time, else a note. */
export function rowsSetAside({ runs }: ReviewInput): Finding[] {
  return runs.flatMap(({ info, sampling: { withoutNumber, sameTime, behind, behindInReaction } }): Finding[] => {
    const kinds = [
      withoutNumber > 0 ? `${withoutNumber} without a number for time, temperature or signal` : '',
      sameTime > 0 && info.hasTime ? `${sameTime} with the time of the row before, which went into one mean with it` : '',
      sameTime > 0 && !info.hasTime ? `${sameTime} in which the temperature does not rise` : '',
      behind > 0 ? `${behind} whose time lies behind that of an earlier row` : '',
    ].filter((kind) => kind !== '')
    if (kinds.length === 0) return []
    const timeIsCoarse = info.hasTime && sameTime > 0.5 * info.rows
    return [
      {
        code: 'rows-set-aside',
        severity: behindInReaction > 0 || timeIsCoarse ? 'caution' : 'note',
        stage: 'runs',
        title: `${info.label}: ${withoutNumber + sameTime + behind} of ${info.rows} rows do not count for themselves`,
        message:
          `Of the ${info.rows} rows of ${info.label} some are no samples of their own: ${list(kinds)}. ` +
          (behindInReaction > 0
            ? `Time goes back while the sample reacts (${behindInReaction} rows): see whether the clock was set there. `
            : '') +
          (sameTime > 0 && info.hasTime
            ? 'Where time was rounded, which roughens rates most, export it with more digits.'
            : 'The other rows are used as they stand.'),
        run: info.id,
        level: null,
        evidence: { withoutNumber, sameTime, behind, behindInReaction },
        basis: 'Time ascends from row to row',
        sources: [],
      },
    ]
  })
}

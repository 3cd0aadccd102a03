import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { levelsInWords } from '../words.ts'

/** Fires for each run that does not reach some of the levels inside its window. */
export function levelNotReached({ result, runs }: ReviewInput): Finding[] {
  return runs.flatMap(({ info, result: run, sampling }): Finding[] => {
    const missing = result.levels.filter((_, i) => run.temperatureAtLevel_K[i] === null)
    const [first] = missing
    if (first === undefined) return []
    return [
      {
        code: 'level-not-reached',
        severity: 'caution',
        stage: 'activation',
        title: `${info.label} does not reach conversion ${levelsInWords(missing)}`,
        message:
          `Inside its window ${info.label} does not pass${sampling.gaps.length > 0 ? ', or passes in a gap of its rows,' : ''} ${missing.length} of ${result.levels.length} levels (conversion ${levelsInWords(missing)}), so that no Ea is given there. ` +
          'Ask for other levels, widen its window, or leave the run out.',
        run: info.id,
        level: first,
        evidence: { missing: missing.length, levels: result.levels.length, first, last: missing.at(-1) ?? null },
        basis: 'Every run is read at every level, or the level is left empty',
        sources: ['ictac-2011'],
      },
    ]
  })
}

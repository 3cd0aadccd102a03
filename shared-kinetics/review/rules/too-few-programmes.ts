import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { programmesOf } from '../words.ts'

const recommended = 3

/** Fewer than two distinct programmes give no Ea (stop); two give one without an interval (caution). Replicates do not count. A study without used runs is not spoken of. */
export function tooFewProgrammes({ study, runs }: ReviewInput): Finding[] {
  const programmes = programmesOf(runs).length
  if (!study.runs.some((run) => run.use) || programmes >= recommended) return []
  const replicates = runs.length > programmes ? ` (${runs.length} runs; replicates of one programme count once)` : ''
  const counted = `${programmes === 0 ? 'No' : programmes} distinct temperature programme${programmes === 1 ? '' : 's'}${replicates}`
  return [
    {
      code: 'too-few-programmes',
      severity: programmes < 2 ? 'stop' : 'caution',
      stage: 'runs',
      title:
        programmes < 2
          ? `${counted.replace(replicates, '')}; Ea needs at least 2, an interval ${recommended}`
          : 'No interval: two distinct temperature programmes',
      message:
        programmes < 2
          ? `${counted}. Isoconversional methods compare runs at one conversion and need at least two, better three to five. Add runs at other heating rates or hold temperatures.`
          : `${counted}. Through two points any line fits, so that Ea has no interval and nothing shows whether it is right. Add a run at a third heating rate or hold temperature.`,
      run: null,
      level: null,
      evidence: { programmes, runs: runs.length },
      basis: 'Three to five distinct programmes',
      sources: ['ictac-2011', 'ictac-2014'],
    },
  ]
}

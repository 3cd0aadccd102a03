import { fewestRowsInReaction } from '../../conversion/smooth-curve.ts'
import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'

/** Fires for each run with fewer than 15 rows between conversion 0.02 and 0.98. */
export function samplingCoarse({ runs }: ReviewInput): Finding[] {
  return runs.flatMap(({ info, sampling: { rowsInReaction } }): Finding[] =>
    rowsInReaction >= fewestRowsInReaction
      ? []
      : [
          {
            code: 'sampling-coarse',
            severity: 'caution',
            stage: 'runs',
            title: `${info.label}: few rows while it reacts`,
            message:
              `${info.label} has ${rowsInReaction} rows between conversion 0.02 and 0.98. Levels and rates are read from curves laid through so few rows, which rounds ` +
              'them off by the same amount in every run: Ea is shifted by more than its interval tells. Export the run with more rows.',
            run: info.id,
            level: null,
            evidence: { rowsInReaction },
            basis: `With ${fewestRowsInReaction} rows Ea of exact first-order data is shifted by up to 1 %, with fewer by more`,
            sources: [],
          },
        ],
  )
}

import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { celsiusAndKelvin, digits, list, percent } from '../words.ts'

/** Fires for each run whose rows leave out a notable part of the reaction. */
export function gapInReaction({ result, runs }: ReviewInput): Finding[] {
  return runs.flatMap(({ info, sampling: { gaps } }): Finding[] => {
    const unseen = gaps.reduce((sum, gap) => sum + gap.conversionAfter - gap.conversionBefore, 0)
    if (gaps.length === 0) return []
    const where = list(
      gaps.map(
        ({ from_K, to_K, conversionBefore, conversionAfter }) =>
          `from ${celsiusAndKelvin(from_K)} to ${celsiusAndKelvin(to_K)} (conversion ${digits(conversionBefore, 2)} to ${digits(conversionAfter, 2)})`,
      ),
    )
    const ofArea = result.signal === 'heat-flow' || result.signal === 'heat-release'
    return [
      {
        code: 'gap-in-reaction',
        severity: 'caution',
        stage: 'runs',
        title: `${info.label}: rows are missing while it reacts`,
        message:
          `The rows of ${info.label} leave out ${percent(unseen)} of the reaction: ${where}. No level is read there, and no rate peak beside it. ` +
          (ofArea ? 'The area in the gap is a guess, and with it the conversion on either side. ' : '') +
          'Export the run whole, measure it again, or leave it out.',
        run: info.id,
        level: null,
        evidence: {
          gaps: gaps.length,
          unseen_percent: 100 * unseen,
          from_K: gaps[0]?.from_K ?? null,
          to_K: gaps.at(-1)?.to_K ?? null,
        },
        basis: 'Nothing is read where nothing was measured: a step of time above ten usual ones and above a fifteenth of the reaction',
        sources: [],
      },
    ]
  })
}

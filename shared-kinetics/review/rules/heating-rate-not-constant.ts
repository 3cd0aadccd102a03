import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, percent } from '../words.ts'

const allowed = 0.05

/** Fires where the heating rate in some eighth of the reaction is more than 5 % off that over all of it. */
export function heatingRateNotConstant({ runs }: ReviewInput): Finding[] {
  return runs.flatMap(({ info, result, heatingRateSpread }): Finding[] => {
    const rate = result.heatingRate_K_per_min
    if (rate === null || !(heatingRateSpread > allowed)) return []
    return [
      {
        code: 'heating-rate-not-constant',
        severity: 'note',
        stage: 'runs',
        title: `${info.label}: heating rate wanders by ${percent(heatingRateSpread)}`,
        message:
          `The heating rate of ${info.label} is ${digits(rate, 4)} K/min over the reaction, but up to ${percent(heatingRateSpread)} off that in parts of it. Methods for constant ` +
          'heating rates carry such a share into Ea; Friedman does not. Compare the two, and let the furnace settle before the reaction next time.',
        run: info.id,
        level: null,
        evidence: { heatingRate_K_per_min: rate, spread_percent: 100 * heatingRateSpread },
        basis: 'Common practice: a constant heating rate within 5 % in every eighth of the reaction',
        sources: ['ictac-2014'],
      },
    ]
  })
}

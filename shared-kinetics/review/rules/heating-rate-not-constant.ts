import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, percent } from '../words.ts'

const allowed = 0.05

/**
 * Fires where the heating rate in some eighth of the reaction is more than 5 % off that over all of it. Methods that know one heating rate a run then err in Ea by up
 * to that share over ln(fastest/slowest heating rate), as the slope of ln(beta) against 1/T does when one end of it moves.
 */
export function heatingRateNotConstant({ runs }: ReviewInput): Finding[] {
  const rates = runs.flatMap(({ result }) => result.heatingRate_K_per_min ?? [])
  const lnRatio = Math.log(Math.max(...rates) / Math.min(...rates))
  return runs.flatMap(({ info, result, heatingRateSpread }): Finding[] => {
    const rate = result.heatingRate_K_per_min
    if (rate === null || !(heatingRateSpread > allowed)) return []
    const shift = lnRatio > 0 ? heatingRateSpread / lnRatio : Number.NaN
    const off = Number.isFinite(shift) ? `: Ea may be off by up to ${percent(shift)}` : ''
    return [
      {
        code: 'heating-rate-not-constant',
        severity: 'note',
        stage: 'runs',
        title: `${info.label}: heating rate wanders by ${percent(heatingRateSpread)}`,
        message:
          `Over the reaction it is ${digits(rate, 4)} K/min, in parts up to ${percent(heatingRateSpread)} off. OFW, KAS, Starink and Kissinger take the one rate${off}. ` +
          'Friedman and Vyazovkin follow the measured T(t): quote these.',
        run: info.id,
        level: null,
        evidence: {
          heatingRate_K_per_min: rate,
          spread_percent: 100 * heatingRateSpread,
          EaShift_percent: Number.isFinite(shift) ? 100 * shift : null,
        },
        basis: 'Common practice: a constant heating rate within 5 % in every eighth of the reaction',
        sources: ['ictac-2014'],
      },
    ]
  })
}

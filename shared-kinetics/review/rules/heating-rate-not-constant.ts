import type { MethodId } from '../../isoconversional/result.ts'
import type { Finding } from '../finding.ts'
import { halfIntervalOf } from '../half-intervals.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, percent } from '../words.ts'

const allowed = 0.05
/** Below this a ramp counts as straight for every method. */
const straight = 0.01
/** Part of half the 95 % interval of Ea from which on a shift of it matters. */
const notable = 1 / 3

/** Methods that know one heating rate a run, by how they are usually quoted. */
const ofOneRate: readonly MethodId[] = ['starink', 'kas', 'ofw', 'ofw-corrected', 'starink-1996', 'tang', 'astm-e1641', 'iso-11358-2']

/**
 * Fires where the heating rate in some eighth of the reaction is more than 5 % off that over all of it; and from 1 % on where methods that know one heating rate a run may
 * err in Ea by more than a third of half their own interval. They err by up to that share over ln(fastest/slowest heating rate), as the slope of ln(beta) against 1/T does
 * when one end of it moves.
 */
export function heatingRateNotConstant({ runs, result: { profiles } }: ReviewInput): Finding[] {
  const rates = runs.flatMap(({ result }) => result.heatingRate_K_per_min ?? [])
  const lnRatio = Math.log(Math.max(...rates) / Math.min(...rates))
  const profile = ofOneRate.flatMap((method) => profiles.find((one) => one.method === method) ?? [])[0]
  const half = profile === undefined ? null : halfIntervalOf(profile)
  return runs.flatMap(({ info, result, heatingRateSpread }): Finding[] => {
    const rate = result.heatingRate_K_per_min
    const shift = lnRatio > 0 ? heatingRateSpread / lnRatio : Number.NaN
    const matters = heatingRateSpread > straight && half !== null && shift > notable * half.share
    if (rate === null || !(heatingRateSpread > allowed || matters)) return []
    const beside = half === null ? '' : `, where half of their 95 % interval is ${percent(half.share)}`
    const off = Number.isFinite(shift) ? `: Ea may be off by up to ${percent(shift)}${beside}` : ''
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
          halfInterval_percent: half === null ? null : 100 * half.share,
        },
        basis:
          'Common practice: a constant heating rate within 5 % in every eighth of the reaction; from 1 % on where it may shift Ea by more than a third of half its interval',
        sources: ['ictac-2014'],
      },
    ]
  })
}

import type { MethodId } from '../../isoconversional/result.ts'
import type { Finding } from '../finding.ts'
import { halfIntervalOf } from '../half-intervals.ts'
import type { ReviewedRun, ReviewInput } from '../review-input.ts'
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
 * when one end of it moves. A caution where that error may be as large as half the interval, which then does not hold it; else a note. One finding speaks for all runs and methods.
 */
export function heatingRateNotConstant({ runs, result: { profiles } }: ReviewInput): Finding[] {
  const rates = runs.flatMap(({ result }) => result.heatingRate_K_per_min ?? [])
  const lnRatio = Math.log(Math.max(...rates) / Math.min(...rates))
  const profile = ofOneRate.flatMap((method) => profiles.find((one) => one.method === method) ?? [])[0]
  const half = profile === undefined ? null : halfIntervalOf(profile)
  const shiftOf = (run: ReviewedRun): number => (lnRatio > 0 ? run.heatingRateSpread / lnRatio : Number.NaN)
  const wandering = runs.filter((run) => {
    const matters = run.heatingRateSpread > straight && half !== null && shiftOf(run) > notable * half.share
    return run.result.heatingRate_K_per_min !== null && (run.heatingRateSpread > allowed || matters)
  })
  const [first] = wandering
  if (first === undefined) return []
  const worst = wandering.reduce((a, b) => (b.heatingRateSpread > a.heatingRateSpread ? b : a))
  const shift = shiftOf(worst)
  const isAsLarge = half !== null && Number(percentNumber(shift)) >= Number(percentNumber(half.share))
  const isOne = wandering.length === 1
  const spread = percent(worst.heatingRateSpread)
  const seen = isOne
    ? `Over the reaction it is ${digits(first.result.heatingRate_K_per_min ?? Number.NaN, 4)} K/min, in parts up to ${spread} off.`
    : `In parts of the reaction it is off its mean by up to ${spread} (${worst.info.label}).`
  return [
    {
      code: 'heating-rate-not-constant',
      severity: isAsLarge ? 'caution' : 'note',
      stage: 'runs',
      title: `${isOne ? `${first.info.label}: heating rate wanders` : `${wandering.length} runs: heating rates wander`} by ${isOne ? '' : 'up to '}${spread}`,
      message:
        `${seen} OFW, KAS, Starink and Kissinger take the one rate${offText(shift, half?.share ?? null, isAsLarge)}. ` +
        'Friedman and Vyazovkin follow the measured T(t): quote these.',
      run: isOne ? first.info.id : null,
      level: null,
      evidence: {
        ...(isOne
          ? { heatingRate_K_per_min: first.result.heatingRate_K_per_min }
          : {
              runs: wandering.length,
              ...Object.fromEntries(
                wandering.map((run) => [`${run.info.label} (${run.info.id}): spread_percent`, 100 * run.heatingRateSpread]),
              ),
            }),
        spread_percent: 100 * worst.heatingRateSpread,
        EaShift_percent: Number.isFinite(shift) ? 100 * shift : null,
        halfInterval_percent: half === null ? null : 100 * half.share,
      },
      basis:
        'Common practice: a constant heating rate within 5 % in every eighth of the reaction; from 1 % on where it may shift Ea by more than a third of half its interval',
      sources: ['ictac-2014'],
    },
  ]
}

/** As it is printed: what reads as equal counts as equal. */
const percentNumber = (share: number): string => (100 * share).toPrecision(2)

function offText(shift: number, half: number | null, isAsLarge: boolean): string {
  if (!Number.isFinite(shift)) return ''
  const off = `: their Ea may be off by up to ${percent(shift)}`
  if (half === null) return off
  return isAsLarge
    ? `${off}, no less than half of their 95 % interval (${percent(half)}), which does not hold it`
    : `${off}, where half of their 95 % interval is ${percent(half)}`
}

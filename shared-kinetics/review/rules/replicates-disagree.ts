import type { Finding } from '../finding.ts'
import type { ReviewedRun, ReviewInput } from '../review-input.ts'
import { digits, list, mean, percent, programmesOf } from '../words.ts'

/** Of the whole shift between slowest and fastest programme: more than this between replicates hides what Ea is read from. */
const allowedShare = 0.2
/** Of the mean enthalpy. */
const allowedEnthalpySpread = 0.1

/**
 * Fires for a constant-heating-rate programme whose replicates stand apart at some level by more than a fifth of the shift that the heating rates cause there, or
 * differ in enthalpy by more than a tenth. Such replicates mostly have unlike windows or baselines.
 */
export function replicatesDisagree({ result, runs }: ReviewInput): Finding[] {
  const programmes = programmesOf(runs.filter((run) => run.result.programme === 'constant-heating-rate'))
  const [slowest = [], fastest = []] = [programmes[0], programmes.at(-1)]
  return programmes
    .filter((replicates) => replicates.length > 1)
    .flatMap((replicates): Finding[] => {
      const spreads = result.levels.map((level, at) => {
        const spread_K = spreadOf(temperatures(replicates, at))
        const shift_K = mean(temperatures(fastest, at)) - mean(temperatures(slowest, at))
        return { level, spread_K, share: shift_K > 0 ? spread_K / shift_K : Number.NaN }
      })
      const worst = spreads.filter(({ share }) => share > allowedShare).toSorted((a, b) => b.share - a.share)[0]
      const enthalpies = replicates.flatMap((run) => run.result.enthalpyMagnitude_J_per_g ?? [])
      const enthalpySpread = enthalpies.length > 1 ? spreadOf(enthalpies) / mean(enthalpies) : 0
      if (worst === undefined && enthalpySpread <= allowedEnthalpySpread) return []
      const names = list(replicates.map((run) => run.info.label))
      const apart =
        worst === undefined
          ? []
          : [
              `by ${digits(worst.spread_K, 2)} K at conversion ${digits(worst.level)} (${percent(worst.share)} of the shift between slowest and fastest)`,
            ]
      const heat = enthalpySpread > allowedEnthalpySpread ? [`by ${percent(enthalpySpread)} in enthalpy`] : []
      return [
        {
          code: 'replicates-disagree',
          severity: 'caution',
          stage: 'runs',
          title: `Replicates at ${rateOf(replicates)} K/min do not agree`,
          message: `${names} differ ${list([...apart, ...heat])}. Compare their windows and baselines; set one window for all runs, or leave out the one at odds.`,
          run: replicates[0]?.info.id ?? null,
          level: worst?.level ?? null,
          evidence: { spread_K: worst?.spread_K ?? null, shareOfShift: worst?.share ?? null, enthalpySpread },
          basis: 'Replicates give the real error; a fifth of the shift and a tenth of the enthalpy are common practice',
          sources: ['ictac-2014'],
        },
      ]
    })
}

const temperatures = (runs: readonly ReviewedRun[], level: number): readonly number[] =>
  runs.flatMap((run) => run.result.temperatureAtLevel_K[level] ?? [])

const spreadOf = (values: readonly number[]): number => (values.length < 2 ? 0 : Math.max(...values) - Math.min(...values))

const rateOf = (runs: readonly ReviewedRun[]): string => digits(mean(runs.map((run) => run.result.heatingRate_K_per_min ?? Number.NaN)))

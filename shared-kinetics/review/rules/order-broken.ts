import type { Finding } from '../finding.ts'
import type { ReviewedRun, ReviewInput } from '../review-input.ts'
import { celsiusAndKelvin, digits, levelsInWords, list, mean, programmesOf } from '../words.ts'

/**
 * Fires for two neighbouring constant heating rates where the faster one does not reach some level at a higher temperature than the slower one. Replicates are
 * compared by their mean. One finding a pair, at the level where it is worst.
 */
export function orderBroken({ result, runs }: ReviewInput): Finding[] {
  const programmes = programmesOf(runs.filter((run) => run.result.programme === 'constant-heating-rate'))
  return programmes.slice(1).flatMap((faster, i): Finding[] => {
    const slower = programmes[i] ?? []
    const rises = result.levels.map((level, at) => ({ level, rise: temperatureAt(faster, at) - temperatureAt(slower, at) }))
    const broken = rises.filter(({ rise }) => rise <= 0)
    if (broken.length === 0) return []
    const worst = broken.reduce((a, b) => (b.rise < a.rise ? b : a))
    const at = result.levels.indexOf(worst.level)
    return [
      {
        code: 'order-broken',
        severity: 'caution',
        stage: 'activation',
        title: `${rate(faster)} K/min is not later than ${rate(slower)} K/min at conversion ${levelsInWords(broken.map(({ level }) => level))}`,
        message:
          `At conversion ${digits(worst.level)} ${names(faster)} ${faster.length === 1 ? 'stands' : 'stand'} at ${celsiusAndKelvin(temperatureAt(faster, at))}, the slower ${names(slower)} at ${celsiusAndKelvin(temperatureAt(slower, at))}; ` +
          'a faster run should stand higher. Ea there is not to be relied on. Compare their windows, baselines, masses and temperature calibration; leave the wrong run out.',
        run: faster[0]?.info.id ?? null,
        level: worst.level,
        evidence: { level: worst.level, slower_K: temperatureAt(slower, at), faster_K: temperatureAt(faster, at), levels: broken.length },
        basis: 'Follows from any positive Ea',
        sources: ['ictac-2011'],
      },
    ]
  })
}

/** Mean over the runs that reach the level; NaN, which breaks no order, where none does. */
function temperatureAt(group: readonly ReviewedRun[], level: number): number {
  return mean(group.flatMap((run) => run.result.temperatureAtLevel_K[level] ?? []))
}

const names = (group: readonly ReviewedRun[]): string => list(group.map((run) => run.info.label))

const rate = (group: readonly ReviewedRun[]): string => digits(mean(group.map((run) => run.result.heatingRate_K_per_min ?? Number.NaN)))

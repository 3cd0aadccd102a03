import type { IntervalStatus } from '../isoconversional/result.ts'
import { isAssumed } from '../uncertainty/assumed-uncertainties.ts'
import { shownByScatter, type Budget } from '../uncertainty/budget.ts'
import {
  uncertaintySources,
  type MeasuredSources,
  type StatedUncertainties,
  type UncertaintySource,
} from '../uncertainty/measured-sources.ts'
import { joulesToKilojoules } from '../units/convert.ts'
import { maybes } from './maybe.ts'
import type { BudgetEntry } from './study-result.ts'

const labels: Readonly<Record<UncertaintySource, string>> = {
  'temperature-common': 'Temperature, common to all runs',
  'temperature-run': 'Temperature, run by run',
  'temperature-lag': 'Thermal lag',
  'heating-rate': 'Heating rate',
  'signal-noise': 'Noise of the signal',
  baseline: 'Choice of baseline',
}

/** A budget in the terms of a result: sources that play no part are left out. */
export function budgetEntries(budget: Budget, sources: MeasuredSources): BudgetEntry[] {
  return uncertaintySources
    .filter((source) => source !== 'baseline' || sources.baseline !== null)
    .map((source) => ({
      source,
      label: labels[source],
      magnitude: magnitudeOf(source, sources),
      assumed: assumes(source, sources),
      standardUncertainty_kJ_per_mol: maybes(budget[source].map(joulesToKilojoules)),
      shownByScatter: shownByScatter[source],
      reason: source === 'baseline' ? (sources.baseline?.reason ?? null) : null,
    }))
}

/**
 * How the combined interval was made, with the size of everything that was put in besides the scatter, and whether anybody stated it.
 *
 * @param entries - of the method's budget
 */
export function noteOnCombined(entries: readonly BudgetEntry[]): string {
  const added = entries
    .filter((entry) => !entry.shownByScatter && entry.reason === null)
    .map((entry) => `${lowerFirst(entry.label)} (${entry.magnitude})`)
  return (
    `The regression's standard error with what no scatter shows: ${added.join('; ')}. Student's t times the one and the normal quantile times the other, ` +
    `added in squares. Pointwise, and approximate: the sizes that are stated or assumed count as known exactly.${leftOut(entries)}`
  )
}

/** What an interval does not hold since nobody can tell it, with the reason, as sentences to put after a note; empty where nothing is left out. */
export const leftOut = (entries: readonly Pick<BudgetEntry, 'label' | 'reason'>[]): string =>
  entries.flatMap(({ label, reason }) => (reason === null ? [] : [` The ${lowerFirst(label)} is not in it: ${reason}`])).join('')

/** What is said of an interval from measured sources at a level that has one: whether the choice of baseline is in it. */
export const givenOf = ({ baseline }: Pick<MeasuredSources, 'baseline'>): IntervalStatus =>
  baseline === null || baseline.reason === null ? 'ok' : 'baseline-left-out'

const lowerFirst = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1)

const statedBy: Partial<Readonly<Record<UncertaintySource, keyof StatedUncertainties>>> = {
  'temperature-common': 'temperatureCommon_K',
  'temperature-run': 'temperatureRun_K',
  'temperature-lag': 'lag_s',
  'heating-rate': 'statedHeatingRate_share',
}

function assumes(source: UncertaintySource, { stated, heatingRate_share }: MeasuredSources): boolean {
  const key = statedBy[source]
  if (key === undefined || !isAssumed(stated, key)) return false
  // A measured heating rate has an error of its own: nothing is assumed of it.
  return source !== 'heating-rate' || heatingRate_share.includes(stated.statedHeatingRate_share)
}

function magnitudeOf(source: UncertaintySource, sources: MeasuredSources): string {
  const { stated, heatingRate_share, noise } = sources
  const from = assumes(source, sources) ? 'assumed, nothing stated' : 'as stated'
  switch (source) {
    case 'temperature-common':
      return `${stated.temperatureCommon_K} K, ${from}`
    case 'temperature-run':
      return `${stated.temperatureRun_K} K in each run, ${from}`
    case 'temperature-lag':
      return `${stated.lag_s} s times the heating rate, ${from}`
    case 'heating-rate': {
      const most = heatingRate_share.reduce((a, b) => Math.max(a, b), 0)
      if (most < negligible) return 'none'
      return `up to ${percent(most)} % of each${assumes(source, sources) ? ', assumed where it was not measured' : ''}`
    }
    case 'signal-noise': {
      const most = noise.time_s.reduce((a, b) => (b > a ? b : a), 0)
      return `found in the data: up to ${most.toPrecision(2)} s in the time of a level`
    }
    case 'baseline':
      return 'area-proportional or straight'
  }
}

/** Share of a heating rate that is rounding. */
const negligible = 1e-9

const percent = (share: number): string => (100 * share).toPrecision(2)

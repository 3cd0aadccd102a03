import { joulesToKilojoules } from '../units/convert.ts'
import { shownByScatter, type Budget } from '../uncertainty/budget.ts'
import { uncertaintySources, type MeasuredSources, type UncertaintySource } from '../uncertainty/measured-sources.ts'
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
      standardUncertainty_kJ_per_mol: maybes(budget[source].map(joulesToKilojoules)),
      shownByScatter: shownByScatter[source],
    }))
}

function magnitudeOf(source: UncertaintySource, { stated, heatingRate_share, noise }: MeasuredSources): string {
  switch (source) {
    case 'temperature-common':
      return `${stated.temperatureCommon_K} K, as stated`
    case 'temperature-run':
      return `${stated.temperatureRun_K} K in each run, as stated`
    case 'temperature-lag':
      return `${stated.lag_s} s times the heating rate, as stated`
    case 'heating-rate': {
      const most = heatingRate_share.reduce((a, b) => Math.max(a, b), 0)
      return most === 0 ? 'none' : `up to ${percent(most)} % of each`
    }
    case 'signal-noise': {
      const most = noise.time_s.reduce((a, b) => (b > a ? b : a), 0)
      return `found in the data: up to ${most.toPrecision(2)} s in the time of a level`
    }
    case 'baseline':
      return 'area-proportional or straight'
  }
}

const percent = (share: number): string => (100 * share).toPrecision(2)

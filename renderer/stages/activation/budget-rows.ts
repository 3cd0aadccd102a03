import { defaultUncertainty } from '../../../shared-kinetics/contract/study-document.ts'
import type {
  BudgetEntry,
  Maybe,
  RunResult,
  UncertaintySettings,
  UncertaintySource,
} from '../../../shared-kinetics/contract/study-result.ts'
import type { DataColumn } from '../../sheet/data-table.ts'
import { decimals } from '../../sheet/format.ts'
import type { ShownOfMethod } from './shown-interval.ts'

/** What a person states, by the field of the settings that holds it. */
export type StatedKey = 'temperatureCommon_K' | 'temperatureRun_K' | 'lag_s' | 'statedHeatingRate_share'

/** One line of the budget at a level. */
export interface BudgetRow {
  readonly id: UncertaintySource | 'scatter' | 'combined' | 'measured-sources'
  readonly label: string
  /** What can be stated here; null where it is found in the data. */
  readonly stated: StatedKey | null
  /** In words beside the field, or in its place. */
  readonly words: string
  /** Standard uncertainty of Ea that it brings alone, in kJ/mol. */
  readonly u: Maybe
  /** u² as a share of the largest in the table; 0 for a sum. */
  readonly share: number
  /** `sum`: of other lines of the table. */
  readonly role: 'part' | 'sum'
}

/** Lines under one heading. The squares of the first group's parts add up to that of its sum. */
export interface BudgetGroup {
  readonly id: 'combined' | 'measured-sources'
  readonly title: string
  readonly rows: readonly BudgetRow[]
}

const statedKeys: Partial<Readonly<Record<UncertaintySource, StatedKey>>> = {
  'temperature-common': 'temperatureCommon_K',
  'temperature-run': 'temperatureRun_K',
  'temperature-lag': 'lag_s',
  'heating-rate': 'statedHeatingRate_share',
}

/** Whether a value is the assumption made because nobody has stated anything. */
export const isAssumed = (settings: UncertaintySettings, key: StatedKey): boolean =>
  settings.stated?.includes(key) !== true && settings[key] === defaultUncertainty[key]

/** The settings with what was typed, which from then on is stated, be it what was assumed before or not. */
export function withStated(settings: UncertaintySettings, typed: Partial<UncertaintySettings>): UncertaintySettings {
  const stated = Object.values(statedKeys).filter((key) => settings.stated?.includes(key) === true || key in typed)
  return { ...settings, ...typed, ...(stated.length === 0 ? {} : { stated }) }
}

const number = (value: number): string => String(Number(value.toPrecision(6)))

/** What stands in the field. */
export function statedText(settings: UncertaintySettings, key: StatedKey): string {
  if (key === 'lag_s') return `${number(settings[key])} s`
  return key === 'statedHeatingRate_share' ? `${number(100 * settings[key])} %` : `${number(settings[key])} K`
}

/**
 * Where the uncertainty of Ea comes from at a level: what makes up the combined one (the scatter of the runs, and what no scatter shows), then what the scatter shows
 * already, which stands beside it to compare and is not added again.
 *
 * @returns nothing until it is worked out
 */
export function budgetGroups(
  { profile, apart }: ShownOfMethod,
  settings: UncertaintySettings,
  runs: readonly RunResult[],
  levelIndex: number,
): readonly BudgetGroup[] {
  if (apart === null || apart.budget.length === 0) return []
  const scatter = profile.standardError_kJ_per_mol[levelIndex] ?? null
  const us = [scatter, ...apart.budget.map((entry) => entry.standardUncertainty_kJ_per_mol[levelIndex] ?? null)]
  const largest = Math.max(...us.map((u) => (u ?? 0) ** 2))
  const part = (row: Omit<BudgetRow, 'share' | 'role'>): BudgetRow => ({
    ...row,
    share: row.u === null || !(largest > 0) ? 0 : row.u ** 2 / largest,
    role: 'part',
  })
  const rowOf = (entry: BudgetEntry): BudgetRow => {
    const stated = statedOf(entry.source, runs)
    const u = entry.standardUncertainty_kJ_per_mol[levelIndex] ?? null
    return part({ id: entry.source, label: entry.label, stated, words: wordsOf(entry, stated, settings, runs), u })
  }
  const sum = (id: 'combined' | 'measured-sources', label: string): BudgetRow => {
    const interval = apart.intervals.find((one) => one.kind === id)
    return { id, label, stated: null, words: '', u: interval?.standardUncertainty_kJ_per_mol[levelIndex] ?? null, share: 0, role: 'sum' }
  }
  const { dof } = profile.interval
  const words = dof > 0 ? `regression, ${dof} degree${dof === 1 ? '' : 's'} of freedom` : 'not to be had from two programmes'
  return [
    {
      id: 'combined',
      title: 'Scatter, and what no scatter shows',
      rows: [
        part({ id: 'scatter', label: 'Scatter of the runs', stated: null, words, u: scatter }),
        ...apart.budget.filter((entry) => !entry.shownByScatter).map(rowOf),
        ...(dof > 0 ? [sum('combined', 'Combined')] : []),
      ],
    },
    {
      id: 'measured-sources',
      title: 'In the scatter already, not added again',
      rows: [...apart.budget.filter((entry) => entry.shownByScatter).map(rowOf), sum('measured-sources', 'All measured sources together')],
    },
  ]
}

/** A stated heating rate matters only where one was stated. */
function statedOf(source: UncertaintySource, runs: readonly RunResult[]): StatedKey | null {
  if (source === 'heating-rate' && runs.every((run) => run.heatingRateSource === 'measured' || run.heatingRateSource === null)) return null
  return statedKeys[source] ?? null
}

/** What a lag moves the temperature by at the fastest heating rate, `1 s = 1.67 K at 100 K/min`; empty without a lag and where no run has a heating rate. */
export function lagInKelvin(lag_s: number, runs: readonly RunResult[]): string {
  const fastest = Math.max(...runs.map((run) => run.heatingRate_K_per_min ?? 0), 0)
  return fastest > 0 && lag_s > 0
    ? `${number(lag_s)} s = ${number(Number(((lag_s * fastest) / 60).toPrecision(3)))} K at ${number(Number(fastest.toPrecision(3)))} K/min`
    : ''
}

function wordsOf(
  { source, magnitude, reason }: BudgetEntry,
  stated: StatedKey | null,
  settings: UncertaintySettings,
  runs: readonly RunResult[],
): string {
  if (source === 'heating-rate' && stated === null) return magnitude === 'none' ? 'measured' : `measured: ${magnitude}`
  if (reason !== null) return reason
  if (stated === null) return magnitude
  const inKelvin = lagInKelvin(settings.lag_s, runs)
  const lag = inKelvin === '' ? '× heating rate, ' : `× heating rate: ${inKelvin}, `
  const what = { temperatureCommon_K: '', temperatureRun_K: '', lag_s: lag, statedHeatingRate_share: 'where only stated, ' }[stated]
  return `${what}${isAssumed(settings, stated) ? 'assumed: nobody has stated it' : 'as stated'}`
}

/** In kJ/mol to two decimals, as it is compared with intervals of one. */
export const uText = (u: Maybe): string => (u === null ? '' : u > 0 && u < 0.005 ? '< 0.01' : decimals(u, 2))

interface CopiedRow extends BudgetRow {
  readonly group: BudgetGroup
}

export const budgetCopyRows = (groups: readonly BudgetGroup[]): readonly CopiedRow[] =>
  groups.flatMap((group) => group.rows.map((row) => ({ ...row, group })))

/** For the clipboard: one line a source, with what was stated and whether the combined uncertainty holds it. */
export function budgetCopyColumns(settings: UncertaintySettings, heading: string): readonly DataColumn<CopiedRow>[] {
  const words = (row: CopiedRow): string =>
    [row.stated === null ? '' : statedText(settings, row.stated), row.words].filter((text) => text !== '').join(' ')
  const text = (id: string, name: string, of: (row: CopiedRow) => string): DataColumn<CopiedRow> => ({
    id,
    heading: name,
    unit: '',
    numeric: false,
    text: of,
    value: of,
  })
  return [
    text('source', `Source, ${heading}`, (row) => row.label),
    text('stated', 'Stated (standard uncertainty) or found', words),
    { id: 'u', heading: 'u(Ea)', unit: 'kJ/mol', numeric: true, text: (row) => uText(row.u), value: (row) => row.u, places: 3 },
    text('group', 'Counts in', (row) => (row.group.id === 'combined' ? 'combined uncertainty' : 'scatter of the runs already')),
  ]
}

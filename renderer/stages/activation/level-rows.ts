import type { MethodId, ProfileResult, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { runNames } from '../../../shared-kinetics/figure/run-place.ts'
import { atLevel, formatAtLevel, levelQuantity } from '../../sheet/at-level.ts'
import type { DataColumn } from '../../sheet/data-table.ts'
import { decimals, formatInterval, formatLevel, halfWidth, shortMethodNames, statusWords } from '../../sheet/format.ts'

/** One level of the table, by its index in `StudyResult.levels`. */
export interface LevelRow {
  readonly index: number
  readonly level: number
}

export const levelRows = (result: StudyResult): readonly LevelRow[] => result.levels.map((level, index) => ({ index, level }))

/** The columns of the table: chosen method with its interval, the compared methods' Ea, and where the slowest and fastest runs stand. */
export function levelColumns(result: StudyResult, chosen: MethodId, compared: readonly MethodId[]): readonly DataColumn<LevelRow>[] {
  const profileOf = (method: MethodId): ProfileResult | undefined => result.profiles.find((profile) => profile.method === method)
  const first = profileOf(chosen)
  const others = compared.map(profileOf).filter((profile) => profile !== undefined)
  return [
    column(
      'level',
      'α',
      '',
      (row) => formatLevel(row.level),
      (row) => row.level,
    ),
    ...(first === undefined ? [] : chosenColumns(first)),
    ...others.map((profile) => energyColumn(profile)),
    ...endColumns(result),
    ...(first === undefined ? [] : [statusColumn(first)]),
  ]
}

function chosenColumns(profile: ProfileResult): DataColumn<LevelRow>[] {
  const columns = [
    energyColumn(profile),
    column(
      'interval',
      '± 95 %',
      'kJ/mol',
      ({ index }) => formatInterval(profile.Ea_kJ_per_mol[index], profile.lower95_kJ_per_mol[index], profile.upper95_kJ_per_mol[index]),
      ({ index }) => halfWidth(profile.lower95_kJ_per_mol[index], profile.upper95_kJ_per_mol[index]),
    ),
  ]
  if (profile.lnAf_per_s.some((value) => value !== null))
    columns.push(seriesColumn('lnAf', 'ln[A f(α)]', 'A in 1/s', profile.lnAf_per_s, 2))
  if (profile.r2.some((value) => value !== null)) columns.push(seriesColumn('r2', 'r²', '', profile.r2, 5))
  return columns
}

/** Ea of one method; where there is none, the reason stands in the cell. */
const energyColumn = (profile: ProfileResult): DataColumn<LevelRow> =>
  column(
    `Ea-${profile.method}`,
    `Ea ${shortMethodNames[profile.method]}`,
    'kJ/mol',
    ({ index }) => decimals(profile.Ea_kJ_per_mol[index], 1) || statusWords[profile.status[index] ?? 'level-not-reached'],
    ({ index }) => profile.Ea_kJ_per_mol[index] ?? null,
  )

/** On screen the reason stands in the energy's own cell; in a spreadsheet a column of numbers must stay one. */
const statusColumn = (profile: ProfileResult): DataColumn<LevelRow> => ({
  ...column(
    'status',
    `Status ${shortMethodNames[profile.method]}`,
    '',
    () => '',
    ({ index }) => statusWords[profile.status[index] ?? 'level-not-reached'] || 'ok',
  ),
  numeric: false,
})

/** Where the slowest and the fastest run reach the level. */
function endColumns(result: StudyResult): DataColumn<LevelRow>[] {
  const names = runNames(result.runs)
  const quantity = levelQuantity(result)
  const last = result.runs.length - 1
  return [...new Set(last < 0 ? [] : [0, last])].map((end) =>
    column(
      `end-${end}`,
      `${quantity.symbol} at ${names[end] ?? ''}`,
      quantity.unit,
      ({ index }) => formatAtLevel(result.runs[end], index, quantity) || 'not reached',
      ({ index }) => atLevel(result.runs[end], index, quantity),
    ),
  )
}

const seriesColumn = (id: string, heading: string, unit: string, values: readonly (number | null)[], count: number): DataColumn<LevelRow> =>
  column(
    id,
    heading,
    unit,
    ({ index }) => decimals(values[index], count),
    ({ index }) => values[index] ?? null,
  )

const column = (
  id: string,
  heading: string,
  unit: string,
  text: DataColumn<LevelRow>['text'],
  value: DataColumn<LevelRow>['value'],
): DataColumn<LevelRow> => ({ id, heading, unit, numeric: true, text, value })

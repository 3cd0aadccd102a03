import type { MethodId, ProfileResult, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { formatAt, levelPlaces, levelQuantity } from '../../sheet/at-level.ts'
import type { DataColumn } from '../../sheet/data-table.ts'
import { endProgrammes, meanAtLevel } from '../../sheet/end-programmes.ts'
import {
  decimals,
  formatInterval,
  formatLevel,
  formatSigned,
  halfWidth,
  isLopsided,
  shortMethodNames,
  statusWords,
} from '../../sheet/format.ts'
import { intervalOfKind, intervalWordsAt, shortKinds, type ShownInterval } from './shown-interval.ts'

/** One level of the table, by its index in `StudyResult.levels`. */
export interface LevelRow {
  readonly index: number
  readonly level: number
}

export const levelRows = (result: StudyResult): readonly LevelRow[] => result.levels.map((level, index) => ({ index, level }))

/** The interval that is shown of a method; null where it has none. */
export type IntervalOf = (profile: ProfileResult) => ShownInterval | null

const ownInterval: IntervalOf = (profile) => intervalOfKind(profile, null, 'student-t')

/** What stands in the table: the chosen method with its interval, the compared methods' Ea, and where the slowest and fastest programmes stand. */
export function levelColumns(
  result: StudyResult,
  chosen: MethodId,
  compared: readonly MethodId[],
  intervalOf: IntervalOf = ownInterval,
): readonly DataColumn<LevelRow>[] {
  const { first, others } = profilesOf(result, chosen, compared)
  return [
    levelColumn,
    ...(first === undefined
      ? []
      : [
          energyColumn(first),
          intervalColumn(first, intervalOf(first), '±\u00a095\u00a0%'),
          ...lnAfColumn(first),
          ...furtherColumns(first),
        ]),
    ...others.map((profile) => energyColumn(profile)),
    ...endColumns(result),
  ]
}

/** What the clipboard gets: every shown method with its own interval, and a column that says why a number is not to be had. */
export function levelCopyColumns(
  result: StudyResult,
  chosen: MethodId,
  compared: readonly MethodId[],
  intervalOf: IntervalOf = ownInterval,
): readonly DataColumn<LevelRow>[] {
  const { first, others } = profilesOf(result, chosen, compared)
  return [
    levelColumn,
    ...(first === undefined
      ? []
      : [energyColumn(first), ...copiedInterval(first, intervalOf(first)), ...copiedLnAf(first), ...furtherColumns(first)]),
    ...others.flatMap((profile) => [energyColumn(profile), ...copiedInterval(profile, intervalOf(profile))]),
    ...endColumns(result),
    ...(first === undefined
      ? []
      : [first, ...others].flatMap((profile) => [statusColumn(profile), ...remarkColumn(profile, intervalOf(profile))])),
  ]
}

function profilesOf(result: StudyResult, chosen: MethodId, compared: readonly MethodId[]) {
  const profileOf = (method: MethodId): ProfileResult | undefined => result.profiles.find((profile) => profile.method === method)
  return { first: profileOf(chosen), others: compared.map(profileOf).filter((profile) => profile !== undefined) }
}

/** A text on the clipboard too, so that the column stays as wide as it is shown. */
const levelColumn: DataColumn<LevelRow> = {
  id: 'level',
  heading: 'α',
  unit: '',
  numeric: true,
  text: (row) => formatLevel(row.level),
  value: (row) => formatLevel(row.level),
}

/** Ea of one method; where there is none, the reason stands in the cell. */
const energyColumn = (profile: ProfileResult): DataColumn<LevelRow> => ({
  id: `Ea-${profile.method}`,
  heading: `Ea ${shortMethodNames[profile.method]}`,
  unit: 'kJ/mol',
  numeric: true,
  text: ({ index }) => decimals(profile.Ea_kJ_per_mol[index], 1) || statusWords[profile.status[index] ?? 'level-not-reached'],
  value: ({ index }) => profile.Ea_kJ_per_mol[index] ?? null,
  places: 2,
})

const intervalColumn = (profile: ProfileResult, interval: ShownInterval | null, heading: string): DataColumn<LevelRow> => ({
  id: `interval-${profile.method}`,
  heading,
  unit: 'kJ/mol',
  numeric: true,
  text: ({ index }) =>
    formatInterval(profile.Ea_kJ_per_mol[index], interval?.lower95_kJ_per_mol[index], interval?.upper95_kJ_per_mol[index]) ||
    (intervalWordsAt(interval, index) === null ? '' : 'none'),
  remark: ({ index }) => intervalWordsAt(interval, index),
  value: ({ index }) => halfWidth(interval?.lower95_kJ_per_mol[index], interval?.upper95_kJ_per_mol[index]),
  places: 2,
})

/** One column of half-widths or, where some interval is lopsided or open, both ends; none where a method has no interval at all. The heading says the kind. */
function copiedInterval(profile: ProfileResult, interval: ShownInterval | null): readonly DataColumn<LevelRow>[] {
  if (interval === null) return []
  const { lower95_kJ_per_mol: lower, upper95_kJ_per_mol: upper } = interval
  const [name, kind] = [shortMethodNames[profile.method], shortKinds[interval.kind]]
  const needsEnds = profile.Ea_kJ_per_mol.some(
    (value, i) => isLopsided(value, lower[i], upper[i]) || (lower[i] === null) !== (upper[i] === null),
  )
  if (!needsEnds) return [intervalColumn(profile, interval, `± 95 % ${name}, ${kind}`)]
  return [
    seriesColumn(`lower-${profile.method}`, `Ea ${name}, lower end 95 %, ${kind}`, 'kJ/mol', lower, 1),
    seriesColumn(`upper-${profile.method}`, `Ea ${name}, upper end 95 %, ${kind}`, 'kJ/mol', upper, 1),
  ]
}

const hasNumbers = (values: readonly (number | null)[]): boolean => values.some((value) => value !== null)

/** On screen with its standard error in the same cell. */
function lnAfColumn(profile: ProfileResult): readonly DataColumn<LevelRow>[] {
  if (!hasNumbers(profile.lnAf_per_s)) return []
  const column = seriesColumn('lnAf', 'ln[A f(α)]', 'A in 1/s, ± s.e.', profile.lnAf_per_s, 2)
  return [{ ...column, text: ({ index }) => withError(profile.lnAf_per_s[index], profile.lnAfStandardError[index]) }]
}

function copiedLnAf(profile: ProfileResult): readonly DataColumn<LevelRow>[] {
  if (!hasNumbers(profile.lnAf_per_s)) return []
  return [
    seriesColumn('lnAf', 'ln[A f(α)]', 'A in 1/s', profile.lnAf_per_s, 2),
    ...(hasNumbers(profile.lnAfStandardError) ? [seriesColumn('lnAf-error', 's.e. of ln[A f(α)]', '', profile.lnAfStandardError, 2)] : []),
  ]
}

/** A number and its standard error, `25.12 ± 0.20`. */
function withError(value: number | null | undefined, standardError: number | null | undefined): string {
  const error = decimals(standardError, 2)
  return error === '' ? decimals(value, 2) : `${decimals(value, 2)} ± ${error}`
}

function furtherColumns(profile: ProfileResult): readonly DataColumn<LevelRow>[] {
  return [
    ...(hasNumbers(profile.lnA_per_s) ? [seriesColumn('lnA', 'ln A', 'A in 1/s', profile.lnA_per_s, 2)] : []),
    ...(profile.systematicError_percent.some((error) => error !== null && error !== 0) ? [systematicColumn(profile)] : []),
    ...(hasNumbers(profile.r2) ? [seriesColumn('r2', 'r²', '', profile.r2, 5)] : []),
  ]
}

/** Of the method's own temperature integral, with its sign. */
const systematicColumn = ({ systematicError_percent: percent }: ProfileResult): DataColumn<LevelRow> => ({
  ...seriesColumn('systematic', 'Syst. error', '%', percent, 2),
  text: ({ index }) => formatSigned(percent[index], 2),
})

/** On screen the reason stands in the energy's own cell; in a spreadsheet a column of numbers must stay one. */
const statusColumn = (profile: ProfileResult): DataColumn<LevelRow> => {
  const status = ({ index }: LevelRow): string => statusWords[profile.status[index] ?? 'level-not-reached'] || 'ok'
  const heading = `Status ${shortMethodNames[profile.method]}`
  return { id: `status-${profile.method}`, heading, unit: '', numeric: false, text: status, value: status }
}

/** Why an interval has no ends at a level, or ends that say less than they seem to; none where there is nothing to say at any level. */
function remarkColumn(profile: ProfileResult, interval: ShownInterval | null): readonly DataColumn<LevelRow>[] {
  if (interval === null || interval.status.every((_, index) => intervalWordsAt(interval, index) === null)) return []
  const words = ({ index }: LevelRow): string => intervalWordsAt(interval, index) ?? ''
  const heading = `Interval ${shortMethodNames[profile.method]}, ${shortKinds[interval.kind]}`
  return [{ id: `remark-${profile.method}`, heading, unit: '', numeric: false, text: words, value: words }]
}

/** Where the slowest and the fastest programme reach the level, as a mean over their replicates. */
function endColumns(result: StudyResult): readonly DataColumn<LevelRow>[] {
  const quantity = levelQuantity(result)
  return endProgrammes(result).map(({ name, runs }, i) => ({
    id: `end-${i}`,
    heading: `${quantity.symbol} at ${name}`,
    unit: quantity.unit,
    numeric: true,
    text: ({ index }) => formatAt(meanAtLevel(runs, index, quantity), quantity) || 'not reached',
    value: ({ index }) => meanAtLevel(runs, index, quantity),
    places: levelPlaces(quantity) + 1,
  }))
}

const seriesColumn = (
  id: string,
  heading: string,
  unit: string,
  values: readonly (number | null)[],
  count: number,
): DataColumn<LevelRow> => ({
  id,
  heading,
  unit,
  numeric: true,
  text: ({ index }) => decimals(values[index], count),
  value: ({ index }) => values[index] ?? null,
  places: count + 1,
})

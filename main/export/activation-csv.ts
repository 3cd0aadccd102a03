import { levelText } from '../../shared-kinetics/figure/nice-axis.ts'
import type { BudgetEntry, IntervalResult, ProfileResult } from '../../shared-kinetics/tasks/study-result.ts'
import type { TableStyle } from '../../shared-kinetics/contract/host-api.ts'
import { uncertaintyOf, type ExportSource } from './activation-json.ts'
import { csvTable } from './csv-table.ts'

/** A column of the table of results, with its heading; the copy of the table on a screen has the same. */
interface ResultColumn {
  readonly heading: string
  readonly values: readonly (number | null)[]
}

/**
 * The text of `activation.csv`: one heading row and one row a level; first column `conversion`, then for each method Ea, its standard error, the
 * ends of its 95 % interval and ln[A f], the unit in every heading. After those of all methods come, where a method has them: standard error of ln[A f] and its covariance with
 * Ea, ln A, the systematic error of Ea, and the ends of each other interval, named by its kind; last what each source of the budget alone brings to Ea. A number that is not to be had is an empty cell.
 */
export function activationCsv({ result, uncertainty }: Pick<ExportSource, 'result' | 'uncertainty'>, style: TableStyle): string {
  const columns = [
    ...result.profiles.flatMap(columnsOf),
    ...result.profiles.flatMap((profile) => furtherColumnsOf(profile, uncertaintyOf(profile, uncertainty)?.intervals ?? [])),
    ...result.profiles.flatMap((profile) => budgetColumnsOf(profile, uncertaintyOf(profile, uncertainty)?.budget ?? [])),
  ]
  const headings = ['conversion', ...columns.map((column) => column.heading)]
  const rows = result.levels.map((level, i) => [Number(levelText(level)), ...columns.map((column) => column.values[i] ?? null)])
  return csvTable([headings, ...rows], style)
}

// Headings are plain ASCII: spreadsheets that take a file without a byte-order mark for a national encoding then still read them.
const ascii = (label: string): string => label.replaceAll('–', '-')

function columnsOf(profile: ProfileResult): readonly ResultColumn[] {
  const label = ascii(profile.label)
  return [
    { heading: `Ea ${label} (kJ/mol)`, values: profile.Ea_kJ_per_mol },
    { heading: `Ea ${label} standard error (kJ/mol)`, values: profile.standardError_kJ_per_mol },
    { heading: `Ea ${label} lower 95 % (kJ/mol)`, values: profile.lower95_kJ_per_mol },
    { heading: `Ea ${label} upper 95 % (kJ/mol)`, values: profile.upper95_kJ_per_mol },
    { heading: `ln[A f] ${label} (A in 1/s)`, values: profile.lnAf_per_s },
  ]
}

function furtherColumnsOf(profile: ProfileResult, apart: readonly IntervalResult[]): readonly ResultColumn[] {
  const label = ascii(profile.label)
  const columns: readonly ResultColumn[] = [
    { heading: `ln[A f] ${label} standard error`, values: profile.lnAfStandardError },
    { heading: `covariance of Ea and ln[A f] ${label} (kJ/mol)`, values: profile.covarianceEaLnAf_kJ_per_mol },
    { heading: `ln A ${label} (A in 1/s)`, values: profile.lnA_per_s },
    // 0 says that there is none, which the notes beside the table say once.
    { heading: `Ea ${label} systematic error (%)`, values: profile.systematicError_percent.map((value) => (value === 0 ? null : value)) },
    ...[...profile.otherIntervals, ...apart].flatMap((interval): ResultColumn[] => [
      { heading: `Ea ${label} ${ascii(interval.label)} lower 95 % (kJ/mol)`, values: interval.lower95_kJ_per_mol },
      { heading: `Ea ${label} ${ascii(interval.label)} upper 95 % (kJ/mol)`, values: interval.upper95_kJ_per_mol },
    ]),
  ]
  return columns.filter(isThere)
}

const budgetColumnsOf = ({ label }: ProfileResult, budget: readonly BudgetEntry[]): readonly ResultColumn[] =>
  budget
    .map((entry) => ({ heading: `u(Ea) ${ascii(label)} by ${entry.source} (kJ/mol)`, values: entry.standardUncertainty_kJ_per_mol }))
    .filter(isThere)

const isThere = ({ values }: ResultColumn): boolean => values.some((value) => value !== null && Number.isFinite(value))

import { levelText } from '../../shared-kinetics/figure/nice-axis.ts'
import type { ProfileResult, StudyResult } from '../../shared-kinetics/tasks/study-result.ts'
import type { TableStyle } from '../../shared-kinetics/contract/host-api.ts'
import { csvTable } from './csv-table.ts'

/** A column of the table of results, with its heading; the copy of the table on a screen has the same. */
interface ResultColumn {
  readonly heading: string
  readonly values: readonly (number | null)[]
}

/**
 * The text of `activation.csv`: one heading row and one row a level; first column `conversion`, then for each method Ea, its standard error, the
 * ends of its 95 % interval and ln[A f], the unit in every heading. A number that is not to be had is an empty cell.
 */
export function activationCsv(result: StudyResult, style: TableStyle): string {
  const columns = result.profiles.flatMap(columnsOf)
  const headings = ['conversion', ...columns.map((column) => column.heading)]
  const rows = result.levels.map((level, i) => [Number(levelText(level)), ...columns.map((column) => column.values[i] ?? null)])
  return csvTable([headings, ...rows], style)
}

// Headings are plain ASCII: spreadsheets that take a file without a byte-order mark for a national encoding then still read them.
function columnsOf(profile: ProfileResult): readonly ResultColumn[] {
  const label = profile.label.replaceAll('–', '-')
  return [
    { heading: `Ea ${label} (kJ/mol)`, values: profile.Ea_kJ_per_mol },
    { heading: `Ea ${label} standard error (kJ/mol)`, values: profile.standardError_kJ_per_mol },
    { heading: `Ea ${label} lower 95 % (kJ/mol)`, values: profile.lower95_kJ_per_mol },
    { heading: `Ea ${label} upper 95 % (kJ/mol)`, values: profile.upper95_kJ_per_mol },
    { heading: `ln[A f] ${label} (A in 1/s)`, values: profile.lnAf_per_s },
  ]
}

import type { RateConstantReadOptions } from '../../shared-kinetics/contract/rate-constant-schema.ts'
import type { RateConstantNote } from '../../shared-kinetics/rate-constants/rate-constant-table.ts'
import { quoted, type Refuse } from './import-refusal.ts'
import { isUnitText, type CellReading } from './rate-constant-cells.ts'
import { rateConstantTextLimits } from './rate-constant-limits.ts'
import { rateConstantHeading, type RateConstantColumn } from './rate-constant-heading.ts'

type Of<Role extends RateConstantColumn['role']> = Extract<RateConstantColumn, { role: Role }>
export interface Placed<Role extends RateConstantColumn['role']> {
  readonly index: number
  readonly label: string
  readonly column: Of<Role>
}

/** Which column holds what. Several of temperature or of k are held against each other. */
export interface RateConstantColumns {
  /** 1-based; null where the table has no headings. */
  readonly headingLine: number | null
  readonly temperatures: readonly (Placed<'temperature'> | Placed<'inverse-temperature'>)[]
  readonly rateConstants: readonly Placed<'rate-constant'>[]
  readonly uncertainty: Placed<'uncertainty'> | null
  readonly label: Placed<'label'> | null
  readonly width: number
}

const headingsRemedy = 'Name the columns, for example “T (°C)” and “k (1/s)”; 1000/T, ln k and log10 k can be read as well.'

/**
 * The columns by their headings, a row of units below them taken in; two bare columns are temperature and k, with a note.
 * @throws ImportRefusal where headings do not tell temperature and k, or may mean two things
 */
export function planRateConstantColumns(
  reading: CellReading,
  options: RateConstantReadOptions,
  refuse: Refuse,
  notes: RateConstantNote[],
): RateConstantColumns {
  const first = reading.rows.findIndex((row) => row.isData)
  const width = reading.rows.reduce((widest, row) => (row.isData ? Math.max(widest, row.cells.length) : widest), 0)
  const above = reading.rows.slice(0, first).toReversed()
  const unitRow = above[0]?.cells.filter((cell) => cell !== '').every((cell) => isUnitText(cell) || /^[([].*[)\]]$|^-$/.test(cell)) === true
  const [nearest, next] = above
  const namesRow = unitRow && next !== undefined && next.cells.length >= 2 ? next : nearest
  if (namesRow === undefined) return bareColumns(width, reading.rows[first]?.line ?? 1, options, refuse, notes)
  const units = namesRow === next ? (nearest?.cells ?? []) : []
  const long = [...namesRow.cells, ...units].find((cell) => cell.length > rateConstantTextLimits.headingCharacters)
  if (long !== undefined) {
    throw refuse(
      namesRow.line,
      `The heading ${quoted(long)} has ${long.length} characters; at most ${rateConstantTextLimits.headingCharacters} are read.`,
      'Shorten it to a name and a unit, for example “k (1/s)”.',
    )
  }
  const headings = namesRow.cells.map((cell, i) => withUnit(cell.replace(/^#+\s*/, ''), units[i] ?? ''))
  if (headings.length < width) {
    throw refuse(
      namesRow.line,
      `The rows have ${width} cells but this line names ${headings.length}.`,
      widthRemedy[reading.delimiter] ?? 'Name every column.',
    )
  }
  return byHeadings(headings, namesRow.line, width, refuse, notes)
}

const widthRemedy: Partial<Record<CellReading['delimiter'], string>> = {
  comma: 'Name every column; a decimal comma needs another delimiter than the comma.',
  blanks: 'Blanks were taken to part the cells: put tabs or semicolons between them, or name every column.',
}

/** The units of a row of units go behind the names, unless a name has its own. */
const withUnit = (name: string, unit: string): string => {
  const bare = unit.replace(/^[([{]\s*|\s*[)\]}]$/g, '')
  return bare === '' || bare === '-' || /[([]/.test(name) ? name : `${name} (${bare})`
}

function bareColumns(
  width: number,
  line: number,
  options: RateConstantReadOptions,
  refuse: Refuse,
  notes: RateConstantNote[],
): RateConstantColumns {
  if (width !== 2) throw refuse(line, `Nothing says what the ${width} columns hold.`, headingsRemedy)
  notes.push({
    code: 'heading-missing',
    severity: options.temperatureUnit === undefined ? 'caution' : 'note',
    message: 'The table has no headings: its first column was read as temperature, its second as the rate constant.',
    evidence: { columns: width },
  })
  return {
    headingLine: null,
    temperatures: [{ index: 0, label: 'column 1', column: { role: 'temperature', unit: null } }],
    rateConstants: [
      { index: 1, label: 'column 2', column: { role: 'rate-constant', form: 'k', scale: 1, unit: null, unitText: '', remark: null } },
    ],
    uncertainty: null,
    label: null,
    width,
  }
}

function byHeadings(
  headings: readonly string[],
  line: number,
  width: number,
  refuse: Refuse,
  notes: RateConstantNote[],
): RateConstantColumns {
  const placed = headings.map((label, index) => ({ index, label, column: rateConstantHeading(label) }))
  const having = <Role extends RateConstantColumn['role']>(role: Role): readonly Placed<Role>[] =>
    placed.filter((item): item is typeof item & Placed<Role> => item.column.role === role)
  const [unclear] = having('unclear')
  if (unclear !== undefined) {
    throw refuse(
      line,
      `The heading ${quoted(unclear.label)} cannot be read for certain: ${unclear.column.why}.`,
      'Write the numbers in full, e.g. 3.5e-5, and the heading as “k (1/s)”.',
    )
  }
  const temperatures = [...having('temperature'), ...having('inverse-temperature')]
  const rateConstants = having('rate-constant')
  if (temperatures.length === 0 || rateConstants.length === 0) {
    const missing = temperatures.length === 0 ? 'a temperature' : 'rate constants'
    throw refuse(line, `No heading names ${missing}: ${headings.map(quoted).join(', ')}.`, headingsRemedy)
  }
  const other = having('other').filter((item) => item.label.trim() !== '')
  if (other.length > 0) {
    notes.push({
      code: 'columns-set-aside',
      severity: 'note',
      message: `Columns that are neither temperature nor rate constant were set aside: ${other
        .slice(0, 10)
        .map((item) => quoted(item.label))
        .join(', ')}${other.length > 10 ? ', …' : ''}.`,
      evidence: { columns: other.length },
    })
  }
  return {
    headingLine: line,
    temperatures,
    // k itself before its logarithm: it has more digits.
    rateConstants: rateConstants.toSorted((a, b) => Number(a.column.form !== 'k') - Number(b.column.form !== 'k')),
    uncertainty: having('uncertainty')[0] ?? null,
    label: having('label')[0] ?? null,
    width,
  }
}

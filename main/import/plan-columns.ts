import type { ColumnOverride, ColumnQuantity, ImportOptions } from '../../shared-kinetics/contract/import-options.ts'
import { dimensionsOf, type NamedQuantity, quantityOfName } from './column-quantity.ts'
import { type Dimension, type FileUnit, unitOf } from './file-unit.ts'
import type { Layout } from './find-layout.ts'
import { quoted, type Refuse } from './import-refusal.ts'
import { type Heading, parseHeading } from './parse-heading.ts'

/** What is to be read from one column of the file, or why it is not. */
export interface PlannedColumn {
  /** From 0. */
  readonly index: number
  /** Heading as the file has it; `column 3` where it has none. */
  readonly label: string
  readonly heading: Heading
  /** null: set aside, for the reason in `setAside`. */
  readonly quantity: NamedQuantity | null
  readonly rank: number
  readonly as: 'value' | 'loss' | 'change'
  /** null: the file does not say. */
  readonly unit: FileUnit | null
  /** Unit as the file has it. */
  readonly unitText: string
  readonly setAside: string | null
  /** Set aside although its name is that of a signal: worth a caution. */
  readonly weighty: boolean
  /** How the quantity was told. */
  readonly reason: string
}

const largestWidth = 1000

/**
 * Quantity and unit of every column by its name, its unit and what was stated about it.
 * @throws ImportRefusal for headings that do not fit the rows, and for a time or a temperature whose unit is not known
 */
export function planColumns(layout: Layout, width: number, options: ImportOptions, refuse: Refuse): readonly PlannedColumn[] {
  const named = layout.headingLine !== null
  const widest = Math.max(width, layout.headings.length, layout.units.length)
  if (widest > largestWidth) throw refuse(layout.firstData + 1, `There are ${widest} columns.`, 'Export at most 1,000 columns.')
  if (!named && layout.unitLine === null && options.columns === undefined) {
    throw refuse(
      layout.firstData + 1,
      'Nothing says what the columns hold: no names and no units stand above the numbers.',
      'Add a row of headings, or state each column’s quantity and unit (“column 1” as time in s, and so on).',
    )
  }
  if (named && layout.headings.length < width) {
    const names = layout.headings.length
    throw refuse(
      layout.headingLine + 1,
      `The rows have ${width} cells but this line names ${names} ${names === 1 ? 'column' : 'columns'}.`,
      'Name every column; a decimal comma needs another delimiter than the comma; or state the “heading line” (on the command line: --heading-line).',
    )
  }
  refuseUnknownOverrides(layout, widest, options, refuse)
  const columns = Array.from({ length: widest }, (_, index) => planColumn(layout, index, named, options, refuse))
  return columns.map((column) => withoutLesser(column, columns))
}

function planColumn(layout: Layout, index: number, named: boolean, options: ImportOptions, refuse: Refuse): PlannedColumn {
  const heading = parseHeading(layout.headings[index] ?? '')
  const stated = options.columns?.find((override) => isMeant(override, index, heading))
  const inRow = (layout.units[index] ?? '').replace(/^[([{]\s*|\s*[)\]}]$/g, '')
  const line = (layout.headingLine ?? layout.unitLine ?? layout.firstData) + 1
  const label = heading.text === '' ? `column ${index + 1}` : heading.text
  const rowUnit = unitOf(inRow)
  if (rowUnit !== null && heading.unit !== null && rowUnit.word !== heading.unit.word) {
    const reason = `Column ${index + 1} has two units: ${quoted(heading.text)} and, in the row of units, ${quoted(inRow)}.`
    throw refuse(line, reason, `State the unit of “column ${index + 1}”.`)
  }
  const unitText = stated?.unit ?? (inRow === '' ? (heading.unitText ?? '') : inRow)
  const unit = stated?.unit === undefined ? (rowUnit ?? heading.unit) : unitOf(stated.unit)
  if (stated?.unit !== undefined && unit === null) {
    throw refuse(null, `The unit stated for column ${index + 1}, ${quoted(stated.unit)}, is not known.`, knownUnits)
  }
  const name = named && heading.name !== '' ? quantityOfName(heading.name, unit) : quantityOfUnit(unit)
  const base = { index, label, heading, unit, unitText, rank: 1, as: 'value' as const, weighty: false }
  const aside = (why: string, weighty = false): PlannedColumn => ({ ...base, quantity: null, setAside: why, weighty, reason: why })
  if (stated?.quantity !== undefined) {
    if (stated.quantity === 'set-aside') return aside('stated')
    const as = name.quantity === stated.quantity && 'as' in name ? name.as : 'value'
    const misfit = unit !== null && !dimensionsOf[stated.quantity].includes(unit.dimension)
    if (misfit) throw refuse(line, `Column ${index + 1} cannot hold ${words(stated.quantity)} in ${quoted(unitText)}.`, knownUnits)
    return { ...base, quantity: stated.quantity, as, setAside: null, reason: 'stated' }
  }
  if (name.quantity === 'derivative') return aside('a derivative or a rate of change, not a signal')
  if (name.quantity === 'other') return aside(heading.text === '' ? 'has no name' : 'not a quantity that a run is made of')
  const misfit = unit === null ? unitText !== '' : !dimensionsOf[name.quantity].includes(unit.dimension)
  if (misfit) {
    const why = `its unit ${quoted(unitText)} is not one of ${words(name.quantity)}`
    const isAxis = name.quantity === 'time' || name.quantity === 'temperature'
    if (isAxis && name.rank < 2)
      throw refuse(line, `Column ${index + 1}, ${quoted(label)}: ${why}.`, `State the unit of “column ${index + 1}”.`)
    return aside(why, !isAxis)
  }
  const reason = named && heading.name !== '' ? 'told by its name' : 'told by its unit alone'
  return { ...base, quantity: name.quantity, rank: name.rank, as: name.as, setAside: null, reason }
}

/** A furnace's or a programme's temperature stands back behind the sample's; alone it is not taken for it. */
function withoutLesser(column: PlannedColumn, all: readonly PlannedColumn[]): PlannedColumn {
  const isAxis = column.quantity === 'time' || column.quantity === 'temperature'
  if (!isAxis || column.reason === 'stated') return column
  const best = Math.min(...all.filter((other) => other.quantity === column.quantity).map((other) => other.rank))
  if (column.rank < 2 && !(column.quantity === 'temperature' && column.rank > best && best === 0)) return column
  const why = column.quantity === 'temperature' ? 'not the temperature of the sample' : 'not the time since the start'
  return { ...column, quantity: null, setAside: why, reason: why }
}

const byDimension: Readonly<Record<Dimension, NamedQuantity | null>> = {
  time: 'time',
  temperature: 'temperature',
  mass: 'mass',
  // A fraction may be mass, conversion or anything else.
  fraction: null,
  power: 'heat-flow',
  'specific-power': 'heat-flow',
}

function quantityOfUnit(unit: FileUnit | null): ReturnType<typeof quantityOfName> {
  const quantity = unit === null ? null : byDimension[unit.dimension]
  return quantity === null ? { quantity: 'other' } : { quantity, rank: 1, as: 'value' }
}

function isMeant(override: ColumnOverride, index: number, heading: Heading): boolean {
  if (typeof override.column === 'number') return override.column === index + 1
  const wanted = override.column.trim().toLowerCase()
  return wanted === heading.text.toLowerCase() || wanted === heading.name.toLowerCase()
}

function refuseUnknownOverrides(layout: Layout, width: number, options: ImportOptions, refuse: Refuse): void {
  const headings = Array.from({ length: width }, (_, i) => parseHeading(layout.headings[i] ?? ''))
  for (const override of options.columns ?? []) {
    if (headings.some((heading, i) => isMeant(override, i, heading))) continue
    const which = typeof override.column === 'number' ? `number ${override.column}` : quoted(override.column)
    throw refuse(null, `A column was stated that the file does not have: ${which}.`, `It has ${width}: name one by number or heading.`)
  }
}

const names: Readonly<Record<Exclude<ColumnQuantity, 'set-aside'>, string>> = {
  time: 'time',
  temperature: 'temperature',
  mass: 'mass',
  conversion: 'conversion',
  'heat-release': 'heat-release rate',
  'heat-flow': 'heat flow',
}
export const words = (quantity: NamedQuantity): string => names[quantity]

const knownUnits =
  'Units are s, min, h; K, °C, °F; mg, g, ug, kg, % or 1 for mass; % or 1 for conversion; mW, W, uW, W/g, mW/mg, mW/g for heat flow and heat release.'

/** A column of a table as data: what stands in a cell, and what is copied from it. */
export interface DataColumn<Row> {
  readonly id: string
  /** Heading in one or two lines: quantity, and unit or addition. */
  readonly heading: string
  readonly unit: string
  readonly numeric: boolean
  readonly text: (row: Row) => string
  /** What must be known of the cell beside its text; null where there is nothing. */
  readonly remark?: (row: Row) => string | null
  /** For the clipboard: a number, a text, or null for an empty cell. */
  readonly value: (row: Row) => number | string | null
  /** Decimals of a number on the clipboard: one more than on the screen. Without it a number keeps eight digits. */
  readonly places?: number | ((row: Row) => number)
}

/** A column of numbers as they are, null an empty cell. */
export const numberColumn = <Row>(id: string, heading: string, unit: string, value: (row: Row) => number | null): DataColumn<Row> => ({
  id,
  heading,
  unit,
  numeric: true,
  text: (row) => String(value(row) ?? ''),
  value,
})

export const wordColumn = <Row>(id: string, heading: string, text: (row: Row) => string): DataColumn<Row> => ({
  id,
  heading,
  unit: '',
  numeric: false,
  text,
  value: text,
})

/**
 * The table as tab-separated text with units in its headings. Numbers stand with a decimal point and with one digit more than the screen
 * shows; what is not to be had is an empty cell; a text that a spreadsheet would take for a formula is led by an apostrophe.
 */
export function copyText<Row>(columns: readonly DataColumn<Row>[], rows: readonly Row[]): string {
  const headings = columns.map((column) => cellText(column.unit === '' ? column.heading : `${column.heading} (${column.unit})`))
  const lines = rows.map((row) => columns.map((column) => cellText(column.value(row), placesIn(column, row))))
  return [headings, ...lines].map((cells) => cells.join('\t')).join('\n')
}

const placesIn = <Row>({ places }: DataColumn<Row>, row: Row): number | undefined => (typeof places === 'function' ? places(row) : places)

function cellText(value: number | string | null, places?: number): string {
  if (value === null) return ''
  if (typeof value === 'number') return Number.isFinite(value) ? numberText(value, places) : ''
  const text = value.replace(/[\t\r\n]+/g, ' ')
  return /^[=+\-@]/.test(text) ? `'${text}` : text
}

function numberText(value: number, places: number | undefined): string {
  const text = places === undefined ? String(Number(value.toPrecision(8))) : value.toFixed(places)
  return Number(text) === 0 ? text.replace('-', '') : text
}

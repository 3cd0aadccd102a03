import { describe, expect, it } from 'vitest'
import { copyText, type DataColumn } from './data-table.ts'

interface Row {
  readonly label: string
  readonly Ea: number | null
}

const columns: readonly DataColumn<Row>[] = [
  { id: 'label', heading: 'Run', unit: '', numeric: false, text: (row) => row.label, value: (row) => row.label },
  { id: 'Ea', heading: 'Ea Starink', unit: 'kJ/mol', numeric: true, text: () => '', value: (row) => row.Ea },
]

describe('text of a copied table', () => {
  it('is tab-separated, one heading row with units, numbers with a point', () => {
    expect(copyText(columns, [{ label: 'run 1', Ea: -132.25 }])).toBe('Run\tEa Starink (kJ/mol)\nrun 1\t-132.25')
  })

  it('leaves a cell empty where a number is not to be had, and never writes 0 for it', () => {
    expect(
      copyText(columns, [
        { label: 'a', Ea: null },
        { label: 'b', Ea: Number.NaN },
        { label: 'c', Ea: 0 },
      ])
        .split('\n')
        .slice(1),
    ).toEqual(['a\t', 'b\t', 'c\t0'])
  })

  it('never starts a cell of text with what a spreadsheet takes for a formula', () => {
    const labels = ['=1+1', '+1', '-1', '@sum']
    const cells = copyText(
      columns,
      labels.map((label) => ({ label, Ea: null })),
    )
      .split('\n')
      .slice(1)
    expect(cells.map((cell) => cell[0])).toEqual(["'", "'", "'", "'"])
  })

  it('keeps a label with tabs and line ends in one cell', () => {
    expect(copyText(columns, [{ label: 'a\tb\r\nc', Ea: 1 }])).toBe('Run\tEa Starink (kJ/mol)\na b c\t1')
  })
})

import { quoted, type Refuse } from './import-refusal.ts'
import { numberCell, type CellReading } from './rate-constant-cells.ts'

const otherSign = { point: 'comma', comma: 'point' } as const

/** What is wrong with a cell that is a number only under the other decimal sign than the table has; null for any other cell. */
export const otherSignReason = (cell: string, decimal: CellReading['decimal']): string | null =>
  numberCell(cell, decimal) === null && numberCell(cell, otherSign[decimal]) !== null
    ? `${quoted(cell)} has a decimal ${otherSign[decimal]}, the table a decimal ${decimal}`
    : null

export const oneSignRemedy = 'Write all numbers of the table with the same decimal sign.'

/**
 * A line that would be a row if it had the decimal sign of the others is a row with a slip, not a remark to be set aside.
 * @throws ImportRefusal naming the line
 */
export function refuseMixedSigns(reading: CellReading, refuse: Refuse): void {
  for (const { line, cells, isData } of reading.rows) {
    if (isData) continue
    const filled = cells.filter((cell) => cell !== '')
    const [reason] = filled.flatMap((cell) => otherSignReason(cell, reading.decimal) ?? [])
    if (reason === undefined) continue
    const numbers = filled.filter((cell) => numberCell(cell, reading.decimal) !== null || otherSignReason(cell, reading.decimal) !== null)
    if (numbers.length >= 2 && 2 * numbers.length >= filled.length) throw refuse(line, `${reason}.`, oneSignRemedy)
  }
}

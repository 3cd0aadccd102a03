import { rateConstantLimits } from '../../shared-kinetics/contract/rate-constant-schema.ts'
import type { Refuse } from './import-refusal.ts'

/** What a text of rate constants may hold before it is parsed; headings, units and remarks stand beside the rows. */
export const rateConstantTextLimits = {
  lines: rateConstantLimits.rows + 200,
  cells: 64,
  lineCharacters: 2000,
  headingCharacters: 200,
} as const

/** A line as it stands in the file; `number` counts from 1. */
export interface RawLine {
  readonly number: number
  readonly text: string
}

/**
 * The lines that are not blank, none of them longer, wider or more than a table of rate constants can have: what follows may then look at each of them in
 * several ways.
 * @throws ImportRefusal with the line at fault
 */
export function linesWithinLimits(text: string, refuse: Refuse): readonly RawLine[] {
  const { lines: mostLines, cells: mostCells, lineCharacters } = rateConstantTextLimits
  const lines = text
    .split(/\r\n|\n|\r/)
    .map((line, i) => ({ number: i + 1, text: line }))
    .filter((line) => line.text.trim() !== '')
  const tooMany = lines[mostLines]
  if (tooMany !== undefined) {
    throw refuse(
      tooMany.number,
      `The text has ${lines.length} lines; a table of rate constants holds at most ${rateConstantLimits.rows} rows.`,
      'Keep one row for each temperature, and leave out what does not belong to the table.',
    )
  }
  for (const line of lines) {
    if (line.text.length > lineCharacters) {
      throw refuse(
        line.number,
        `The line has ${line.text.length} characters; a line of a table of rate constants has at most ${lineCharacters}.`,
        'Keep a temperature and its rate constant in each line, and shorten remarks and headings.',
      )
    }
    const cells = mostCellsOf(line.text)
    if (cells > mostCells) {
      throw refuse(
        line.number,
        `The line has ${cells} cells; a table of rate constants has at most ${mostCells} columns.`,
        'Give one row for each temperature, with a column of temperature and one of the rate constant; turn a table that lies on its side.',
      )
    }
  }
  return lines
}

/** By the sign that parts it into most; blanks part words as well, so that only numbers count between them. */
function mostCellsOf(text: string): number {
  const count = [0, 0, 0, 0]
  for (const sign of text) {
    const which = '\t;,|'.indexOf(sign)
    if (which >= 0) count[which] = (count[which] ?? 0) + 1
  }
  const numbers = text.split(/\s+/).filter((word) => /^[-+−]?[.,]?\d/.test(word)).length
  return Math.max(...count.map((signs) => signs + 1), numbers)
}

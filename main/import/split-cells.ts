import Papa from 'papaparse'
import type { DelimiterWord } from '../../shared-kinetics/contract/import-options.ts'

export const delimiterCharacter: Readonly<Record<Exclude<DelimiterWord, 'blanks'>, string>> = {
  comma: ',',
  semicolon: ';',
  tab: '\t',
  pipe: '|',
}

/** The cells of one line, blanks around each trimmed. Quoted fields are read by papaparse; runs of blanks count as one. */
export function splitCells(line: string, delimiter: DelimiterWord): string[] {
  if (delimiter === 'blanks') {
    const trimmed = line.trim()
    return trimmed === '' ? [] : trimmed.split(/[\s\u00a0]+/)
  }
  const character = delimiterCharacter[delimiter]
  if (!line.includes('"')) return line.split(character).map((cell) => cell.trim())
  const rows = Papa.parse<string[]>(line, { delimiter: character, newline: '\n' }).data
  return (rows[0] ?? []).map((cell) => cell.trim())
}

/** Without the empty cells at the end that spreadsheets leave behind. */
export function withoutEmptyEnd(cells: readonly string[]): string[] {
  let length = cells.length
  while (length > 0 && cells[length - 1] === '') length--
  return cells.slice(0, length)
}

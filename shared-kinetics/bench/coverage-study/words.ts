import { methods } from '../../isoconversional/registry.ts'
import type { MethodId } from '../../isoconversional/result.ts'
import type { ErrorKind, StudiedInterval } from './design.ts'
import { coverageOf } from './gate.ts'
import type { Cell } from './tally.ts'

export const intervalNames: Readonly<Record<StudiedInterval, string>> = {
  'student-t': '(a) Student-t',
  'vyazovkin-wight-f': '(b) F-type',
  jackknife: '(c) jackknife',
  bootstrap: '(c) bootstrap',
  'measured-sources': '(d) measured sources',
  combined: 'combined',
}

export const errorNames: Readonly<Record<ErrorKind, string>> = {
  'temperature-offset': 'Temperature offset of each run',
  'heating-rate': 'Heating rate of each run',
  'all-sources': 'All stated sources together',
  'signal-noise': 'Signal noise at a constant sampling time',
}

export const methodName = (id: MethodId): string => methods[id].info.label

export const percent = (share: number): string => (100 * share).toFixed(1)

export const cellName = (cell: Cell): string =>
  `${intervalNames[cell.interval]}, ${errorNames[cell.error].toLowerCase()}, ${methodName(cell.method)}, ${cell.runs} runs, ${cell.model}, level ${cell.level}: ` +
  `${percent(coverageOf(cell))} % of ${cell.replicates}`

export const medianOf = (values: readonly number[]): number => {
  const sorted = values.toSorted((a, b) => a - b)
  const middle = sorted.length / 2
  return ((sorted[Math.ceil(middle) - 1] ?? Number.NaN) + (sorted[Math.floor(middle)] ?? Number.NaN)) / 2
}

const line = (cells: readonly string[]): string => `| ${cells.join(' | ')} |`

/** A Markdown table; the first `left` columns are words. */
export function table(head: readonly string[], left: number, rows: readonly (readonly string[])[]): string {
  return [line(head), `|${head.map((_, i) => (i < left ? '---' : '---:')).join('|')}|`, ...rows.map(line)].join('\n')
}

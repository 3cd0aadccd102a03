import type { RunInfo } from '../series/run.ts'

const separators = /[\s,;_·-]+/

/** A first name for a study: the words that the labels of all its runs begin with, else the first label. */
export function nameAfter(runs: readonly Pick<RunInfo, 'label'>[]): string {
  const [first = '', ...others] = runs.map((run) => run.label)
  const words = first.split(separators)
  const otherWords = others.map((label) => label.split(separators))
  const differs = words.findIndex((word, i) => otherWords.some((other) => other[i] !== word))
  if (others.length === 0 || differs === -1) return first
  // As written, separators included: everything before the first word that differs.
  const common = words.slice(0, differs).reduce((at, word) => first.indexOf(word, at) + word.length, 0)
  return common >= 2 ? first.slice(0, common) : first
}

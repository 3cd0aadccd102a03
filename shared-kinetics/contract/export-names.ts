import { naturalOrder } from './natural-order.ts'

const suffixes = /\.(csv|tsv|txt|dat|asc)$/i
/** Texts that lie beside exports, and what this program itself has written there. */
const notExports = /^\.|^(readme|licen[cs]e|notice|copying|changelog)\b|^(?:activation|rate-constants)\.(csv|csv\.txt|json|svg)$/i

/** What a folder is asked to hold, in words. */
export const exportSuffixWords = '.csv, .tsv, .txt, .dat or .asc files'

/** The exports that a folder stands for, told by their names, in natural order (2 before 10). Sub-folders are other series. */
export const exportsAmong = (names: readonly string[], alsoSuffixes = /$^/): readonly string[] =>
  names.filter((name) => !notExports.test(name) && (suffixes.test(name) || alsoSuffixes.test(name))).toSorted(naturalOrder)

import { readdirSync, readFileSync, statSync, type Dirent, type Stats } from 'node:fs'
import { basename, join, resolve } from 'node:path'
import { exportsAmong, exportSuffixWords } from '../../shared-kinetics/contract/export-names.ts'
import { largestUploadBytes } from '../../shared-kinetics/contract/host-api.ts'
import { naturalOrder } from '../../shared-kinetics/contract/natural-order.ts'
import { savedCopySuffix } from '../study/saved-copy-suffix.ts'
import { InputError } from './cli-io.ts'

/** One file that was named, or found in a folder that was named. */
export interface InputFile {
  /** As typed, or as typed with the name found in the folder. */
  readonly path: string
  readonly fileName: string
  readonly bytes: Uint8Array<ArrayBuffer>
}

/**
 * The files that paths stand for: a file is itself, a folder the exports in it in natural order (2 before 10), sub-folders left out. A file that is
 * named twice is taken once.
 * @throws InputError for a path that is not there, a folder without exports, or a file that cannot be read
 */
export function expandPaths(paths: readonly string[], alsoSuffixes = /$^/): readonly InputFile[] {
  const once = new Map<string, string>()
  for (const path of paths.flatMap((named) => filesOf(named, alsoSuffixes))) if (!once.has(resolve(path))) once.set(resolve(path), path)
  return [...once.values()].map((path) => ({ path, fileName: basename(path), bytes: bytesOf(path) }))
}

function filesOf(path: string, alsoSuffixes: RegExp): readonly string[] {
  if (!statOf(path).isDirectory()) {
    if (isSavedCopy(path) && !alsoSuffixes.test(path))
      throw new InputError(`${path}: this is a saved study. Open it with: rampfold open ${path}`)
    return [path]
  }
  const inside = entriesOf(path)
  const files = inside.filter((entry) => !entry.isDirectory()).map((entry) => entry.name)
  const names = exportsAmong(files, alsoSuffixes)
  if (names.length === 0) {
    const folders = inside.filter((entry) => entry.isDirectory()).map((entry) => entry.name)
    const searched =
      folders.length === 0 ? '' : ` Its sub-folders (${few(folders.toSorted(naturalOrder))}) are not searched: name those you mean.`
    throw new InputError(
      `${path}: there are no exports in this folder.${searched} Name a folder that holds ${exportSuffixWords}, or name the files.`,
    )
  }
  return names.map((name) => join(path, name))
}

const mostNamed = 3
const few = (names: readonly string[]): string =>
  names.length <= mostNamed ? names.join(', ') : `${names.slice(0, mostNamed).join(', ')} and ${names.length - mostNamed} more`

const isSavedCopy = (path: string): boolean => path.toLowerCase().endsWith(savedCopySuffix)

// Read at once, one after the other: there is nothing else to do before the last byte is here.
const statOf = (path: string): Stats => orRefuse(path, () => statSync(path))
const entriesOf = (path: string): readonly Dirent[] => orRefuse(path, () => readdirSync(path, { withFileTypes: true }))

function bytesOf(path: string): Uint8Array<ArrayBuffer> {
  if (statOf(path).size > largestUploadBytes) {
    throw new InputError(`${path}: the file is larger than ${largestUploadBytes / 2 ** 20} MiB. Export the run with fewer rows.`)
  }
  return orRefuse(path, () => readFileSync(path))
}

function orRefuse<Found>(path: string, find: () => Found): Found {
  try {
    return find()
  } catch (error) {
    throw cannotRead(path, error)
  }
}

function cannotRead(path: string, error: unknown): InputError {
  const code = error instanceof Error && 'code' in error ? error.code : ''
  if (code === 'ENOENT' || code === 'ENOTDIR') return new InputError(`${path}: there is no such file or folder. Check the path.`)
  if (code === 'EACCES' || code === 'EPERM')
    return new InputError(`${path}: there is no permission to read it. Change that, or copy the file elsewhere.`)
  return new InputError(`${path}: it cannot be read (${error instanceof Error ? error.message : String(error)}).`)
}

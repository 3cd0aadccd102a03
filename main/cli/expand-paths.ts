import { readdir, readFile, stat } from 'node:fs/promises'
import { basename, join, resolve } from 'node:path'
import { exportsAmong, exportSuffixWords } from '../../shared-kinetics/contract/export-names.ts'
import { largestUploadBytes } from '../../shared-kinetics/contract/host-api.ts'
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
export async function expandPaths(paths: readonly string[], alsoSuffixes = /$^/): Promise<readonly InputFile[]> {
  const found: string[] = []
  for (const path of paths) found.push(...(await filesOf(path, alsoSuffixes)))
  const seen = new Set<string>()
  const once = found.filter((path) => {
    const known = seen.has(resolve(path))
    seen.add(resolve(path))
    return !known
  })
  const files: InputFile[] = []
  for (const path of once) files.push({ path, fileName: basename(path), bytes: await bytesOf(path) })
  return files
}

async function filesOf(path: string, alsoSuffixes: RegExp): Promise<readonly string[]> {
  const entry = await stat(path).catch((error: unknown) => {
    throw cannotRead(path, error)
  })
  if (!entry.isDirectory()) {
    if (isSavedCopy(path) && !alsoSuffixes.test(path))
      throw new InputError(`${path}: this is a saved study. Open it with: rampfold open ${path}`)
    return [path]
  }
  const entries = await readdir(path, { withFileTypes: true }).catch((error: unknown) => {
    throw cannotRead(path, error)
  })
  const files = entries.filter((inside) => !inside.isDirectory()).map((inside) => inside.name)
  const names = exportsAmong(files, alsoSuffixes)
  if (names.length === 0) {
    throw new InputError(`${path}: there are no exports in this folder. Name a folder that holds ${exportSuffixWords}, or name the files.`)
  }
  return names.map((name) => join(path, name))
}

const isSavedCopy = (path: string): boolean => path.toLowerCase().endsWith(savedCopySuffix)

async function bytesOf(path: string): Promise<Uint8Array<ArrayBuffer>> {
  try {
    const { size } = await stat(path)
    if (size > largestUploadBytes) {
      throw new InputError(`${path}: the file is larger than ${largestUploadBytes / 2 ** 20} MiB. Export the run with fewer rows.`)
    }
    return new Uint8Array(await readFile(path))
  } catch (error) {
    throw error instanceof InputError ? error : cannotRead(path, error)
  }
}

function cannotRead(path: string, error: unknown): InputError {
  const code = error instanceof Error && 'code' in error ? error.code : ''
  if (code === 'ENOENT' || code === 'ENOTDIR') return new InputError(`${path}: there is no such file or folder. Check the path.`)
  if (code === 'EACCES' || code === 'EPERM')
    return new InputError(`${path}: there is no permission to read it. Change that, or copy the file elsewhere.`)
  return new InputError(`${path}: it cannot be read (${error instanceof Error ? error.message : String(error)}).`)
}

import { randomBytes } from 'node:crypto'
import { mkdir, open, readdir, rename, rm, rmdir, stat } from 'node:fs/promises'
import { dirname, join, resolve } from 'node:path'
import type { FileOut } from '../../shared-kinetics/contract/host-api.ts'

/** A folder or file that could not be written, in words for the person who named it. */
export class WriteRefusal extends Error {
  override readonly name = 'WriteRefusal'
}

/**
 * Writes files into a folder, which is made where it is missing. All are first written whole under passing names and then renamed, so that a reader
 * never finds half a file: when one cannot be written, none is replaced. Nothing of ours stays behind, also nothing that an earlier call left when it was
 * killed. Other files are left alone.
 * @throws WriteRefusal with the path and the reason
 */
export async function writeFiles(folder: string, files: readonly FileOut[]): Promise<void> {
  const made = await mkdir(folder, { recursive: true }).catch((error: unknown) => {
    throw refusal(folder, error)
  })
  await removeLeftovers(folder, files)
  const suffix = `.${randomBytes(6).toString('hex')}.part`
  const passing = files.map((file) => join(folder, `.${file.fileName}${suffix}`))
  try {
    for (const file of files) await mustNotBeFolder(join(folder, file.fileName))
    await allSettled(files.map(async (file, i) => writeWhole(passing[i] ?? '', file.bytes)))
    for (const [i, file] of files.entries()) await rename(passing[i] ?? '', join(folder, file.fileName))
  } catch (error) {
    await Promise.all(passing.map(async (path) => rm(path, { force: true }).catch(() => undefined)))
    if (made !== undefined) await removeEmpty(folder, made)
    throw error instanceof WriteRefusal ? error : refusal(folder, error)
  }
}

/** What a killed call leaves is older than any call takes; a younger one may belong to a call at work. */
const leftoverAge_ms = 3_600_000

async function removeLeftovers(folder: string, files: readonly FileOut[]): Promise<void> {
  const names = await readdir(folder).catch(() => [])
  const ours = names.filter((name) => /\.[0-9a-f]{12}\.part$/.test(name) && files.some((file) => name.startsWith(`.${file.fileName}.`)))
  for (const name of ours) {
    const path = join(folder, name)
    const found = await stat(path).catch(() => null)
    if (found !== null && Date.now() - found.mtimeMs > leftoverAge_ms) await rm(path, { force: true }).catch(() => undefined)
  }
}

/** Takes away the folders from `deepest` up to `topmost`, as far as nobody has put anything there meanwhile. */
async function removeEmpty(deepest: string, topmost: string): Promise<void> {
  const last = resolve(topmost)
  for (let path = resolve(deepest); path.startsWith(last); path = dirname(path)) {
    const gone = await rmdir(path).then(
      () => true,
      () => false,
    )
    if (!gone) return
  }
}

async function mustNotBeFolder(path: string): Promise<void> {
  const found = await stat(path).catch(() => null)
  if (found?.isDirectory() === true)
    throw new WriteRefusal(`${path} cannot be written: a folder has that name. Move it, or choose another folder.`)
}

/** Each waits for the disk, so they wait together; and none is still at work when the first failure is told. */
async function allSettled(works: readonly Promise<void>[]): Promise<void> {
  for (const outcome of await Promise.allSettled(works)) if (outcome.status === 'rejected') throw outcome.reason
}

async function writeWhole(path: string, bytes: Uint8Array): Promise<void> {
  const file = await open(path, 'wx')
  try {
    await file.writeFile(bytes)
    // A crash right after the rename must not leave an empty file under the final name.
    await file.sync()
  } finally {
    await file.close()
  }
}

const reasons: Readonly<Record<string, string>> = {
  EACCES: 'there is no permission to write there',
  EPERM: 'there is no permission to write there',
  EROFS: 'the disk is read-only',
  ENOSPC: 'the disk is full',
  EDQUOT: 'the quota of the disk is used up',
  EEXIST: 'a file has that name',
  ENOTDIR: 'a part of the path is a file',
  ENAMETOOLONG: 'the name is too long',
}

function refusal(path: string, error: unknown): WriteRefusal {
  const code = error instanceof Error && 'code' in error ? String(error.code) : ''
  const reason = reasons[code] ?? (error instanceof Error ? error.message : String(error))
  return new WriteRefusal(`${path} cannot be written: ${reason}. Choose another folder.`)
}

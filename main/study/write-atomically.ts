import { open, rename, unlink } from 'node:fs/promises'
import { dirname } from 'node:path'

let counter = 0

/**
 * Writes a file so that a crash at any moment leaves either the old content or the new one: a temporary file beside it,
 * flushed to the disk, then renamed over it, then the folder's own entry flushed.
 */
export async function writeAtomically(path: string, bytes: Uint8Array | string): Promise<void> {
  counter += 1
  const temporary = `${path}.${process.pid}-${counter}.tmp`
  try {
    const file = await open(temporary, 'wx', 0o600)
    try {
      await file.writeFile(bytes)
      await file.sync()
    } finally {
      await file.close()
    }
    await rename(temporary, path)
  } catch (error) {
    await unlink(temporary).catch(() => undefined)
    throw error
  }
  await syncFolder(dirname(path))
}

/** Some systems (Windows) do not let a folder be opened; there the rename alone has to do. */
async function syncFolder(path: string): Promise<void> {
  const folder = await open(path, 'r').catch(() => null)
  if (folder === null) return
  await folder.sync().catch(() => undefined)
  await folder.close()
}

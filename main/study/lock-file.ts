import { constants, copyFile, link, open, rename, unlink, writeFile } from 'node:fs/promises'
import { hostname } from 'node:os'
import * as z from 'zod/mini'
import { isMissing } from './is-missing.ts'

/** A lock without a beat for a minute is taken for left behind. */
export const lockStale_ms = 60_000

const lockSchema = z.object({ pid: z.int(), host: z.string(), token: z.string() })

export type LockState =
  | { readonly kind: 'free' }
  | { readonly kind: 'held' }
  /** Its process has ended, it has not been beaten, or it says nothing; `was` tells it from any other lock. */
  | { readonly kind: 'left-behind'; readonly was: string }

let counter = 0
/** Beside the lock, never the same twice. */
const besides = (path: string): string => `${path}.${process.pid}-${(counter += 1)}.tmp`

/**
 * Puts a lock in a place that is free, whole from the first moment: written beside it, then linked.
 * @returns false when the place is taken
 */
export async function placeLock(path: string, token: string): Promise<boolean> {
  const temporary = besides(path)
  try {
    await writeFile(temporary, JSON.stringify({ pid: process.pid, host: hostname(), token }), { flag: 'wx', mode: 0o600 })
    await moveIn(temporary, path)
  } catch (error) {
    if (codeOf(error) === 'EEXIST') return false
    throw error
  } finally {
    await unlink(temporary).catch(() => undefined)
  }
  return (await tokenOfLock(path)) === token
}

/** The token of a lock; null for one that is gone or says nothing. Throws what a file that cannot be read throws. */
export async function tokenOfLock(path: string): Promise<string | null> {
  return (await readLock(path))?.content?.token ?? null
}

export async function lookAtLock(path: string, now: () => number): Promise<LockState> {
  const found = await readLock(path)
  if (found === null) return { kind: 'free' }
  const { content, beaten_ms, mark } = found
  const isHeld = content !== null && now() - beaten_ms <= lockStale_ms && (content.host !== hostname() || isAlive(content.pid))
  return isHeld ? { kind: 'held' } : { kind: 'left-behind', was: mark }
}

/**
 * Takes a lock that was judged left behind out of its place. What is found there instead by now (another host has been quicker,
 * or its own has woken up and beaten it) is put back.
 */
export async function removeLeftBehind(path: string, { was }: Extract<LockState, { kind: 'left-behind' }>): Promise<void> {
  const aside = besides(path)
  try {
    await rename(path, aside)
  } catch {
    // Gone already, or not to be moved while somebody reads it: the next look will tell.
    return
  }
  const moved = await readLock(aside).catch(() => null)
  if (moved !== null && moved.mark !== was) await moveIn(aside, path).catch(() => undefined)
  await unlink(aside).catch(() => undefined)
}

/** A second name for a file, where there is none of that name. */
async function moveIn(from: string, to: string): Promise<void> {
  try {
    await link(from, to)
  } catch (error) {
    // Some file systems (memory sticks) have no links; there a lock is seen half written for a moment.
    if (!['EPERM', 'ENOTSUP', 'EOPNOTSUPP', 'ENOSYS', 'EINVAL'].includes(codeOf(error))) throw error
    await copyFile(from, to, constants.COPYFILE_EXCL)
  }
}

interface LockFile {
  /** null for a file that says nothing. */
  readonly content: z.infer<typeof lockSchema> | null
  readonly beaten_ms: number
  /** Content and last beat: tells this lock from every other. */
  readonly mark: string
}

/** null for a file that is not there. */
async function readLock(path: string): Promise<LockFile | null> {
  const file = await open(path, 'r').catch((error: unknown) => {
    if (isMissing(error)) return null
    throw error
  })
  if (file === null) return null
  try {
    const { mtimeMs } = await file.stat()
    const text = await file.readFile('utf8')
    return { content: contentOf(text), beaten_ms: mtimeMs, mark: `${mtimeMs} ${text}` }
  } finally {
    await file.close()
  }
}

function contentOf(text: string): z.infer<typeof lockSchema> | null {
  try {
    return lockSchema.parse(JSON.parse(text))
  } catch {
    return null
  }
}

function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0)
    return true
  } catch (error) {
    return codeOf(error) === 'EPERM'
  }
}

const codeOf = (error: unknown): string => (error instanceof Error && 'code' in error && typeof error.code === 'string' ? error.code : '')

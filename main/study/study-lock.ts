import { unlink, utimes } from 'node:fs/promises'
import { join } from 'node:path'
import { lookAtLock, placeLock, removeLeftBehind, tokenOfLock } from './lock-file.ts'

/** A lock is beaten this often; `lockStale_ms` without a beat, and it is taken over. */
export const lockBeat_ms = 10_000

/** Another host that is just taking over a lock is waited for this often, and so long each time. */
const tries = 50
const wait_ms = 10

/** The right of one host to write one study's folder. */
export interface StudyLock {
  /**
   * False once another host has taken the study over (this one was stopped for longer than a minute).
   * Rejects, with a word, where the lock cannot be read.
   */
  isOurs(): Promise<boolean>
  /** Never rejects: a lock that cannot be given back is left behind, and taken over from there. */
  release(): Promise<void>
}

/**
 * Takes the lock file of a study's folder, or gives null while a living host holds it. A lock whose process has ended, or that
 * has not been beaten for a minute (its process number now belongs to something else), is taken over.
 * @param token - of this host alone
 */
export async function takeStudyLock(folder: string, token: string, now: () => number): Promise<StudyLock | null> {
  const path = join(folder, 'lock.json')
  for (let attempt = 0; attempt < tries; attempt += 1) {
    if (await placeLock(path, token)) return keepLock(path, token, now)
    const found = await lookAtLock(path, now)
    if (found.kind === 'held') return null
    if (found.kind === 'left-behind' && !(await clear(path, token, now))) await new Promise((resolve) => setTimeout(resolve, wait_ms))
  }
  return null
}

/**
 * Removes a lock that was left behind. One host at a time, held off by a lock of its own, and judged anew under it: else a host
 * that judged early and acts late would take away the lock that a quicker one has made meanwhile.
 * @returns false when another host is at it
 */
async function clear(path: string, token: string, now: () => number): Promise<boolean> {
  const clearing = `${path}.clearing`
  if (!(await placeLock(clearing, token))) {
    const other = await lookAtLock(clearing, now)
    if (other.kind === 'left-behind') await removeLeftBehind(clearing, other)
    return false
  }
  try {
    const found = await lookAtLock(path, now)
    if (found.kind === 'left-behind') await removeLeftBehind(path, found)
    return true
  } finally {
    await giveBack(clearing, token)
  }
}

function keepLock(path: string, token: string, now: () => number): StudyLock {
  const beat = async (): Promise<void> => {
    const seconds = now() / 1000
    if ((await tokenOfLock(path)) === token) await utimes(path, seconds, seconds)
  }
  const beating = setInterval(() => {
    // A beat that fails is told by the next save, which looks at the same file.
    beat().catch(() => undefined)
  }, lockBeat_ms)
  beating.unref()
  return {
    isOurs: async () => {
      try {
        return (await tokenOfLock(path)) === token
      } catch (error) {
        throw new Error(`the lock of the study's folder cannot be read (${error instanceof Error ? error.message : String(error)})`, {
          cause: error,
        })
      }
    },
    release: async () => {
      clearInterval(beating)
      await giveBack(path, token)
    },
  }
}

async function giveBack(path: string, token: string): Promise<void> {
  try {
    if ((await tokenOfLock(path)) === token) await unlink(path)
  } catch {
    // Left behind, then.
  }
}

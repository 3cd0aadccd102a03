import { readFile, rename, stat, unlink, utimes, writeFile } from 'node:fs/promises'
import { hostname } from 'node:os'
import { join } from 'node:path'
import * as z from 'zod/mini'
import { isMissing } from './is-missing.ts'

/** A lock is beaten this often, and is taken for left behind after a minute without a beat. */
export const lockBeat_ms = 10_000
export const lockStale_ms = 60_000

const lockSchema = z.object({ pid: z.int(), host: z.string(), token: z.string() })

/** The right of one host to write one study's folder. */
export interface StudyLock {
  /** False once another host has taken the study over (this one was stopped for longer than a minute). */
  isOurs(): Promise<boolean>
  release(): Promise<void>
}

/**
 * Takes the lock file of a study's folder, or gives null while a living host holds it. A lock whose process has ended, or that
 * has not been beaten for a minute (its process number now belongs to something else), is taken over.
 */
export async function takeStudyLock(folder: string, token: string, now: () => number): Promise<StudyLock | null> {
  const path = join(folder, 'lock.json')
  const mine = JSON.stringify({ pid: process.pid, host: hostname(), token })
  for (let attempt = 0; attempt < 3; attempt += 1) {
    try {
      await writeFile(path, mine, { flag: 'wx', mode: 0o600 })
      return keepLock(path, token, now)
    } catch (error) {
      if (!(error instanceof Error && 'code' in error && error.code === 'EEXIST')) throw error
    }
    if (await isHeld(path, now)) return null
    // The rename lets only one of two hosts that found the same left-behind lock go on.
    const aside = `${path}.${token}`
    await rename(path, aside).catch(() => undefined)
    await unlink(aside).catch(() => undefined)
  }
  return null
}

function keepLock(path: string, token: string, now: () => number): StudyLock {
  const isOurs = async (): Promise<boolean> => (await readLock(path))?.token === token
  const beat = setInterval(() => {
    const seconds = now() / 1000
    void isOurs().then((ours) => (ours ? utimes(path, seconds, seconds).catch(() => undefined) : undefined))
  }, lockBeat_ms)
  beat.unref()
  return {
    isOurs,
    release: async () => {
      clearInterval(beat)
      if (await isOurs()) await unlink(path).catch(() => undefined)
    },
  }
}

async function isHeld(path: string, now: () => number): Promise<boolean> {
  const lock = await readLock(path)
  if (lock === null) return false
  const mtimeMs = await stat(path).then(
    (found) => found.mtimeMs,
    () => 0,
  )
  if (now() - mtimeMs > lockStale_ms) return false
  return lock.host !== hostname() || isAlive(lock.pid)
}

/** null for a lock that is gone or that says nothing (a crash while it was written). */
async function readLock(path: string): Promise<z.infer<typeof lockSchema> | null> {
  try {
    return lockSchema.parse(JSON.parse(await readFile(path, 'utf8')))
  } catch (error) {
    if (isMissing(error) || error instanceof SyntaxError || error instanceof z.core.$ZodError) return null
    throw error
  }
}

function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0)
    return true
  } catch (error) {
    return error instanceof Error && 'code' in error && error.code === 'EPERM'
  }
}

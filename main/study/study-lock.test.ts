import { spawn, type ChildProcessWithoutNullStreams } from 'node:child_process'
import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { hostname, tmpdir } from 'node:os'
import { join } from 'node:path'
import { createInterface } from 'node:readline'
import { afterAll, afterEach, beforeAll, describe, expect, it, vi } from 'vitest'
import { buildForTests } from '../host/testing/build-for-tests.ts'
import { lookAtLock, removeLeftBehind } from './lock-file.ts'
import { lockBeat_ms, takeStudyLock } from './study-lock.ts'

let folder = ''
let built: Awaited<ReturnType<typeof buildForTests>>

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'rampfold-lock-'))
  built = await buildForTests(new URL('./testing/take-locks.ts', import.meta.url))
})
afterAll(async () => {
  await rm(folder, { recursive: true, force: true })
  await built.remove()
})

interface HostProcess {
  readonly child: ChildProcessWithoutNullStreams
  answer(): Promise<string>
}

const start = (token: string): HostProcess => {
  const child = spawn(process.execPath, [built.path, token])
  const lines: AsyncIterator<string, undefined> = createInterface({ input: child.stdout })[Symbol.asyncIterator]()
  return { child, answer: async () => (await lines.next()).value ?? 'ended' }
}

describe('hosts that start at once', () => {
  const hosts: HostProcess[] = []
  beforeAll(() => {
    for (let i = 0; i < 5; i += 1) hosts.push(start(`host-${i}`))
  })
  afterAll(() => {
    for (const { child } of hosts) child.kill('SIGKILL')
  })

  // No Linux, macOS or Windows process has this number.
  const leftBehind = JSON.stringify({ pid: 2 ** 30, host: hostname(), token: 'gone' })

  it.each([
    ['none has been left behind', null],
    ['one was left behind by a host that was killed', leftBehind],
    ['a damaged one was left behind', ''],
  ])('one of them gets the lock where %s', async (_where, text) => {
    for (let round = 0; round < 60; round += 1) {
      const study = await mkdtemp(join(folder, 'study-'))
      if (text !== null) await writeFile(join(study, 'lock.json'), text)
      for (const { child } of hosts) child.stdin.write(`${study}\n`)
      const answers = await Promise.all(hosts.map(async (host) => host.answer()))
      expect([round, answers.toSorted()]).toEqual([round, ['held', 'held', 'held', 'held', 'taken']])
      expect(JSON.parse(await readFile(join(study, 'lock.json'), 'utf8'))).toMatchObject({ token: `host-${answers.indexOf('taken')}` })
      expect(await readdir(study)).toEqual(['lock.json'])
    }
  })

  it('take over, too, from a host that was killed while it took over', async () => {
    const study = await mkdtemp(join(folder, 'study-'))
    await writeFile(join(study, 'lock.json'), leftBehind)
    await writeFile(join(study, 'lock.json.clearing'), leftBehind)
    expect(await takeStudyLock(study, 'mine', Date.now)).not.toBeNull()
    expect(await readdir(study)).toEqual(['lock.json'])
  })

  it('leave a lock alone that is another than the one they judged left behind', async () => {
    const path = join(await mkdtemp(join(folder, 'study-')), 'lock.json')
    await writeFile(path, leftBehind)
    const judged = await lookAtLock(path, Date.now)
    if (judged.kind !== 'left-behind') throw new Error(judged.kind)
    const quicker = JSON.stringify({ pid: process.pid, host: hostname(), token: 'quicker' })
    await writeFile(path, quicker)
    await removeLeftBehind(path, judged)
    expect(await readFile(path, 'utf8')).toBe(quicker)
    await writeFile(path, leftBehind)
    const again = await lookAtLock(path, Date.now)
    if (again.kind !== 'left-behind') throw new Error(again.kind)
    await removeLeftBehind(path, again)
    expect(await lookAtLock(path, Date.now)).toEqual({ kind: 'free' })
  })
})

describe('a lock that cannot be read', () => {
  afterEach(() => {
    vi.useRealTimers()
  })

  it('costs the save, not the process: neither beat nor release fails', async () => {
    const rejections: unknown[] = []
    const hear = (reason: unknown): void => void rejections.push(reason)
    process.on('unhandledRejection', hear)
    vi.useFakeTimers({ toFake: ['setInterval', 'clearInterval'] })
    const study = await mkdtemp(join(folder, 'study-'))
    const lock = await takeStudyLock(study, 'mine', Date.now)
    // A folder in its place: reading fails with something else than its absence, for root as well.
    await rm(join(study, 'lock.json'))
    await mkdir(join(study, 'lock.json'))
    vi.advanceTimersByTime(2 * lockBeat_ms)
    await new Promise((resolve) => setTimeout(resolve, 100))
    process.off('unhandledRejection', hear)
    expect(rejections).toEqual([])
    await expect(lock?.isOurs()).rejects.toThrow(/lock of the study's folder cannot be read.*EISDIR/)
    await expect(lock?.release()).resolves.toBeUndefined()
  })
})

import { spawn } from 'node:child_process'
import { once } from 'node:events'
import { mkdtemp, readdir, readFile, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildForTests } from '../host/testing/build-for-tests.ts'
import { writeAtomically } from './write-atomically.ts'

let folder = ''
let built: Awaited<ReturnType<typeof buildForTests>>

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'rampfold-write-'))
  built = await buildForTests(new URL('./testing/write-forever.ts', import.meta.url))
})
afterAll(async () => {
  await rm(folder, { recursive: true, force: true })
  await built.remove()
})

describe('writing atomically', () => {
  it('leaves one whole content, whenever the process is killed', async () => {
    const path = join(folder, 'study.json')
    for (let round = 0; round < 8; round += 1) {
      const child = spawn(process.execPath, [built.path, path])
      await once(child.stdout, 'data')
      await new Promise((resolve) => setTimeout(resolve, 3 + round * 7))
      child.kill('SIGKILL')
      await once(child, 'exit')
      const text = await readFile(path, 'utf8')
      expect(new Set(text).size).toBe(1)
      expect([200_000, 300_000, 400_000, 500_000, 600_000, 700_000, 800_000]).toContain(text.length)
    }
  })

  it('keeps the old content and leaves nothing behind when it cannot write', async () => {
    const path = join(folder, 'missing', 'x')
    await expect(writeAtomically(path, 'x')).rejects.toHaveProperty('code', 'ENOENT')
    // A folder cannot be replaced by a file; the temporary file must go all the same.
    const before = await readdir(folder)
    await expect(writeAtomically(folder, 'x')).rejects.toThrow(Error)
    expect(await readdir(folder)).toEqual(before)
    expect((await readdir(tmpdir())).filter((name) => name.startsWith('rampfold-write-') && name.endsWith('.tmp'))).toEqual([])
  })
})

import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { codeCacheOf, loadScript } from './load-script.ts'

let folder = ''
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'load-script-'))
})
afterAll(async () => rm(folder, { recursive: true, force: true }))

/** Scripts of their own, since a process that has compiled a text once asks no cache for it. */
const adding = (number: number): string =>
  `(function (exports, require) { exports.added = (x) => x + ${number}; exports.sep = require('node:path').sep })`

async function scriptWith(code: string, cache: Buffer | null): Promise<string> {
  const file = join(await mkdtemp(join(folder, 'one-')), 'script.cjs')
  await writeFile(file, code)
  if (cache !== null) await writeFile(codeCacheOf(file), cache)
  return file
}

const results = (exports: Readonly<Record<string, unknown>>): unknown[] => [
  (exports['added'] as (x: number) => number)(40),
  typeof exports['sep'],
]

describe('a script of the build', () => {
  it('gives what it exports, with no code kept beside it', async () => {
    const { script, exports } = loadScript(await scriptWith(adding(2), null))
    expect(results(exports)).toEqual([42, 'string'])
    expect(script.cachedDataRejected).toBeUndefined()
  })

  it('compiles afresh where the code kept is of another script, is cut short or is no code at all', async () => {
    const other = loadScript(await scriptWith(adding(3), null)).script.createCachedData()
    const useless = [Buffer.concat([other, Buffer.alloc(64)]), other.subarray(0, 100), Buffer.alloc(0), Buffer.from('nothing of the kind')]
    for (const [i, cache] of useless.entries()) {
      const { script, exports } = loadScript(await scriptWith(adding(10_000 + i), cache))
      expect(script.cachedDataRejected).toBe(true)
      expect(results(exports)).toEqual([10_040 + i, 'string'])
    }
  })
})

import { spawnSync } from 'node:child_process'
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { codeCacheOf, loadScript, sealBytes, sealed } from './load-script.ts'

let folder = ''
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'load-script-'))
})
afterAll(async () => rm(folder, { recursive: true, force: true }))

/** One expression, as long as any other of as many digits. */
const adding = (number: number): string =>
  `(function (exports, require) { exports.added = (x) => x + ${number}; exports.sep = require('node:path').sep })`

/** In a process of its own: one that has compiled a text once asks no cache for it. */
function codeMadeElsewhere(text: Buffer): Buffer {
  const make = `const script = new (require('node:vm').Script)(process.argv[1])
    const exports = {}
    script.runInThisContext()(exports, require)
    exports.added(1)
    process.stdout.write(script.createCachedData())`
  return spawnSync(process.execPath, ['-e', make, text.toString('latin1')]).stdout
}

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

  it('takes the code kept of it', async () => {
    const text = Buffer.from(adding(500))
    const code = codeMadeElsewhere(text)
    const { script, exports } = loadScript(await scriptWith(adding(500), sealed(text, code)))
    expect(script.cachedDataRejected).toBe(false)
    expect(results(exports)).toEqual([540, 'string'])
  })

  it('compiles afresh where the code kept is of another script of the same length, damaged, cut short or no code at all', async () => {
    const other = Buffer.from(adding(600))
    const kept = sealed(other, codeMadeElsewhere(other))
    const damaged = Buffer.from(kept)
    damaged.writeUInt8(damaged.readUInt8(kept.length >> 1) ^ 1, kept.length >> 1)
    const cases = [
      { number: 601, cache: kept },
      { number: 600, cache: damaged },
      { number: 600, cache: kept.subarray(0, kept.length - 8) },
      { number: 600, cache: kept.subarray(sealBytes) },
      { number: 600, cache: Buffer.alloc(0) },
      { number: 600, cache: Buffer.from('nothing of the kind') },
    ]
    for (const { number, cache } of cases) {
      const { script, exports } = loadScript(await scriptWith(adding(number), cache))
      expect(script.cachedDataRejected).toBeUndefined()
      expect(results(exports)).toEqual([40 + number, 'string'])
    }
  })

  it('compiles afresh where V8 refuses code whose seal holds', async () => {
    const text = Buffer.from(adding(700))
    const { script, exports } = loadScript(await scriptWith(adding(700), sealed(text, Buffer.from('of another V8'))))
    expect(script.cachedDataRejected).toBe(true)
    expect(results(exports)).toEqual([740, 'string'])
  })
})

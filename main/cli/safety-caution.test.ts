import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { demoSeries } from '../demo/demo-series.ts'
import { run } from './run.ts'

/** As product and README word it. */
const caution =
  /^A calculated value is an estimate for planning; .*real amount, package and plant; .*licensed or otherwise competent people\.$/

let place = ''
let table = ''
let runs: readonly string[] = []

beforeAll(async () => {
  place = await mkdtemp(join(tmpdir(), 'caution-'))
  table = join(place, 'k.csv')
  await writeFile(table, 'T (K),k (1/s)\n300,0.001\n320,0.008\n340,0.05\n')
  const { files } = demoSeries()
  runs = files.map(({ fileName }) => join(place, fileName))
  for (const { fileName, bytes } of files) await writeFile(join(place, fileName), bytes)
})
afterAll(async () => rm(place, { recursive: true, force: true }))

async function said(...words: readonly string[]): Promise<readonly string[]> {
  let out = ''
  const io = {
    stdout: (text: string) => (out += text),
    stderr: () => undefined,
    stderrIsTerminal: false,
    version: '0.0.0',
    workerUrl: new URL('file:///nowhere/worker-entry.js'),
    rendererUrl: new URL('file:///nowhere/renderer/'),
  }
  expect(await run(words, io)).toBe(0)
  return out.trimEnd().split('\n')
}

describe('the caution', () => {
  it('is the last line of what a call with calculated values prints', async () => {
    const out = join(place, 'out')
    for (const words of [
      ['activation', ...runs],
      ['rate-constants', table],
    ]) {
      const lines = await said(...words, '--out', out)
      expect(lines.at(-1)).toMatch(caution)
      expect(lines.filter((line) => caution.test(line))).toHaveLength(1)
      expect(await said(...words, '--out', out, '--quiet')).toEqual([''])
    }
  })

  it('stands in JSON, in the text beside a table and in the picture, and is no row of a table', async () => {
    const out = join(place, 'out')
    for (const name of ['activation', 'rate-constants']) {
      const file = async (suffix: string): Promise<string> => readFile(join(out, `${name}${suffix}`), 'utf8')
      expect((JSON.parse(await file('.json')) as { caution: string }).caution).toMatch(caution)
      expect((await file('.csv.txt')).split('\n').map((line) => line.trim())).toContainEqual(expect.stringMatching(caution))
      expect(await file('.csv')).not.toContain('estimate for planning')
      const shown = [...(await file('.svg')).matchAll(/<text [^>]*>([^<]*)<\/text>/g)].map(([, text]) => text)
      expect(shown.join(' ')).toMatch(/A calculated value is an estimate for planning; .* otherwise competent people\.$/)
    }
  })

  it('is not said where nothing is calculated', async () => {
    expect(await said('inspect', ...runs)).not.toContainEqual(expect.stringMatching(caution))
  })
})

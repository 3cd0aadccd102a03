import { mkdir, mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { run } from './run.ts'

let place = ''
beforeAll(async () => {
  place = await mkdtemp(join(tmpdir(), 'words-on-runs-'))
})
afterAll(async () => rm(place, { recursive: true, force: true }))

async function call(...words: readonly string[]): Promise<{ readonly code: number; readonly out: string; readonly err: string }> {
  let [out, err] = ['', '']
  const io = {
    stdout: (text: string) => (out += text),
    stderr: (text: string) => (err += text),
    stderrIsTerminal: false,
    version: '0.0.0',
    workerUrl: new URL('file:///nowhere/worker-entry.js'),
    rendererUrl: new URL('file:///nowhere/renderer/'),
  }
  return { code: await run(words, io), out, err }
}

async function fileOf(name: string, text: string): Promise<string> {
  const path = join(place, name)
  await writeFile(path, text)
  return path
}

/** A ramp of so many K/min from 400 K, a row each 6 s, exactly on its line or with a furnace's wavering; a step of mass around 560 K. */
const ramp = (rate: number, start_s: number, waver_K: number): string => {
  const rows = Array.from({ length: 400 }, (_, i) => {
    const T = 400 + (rate * i) / 10
    return `${start_s + 6 * i},${T + waver_K * Math.sin(i)},${10 - 5 / (1 + Math.exp(-(T - 560) / 8))}`
  })
  return `Time (s),Temperature (K),Mass (mg)\n${rows.join('\n')}\n`
}

/** Five runs, the first of which have their column under another heading, the others under their own. */
const folder = async (name: string, heading: string, others: number, withBoth: boolean): Promise<string> => {
  const path = join(place, name)
  await mkdir(path)
  for (const [i, rate] of [2, 4, 6, 10, 20].entries()) {
    const text = ramp(rate, 0, 0.02)
    const own = withBoth ? text.replace('Mass (mg)', `Mass (mg),${heading}`).replace(/^(\d.*),([^,]+)$/gm, '$1,$2,$2') : text
    await writeFile(join(path, `run ${rate} K per min.csv`), i < others ? text.replace('Mass (mg)', heading) : own)
  }
  return path
}

describe('runs of different kinds in one call', () => {
  it('are one matter, with the runs and what to do', async () => {
    const { code, err } = await call('activation', await folder('mixed', 'Heat flow (W/g)', 2, false), '--out', join(place, 'out'))
    expect(code).toBe(1)
    expect(err.split('no mass column')).toHaveLength(2)
    expect(err).toMatch(
      /2 of 5 runs have no mass column but heat flow: .+, .+\. No signal is in all runs: .* Name only the files of one kind\./,
    )
    expect(err).toContain('--skip-unusable')
    const skipping = await call('activation', join(place, 'mixed'), '--skip-unusable', '--out', join(place, 'out'))
    expect(skipping.code).toBe(0)
    expect(skipping.out.match(/^stop: .*$/gm)).toEqual([expect.stringMatching(/^stop: 2 runs cannot be used: .+, .+$/)])
  })

  it('are told which signal they share', async () => {
    const path = await folder('shared', 'Heat flow (W/g)', 2, true)
    const { err } = await call('activation', path, '--signal', 'mass', '--out', join(place, 'out'))
    expect(err).toMatch(/2 of 5 runs have no mass column but heat flow: .*Name a signal that all runs have: --signal heat-flow\./)
  })
})

describe('a folder without exports', () => {
  it('says that its sub-folders are not searched, and names some', async () => {
    const path = join(place, 'outer')
    for (const name of ['b2', 'b10', 'a', 'c']) await mkdir(join(path, name), { recursive: true })
    const { code, err } = await call('inspect', path)
    expect(code).toBe(1)
    expect(err).toContain('no exports in this folder. Its sub-folders (a, b2, b10 and 1 more) are not searched: name those you mean.')
    expect((await call('inspect', join(path, 'a'))).err).not.toContain('sub-folders')
  })
})

describe('what inspect says of a run', () => {
  it('gives the clock by which segments go where it does not begin at 0', async () => {
    const { out } = await call('inspect', await fileOf('late.csv', ramp(10, 790, 0.02)))
    // 399 steps of 6 s: 39.9 min, from 13.2 min on.
    expect(out).toMatch(/time +39\.90 min +13\.2 to 53\.1 min in the file/)
    expect(out).toMatch(/segment 1 +heating at 10\.0 K\/min to .* 13\.2 to 53\.1 min/)
    expect(out).toMatch(/fitted over +[\d.]+ to [\d.]+ °C +the window of the reaction, ± one standard error; a segment has its median rate/)
    expect((await call('inspect', await fileOf('early.csv', ramp(10, 0, 0.02)))).out).not.toContain('in the file')
  })

  it('does not call a heating rate unmeasured that stands above it, where the run cannot be worked out', async () => {
    const flat = ramp(10, 0, 0.02).replace(/[^,\n]+$/gm, (cell) => (/^[\d.]/.test(cell) ? '5' : cell))
    const { out } = await call('inspect', await fileOf('flat.csv', flat))
    expect(out).toMatch(/heating rate +of the reaction: not worked out, see below/)
    expect(out).toMatch(/ {2}stop: flat/)
    expect(out).not.toContain('not measured')
  })

  it('has no standard error of a temperature that was calculated', async () => {
    const { out } = await call('inspect', await fileOf('set.csv', ramp(10, 0, 0)))
    expect(out).toMatch(/heating rate +10\.000 K\/min, set or calculated, not measured/)
    const runs = await Promise.all([5, 10, 20].map(async (rate) => fileOf(`set ${rate}.csv`, ramp(rate, 0, 0))))
    expect((await call('activation', ...runs, '--out', join(place, 'set'))).code).toBe(0)
    const notes = await readFile(join(place, 'set/activation.csv.txt'), 'utf8')
    expect(notes).toContain('heating rate 10.000 K/min (of a temperature set or calculated, its error not measured')
    expect(notes).not.toMatch(/e-\d+ K\/min/)
  })
})

import { spawnSync } from 'node:child_process'
import { cpSync, existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'

const root = resolve(import.meta.dirname, '../..')
const place = mkdtempSync(join(tmpdir(), 'without-electron-'))
afterAll(() => rmSync(place, { recursive: true, force: true }))

const cli = (...args: string[]) =>
  spawnSync(process.execPath, [join(place, 'out/main/cli.cjs'), ...args], {
    cwd: place,
    encoding: 'utf8',
    env: { ...process.env, NODE_PATH: '' },
  })

/** First-order mass loss, Ea 150 kJ/mol, ln A 25 (1/s), by small steps of T; good to a fraction of a percent. */
function firstOrderRun(heatingRate_K_per_min: number): string {
  const rows = ['Time (min),Temperature (K),Mass (mg)']
  let remaining = 1
  const step_K = 0.05
  for (let i = 0; i <= 8000; i++) {
    const T = 450 + i * step_K
    const k = Math.exp(25 - 150_000 / 8.31446261815324 / (T + step_K / 2))
    if (i % 4 === 0) rows.push(`${(T - 450) / heatingRate_K_per_min},${T},${(10 * remaining).toFixed(6)}`)
    remaining *= Math.exp((-k * step_K * 60) / heatingRate_K_per_min)
  }
  return rows.join('\n')
}

describe('the built command line, with nothing but Node beside it', () => {
  beforeAll(() => {
    expect(existsSync(join(root, 'out/main/cli.cjs')), 'run `npm run build` first').toBe(true)
    cpSync(join(root, 'out'), join(place, 'out'), { recursive: true })
    cpSync(join(root, 'package.json'), join(place, 'package.json'))
  })

  it.skipIf(process.platform === 'win32')('can be run by its name after every build', () => {
    const run = spawnSync(join(root, 'out/main/cli.cjs'), ['--version'], { encoding: 'utf8' })
    expect([run.error, run.status]).toEqual([undefined, 0])
  })

  it('starts and tells its version', () => {
    const { version } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8')) as { version: string }
    const run = cli('--version')
    expect(run.stderr).toBe('')
    expect(run.stdout).toContain(version)
    expect(run.status).toBe(0)
  })

  it('does the whole job: exports in, Ea against conversion out', () => {
    const files = [2, 5, 10, 20].map((rate) => {
      const file = join(place, `additive ${rate} K per min.csv`)
      writeFileSync(file, firstOrderRun(rate))
      return file
    })
    const run = cli('activation', ...files, '--out', join(place, 'results'))
    expect(run.stderr).toBe('')
    expect(run.status).toBe(0)
    const { profiles } = JSON.parse(readFileSync(join(place, 'results/activation.json'), 'utf8')) as {
      profiles: { method: string; Ea_kJ_per_mol: (number | null)[] }[]
    }
    const vyazovkin = profiles.find((profile) => profile.method === 'vyazovkin')
    for (const Ea of vyazovkin?.Ea_kJ_per_mol ?? [null]) expect(Math.abs((Ea ?? 0) - 150)).toBeLessThan(0.75)
  })
})

import { mkdtemp, readdir, readFile, rm } from 'node:fs/promises'
import { existsSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'
import { afterAll, expect, it } from 'vitest'
import { run } from './run.ts'

const folder = resolve(import.meta.dirname, '../../../shared/data/measured/pmma-dsc-tga-n2-four-rates')
const made: string[] = []
afterAll(async () => Promise.all(made.map((path) => rm(path, { recursive: true, force: true }))))

it.skipIf(!existsSync(folder))(
  'a straight baseline is drawn under every measured heat flow whose record holds the whole peak (skipped where the measured data are absent)',
  async () => {
    const out = await mkdtemp(join(tmpdir(), 'straight-'))
    made.push(out)
    const names = (await readdir(folder)).filter((name) => name.startsWith('FSRI_DSC_')).sort()
    const errors: string[] = []
    const io = {
      stdout: () => undefined,
      stderr: (text: string) => void errors.push(text),
      stderrIsTerminal: false,
      version: '0.0.0',
      workerUrl: new URL('file:///nowhere/worker-entry.js'),
      rendererUrl: new URL('file:///nowhere/renderer/'),
    }
    const words = ['activation', ...names.map((name) => join(folder, name)), '--baseline', 'straight', '--methods', 'kas', '--out', out]
    expect([await run(words, io), errors.join('')]).toEqual([0, ''])
    const { runs, findings } = JSON.parse(await readFile(join(out, 'activation.json'), 'utf8')) as {
      readonly runs: readonly unknown[]
      readonly findings: readonly { readonly code: string }[]
    }
    expect(runs).toHaveLength(names.length)
    expect(findings.map(({ code }) => code)).not.toContain('run-unusable')
  },
)

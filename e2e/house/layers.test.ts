import { spawnSync } from 'node:child_process'
import { cpSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join, resolve } from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'

const root = resolve(import.meta.dirname, '../..')
const tree = mkdtempSync(join(tmpdir(), 'layers-'))
cpSync(join(root, '.oxlintrc.json'), join(tree, '.oxlintrc.json'))
afterAll(() => rmSync(tree, { recursive: true, force: true }))

/** What the project's own lint rules say of one import statement standing in one place. */
function verdict(file: string, statement: string): string {
  const path = join(tree, file)
  mkdirSync(dirname(path), { recursive: true })
  writeFileSync(path, `${statement}\nexport type { Thing }\n`)
  const run = spawnSync(process.execPath, [join(root, 'node_modules/oxlint/bin/oxlint'), '--deny-warnings', '-f', 'unix', file], {
    cwd: tree,
    encoding: 'utf8',
  })
  rmSync(path)
  return /no-restricted-imports/.test(run.stdout + run.stderr) ? 'refused' : 'allowed'
}

const type = (from: string): string => `import type { Thing } from '${from}'`
const value = (from: string): string => `import { Thing } from '${from}'`

describe('who may import what is held by lint, type imports included', () => {
  it.each([
    ['shared-kinetics/units/a.ts', type('../series/run.ts')],
    ['shared-kinetics/numerics/a.ts', type('../series/run.ts')],
    ['shared-kinetics/numerics/a.ts', type('node:fs')],
    ['shared-kinetics/series/a.ts', type('../conversion/window.ts')],
    ['shared-kinetics/conversion/a.ts', type('../isoconversional/result.ts')],
    ['shared-kinetics/isoconversional/a.ts', type('../review/finding.ts')],
    ['shared-kinetics/isoconversional/a.ts', type('mathjs')],
    ['shared-kinetics/isoconversional/a.ts', type('../uncertainty/budget.ts')],
    ['shared-kinetics/isoconversional/a.ts', type('../rate-constants/arrhenius.ts')],
    ['shared-kinetics/peak-methods/a.ts', type('../uncertainty/budget.ts')],
    ['shared-kinetics/peak-methods/a.ts', type('../rate-constants/arrhenius.ts')],
    ['shared-kinetics/uncertainty/a.ts', type('../tasks/study-result.ts')],
    ['shared-kinetics/rate-constants/a.ts', type('../tasks/study-result.ts')],
    ['shared-kinetics/tasks/a.ts', type('../contract/wire.ts')],
    ['shared-kinetics/review/rules/a.ts', type('../../contract/wire.ts')],
    ['shared-kinetics/contract/a.ts', value('../tasks/study-input.ts')],
    ['shared-kinetics/contract/a.ts', type('zod')],
    ['main/host/a.ts', type('electron')],
    ['main/cli/a.ts', type('../electron/app.ts')],
    ['main/cli/commands/a.ts', type('../../../renderer/app/app.tsx')],
    ['main/host/a.ts', type('./testing/host-testing.ts')],
    ['main/cli/commands/a.ts', type('../../host/testing/host-testing.ts')],
    ['main/electron/a.ts', type('./testing/fake-electron.ts')],
    ['main/preload/a.ts', type('../host/create-host.ts')],
    ['main/preload/a.ts', type('../../shared-kinetics/tasks/study-result.ts')],
    ['renderer/app/a.tsx', type('../../main/host/create-host.ts')],
    ['renderer/app/a.tsx', type('electron')],
    ['renderer/app/a.tsx', type('../../shared-kinetics/tasks/study-result.ts')],
    ['renderer/charts/a.tsx', type('../state/view.ts')],
    ['renderer/state/a.ts', type('../transport/testing/memory-transport.ts')],
  ])('%s refuses %s', (file, statement) => {
    expect(verdict(file, statement)).toBe('refused')
  })

  it.each([
    ['shared-kinetics/units/a.ts', type('../errors.ts')],
    ['shared-kinetics/series/a.ts', type('../units/quantity.ts')],
    ['shared-kinetics/isoconversional/a.ts', type('../temperature-integral/p-of-x.ts')],
    ['shared-kinetics/uncertainty/a.ts', type('../isoconversional/result.ts')],
    ['shared-kinetics/contract/a.ts', type('../tasks/study-input.ts')],
    ['shared-kinetics/contract/a.ts', value('../errors.ts')],
    ['main/electron/a.ts', type('electron')],
    ['main/preload/a.ts', type('electron')],
    ['main/preload/a.ts', type('../../shared-kinetics/contract/host-api.ts')],
    ['main/host/a.ts', type('../../shared-kinetics/tasks/evaluate-study.ts')],
    ['main/host/a.test.ts', type('./testing/host-testing.ts')],
    ['main/study/testing/a.ts', type('../../host/testing/host-testing.ts')],
    ['renderer/app/a.tsx', type('../../shared-kinetics/figure/figure.ts')],
    ['renderer/charts/a.tsx', type('../../shared-kinetics/figure/figure.ts')],
  ])('%s allows %s', (file, statement) => {
    expect(verdict(file, statement)).toBe('allowed')
  })
})

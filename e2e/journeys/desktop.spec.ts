import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { _electron, expect, test } from '@playwright/test'
import { findElectronBinary } from '../../main/host/electron-binary.ts'
import { root } from '../pages/program.ts'
import { Sheet } from '../pages/sheet.ts'

const binary = findElectronBinary(join(root, 'node_modules/electron'))
const required = process.env.REQUIRE_ELECTRON === '1'

test.skip(binary === null && !required, "Electron's binary is not installed here; REQUIRE_ELECTRON=1 makes this a failure")

test('the desktop window opens the demo series under the flags it states', async () => {
  expect(binary, "Electron's binary is not installed").not.toBeNull()
  const dataFolder = mkdtempSync(join(tmpdir(), 'rampfold-desktop-'))
  const app = await _electron.launch({
    executablePath: binary ?? '',
    args: [root, ...(process.getuid?.() === 0 ? ['--no-sandbox'] : [])],
    env: { ...process.env, RAMPFOLD_DATA: dataFolder },
  })
  try {
    const page = await app.firstWindow()
    expect(page.url()).toMatch(/^app:/)
    expect(await page.evaluate(() => 'require' in globalThis || 'process' in globalThis)).toBe(false)
    const sheet = new Sheet(page)
    await sheet.openDemo()
    await sheet.goTo('Activation energy')
    await expect(sheet.levelTable.getByRole('row')).toHaveCount(20)
  } finally {
    await app.close()
    rmSync(dataFolder, { recursive: true, force: true })
  }
})

import { type ChildProcess, spawn } from 'node:child_process'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'
import { test as base } from '@playwright/test'
import { Sheet } from './sheet.ts'

export const root = resolve(import.meta.dirname, '../..')
const cli = join(root, 'out/main/cli.cjs')

/** A running browser shell of its own, on a data folder of its own. */
export interface Program {
  readonly address: string
  readonly dataFolder: string
  /** Ends the host as a person would (Ctrl+C) and starts another on the same data folder. */
  readonly restart: () => Promise<string>
}

async function start(dataFolder: string, paths: readonly string[]): Promise<{ host: ChildProcess; address: string }> {
  const host = spawn(process.execPath, [cli, 'open', '--no-browser', ...paths], {
    env: { ...process.env, RAMPFOLD_DATA: dataFolder },
    stdio: ['ignore', 'pipe', 'pipe'],
  })
  let said = ''
  const address = await new Promise<string>((found, failed) => {
    const read = (piece: Buffer): void => {
      said += piece.toString()
      const match = /http:\/\/127\.0\.0\.1:\d+\/\S*/.exec(said)
      if (match) found(match[0])
    }
    host.stdout.on('data', read)
    host.stderr.on('data', read)
    host.on('exit', (code) => failed(new Error(`The host ended with ${code} before it told its address:\n${said}`)))
  })
  return { host, address }
}

const end = async (host: ChildProcess): Promise<void> => {
  if (host.exitCode !== null) return
  const gone = new Promise((resolve) => host.once('exit', resolve))
  host.kill('SIGINT')
  await gone
}

export const test = base.extend<{ folder: string; program: Program; sheet: Sheet }>({
  // Playwright reads the fixtures wanted from this pattern, so it stands even where none is.
  // oxlint-disable-next-line no-empty-pattern
  folder: async ({}, use) => {
    const folder = mkdtempSync(join(tmpdir(), 'rampfold-files-'))
    await use(folder)
    rmSync(folder, { recursive: true, force: true })
  },
  // oxlint-disable-next-line no-empty-pattern
  program: async ({}, use) => {
    const dataFolder = mkdtempSync(join(tmpdir(), 'rampfold-journey-'))
    let running = await start(dataFolder, [])
    await use({
      address: running.address,
      dataFolder,
      restart: async () => {
        await end(running.host)
        running = await start(dataFolder, [])
        return running.address
      },
    })
    await end(running.host)
    rmSync(dataFolder, { recursive: true, force: true })
  },
  sheet: async ({ page, program }, use) => {
    const faults: string[] = []
    page.on('console', (message) => {
      if (message.type() === 'error') faults.push(message.text())
    })
    page.on('pageerror', (error) => faults.push(String(error)))
    const sheet = new Sheet(page)
    await sheet.open(program.address)
    await use(sheet)
    if (faults.length > 0) throw new Error(`The page's console is not clean:\n${faults.join('\n')}`)
  },
})

export { expect } from '@playwright/test'

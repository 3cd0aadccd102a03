// Finds the Chromium that the journeys run in, and installs one where there is none.
import { spawnSync } from 'node:child_process'
import { accessSync, constants, existsSync } from 'node:fs'
import { delimiter, join } from 'node:path'

const names = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable']

/** Path of a Chromium: CHROMIUM_PATH, else one on PATH, else the one Playwright has fetched; null where there is none. */
export async function findBrowser() {
  const named = process.env.CHROMIUM_PATH
  if (named) return existsSync(named) ? named : null
  for (const folder of (process.env.PATH ?? '').split(delimiter)) {
    for (const name of names) {
      const path = join(folder, name)
      try {
        accessSync(path, constants.X_OK)
        return path
      } catch {
        // not here
      }
    }
  }
  const { chromium } = await import('@playwright/test')
  return existsSync(chromium.executablePath()) ? chromium.executablePath() : null
}

/** The same, after trying to install: Debian's package where that can be done, else Playwright's own build. */
export async function findOrInstallBrowser() {
  const found = await findBrowser()
  if (found) return found
  const apt = existsSync('/usr/bin/apt-get')
  if (apt && asRoot('apt-get', 'update')) asRoot('apt-get', 'install', '-y', '--no-install-recommends', 'chromium')
  if (!(await findBrowser())) run('npx', 'playwright', 'install', 'chromium')
  const installed = await findBrowser()
  if (!installed)
    throw new Error('No Chromium was found and none could be installed. Install one, or set CHROMIUM_PATH to its program file.')
  return installed
}

function run(command, ...args) {
  console.log(`> ${command} ${args.join(' ')}`)
  return spawnSync(command, args, { stdio: 'inherit', env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' } }).status === 0
}

function asRoot(...words) {
  return process.getuid?.() === 0 ? run(...words) : run('sudo', '-n', ...words)
}

import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { dirname } from 'node:path'
import { fileURLToPath } from 'node:url'
import { fetchElectronBinary, findElectronBinary } from '../host/electron-binary.ts'
import { runElectron } from '../host/run-electron.ts'
import { startBrowserShell } from '../host/start-browser-shell.ts'
import { startProgram } from '../host/start-program.ts'

// `npm start`. Its place in the build (out/main/start.js) is what the addresses below count from.
const appFolder = fileURLToPath(new URL('../..', import.meta.url))
const { version } = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8')) as { readonly version: string }
const print = (line: string): void => void process.stdout.write(`${line}\n`)
const warn = (line: string): void => void process.stderr.write(`${line}\n`)

const electronFolder = ((): string => {
  try {
    return dirname(createRequire(import.meta.url).resolve('electron/package.json'))
  } catch {
    return fileURLToPath(new URL('../../node_modules/electron', import.meta.url))
  }
})()

process.exitCode = await startProgram(process.argv.slice(2), {
  question: { platform: process.platform, env: process.env, userId: process.getuid?.() },
  version,
  print,
  warn,
  findBinary: () => findElectronBinary(electronFolder),
  fetchBinary: async () => {
    const onTerminal = process.stderr.isTTY
    const failure = await fetchElectronBinary({
      packageFolder: electronFolder,
      progress: (mebibytes) => {
        if (onTerminal) process.stderr.write(`\rFetching Electron, once: ${mebibytes} MiB`)
      },
    })
    if (onTerminal) process.stderr.write('\r\u001b[K')
    return failure
  },
  runDesktop: async (binary) => runElectron(binary, appFolder),
  runBrowser: async ({ openBrowser }) => {
    const shell = await startBrowserShell({
      workerUrl: new URL('./worker-entry.js', import.meta.url),
      rendererUrl: new URL('../renderer/', import.meta.url),
      version,
      openBrowser,
      print,
      warn,
    })
    await shell.closed
  },
})

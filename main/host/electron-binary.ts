import { spawn } from 'node:child_process'
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

/**
 * Path of Electron's binary, or null where it is not there. Looked for without loading the `electron` package, which would
 * begin to fetch it.
 */
export function findElectronBinary(packageFolder: string): string | null {
  try {
    const name = readFileSync(join(packageFolder, 'path.txt'), 'utf8').trim()
    const binary = join(process.env['ELECTRON_OVERRIDE_DIST_PATH'] ?? join(packageFolder, 'dist'), name)
    return name !== '' && existsSync(binary) ? binary : null
  } catch {
    return null
  }
}

export interface WindowQuestion {
  readonly platform: string
  readonly env: Readonly<Record<string, string | undefined>>
  /** undefined where the system knows no such number. */
  readonly userId: number | undefined
}

/** Whether this session has a screen at all. */
export function hasDisplay({ platform, env }: WindowQuestion): boolean {
  if (platform === 'win32' || platform === 'darwin') return true
  return (env['DISPLAY'] ?? '') !== '' || (env['WAYLAND_DISPLAY'] ?? '') !== ''
}

/** Why no desktop window can be opened here, or null. Chromium's sandbox does not run as root. */
export function whyNoWindow(question: WindowQuestion): string | null {
  if (!hasDisplay(question)) return 'there is no display'
  if (question.platform !== 'win32' && question.userId === 0) return 'the desktop window does not run as root'
  return null
}

export interface FetchOptions {
  readonly packageFolder: string
  /** Called with the MiB that have arrived. */
  readonly progress: (mebibytes: number) => void
  /** Given up after so long without a byte more; 20 s by default. */
  readonly patience_ms?: number
}

/** Runs the package's own install script and watches it. Resolves to null once the binary is there, else to why it is not. */
export async function fetchElectronBinary({ packageFolder, progress, patience_ms = 20_000 }: FetchOptions): Promise<string | null> {
  const script = join(packageFolder, 'install.js')
  if (!existsSync(script)) return 'the electron package is not installed'
  // The script downloads into the system's temporary folder; one of its own lets us see it grow.
  const folder = mkdtempSync(join(tmpdir(), 'rampfold-electron-'))
  const env = { ...process.env, TMPDIR: folder, TEMP: folder, TMP: folder, ELECTRON_GET_NO_PROGRESS: '1' }
  const child = spawn(process.execPath, [script], { env, stdio: ['ignore', 'ignore', 'pipe'] })
  let said = ''
  child.stderr.on('data', (text: Buffer) => {
    said = (said + text.toString()).slice(-4000)
  })
  return new Promise((resolve) => {
    let size = 0
    let lastGrowth = performance.now()
    let stalled = false
    const watch = setInterval(() => {
      const now = sizeOf(folder) + sizeOf(join(packageFolder, 'dist'))
      if (now !== size) {
        size = now
        lastGrowth = performance.now()
        progress(Math.round(size / 2 ** 20))
      } else if (performance.now() - lastGrowth > patience_ms) {
        stalled = true
        child.kill('SIGKILL')
      }
    }, 250)
    const end = (reason: string | null): void => {
      clearInterval(watch)
      rmSync(folder, { recursive: true, force: true })
      resolve(reason)
    }
    child.on('error', (error) => {
      end(error.message)
    })
    child.on('exit', (code) => {
      if (stalled) end(`nothing arrived for ${Math.round(patience_ms / 1000)} s`)
      else if (code !== 0) end(reasonIn(said))
      else end(findElectronBinary(packageFolder) === null ? 'it was fetched but is not in its place' : null)
    })
  })
}

/** The line of a stack trace that a person can use. */
const reasonIn = (text: string): string => {
  // The script prints the stack of a failed fetch without its cause.
  if (/ENOTFOUND|EAI_AGAIN|ENETUNREACH|ECONNREFUSED|EHOSTUNREACH|fetch failed/.test(text))
    return 'there is no network, or it does not let it through'
  return /^\s*(?:\w*Error: )?(.{1,200})/.exec(text)?.[1]?.trim() ?? 'it could not be fetched'
}

function sizeOf(folder: string): number {
  let size = 0
  try {
    for (const entry of readdirSync(folder, { withFileTypes: true, recursive: true })) {
      if (entry.isFile()) size += statSync(join(entry.parentPath, entry.name)).size
    }
  } catch {
    // A file that is renamed while it is counted; the next look counts it.
  }
  return size
}

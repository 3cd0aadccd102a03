import { randomBytes } from 'node:crypto'
import { EventEmitter, once } from 'node:events'
import { fileURLToPath } from 'node:url'
import { uploadChunkBytes, type RefusedFile } from '../../shared-kinetics/contract/host-api.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'
import { defaultDataFolder } from '../study/data-folder.ts'
import { createHost, type Host } from './create-host.ts'
import type { TaskPool } from './host-tasks.ts'
import { startLoopbackServer } from './loopback-server.ts'
import { openInBrowser } from './open-in-browser.ts'
import { readRendererFiles } from './renderer-files.ts'
import { createWorkerPool } from './worker-pool.ts'

export interface FileIn {
  readonly fileName: string
  readonly bytes: Uint8Array
}

export interface BrowserShellOptions {
  /** Where the built worker-entry.js and the built renderer lie; only an entry file of the program knows. */
  readonly workerUrl: URL
  readonly rendererUrl: URL
  readonly version: string
  /** Whether to open the system's browser; the address is printed either way. */
  readonly openBrowser: boolean
  /** Exports (or one saved study) to begin with, in a new study. */
  readonly files?: readonly FileIn[]
  /** With files that cannot be used: go on without them. Otherwise they are an error. */
  readonly skipUnusable?: boolean
  /** One line to standard output, and one to standard error. */
  readonly print?: (line: string) => void
  readonly warn?: (line: string) => void
  /** The user's data folder by default; null keeps nothing. */
  readonly dataFolder?: string | null
  /** For tests: other workers than the program's own. */
  readonly pool?: TaskPool
}

export interface BrowserShell {
  /** With this start's key: whoever has it can use the program. */
  readonly address: string
  readonly host: Host
  /** Files that were left out because they cannot be used. */
  readonly refused: readonly RefusedFile[]
  /** Ends the shell: last save, workers, server. */
  close(): Promise<void>
  /** Resolves when the shell has ended, by `close`, SIGINT or SIGTERM. */
  readonly closed: Promise<void>
}

/**
 * The program in an ordinary browser: host and loopback server, the address printed, the browser opened. SIGINT and SIGTERM end
 * it after the last save.
 * @throws KineticsError `not-readable` for files that cannot be used (unless they are to be skipped); nothing is then kept of them
 */
export async function startBrowserShell(options: BrowserShellOptions): Promise<BrowserShell> {
  const print = options.print ?? ((line: string) => void process.stdout.write(`${line}\n`))
  const warn = options.warn ?? ((line: string) => void process.stderr.write(`${line}\n`))
  const files = await readRendererFiles(fileURLToPath(options.rendererUrl))
  const host = createHost({
    dataFolder: options.dataFolder === undefined ? defaultDataFolder() : options.dataFolder,
    pool: options.pool ?? createWorkerPool({ workerUrl: options.workerUrl }),
    version: options.version,
    shell: 'browser',
    warn,
  })
  let refused: readonly RefusedFile[]
  try {
    refused = await openFiles(host, options.files ?? [], options.skipUnusable ?? false)
  } catch (error) {
    await host.close({ save: false })
    throw error
  }
  const server = await startLoopbackServer({ host, files, secret: randomBytes(32).toString('base64url') })

  const ending = new EventEmitter()
  const closed = once(ending, 'closed').then(() => undefined)
  let closing: Promise<void> | null = null
  const close = async (): Promise<void> => {
    closing ??= (async () => {
      for (const signal of signals) process.off(signal, stop)
      await server.close()
      await host.close()
      ending.emit('closed')
    })()
    return closing
  }
  const stop = (): void => {
    close().catch((error: unknown) => {
      warn(error instanceof Error ? error.message : String(error))
      process.exitCode = 1
      ending.emit('closed')
    })
  }
  for (const signal of signals) process.on(signal, stop)

  print(`Rampfold is open at ${server.address}`)
  print('It runs until you press Ctrl+C here. The address works on this machine only.')
  if (options.openBrowser) openInBrowser(server.address)
  return { address: server.address, host, refused, close, closed }
}

const signals = ['SIGINT', 'SIGTERM'] as const

async function openFiles(host: Host, files: readonly FileIn[], skipUnusable: boolean): Promise<readonly RefusedFile[]> {
  if (files.length === 0) return []
  await host.call('study.new', {})
  const uploadIds: string[] = []
  for (const { fileName, bytes } of files) {
    const { uploadId } = await host.call('upload.begin', { fileName, byteLength: bytes.byteLength })
    uploadIds.push(uploadId)
    for (let at = 0; at < bytes.byteLength; at += uploadChunkBytes) {
      await host.call('upload.append', { uploadId, bytes: new Uint8Array(bytes.subarray(at, at + uploadChunkBytes)) })
    }
  }
  const { refused } = await host.call('runs.import', { uploadIds })
  const [first] = refused
  if (first !== undefined && !skipUnusable) {
    const line = first.line === null ? '' : `, line ${first.line}`
    throw new KineticsError('not-readable', `${first.fileName}${line}: ${first.reason} ${first.remedy}`, { ...first })
  }
  return refused
}

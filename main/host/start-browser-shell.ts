import { randomBytes } from 'node:crypto'
import { EventEmitter, once } from 'node:events'
import { fileURLToPath } from 'node:url'
import { KineticsError } from '../../shared-kinetics/errors.ts'
import { defaultDataFolder } from '../study/data-folder.ts'
import { createHost, type Host } from './create-host.ts'
import { endingSignals } from './ending-signals.ts'
import type { TaskPool } from './host-tasks.ts'
import { startLoopbackServer, type LoopbackServer } from './loopback-server.ts'
import { openInBrowser } from './open-in-browser.ts'
import { readRendererFiles } from './renderer-files.ts'
import { uploadToHost, type FileIn } from './upload-to-host.ts'
import { createWorkerPool } from './worker-pool.ts'

export interface BrowserShellOptions {
  /** Where the built worker-entry.js and the built renderer lie; only an entry file of the program knows. */
  readonly workerUrl: URL
  readonly rendererUrl: URL
  readonly version: string
  /** Whether to open the system's browser; the address is printed either way. */
  readonly openBrowser: boolean
  /** Exports (or one saved study) to begin with, in a new study. */
  readonly files?: readonly FileIn[]
  /** One line to standard output, and one to standard error. */
  readonly print?: (line: string) => void
  readonly warn?: (line: string) => void
  /** The user's data folder by default; null keeps nothing. */
  readonly dataFolder?: string | null
  /** For tests: other workers than the program's own, and another browser than the system's. */
  readonly pool?: TaskPool
  readonly browse?: (address: string) => unknown
}

export interface BrowserShell {
  /** With this start's key: whoever has it can use the program. */
  readonly address: string
  readonly host: Host
  /** Ends the shell: last save, workers, server. */
  close(): Promise<void>
  /** Resolves when the shell has ended, by `close` or by a signal. */
  readonly closed: Promise<void>
}

/**
 * The program in an ordinary browser: host and loopback server, the address printed, the browser opened. Signals that ask a
 * program to end, a closed terminal included, end it after the last save.
 * @throws KineticsError `not-readable` for files that cannot be used; nothing is then kept of them
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
  let server: LoopbackServer
  try {
    await openFiles(host, options.files ?? [])
    server = await startLoopbackServer({ host, files, secret: randomBytes(32).toString('base64url') })
  } catch (error) {
    await host.close({ save: false })
    throw error
  }

  const ending = new EventEmitter()
  const closed = once(ending, 'closed').then(() => undefined)
  let closing: Promise<void> | null = null
  const close = async (): Promise<void> => {
    closing ??= (async () => {
      // From here on a second Ctrl+C ends it at once. A closed terminal sends its signal more than once, by the shell and by npm.
      for (const signal of endingSignals) if (signal !== 'SIGHUP') process.off(signal, stop)
      try {
        await server.close()
        await host.close()
      } finally {
        process.off('SIGHUP', stop)
        ending.emit('closed')
      }
    })()
    return closing
  }
  const stop = (signal: NodeJS.Signals): void => {
    // Without a terminal every further word would fail, and that failure end the program before its last save.
    if (signal === 'SIGHUP') for (const stream of [process.stdout, process.stderr]) stream.on('error', () => undefined)
    close().catch((error: unknown) => {
      warn(error instanceof Error ? error.message : String(error))
      process.exitCode = 1
    })
  }
  for (const signal of endingSignals) process.on(signal, stop)

  print(`Rampfold is open at ${server.address}`)
  print('It runs until you press Ctrl+C here. The address works on this machine only.')
  // Every account of this machine can read what a program is started with.
  if (options.openBrowser) await (options.browse ?? openInBrowser)(server.addressForOnce())
  return { address: server.address, host, close, closed }
}

async function openFiles(host: Host, files: readonly FileIn[]): Promise<void> {
  if (files.length === 0) return
  await host.call('study.new', {})
  const { refused } = await host.call('runs.import', { uploadIds: await uploadToHost(host, files) })
  const [first] = refused
  if (first === undefined) return
  const line = first.line === null ? '' : `, line ${first.line}`
  throw new KineticsError('not-readable', `${first.fileName}${line}: ${first.reason} ${first.remedy}`, { ...first })
}

import { spawn, type ChildProcess } from 'node:child_process'
import { existsSync } from 'node:fs'
import { mkdtemp, readdir, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { Server } from 'node:net'
import { join } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { afterAll, afterEach, beforeAll, describe, expect, it, vi } from 'vitest'
import { encodeMessage } from '../../shared-kinetics/contract/wire.ts'
import { decodeAnswer } from '../../shared-kinetics/contract/wire-answer.ts'
import { rejectionOf, sampleTasks, textBytes } from './testing/host-testing.ts'
import { endingSignals } from './ending-signals.ts'
import { createInProcessPool } from './in-process-pool.ts'
import { startBrowserShell, type BrowserShell, type BrowserShellOptions } from './start-browser-shell.ts'

let folder = ''
const shells: BrowserShell[] = []

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'rampfold-shell-'))
  await writeFile(join(folder, 'index.html'), '<html><head></head></html>')
})
afterEach(async () => {
  for (const shell of shells.splice(0)) await shell.close()
})
afterAll(async () => {
  await rm(folder, { recursive: true, force: true })
})

async function start(options: Partial<BrowserShellOptions> = {}): Promise<{ shell: BrowserShell; printed: string[] }> {
  const printed: string[] = []
  const shell = await startBrowserShell({
    workerUrl: new URL('file:///no-worker-is-needed.js'),
    rendererUrl: pathToFileURL(`${folder}/`),
    version: '1.2.3',
    openBrowser: false,
    print: (line) => printed.push(line),
    warn: (line) => printed.push(line),
    dataFolder: null,
    pool: createInProcessPool(sampleTasks()),
    ...options,
  })
  shells.push(shell)
  return { shell, printed }
}

const visit = async (to: string): Promise<number> => (await fetch(to, { redirect: 'manual' })).status

describe('the browser shell', () => {
  it('prints an address that works, with another key at each start', async () => {
    const [one, two] = [await start(), await start()]
    expect(one.printed[0]).toBe(`Rampfold is open at ${one.shell.address}`)
    expect(one.shell.address).toMatch(/^http:\/\/127\.0\.0\.1:\d+\/\?key=[\w-]{43}$/)
    expect(new URL(one.shell.address).searchParams.get('key')).not.toBe(new URL(two.shell.address).searchParams.get('key'))
    expect((await fetch(one.shell.address, { redirect: 'manual' })).status).toBe(303)
  })

  it('begins with files in a new study', async () => {
    const files = [
      { fileName: 'b.csv', bytes: textBytes('rate 10') },
      { fileName: 'a.csv', bytes: textBytes('rate 2') },
    ]
    const { shell } = await start({ files })
    const { document } = await shell.host.call('study.read', {})
    expect(document.runs.map((run) => run.label)).toEqual(['a', 'b'])
  })

  it('refuses to begin with a file that cannot be used, says which and why, and keeps nothing of it', async () => {
    const dataFolder = join(folder, 'data')
    const files = [
      { fileName: 'a.csv', bytes: textBytes('rate 2') },
      { fileName: 'bad.csv', bytes: textBytes('x') },
    ]
    const error = await rejectionOf(start({ files, dataFolder }))
    expect(error).toMatchObject({ name: 'KineticsError', code: 'not-readable', message: 'bad.csv, line 1: There is no rate. Write one.' })
    expect(await readdir(join(dataFolder, 'studies'))).toEqual([])
  })

  it('that cannot listen closes its host', async () => {
    const pool = createInProcessPool(sampleTasks())
    const closed = vi.spyOn(pool, 'close')
    const listen = vi.spyOn(Server.prototype, 'listen').mockImplementation(function (this: Server) {
      setImmediate(() => this.emit('error', new Error('no port is free')))
      return this
    })
    await expect(start({ pool })).rejects.toThrow(/no port is free/)
    listen.mockRestore()
    expect(closed).toHaveBeenCalledOnce()
  })

  it('hands the browser another key than the printed one, good for one visit', async () => {
    const opened: string[] = []
    const { shell } = await start({ openBrowser: true, browse: (address) => opened.push(address) })
    expect(opened).toEqual([expect.stringMatching(/^http:\/\/127\.0\.0\.1:\d+\/\?key=[\w-]{43}$/)])
    const [address = ''] = opened
    expect(address).not.toBe(shell.address)
    expect([await visit(address), await visit(address)]).toEqual([303, 403])
    expect([await visit(shell.address), await visit(shell.address)]).toEqual([303, 303])
  })

  it.each(endingSignals)('ends with %s after the last save, and gives its study back', async (signal) => {
    const dataFolder = await mkdtemp(join(folder, 'kept-'))
    const { shell } = await start({ dataFolder, files: [{ fileName: 'a.csv', bytes: textBytes('rate 2') }] })
    expect(process.emit(signal, signal)).toBe(true)
    await shell.closed
    const kept = await readdir(dataFolder, { recursive: true })
    expect(kept.filter((path) => path.endsWith('/study.json'))).toHaveLength(1)
    expect(kept.filter((path) => path.endsWith('lock.json'))).toEqual([])
  })

  it('is not ended by a second word of a closed terminal while it saves', async () => {
    const { shell } = await start()
    process.emit('SIGHUP', 'SIGHUP')
    expect(process.emit('SIGHUP', 'SIGHUP')).toBe(true)
    await shell.closed
    expect(process.listenerCount('SIGHUP')).toBe(0)
  })

  it('ends once, when closed: the address answers no more', async () => {
    const { shell } = await start()
    await Promise.all([shell.close(), shell.close()])
    await shell.closed
    await expect(fetch(shell.address)).rejects.toThrow(TypeError)
    expect(process.listenerCount('SIGTERM')).toBe(0)
  })

  it('closes while a page listens', async () => {
    const { shell } = await start()
    const cookie = (await fetch(shell.address, { redirect: 'manual' })).headers.get('set-cookie')?.split(';')[0] ?? ''
    const stream = await fetch(new URL('/events', shell.address), { headers: { cookie } })
    expect(stream.status).toBe(200)
    await shell.close()
    // Whether the stream ends or breaks is up to the socket; that it does not go on is what counts.
    expect(await stream.text().catch(() => 'ended')).toMatch(/^data: |ended/m)
  })
})

const startScript = fileURLToPath(new URL('../../out/main/start.js', import.meta.url))

async function ask(address: string, name: string, input: unknown): Promise<unknown> {
  const { origin } = new URL(address)
  const cookie = (await fetch(address, { redirect: 'manual' })).headers.get('set-cookie')?.split(';')[0] ?? ''
  const answer = await fetch(`${origin}/request/${name}`, {
    method: 'POST',
    headers: { cookie, origin },
    body: new Uint8Array(encodeMessage(input)),
  })
  return decodeAnswer(new Uint8Array(await answer.arrayBuffer()))
}

describe('the built npm start', () => {
  beforeAll(() => {
    const page = fileURLToPath(new URL('../../out/renderer/index.html', import.meta.url))
    expect(existsSync(startScript) && existsSync(page), 'run npm run build').toBe(true)
  })
  const children: ChildProcess[] = []
  afterEach(() => {
    for (const child of children.splice(0)) child.kill('SIGKILL')
  })

  /** Starts it with no display and waits for its address. */
  async function run(
    words: readonly string[],
    dataFolder: string,
  ): Promise<{ address: string; end(signal: NodeJS.Signals): Promise<number | null>; said(): string }> {
    const { DISPLAY: _display, WAYLAND_DISPLAY: _wayland, ...env } = process.env
    const child = spawn(process.execPath, [startScript, ...words], { env: { ...env, RAMPFOLD_DATA: dataFolder } })
    children.push(child)
    let said = ''
    child.stdout.on('data', (text: Buffer) => (said += text.toString()))
    child.stderr.on('data', (text: Buffer) => (said += text.toString()))
    const exited = new Promise<number | null>((resolve) => child.on('exit', resolve))
    await expect.poll(() => said, { timeout: 20_000 }).toMatch(/is open at \S+\n/)
    return {
      address: /is open at (\S+)/.exec(said)?.[1] ?? '',
      end: async (signal) => {
        child.kill(signal)
        return exited
      },
      said: () => said,
    }
  }
  it.skipIf(process.platform === 'win32')(
    'serves without a display, says so in one line, and on a signal saves and ends with 0',
    async () => {
      const dataFolder = join(folder, 'kept')
      const first = await run([], dataFolder)
      expect(first.said()).toMatch(/^The desktop window cannot be opened: [^\n]+\nRampfold is open at/)
      const demo = (await ask(first.address, 'study.open-demo', {})) as { revision: number; document: { id: string; runs: unknown[] } }
      expect(demo.document.runs).toHaveLength(5)
      const { result } = (await ask(first.address, 'study.evaluate', { revision: demo.revision })) as {
        result: { levels: number[]; profiles: unknown[] }
      }
      expect(result.profiles.length).toBeGreaterThan(0)
      expect(await first.end('SIGHUP')).toBe(0)
      const second = await run(['--browser'], dataFolder)
      expect(second.said()).toMatch(/^Rampfold is open at/)
      expect(await ask(second.address, 'study.read', {})).toMatchObject({ document: demo.document })
      expect(await second.end('SIGTERM')).toBe(0)
    },
  )

  it('exits with 2 for a word it does not know', async () => {
    const child = spawn(process.execPath, [startScript, '--brwoser'])
    let said = ''
    child.stderr.on('data', (text: Buffer) => (said += text.toString()))
    expect(await new Promise((resolve) => child.on('exit', resolve))).toBe(2)
    expect(said).toMatch(/^--brwoser is not a word/)
  })
})

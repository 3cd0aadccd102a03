import { chmod, mkdir, mkdtemp, readdir, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { fetchElectronBinary, findElectronBinary } from './electron-binary.ts'
import { commandFor } from './open-in-browser.ts'
import { runElectron, type DesktopEnd } from './run-electron.ts'
import { startProgram, type StartSteps } from './start-program.ts'

const onDesk = { platform: 'linux', env: { DISPLAY: ':0' }, userId: 1000 }

/** Steps that write down what was done; `binary` null is missing, `fetched` is what fetching ends with. */
function steps(options: Partial<StartSteps> & { binary?: string | null; fetched?: string | null; end?: DesktopEnd } = {}) {
  const done: string[] = []
  const said: string[] = []
  let binary = options.binary === undefined ? '/electron' : options.binary
  const made: StartSteps = {
    question: onDesk,
    version: '1.2.3',
    print: (line) => said.push(`out: ${line}`),
    warn: (line) => said.push(`err: ${line}`),
    findBinary: () => binary,
    fetchBinary: async () => {
      done.push('fetch')
      if (options.fetched === undefined || options.fetched === null) binary = '/fetched'
      return Promise.resolve(options.fetched ?? null)
    },
    runDesktop: async (path) => {
      done.push(`desktop ${path}`)
      return Promise.resolve(options.end ?? { kind: 'ended', exitCode: 0 })
    },
    runBrowser: async ({ openBrowser }) => {
      done.push(openBrowser ? 'browser opened' : 'browser shell, address only')
      return Promise.resolve()
    },
    ...options,
  }
  return { made, done, said }
}

describe('npm start', () => {
  it('opens the desktop window where Electron is there, and says nothing', async () => {
    const { made, done, said } = steps()
    expect(await startProgram([], made)).toBe(0)
    expect([done, said]).toEqual([['desktop /electron'], []])
  })

  it('fetches Electron once where it is missing', async () => {
    const { made, done, said } = steps({ binary: null })
    expect(await startProgram([], made)).toBe(0)
    expect([done, said]).toEqual([['fetch', 'desktop /fetched'], []])
  })

  it.each([
    ['as root', { question: { ...onDesk, userId: 0 } }, ['browser opened'], /does not run as root/],
    ['without a display', { question: { ...onDesk, env: {} } }, ['browser shell, address only'], /there is no display/],
    [
      'when fetching fails',
      { binary: null, fetched: 'there is no network.' },
      ['fetch', 'browser opened'],
      /could not be fetched \(there is no network\)/,
    ],
    [
      'when the window does not start',
      { end: { kind: 'not-started', reason: 'libnss3.so is missing' } as const },
      ['desktop /electron', 'browser opened'],
      /libnss3\.so is missing/,
    ],
  ])('goes to the browser %s, and one line says so', async (_when, options, expected, line) => {
    const { made, done, said } = steps(options)
    expect(await startProgram([], made)).toBe(0)
    expect(done).toEqual(expected)
    expect(said).toHaveLength(1)
    expect(said[0]).toMatch(line)
    // Where there is no display nothing can be opened but by the person who reads the address.
    const next = expected.includes('browser opened') ? 'The sheet opens in a browser instead' : 'Open the address below in a browser'
    expect(said[0]).toMatch(new RegExp(`^err: The desktop window cannot be opened: .*\\. ${next}\\.$`))
  })

  it('goes to the browser straight when told to', async () => {
    const { made, done, said } = steps({ binary: null })
    expect(await startProgram(['--browser'], made)).toBe(0)
    expect([done, said]).toEqual([['browser opened'], []])
  })

  it('passes on how the window ended', async () => {
    expect(await startProgram([], steps({ end: { kind: 'ended', exitCode: 7 } }).made)).toBe(7)
  })

  it('does not know other words, and exits with 2', async () => {
    for (const word of ['--brwoser', 'open', 'a.csv', '-x']) {
      const { made, done, said } = steps()
      expect(await startProgram([word], made)).toBe(2)
      expect(done).toEqual([])
      expect(said[0]).toContain(`err: ${word} is not a word`)
    }
  })

  it('tells help and version and does no more', async () => {
    const { made, done, said } = steps()
    expect(await startProgram(['--help'], made)).toBe(0)
    expect(await startProgram(['--version'], made)).toBe(0)
    expect(done).toEqual([])
    expect(said).toEqual([expect.stringContaining('--browser'), 'out: 1.2.3'])
  })
})

describe('the browser of the system', () => {
  it('is opened without a shell in between', () => {
    const address = 'http://127.0.0.1:1/?key=a&b'
    expect(commandFor('linux', address)).toEqual(['xdg-open', [address]])
    expect(commandFor('darwin', address)).toEqual(['open', [address]])
    expect(commandFor('win32', address)).toEqual(['rundll32.exe', ['url.dll,FileProtocolHandler', address]])
  })
})

describe('Electron’s binary', () => {
  let folder = ''
  beforeEach(async () => {
    folder = await mkdtemp(join(tmpdir(), 'rampfold-electron-test-'))
  })
  afterEach(async () => {
    await rm(folder, { recursive: true, force: true })
  })
  const installScript = async (text: string): Promise<void> => writeFile(join(folder, 'install.js'), text)
  /** Writes what the real script leaves behind. */
  const arrives =
    "fs.mkdirSync(__dirname + '/dist', { recursive: true }); fs.writeFileSync(__dirname + '/dist/electron', ''); fs.writeFileSync(__dirname + '/path.txt', 'electron')"

  it('is there only when both its name and the file are', async () => {
    expect(findElectronBinary(join(folder, 'none'))).toBeNull()
    expect(findElectronBinary(folder)).toBeNull()
    await writeFile(join(folder, 'path.txt'), 'electron')
    expect(findElectronBinary(folder)).toBeNull()
    await mkdir(join(folder, 'dist'))
    await writeFile(join(folder, 'dist/electron'), '')
    expect(findElectronBinary(folder)).toBe(join(folder, 'dist/electron'))
    await writeFile(join(folder, 'path.txt'), '')
    expect(findElectronBinary(folder)).toBeNull()
  })

  it('is fetched by the package’s own script, with what has arrived told on the way', async () => {
    await installScript(`const fs = require('fs'); const os = require('os')
      fs.writeFileSync(os.tmpdir() + '/part', Buffer.alloc(3 * 2 ** 20)); setTimeout(() => { ${arrives} }, 700)`)
    const told: number[] = []
    expect(await fetchElectronBinary({ packageFolder: folder, progress: (mebibytes) => told.push(mebibytes) })).toBeNull()
    expect(told).toContain(3)
    expect(findElectronBinary(folder)).not.toBeNull()
  })

  it('is given up when the script fails, with the reason in a word', async () => {
    await installScript("console.error('Error: getaddrinfo ENOTFOUND github.com\\n  at x'); process.exit(1)")
    expect(await fetchElectronBinary({ packageFolder: folder, progress: () => undefined })).toMatch(/^there is no network/)
    await installScript("console.error('HTTPError: Response code 404 (Not Found) for x\\n    at y'); process.exit(1)")
    expect(await fetchElectronBinary({ packageFolder: folder, progress: () => undefined })).toBe('Response code 404 (Not Found) for x')
    expect(await fetchElectronBinary({ packageFolder: join(folder, 'none'), progress: () => undefined })).toMatch(/not installed/)
    await installScript('')
    expect(await fetchElectronBinary({ packageFolder: folder, progress: () => undefined })).toMatch(/not in its place/)
  })

  it('is given up when nothing more arrives, and the fetching is ended', async () => {
    await installScript(`require('fs').writeFileSync(__dirname + '/pid', String(process.pid)); setInterval(() => undefined, 1000)`)
    expect(await fetchElectronBinary({ packageFolder: folder, progress: () => undefined, patience_ms: 600 })).toMatch(
      /nothing arrived for 1 s/,
    )
    expect((await readdir(tmpdir())).filter((name) => name.startsWith('rampfold-electron-') && !name.includes('test'))).toEqual([])
  })

  it.skipIf(process.platform === 'win32')('that cannot start is told by its last line; one that runs by its exit code', async () => {
    const binary = join(folder, 'electron')
    const script = async (text: string): Promise<void> => {
      await writeFile(binary, `#!/bin/sh\n${text}\n`)
      await chmod(binary, 0o755)
    }
    await script('echo noise >&2; echo "error while loading shared libraries: libnss3.so" >&2; exit 127')
    expect(await runElectron(binary, folder)).toEqual({ kind: 'not-started', reason: 'error while loading shared libraries: libnss3.so' })
    await script('kill -SEGV $$')
    expect(await runElectron(binary, folder)).toMatchObject({ kind: 'not-started', reason: 'it ended with SIGSEGV' })
    await script('exit 0')
    expect(await runElectron(binary, folder)).toEqual({ kind: 'ended', exitCode: 0 })
    expect(await runElectron(join(folder, 'none'), folder)).toMatchObject({ kind: 'not-started' })
  })

  it.skipIf(process.platform === 'win32')('is told of a terminal that is closed, and ends in its own way', async () => {
    const binary = join(folder, 'electron')
    await writeFile(binary, `#!/bin/sh\ntrap 'exit 5' HUP\ntouch "$1/up"\nwhile true; do sleep 0.05; done\n`)
    await chmod(binary, 0o755)
    const running = runElectron(binary, folder)
    await expect.poll(async () => readdir(folder)).toContain('up')
    expect(process.emit('SIGHUP', 'SIGHUP')).toBe(true)
    expect(await running).toMatchObject({ kind: 'not-started', reason: 'it ended with 5' })
    expect(process.listenerCount('SIGHUP')).toBe(0)
  })
})

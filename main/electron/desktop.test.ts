import { mkdtemp, mkdir, readdir, rm, writeFile } from 'node:fs/promises'
import { existsSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import type { MenuItemConstructorOptions } from 'electron'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest'
import { channels } from '../../shared-kinetics/contract/host-api.ts'
import { decodeAnswer } from '../../shared-kinetics/contract/wire-answer.ts'
import { encodeMessage } from '../../shared-kinetics/contract/wire.ts'
import { contentSecurityPolicy } from '../host/renderer-files.ts'
import { fakeElectron, fakeEvent, FakeWebContents, Menu as FakeMenu } from './testing/fake-electron.ts'
import { largestRequestBytes } from './ipc.ts'
import { menuTemplate } from './menu.ts'
import { startDesktop } from './start-desktop.ts'

let folder = ''
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'rampfold-desktop-'))
  await mkdir(join(folder, 'renderer'))
  await writeFile(join(folder, 'renderer/index.html'), '<html><head></head></html>')
  await writeFile(join(folder, 'secret.html'), 'secret')
})
afterAll(async () => {
  await rm(folder, { recursive: true, force: true })
})
beforeEach(() => {
  vi.stubEnv('RAMPFOLD_DATA', join(folder, 'data'))
})
afterEach(async () => {
  await quit()
  fakeElectron.reset()
  vi.unstubAllEnvs()
})

const start = async (): Promise<void> =>
  startDesktop({
    workerUrl: pathToFileURL(join(folder, 'no-worker-is-needed.js')),
    rendererFolder: join(folder, 'renderer'),
    preloadPath: '/app/preload.cjs',
  })
async function quit(): Promise<void> {
  if (!fakeElectron.app.isReady) return
  fakeElectron.app.quit()
  await expect.poll(() => fakeElectron.app.hasQuit).toBe(true)
}
const theWindow = () => {
  const [window, ...others] = fakeElectron.windows()
  if (window === undefined || others.length > 0) throw new Error('There is not one window.')
  return window
}
const theFrame = () => ({ sender: theWindow().webContents, senderFrame: theWindow().webContents.mainFrame })
const knock = async (from: Parameters<typeof fakeElectron.invokeFrom>[0], ...words: unknown[]): Promise<unknown> =>
  decodeAnswer((await fakeElectron.invokeFrom(from, channels.request, ...words)) as Uint8Array)

describe('the window', () => {
  it('is sandboxed, isolated and without Node, and shows the program’s own page', async () => {
    await start()
    const { options, webContents } = theWindow()
    expect(options.webPreferences).toEqual({
      preload: '/app/preload.cjs',
      contextIsolation: true,
      sandbox: true,
      nodeIntegration: false,
      nodeIntegrationInWorker: false,
      nodeIntegrationInSubFrames: false,
      webSecurity: true,
      allowRunningInsecureContent: false,
      experimentalFeatures: false,
      webviewTag: false,
      navigateOnDragDrop: false,
      spellcheck: false,
    })
    expect(webContents.mainFrame.url).toBe('app://rampfold/index.html')
    await expect.poll(() => theWindow().shown).toBe(true)
  })

  it('goes nowhere else, opens no other, embeds nothing', async () => {
    await start()
    const { webContents } = theWindow()
    for (const name of ['will-navigate', 'will-redirect', 'will-frame-navigate']) {
      for (const url of [
        'https://example.org/',
        'file:///etc/passwd',
        'app://other/',
        'app://rampfold.example/',
        'javascript:alert(1)',
        'app://user@rampfold/',
        '',
      ]) {
        const event = fakeEvent(url)
        webContents.emit(name, event)
        expect([name, url, event.defaultPrevented]).toEqual([name, url, true])
      }
      const home = fakeEvent('app://rampfold/index.html')
      webContents.emit(name, home)
      expect(home.defaultPrevented).toBe(false)
    }
    expect(webContents.openHandler?.({ url: 'https://example.org/' })).toEqual({ action: 'deny' })
    const attach = fakeEvent()
    webContents.emit('will-attach-webview', attach)
    expect(attach.defaultPrevented).toBe(true)
  })

  it('is denied every permission but to write the clipboard', async () => {
    await start()
    const { requestHandler, checkHandler, deviceHandler } = fakeElectron.session
    const granted = (permission: string, url: string): unknown => {
      const decided: boolean[] = []
      requestHandler?.({}, permission, (ok) => decided.push(ok), { requestingUrl: url })
      expect(checkHandler?.({}, permission, url)).toBe(decided[0])
      return decided[0]
    }
    for (const permission of ['media', 'geolocation', 'notifications', 'clipboard-read', 'openExternal', 'fileSystem', 'hid']) {
      expect(granted(permission, 'app://rampfold/')).toBe(false)
    }
    expect(granted('clipboard-sanitized-write', 'app://rampfold/')).toBe(true)
    expect(granted('clipboard-sanitized-write', 'https://example.org/')).toBe(false)
    expect(deviceHandler?.()).toBe(false)
  })

  it('comes to the front when the program is started a second time', async () => {
    await start()
    theWindow().minimized = true
    fakeElectron.app.emit('second-instance', fakeEvent())
    expect(theWindow()).toMatchObject({ focused: 1, minimized: false })
  })

  it('is not opened by the second start itself', async () => {
    fakeElectron.app.isFirst = false
    await start()
    expect(fakeElectron.windows()).toEqual([])
    expect(fakeElectron.ipcMain.handlers.size).toBe(0)
    expect(fakeElectron.app.hasQuit).toBe(true)
  })

  it('closes the program when it closes, after the last save', async () => {
    await start()
    const renamed = { revision: 1, change: { kind: 'rename-study', name: 'Calcite' } }
    expect(await knock(theFrame(), 'study.change', encodeMessage(renamed))).toMatchObject({ revision: 2 })
    theWindow().close()
    expect(fakeElectron.app.hasQuit).toBe(process.platform === 'darwin')
    await quit()
    expect(await readdir(join(folder, 'data/studies'))).toHaveLength(1)
    expect(fakeElectron.ipcMain.handlers.size).toBe(0)
  })
})

describe('the gate', () => {
  const body = encodeMessage({})

  it('answers the main frame of its own window', async () => {
    await start()
    expect(await knock(theFrame(), 'program.describe', body)).toEqual({ name: 'rampfold', version: '0.0.0-fake', shell: 'desktop' })
    expect(fakeElectron.ipcMain.handlers.size).toBe(1)
  })

  it('refuses frames inside the page, frames that are gone, other pages, and pages that are no window of ours', async () => {
    await start()
    const { webContents } = theWindow()
    const stranger = new FakeWebContents()
    stranger.mainFrame.url = 'app://rampfold/index.html'
    const refused = { code: 'bad-request', message: "Only the program's own pages may ask it." }
    for (const from of [
      { sender: webContents, senderFrame: { url: 'app://rampfold/index.html' } },
      { sender: webContents, senderFrame: null },
      { sender: stranger, senderFrame: stranger.mainFrame },
    ]) {
      await expect(knock(from, 'study.read', body)).rejects.toMatchObject(refused)
    }
    for (const url of ['https://rampfold/', 'app://other/', 'file:///x', 'about:blank', 'app://rampfold@evil/', '']) {
      webContents.mainFrame.url = url
      await expect(knock(theFrame(), 'study.read', body)).rejects.toMatchObject(refused)
    }
  })

  it('refuses whatever is not a name and bytes', async () => {
    await start()
    for (const words of [
      [],
      ['study.read'],
      [7, body],
      ['study.read', {}],
      ['study.read', 'x'],
      ['study.read', body, 1],
      ['study.read', new Float64Array(2)],
      ['study.read', body.buffer],
      [null, null],
    ]) {
      await expect(knock(theFrame(), ...words)).rejects.toMatchObject({ code: 'bad-request' })
    }
    await expect(knock(theFrame(), 'study.read', new Uint8Array(largestRequestBytes + 1))).rejects.toMatchObject({ code: 'too-large' })
    await expect(knock(theFrame(), 'study.read', new Uint8Array(3))).rejects.toMatchObject({ code: 'bad-request' })
  })
})

async function ask(url: string, method = 'GET'): Promise<Response> {
  const handler = fakeElectron.protocol.handlers.get('app')
  if (handler === undefined) throw new Error('The scheme is not served.')
  return handler(new Request(url, { method }))
}

describe('the app scheme', () => {
  it('is registered as a secure standard scheme with no way around the Content-Security-Policy', async () => {
    await start()
    expect(fakeElectron.protocol.privileged).toEqual([
      { scheme: 'app', privileges: { standard: true, secure: true, supportFetchAPI: true } },
    ])
  })

  it('serves the built pages under the same policy as the loopback server, and nothing else', async () => {
    await start()
    const page = await ask('app://rampfold/index.html')
    expect(page.status).toBe(200)
    const nonce = /content="([^"]+)"/.exec(await page.text())?.[1]
    expect(page.headers.get('content-security-policy')).toBe(contentSecurityPolicy(nonce))
    expect(page.headers.get('x-content-type-options')).toBe('nosniff')
    for (const path of ['../secret.html', '%2e%2e/secret.html', '..%2fsecret.html', 'renderer', 'etc/passwd', '%00', '..\\secret.html']) {
      const answer = await ask(`app://rampfold/${path}`)
      expect([path, answer.status]).toEqual([path, 404])
      expect(await answer.text()).not.toContain('secret')
    }
    expect((await ask('app://other/index.html')).status).toBe(403)
    expect((await ask('app://rampfold/index.html', 'POST')).status).toBe(405)
  })
})

describe('the menu', () => {
  it('leaves undo, redo, reload and the developer tools out, which would get in the way of the sheet', async () => {
    await start()
    expect(FakeMenu.template).not.toBeNull()
    for (const platform of ['linux', 'win32', 'darwin']) {
      const roles = menuTemplate(platform).flatMap((menu) =>
        [menu, ...((menu.submenu ?? []) as MenuItemConstructorOptions[])].map((item) => item.role),
      )
      expect(roles).toContain('copy')
      for (const role of ['undo', 'redo', 'reload', 'forceReload', 'toggleDevTools', 'viewMenu', 'editMenu'] as const)
        expect(roles).not.toContain(role)
    }
  })
})

const built = fileURLToPath(new URL('../../out/main/app.js', import.meta.url))
const builtPage = fileURLToPath(new URL('../../out/renderer/index.html', import.meta.url))

describe('the built main bundle', () => {
  it('starts, opens its window, and works a study out in its worker', async () => {
    expect(existsSync(built) && existsSync(builtPage), 'run npm run build').toBe(true)
    await import(/* @vite-ignore */ built)
    await expect.poll(() => fakeElectron.ipcMain.handlers.size, { timeout: 10_000 }).toBe(1)
    const { webPreferences } = theWindow().options
    expect(webPreferences).toMatchObject({ contextIsolation: true, sandbox: true, nodeIntegration: false, webSecurity: true })
    expect(existsSync(String(webPreferences?.['preload']))).toBe(true)
    const demo = (await knock(theFrame(), 'study.open-demo', encodeMessage({}))) as { revision: number; document: { runs: unknown[] } }
    expect(demo.document.runs).toHaveLength(5)
    const answer = (await knock(theFrame(), 'study.evaluate', encodeMessage({ revision: demo.revision }))) as {
      result: { profiles: unknown[] }
    }
    expect(answer.result.profiles.length).toBeGreaterThan(0)
    const page = await fakeElectron.protocol.handlers.get('app')?.(new Request('app://rampfold/index.html'))
    expect(page?.status).toBe(200)
    await expect(knock({ sender: new FakeWebContents(), senderFrame: null }, 'study.read', encodeMessage({}))).rejects.toMatchObject({
      code: 'bad-request',
    })
  })
})

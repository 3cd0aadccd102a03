import type { DesktopBridge } from '../../../shared-kinetics/contract/host-api.ts'

/*
 * Stands in for Electron's binary in tests: the parts of its API that this program uses, with the behaviour that the program
 * relies on (values cross as structured clones, handlers are one a channel, a prevented quit does not quit). `fakeElectron` is
 * the test's own handle; everything else has the name and shape of the real thing.
 */

type Listener = (...words: unknown[]) => void

class Emitter {
  readonly #listeners = new Map<string, Listener[]>()

  on(name: string, listener: Listener): this {
    this.#listeners.set(name, [...(this.#listeners.get(name) ?? []), listener])
    return this
  }

  once(name: string, listener: Listener): this {
    const first: Listener = (...words) => {
      this.off(name, first)
      listener(...words)
    }
    return this.on(name, first)
  }

  off(name: string, listener: Listener): this {
    this.#listeners.set(
      name,
      (this.#listeners.get(name) ?? []).filter((held) => held !== listener),
    )
    return this
  }

  emit(name: string, ...words: unknown[]): boolean {
    const listeners = this.#listeners.get(name) ?? []
    for (const listener of listeners) listener(...words)
    return listeners.length > 0
  }

  removeAllListeners(): this {
    this.#listeners.clear()
    return this
  }
}

/** An event whose default can be prevented, with what it carries. */
export interface FakeEvent {
  readonly url: string
  defaultPrevented: boolean
  preventDefault(): void
}

export function fakeEvent(url = ''): FakeEvent {
  const event: FakeEvent = {
    url,
    defaultPrevented: false,
    preventDefault: () => {
      event.defaultPrevented = true
    },
  }
  return event
}

export interface FakeFrame {
  url: string
}

export class FakeWebContents extends Emitter {
  readonly mainFrame: FakeFrame = { url: 'about:blank' }
  openHandler: ((details: { readonly url: string }) => { readonly action: string }) | null = null
  /** What a page's preload hears. */
  readonly toPage = new Emitter()

  setWindowOpenHandler(handler: (details: { readonly url: string }) => { readonly action: string }): void {
    this.openHandler = handler
  }

  send(channel: string, ...words: unknown[]): void {
    const copies = words.map((word) => structuredClone(word))
    this.toPage.emit(channel, {}, ...copies)
  }
}

type WindowOptions = Readonly<Record<string, unknown>> & { readonly webPreferences?: Readonly<Record<string, unknown>> }

class FakeBrowserWindow extends Emitter {
  static #open: FakeBrowserWindow[] = []

  static getAllWindows(): FakeBrowserWindow[] {
    return [...FakeBrowserWindow.#open]
  }

  static closeAll(): void {
    FakeBrowserWindow.#open = []
  }

  readonly options: WindowOptions
  readonly webContents = new FakeWebContents()
  shown = false
  focused = 0
  minimized = false

  constructor(options: WindowOptions = {}) {
    super()
    this.options = options
    FakeBrowserWindow.#open.push(this)
    app.emit('web-contents-created', fakeEvent(), this.webContents)
  }

  async loadURL(url: string): Promise<void> {
    this.webContents.mainFrame.url = url
    await Promise.resolve()
    this.emit('ready-to-show')
  }

  show(): void {
    this.shown = true
  }

  focus(): void {
    this.focused += 1
  }

  isMinimized(): boolean {
    return this.minimized
  }

  restore(): void {
    this.minimized = false
  }

  isDestroyed(): boolean {
    return !FakeBrowserWindow.#open.includes(this)
  }

  close(): void {
    FakeBrowserWindow.#open = FakeBrowserWindow.#open.filter((window) => window !== this)
    this.emit('closed')
    if (FakeBrowserWindow.#open.length === 0) app.emit('window-all-closed')
  }
}

class FakeApp extends Emitter {
  isFirst = true
  isReady = false
  hasQuit = false
  exitCode: number | null = null

  requestSingleInstanceLock(): boolean {
    return this.isFirst
  }

  async whenReady(): Promise<void> {
    await Promise.resolve()
    this.isReady = true
  }

  getVersion(): string {
    return '0.0.0-fake'
  }

  quit(): void {
    if (this.hasQuit) return
    FakeBrowserWindow.closeAll()
    const event = fakeEvent()
    this.emit('will-quit', event)
    if (event.defaultPrevented) return
    this.hasQuit = true
    this.emit('quit')
  }

  exit(code = 0): void {
    this.exitCode = code
    this.hasQuit = true
  }
}

type InvokeHandler = (event: unknown, ...words: unknown[]) => unknown

class FakeIpcMain {
  readonly handlers = new Map<string, InvokeHandler>()

  handle(channel: string, handler: InvokeHandler): void {
    if (this.handlers.has(channel)) throw new Error(`Attempted to register a second handler for '${channel}'`)
    this.handlers.set(channel, handler)
  }

  removeHandler(channel: string): void {
    this.handlers.delete(channel)
  }
}

class FakeIpcRenderer {
  async invoke(channel: string, ...words: unknown[]): Promise<unknown> {
    const sender = fakeElectron.pageOfPreload()
    return fakeElectron.invokeFrom({ sender, senderFrame: sender.mainFrame }, channel, ...words)
  }

  on(channel: string, listener: Listener): this {
    fakeElectron.pageOfPreload().toPage.on(channel, listener)
    return this
  }

  off(channel: string, listener: Listener): this {
    fakeElectron.pageOfPreload().toPage.off(channel, listener)
    return this
  }
}

class FakeSession {
  requestHandler:
    | ((contents: unknown, permission: string, decide: (ok: boolean) => void, details: { requestingUrl: string }) => void)
    | null = null
  checkHandler: ((contents: unknown, permission: string, origin: string) => boolean) | null = null
  deviceHandler: (() => boolean) | null = null

  setPermissionRequestHandler(handler: FakeSession['requestHandler']): void {
    this.requestHandler = handler
  }

  setPermissionCheckHandler(handler: FakeSession['checkHandler']): void {
    this.checkHandler = handler
  }

  setDevicePermissionHandler(handler: FakeSession['deviceHandler']): void {
    this.deviceHandler = handler
  }
}

class FakeProtocol {
  readonly privileged: { readonly scheme: string; readonly privileges: Readonly<Record<string, boolean>> }[] = []
  readonly handlers = new Map<string, (request: Request) => Response | Promise<Response>>()

  registerSchemesAsPrivileged(schemes: FakeProtocol['privileged']): void {
    if (app.isReady) throw new Error('protocol.registerSchemesAsPrivileged should be called before app is ready')
    this.privileged.push(...schemes)
  }

  handle(scheme: string, handler: (request: Request) => Response | Promise<Response>): void {
    if (!app.isReady) throw new Error('protocol.handle needs a session, which there is only after app is ready')
    this.handlers.set(scheme, handler)
  }
}

export const app = new FakeApp()
export const BrowserWindow = FakeBrowserWindow
export const ipcMain = new FakeIpcMain()
export const ipcRenderer = new FakeIpcRenderer()
export const protocol = new FakeProtocol()
export const session = { defaultSession: new FakeSession() }
export const shell = {}

export const Menu = {
  template: null as unknown,
  buildFromTemplate: (template: unknown): unknown => ({ template }),
  setApplicationMenu: (menu: unknown): void => {
    Menu.template = menu
  },
}

export const contextBridge = {
  exposed: new Map<string, unknown>(),
  exposeInMainWorld: (key: string, value: unknown): void => {
    contextBridge.exposed.set(key, value)
  },
}

/** The test's handle on the fake. */
export const fakeElectron = {
  app,
  ipcMain,
  protocol,
  session: session.defaultSession,
  windows: () => FakeBrowserWindow.getAllWindows(),
  exposed: (key: string) => contextBridge.exposed.get(key) as DesktopBridge,
  /** The page whose preload is speaking: the first window's. */
  pageOfPreload: (): FakeWebContents => {
    const [window] = FakeBrowserWindow.getAllWindows()
    if (window === undefined) throw new Error('There is no window, and so no page.')
    return window.webContents
  },
  /** Knocks at the main process as any frame of any page; values cross as structured clones, as they do in Electron. */
  invokeFrom: async (
    from: { readonly sender: FakeWebContents; readonly senderFrame: FakeFrame | null },
    channel: string,
    ...words: unknown[]
  ): Promise<unknown> => {
    const handler = ipcMain.handlers.get(channel)
    if (handler === undefined) throw new Error(`No handler registered for '${channel}'`)
    const copies = words.map((word) => structuredClone(word))
    return structuredClone(await handler(from, ...copies))
  },
  reset: (): void => {
    app.removeAllListeners()
    Object.assign(app, { isFirst: true, isReady: false, hasQuit: false, exitCode: null })
    FakeBrowserWindow.closeAll()
    ipcMain.handlers.clear()
    protocol.privileged.length = 0
    protocol.handlers.clear()
    contextBridge.exposed.clear()
    Menu.template = null
    Object.assign(session.defaultSession, { requestHandler: null, checkHandler: null, deviceHandler: null })
  },
}

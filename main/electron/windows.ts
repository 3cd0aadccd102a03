import { BrowserWindow, type BrowserWindowConstructorOptions, type Session, type WebContents } from 'electron'
import { appOrigin, isAppAddress } from './app-scheme.ts'

/** Every safety setting is stated, those that are Electron's defaults too, so that a test holds them. */
const windowOptions = (preloadPath: string): BrowserWindowConstructorOptions => ({
  width: 1360,
  height: 860,
  minWidth: 860,
  minHeight: 560,
  show: false,
  title: 'Rampfold',
  backgroundColor: '#faf7f1',
  webPreferences: {
    preload: preloadPath,
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
  },
})

/** Opens a window on the sheet. */
export function openWindow(preloadPath: string): BrowserWindow {
  const window = new BrowserWindow(windowOptions(preloadPath))
  window.once('ready-to-show', () => {
    window.show()
  })
  void window.loadURL(`${appOrigin}/index.html`)
  return window
}

/** Holds for every page ever shown: it stays on the program's own address, opens no window, embeds nothing. */
export function confinePages(contents: WebContents): void {
  contents.setWindowOpenHandler(() => ({ action: 'deny' }))
  contents.on('will-navigate', stay)
  contents.on('will-redirect', stay)
  contents.on('will-frame-navigate', stay)
  contents.on('will-attach-webview', (event) => {
    event.preventDefault()
  })
}

function stay(event: { readonly url: string; preventDefault(): void }): void {
  if (!isAppAddress(event.url)) event.preventDefault()
}

/** The sheet needs no permission but to write to the clipboard when a table is copied. */
export function denyPermissions(session: Session): void {
  session.setPermissionRequestHandler((_contents, permission, decide, details) => {
    decide(isAllowed(permission, details.requestingUrl))
  })
  session.setPermissionCheckHandler((_contents, permission, requestingOrigin) => isAllowed(permission, requestingOrigin))
  session.setDevicePermissionHandler(() => false)
}

const isAllowed = (permission: string, address: string): boolean => permission === 'clipboard-sanitized-write' && isAppAddress(address)

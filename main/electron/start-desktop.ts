import { app, BrowserWindow, session } from 'electron'
import { defaultDataFolder } from '../study/data-folder.ts'
import { createHost } from '../host/create-host.ts'
import { readRendererFiles } from '../host/renderer-files.ts'
import { createWorkerPool } from '../host/worker-pool.ts'
import { registerAppScheme, serveAppScheme } from './app-scheme.ts'
import { openIpcGate } from './ipc.ts'
import { setMenu } from './menu.ts'
import { confinePages, denyPermissions, openWindow } from './windows.ts'

export interface DesktopPlaces {
  readonly workerUrl: URL
  readonly rendererFolder: string
  readonly preloadPath: string
}

/** The desktop shell. A second start brings the window of the first to the front and ends. */
export async function startDesktop({ workerUrl, rendererFolder, preloadPath }: DesktopPlaces): Promise<void> {
  registerAppScheme()
  if (!app.requestSingleInstanceLock()) {
    app.quit()
    return
  }
  app.on('second-instance', () => {
    const [window] = BrowserWindow.getAllWindows()
    if (window === undefined) return
    if (window.isMinimized()) window.restore()
    window.focus()
  })
  app.on('web-contents-created', (_event, contents) => {
    confinePages(contents)
  })

  await app.whenReady()
  denyPermissions(session.defaultSession)
  serveAppScheme(await readRendererFiles(rendererFolder))
  const host = createHost({
    dataFolder: defaultDataFolder(),
    pool: createWorkerPool({ workerUrl }),
    version: app.getVersion(),
    shell: 'desktop',
  })
  const closeGate = openIpcGate(host)
  setMenu(process.platform)
  openWindow(preloadPath)

  app.on('activate', () => {
    if (BrowserWindow.getAllWindows().length === 0) openWindow(preloadPath)
  })
  app.on('window-all-closed', () => {
    if (process.platform !== 'darwin') app.quit()
  })
  let saved = false
  app.on('will-quit', (event) => {
    if (saved) return
    // The last save first; then the same way again.
    event.preventDefault()
    closeGate()
    void host
      .close()
      .catch((error: unknown) => {
        process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`)
      })
      .finally(() => {
        saved = true
        app.quit()
      })
  })
}

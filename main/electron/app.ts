import { app } from 'electron'
import { fileURLToPath } from 'node:url'
import { startDesktop } from './start-desktop.ts'

// The desktop shell's entry; its place in the build (out/main/app.js) is what the addresses below count from.
startDesktop({
  workerUrl: new URL('./worker-entry.js', import.meta.url),
  rendererFolder: fileURLToPath(new URL('../renderer', import.meta.url)),
  preloadPath: fileURLToPath(new URL('../preload/preload.cjs', import.meta.url)),
}).catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`)
  app.exit(1)
})

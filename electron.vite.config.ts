import react from '@vitejs/plugin-react'
import { chmod } from 'node:fs/promises'
import { join } from 'node:path'
import { defineConfig } from 'electron-vite'
import type { Plugin } from 'vite'

// The host also runs under plain Node 20 (browser shell, command line), so the main bundle must not use later syntax.
const node = 'node20.19'

/** npm makes the command executable when it installs; a later build must leave it so. */
const executableCommand: Plugin = {
  name: 'executable-command',
  writeBundle: async ({ dir }) => chmod(join(dir ?? '', 'cli.js'), 0o755),
}

export default defineConfig({
  main: {
    plugins: [executableCommand],
    build: {
      target: node,
      sourcemap: true,
      rolldownOptions: {
        input: {
          app: 'main/electron/app.ts',
          cli: 'main/cli/cli.ts',
          start: 'main/cli/start.ts',
          'worker-entry': 'main/host/worker-entry.ts',
        },
        output: { entryFileNames: '[name].js', chunkFileNames: 'chunks/[name]-[hash].js' },
      },
    },
  },
  preload: {
    build: {
      externalizeDeps: false,
      rolldownOptions: { input: { preload: 'main/preload/preload.ts' }, output: { format: 'cjs', entryFileNames: '[name].cjs' } },
    },
  },
  renderer: {
    root: 'renderer',
    plugins: [react()],
    // One page read from this machine: a single script is right, whatever its size.
    build: { minify: true, chunkSizeWarningLimit: 2000, rolldownOptions: { input: 'renderer/index.html' } },
  },
})

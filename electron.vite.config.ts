import react from '@vitejs/plugin-react'
import { defineConfig } from 'electron-vite'
import type { Plugin } from 'vite'
import { buildCommandLine } from './main/cli/build-command-line.ts'

// The host also runs under plain Node 20 (browser shell), so the main bundle must not use later syntax.
const node = 'node20.19'

/** The command line is a script of its own, without chunks. */
const commandLine: Plugin = { name: 'command-line', writeBundle: async ({ dir }) => buildCommandLine(import.meta.dirname, dir ?? '') }

export default defineConfig({
  main: {
    plugins: [commandLine],
    build: {
      target: node,
      sourcemap: true,
      rolldownOptions: {
        input: {
          app: 'main/electron/app.ts',
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

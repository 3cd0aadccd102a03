import { fileURLToPath } from 'node:url'
import { defineConfig } from 'vitest/config'

export default defineConfig({
  // The desktop shell is tried against a fake: Electron's binary cannot be had everywhere.
  resolve: { alias: { electron: fileURLToPath(new URL('./electron/testing/fake-electron.ts', import.meta.url)) } },
  test: { name: 'main', include: ['**/*.test.ts'], environment: 'node', testTimeout: 60_000 },
})

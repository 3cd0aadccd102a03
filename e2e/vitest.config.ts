import { defineConfig } from 'vitest/config'

export default defineConfig({ test: { name: 'house', include: ['house/**/*.test.ts'], environment: 'node', testTimeout: 120_000 } })

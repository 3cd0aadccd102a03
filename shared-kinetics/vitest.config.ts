import { defineConfig } from 'vitest/config'

export default defineConfig({ test: { name: 'shared-kinetics', include: ['**/*.test.ts'], environment: 'node', testTimeout: 60_000 } })
